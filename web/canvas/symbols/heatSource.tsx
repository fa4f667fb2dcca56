import { at, type SymbolDrawing } from './symbol.ts'

export const heatSource: SymbolDrawing = {
  size: () => ({ width: 48, height: 48 }),
  ports: { inlet: at(0, 24, 'left'), outlet: at(48, 24, 'right') },
  Drawing: () => (
    <>
      <path d="M0 0H48V48H0Z" />
      <path className="open" d="M0 24H7L11 12L20 36L29 12L38 36L42 24H48" />
      <path d="M19 48L24 39L29 48" />
    </>
  ),
  label: ['top', 'bottom', 'right', 'left'],
}
