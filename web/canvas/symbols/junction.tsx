import { anySide } from './dot.ts'
import type { SymbolDrawing } from './symbol.ts'

export const junction: SymbolDrawing = {
  size: () => ({ width: 16, height: 16 }),
  body: () => ({ x: 4, y: 4, width: 8, height: 8 }),
  ports: {
    'inlet*': (form, number) =>
      number % 2 === 1
        ? anySide('left', 'top', 'bottom', 'right')(form, number)
        : anySide('bottom', 'top', 'left', 'right')(form, number),
    outlet: anySide('right', 'bottom', 'top', 'left'),
  },
  Drawing: () => <circle cx={8} cy={8} r={4} />,
  label: [],
}
