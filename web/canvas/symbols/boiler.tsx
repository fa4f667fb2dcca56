import { at, type SymbolDrawing } from './symbol.ts'

export const boiler: SymbolDrawing = {
  size: () => ({ width: 64, height: 104 }),
  ports: {
    feedwater: at(32, 104, 'bottom'),
    spray: at(64, 32, 'right'),
    steam: at(32, 0, 'top'),
    blowdown: at(64, 88, 'right'),
  },
  Drawing: () => (
    <>
      <path d="M0 0H64V104H0Z" />
      <path
        className="open"
        d="M32 0V12L18 17L46 27L18 37L46 47L18 57L46 67L18 77L46 87L32 92V104"
      />
      <path className="solid" d="M0 84L8 89L0 94Z" />
    </>
  ),
  label: ['bottom', 'left', 'right', 'top'],
}
