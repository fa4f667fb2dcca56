import { Fired } from './marks.tsx'
import { at, type SymbolDrawing } from './symbol.ts'

export const reheater: SymbolDrawing = {
  size: () => ({ width: 48, height: 48 }),
  ports: {
    inlet: at(0, 24, 'left'),
    spray: at(8, 0, 'top'),
    outlet: at(48, 24, 'right'),
  },
  Drawing: () => (
    <>
      <path d="M0 0H48V48H0Z" />
      <path className="open" d="M0 24H7L11 12L20 36L29 12L38 36L42 24H48" />
      <Fired x={24} y={48} />
    </>
  ),
  label: ['top', 'bottom', 'right', 'left'],
}
