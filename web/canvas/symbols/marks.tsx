/** Marks that several symbols share. */

/** Fired: fuel burnt in this unit. Points up, its foot at (x, y). */
export function Fired({ x, y }: { readonly x: number; readonly y: number }) {
  return <path className="solid" d={`M${x - 5} ${y}L${x} ${y - 8}L${x + 5} ${y}Z`} />
}

/** Free liquid surface: a level across `width` from (x, y), its triangle at `mark`. */
export function Level(props: {
  readonly x: number
  readonly y: number
  readonly width: number
  readonly mark: number
}) {
  const { x, y, width, mark } = props
  return (
    <g className="detail">
      <path className="open" d={`M${x} ${y}h${width}`} />
      <path d={`M${mark - 4} ${y - 7}h8l-4 7Z`} />
      <path className="open" d={`M${mark - 4} ${y + 3}h8M${mark - 2} ${y + 6}h4`} />
    </g>
  )
}
