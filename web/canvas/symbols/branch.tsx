import { anySide } from './dot.ts'
import type { SymbolDrawing } from './symbol.ts'

export const branch: SymbolDrawing = {
  size: () => ({ width: 16, height: 16 }),
  body: () => ({ x: 4, y: 4, width: 8, height: 8 }),
  ports: {
    inlet: anySide('left', 'top', 'bottom', 'right'),
    'outlet*': (form, number) =>
      number % 2 === 1
        ? anySide('bottom', 'right', 'top', 'left')(form, number)
        : anySide('right', 'top', 'bottom', 'left')(form, number),
  },
  Drawing: () => <circle className="solid" cx={8} cy={8} r={4} />,
  label: [],
}
