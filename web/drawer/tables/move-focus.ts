import type { KeyboardEvent } from 'react'

/** The arrow keys move between the fields and buttons of a table's body. */
export function moveFocus(event: KeyboardEvent<HTMLElement>): void {
  const cell = (event.target as Element).closest('td, th')
  const line = cell?.parentElement
  if (!cell || !line || (event.target as Element).matches('input')) return
  const column = Array.from(line.children).indexOf(cell)
  const focusIn = (row: Element | null | undefined, at: number) => {
    const button = row?.children[at]?.querySelector<HTMLElement>('button')
    button?.focus()
    return button !== undefined && button !== null
  }
  const rowBeside = (step: 1 | -1): Element | null => {
    let row: Element | null = line
    do row = step > 0 ? row.nextElementSibling : row.previousElementSibling
    while (row && row.children.length <= 1)
    return row
  }
  let moved = false
  if (event.key === 'ArrowDown') moved = focusIn(rowBeside(1), column)
  else if (event.key === 'ArrowUp') moved = focusIn(rowBeside(-1), column)
  else if (event.key === 'ArrowRight' || event.key === 'ArrowLeft') {
    const step = event.key === 'ArrowRight' ? 1 : -1
    for (let at = column + step; at >= 0 && at < line.children.length && !moved; at += step) {
      moved = focusIn(line, at)
    }
  }
  if (moved) {
    event.preventDefault()
    event.stopPropagation()
  }
}
