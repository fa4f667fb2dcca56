import { useEffect, useId, useLayoutEffect, useRef, useState } from 'react'
import type { Point } from './geometry.ts'
import { closeKindMenu, type KindItem, takeKind, useKindMenuStore } from './kind-menu-store.ts'
import { SymbolIcon } from './UnitSymbol.tsx'
import { canvasBox } from './view.ts'

/** A small list of kinds at a place of the canvas: filter by typing, arrows, Enter. */
export function KindMenu() {
  const menu = useKindMenuStore((state) => state.menu)
  return menu ? <OpenMenu title={menu.title} items={menu.items} at={menu.at} /> : null
}

function OpenMenu(props: {
  readonly title: string
  readonly items: readonly KindItem[]
  readonly at: Point
}) {
  const { title, items, at } = props
  const listId = useId()
  const box = useRef<HTMLDivElement>(null)
  const list = useRef<HTMLDivElement>(null)
  const [filter, setFilter] = useState('')
  const [chosen, setChosen] = useState(0)
  const [place, setPlace] = useState<Point | null>(null)
  const words = filter.toLowerCase().split(/\s+/).filter(Boolean)
  const shown = items.filter(({ label, detail = '' }) =>
    words.every((word) => `${label} ${detail}`.toLowerCase().includes(word)),
  )
  const current = Math.min(chosen, shown.length - 1)

  useLayoutEffect(() => {
    const canvas = canvasBox()
    const own = box.current
    if (!canvas || !own) return
    // Within the canvas, beside the pointer.
    const clamp = (wanted: number, most: number) => Math.max(4, Math.min(wanted, most - 4))
    setPlace([
      clamp(at[0] - canvas.left + 8, canvas.width - own.offsetWidth),
      clamp(at[1] - canvas.top + 4, canvas.height - own.offsetHeight),
    ])
    own.querySelector('input')?.focus({ preventScroll: true })
  }, [at])

  useEffect(() => {
    list.current?.children[current]?.scrollIntoView({ block: 'nearest' })
  }, [current])

  useEffect(() => {
    const leave = (event: PointerEvent) => {
      if (!box.current?.contains(event.target as Node)) closeKindMenu()
    }
    window.addEventListener('pointerdown', leave, true)
    return () => window.removeEventListener('pointerdown', leave, true)
  }, [])

  return (
    <div
      ref={box}
      className="kind-menu"
      style={place ? { left: place[0], top: place[1] } : { opacity: 0 }}
    >
      <input
        type="text"
        role="combobox"
        aria-label={title}
        aria-expanded
        aria-controls={listId}
        aria-autocomplete="list"
        aria-activedescendant={current >= 0 ? `${listId}-${current}` : undefined}
        placeholder={title}
        autoComplete="off"
        spellCheck={false}
        value={filter}
        onChange={(event) => {
          setFilter(event.target.value)
          setChosen(0)
        }}
        onBlur={(event) => {
          if (!box.current?.contains(event.relatedTarget)) closeKindMenu()
        }}
        onKeyDown={(event) => {
          event.stopPropagation()
          const item = shown[current]
          if (event.key === 'ArrowDown') setChosen(Math.min(current + 1, shown.length - 1))
          else if (event.key === 'ArrowUp') setChosen(Math.max(current - 1, 0))
          else if (event.key === 'Enter' && item) takeKind(item)
          else if (event.key === 'Escape') closeKindMenu()
          else return
          event.preventDefault()
        }}
      />
      <div ref={list} id={listId} role="listbox" aria-label={title} className="kind-menu-list">
        {shown.map((item, i) => (
          // biome-ignore lint/a11y/useKeyWithClickEvents: the keys are the input's.
          <div
            key={`${item.kind}/${item.port ?? ''}`}
            id={`${listId}-${i}`}
            role="option"
            tabIndex={-1}
            aria-selected={i === current}
            data-kind-item={item.kind}
            onPointerDown={(event) => event.preventDefault()}
            onPointerMove={() => setChosen(i)}
            onClick={() => takeKind(item)}
          >
            <SymbolIcon kind={item.kind} />
            <span>{item.label}</span>
            {item.detail && <span className="muted">{item.detail}</span>}
          </div>
        ))}
        {shown.length === 0 && (
          <div className="muted" role="option" tabIndex={-1} aria-selected={false} aria-disabled>
            No kind of that name fits here.
          </div>
        )}
      </div>
    </div>
  )
}
