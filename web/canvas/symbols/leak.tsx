import { at, type SymbolDrawing } from './symbol.ts'

export const leak: SymbolDrawing = {
  size: () => ({ width: 32, height: 16 }),
  ports: { inlet: at(0, 8, 'left'), outlet: at(32, 8, 'right') },
  Drawing: () => (
    <>
      <path className="blank" d="M0 0H32V16H0Z" />
      <path className="open" d="M0 0H32M0 16H32M4 0V10M10 16V6M16 0V10M22 16V6M28 0V10" />
    </>
  ),
  label: ['top', 'bottom', 'right', 'left'],
}
