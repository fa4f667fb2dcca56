import { type Anchor, at, inTurn, type SymbolDrawing } from './symbol.ts'

const middle = 32
const radius = 28

/** On the upper or lower half of the shell, x px beside the middle. */
function onShell(x: number, side: 'top' | 'bottom'): Anchor {
  const rise = Math.sqrt(radius * radius - x * x)
  return { x: middle + x, y: middle + (side === 'top' ? -rise : rise), side }
}

export const condenser: SymbolDrawing = {
  size: () => ({ width: 64, height: 64 }),
  body: () => ({ x: 4, y: 4, width: 56, height: 56 }),
  ports: {
    'steam*': inTurn(
      onShell(0, 'top'),
      onShell(-16, 'top'),
      onShell(16, 'top'),
      onShell(-8, 'top'),
      onShell(8, 'top'),
    ),
    'drain*': inTurn(
      onShell(24, 'bottom'),
      onShell(-24, 'bottom'),
      onShell(16, 'bottom'),
      onShell(-16, 'bottom'),
      onShell(8, 'bottom'),
    ),
    condensate: at(middle, 60, 'bottom'),
  },
  Drawing: () => (
    <>
      <circle cx={middle} cy={middle} r={radius} />
      <path className="open" d="M15 32L20 22L28 42L36 22L44 42L49 32" />
      <path className="detail open" d="M-5 32H15M49 32H69M63 28L69 32L63 36" />
    </>
  ),
  overhang: 8,
  label: ['left', 'right', 'bottom', 'top'],
}
