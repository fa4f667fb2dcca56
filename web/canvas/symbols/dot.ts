import { outward, type Side } from '../geometry.ts'
import type { Anchor, Form, Places } from './symbol.ts'

function onDot(side: Side): Anchor {
  const [x, y] = outward[side]
  return { x: 8 + 4 * x, y: 8 + 4 * y, side }
}

/** Streams meet a dot from any side, the first named by choice. */
export const anySide =
  (first: Side, ...others: readonly Side[]) =>
  (_: Form, __: number): Places => [onDot(first), ...others.map(onDot)]
