import { at, type SymbolDrawing } from './symbol.ts'

export const heatUser: SymbolDrawing = {
  size: () => ({ width: 48, height: 56 }),
  ports: { steam: at(0, 24, 'left'), condensate: at(48, 24, 'right') },
  Drawing: () => (
    <>
      <path d="M0 0H48V48H0Z" />
      <path className="open" d="M0 24H7L11 12L20 36L29 12L38 36L42 24H48" />
      <path d="M19 48L24 56L29 48" />
    </>
  ),
  label: ['top', 'bottom', 'right', 'left'],
}
