import { at, type SymbolDrawing } from './symbol.ts'

export const desuperheater: SymbolDrawing = {
  size: () => ({ width: 40, height: 24 }),
  body: () => ({ x: 0, y: 8, width: 40, height: 16 }),
  ports: {
    steam: at(0, 16, 'left'),
    spray: at(16, 0, 'top'),
    outlet: at(40, 16, 'right'),
  },
  Drawing: () => (
    <>
      <path d="M0 8H40V24H0Z" />
      <path className="open" d="M16 0V11" />
      <path className="detail open" d="M16 11L10 20M16 11V20M16 11L22 20" />
    </>
  ),
  label: ['bottom', 'top', 'right', 'left'],
}
