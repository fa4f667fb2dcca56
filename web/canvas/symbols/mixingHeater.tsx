import { Level } from './marks.tsx'
import { at, inTurn, type SymbolDrawing } from './symbol.ts'

export const mixingHeater: SymbolDrawing = {
  size: () => ({ width: 48, height: 40 }),
  ports: {
    'steam*': inTurn(
      { x: 24, y: 0, side: 'top' },
      { x: 16, y: 0, side: 'top' },
      { x: 32, y: 0, side: 'top' },
      { x: 8, y: 1.5, side: 'top' },
    ),
    'water*': inTurn(
      { x: 48, y: 24, side: 'right' },
      { x: 48, y: 16, side: 'right' },
      { x: 0, y: 24, side: 'left' },
      { x: 0, y: 16, side: 'left' },
    ),
    'drain*': inTurn(
      { x: 8, y: 38.5, side: 'bottom' },
      { x: 16, y: 40, side: 'bottom' },
      { x: 0, y: 24, side: 'left' },
      { x: 0, y: 16, side: 'left' },
    ),
    outlet: at(32, 40, 'bottom'),
    vent: at(40, 1.5, 'top'),
  },
  Drawing: () => (
    <>
      <rect width={48} height={40} rx={16} />
      <Level x={0} y={24} width={48} mark={16} />
    </>
  ),
  label: ['top', 'left', 'bottom', 'right'],
}
