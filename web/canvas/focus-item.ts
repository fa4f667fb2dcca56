/** Gives the focus to a unit or stream that is drawn. */
export function focusItem(id: string): void {
  const item = document.querySelector<HTMLElement | SVGElement>(
    `.react-flow__node[data-id="${CSS.escape(id)}"], .react-flow__edge[data-id="${CSS.escape(id)}"]`,
  )
  item?.focus()
}
