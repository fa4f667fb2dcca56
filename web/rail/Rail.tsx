import { useMemo, useRef, useState, useSyncExternalStore } from 'react'
import { type KindGroup, kinds } from '../../src/document.ts'
import { useCanvasStore } from '../canvas/canvas-store.ts'
import { carry, placeFreely, usePlacingStore } from '../canvas/placing.ts'
import { symbolOf } from '../canvas/symbols/index.ts'
import { SymbolIcon, UnitSymbol } from '../canvas/UnitSymbol.tsx'
import { useSettingsStore } from '../store/settings-store.ts'
import './rail.css'

const groups: readonly KindGroup[] = ['Heat', 'Machines', 'Heaters', 'Vessels', 'Lines', 'Edges']

/** Below this width of the window the names give their room to the canvas. */
const roomForNames = window.matchMedia('(min-width: 1360px)')

function useRoomForNames(): boolean {
  return useSyncExternalStore(
    (tell) => {
      roomForNames.addEventListener('change', tell)
      return () => roomForNames.removeEventListener('change', tell)
    },
    () => roomForNames.matches,
  )
}

/** The kinds of unit, as the trade groups them: drag one onto the canvas, or press Enter. */
export default function Rail() {
  const chosen = useSettingsStore((state) => state.railFolded)
  const change = useSettingsStore((state) => state.change)
  const room = useRoomForNames()
  const folded = chosen ?? !room
  const [filter, setFilter] = useState('')
  const list = useRef<HTMLDivElement>(null)
  const shown = useMemo(() => {
    const words = filter.toLowerCase().split(/\s+/).filter(Boolean)
    const fits = (label: string, group: string) =>
      words.every((word) => `${label} ${group}`.toLowerCase().includes(word))
    return groups
      .map((group) => ({
        group,
        kinds: kinds.filter((kind) => kind.group === group && fits(kind.label, group)),
      }))
      .filter((one) => one.kinds.length > 0)
  }, [filter])

  const buttons = () => [...(list.current?.querySelectorAll('button') ?? [])]
  const step = (by: number) => {
    const all = buttons()
    const now = all.indexOf(document.activeElement as HTMLButtonElement)
    all[(now + by + all.length) % all.length]?.focus()
  }

  return (
    <nav
      className={folded ? 'rail rail-folded' : 'rail'}
      aria-label="Kinds of unit"
      onKeyDown={(event) => {
        if (event.key === 'ArrowDown') step(1)
        else if (event.key === 'ArrowUp') step(-1)
        else if (event.key === 'Escape') setFilter('')
        else return
        event.preventDefault()
      }}
    >
      {!folded && (
        <input
          className="rail-filter"
          type="search"
          placeholder="Filter"
          aria-label="Filter the kinds of unit"
          value={filter}
          onChange={(event) => setFilter(event.target.value)}
          onKeyDown={(event) => {
            const only = shown[0]?.kinds[0]
            if (event.key !== 'Enter' || !only) return
            placeFreely(only.name)
            setFilter('')
          }}
        />
      )}
      <div className="rail-list" ref={list}>
        {shown.map(({ group, kinds: members }) => (
          <section key={group} aria-label={group}>
            <h2 className="rail-group">{group}</h2>
            <ul>
              {members.map((kind) => (
                <li key={kind.name}>
                  <button
                    type="button"
                    className="rail-kind"
                    data-kind={kind.name}
                    title={folded ? kind.label : kind.help}
                    aria-label={kind.label}
                    onPointerDown={(event) => {
                      if (event.button !== 0) return
                      carry(kind.name, event.pointerId, [event.clientX, event.clientY])
                    }}
                    onDragStart={(event) => event.preventDefault()}
                    onClick={() => placeFreely(kind.name)}
                  >
                    <SymbolIcon kind={kind.name} />
                    {!folded && <span>{kind.label}</span>}
                  </button>
                </li>
              ))}
            </ul>
          </section>
        ))}
        {shown.length === 0 && <p className="rail-none">No kind has this name.</p>}
      </div>
      <button
        type="button"
        className="rail-fold"
        aria-expanded={!folded}
        title={folded ? 'Show the names' : 'Icons only'}
        aria-label={folded ? 'Show the names' : 'Icons only'}
        onClick={() => change({ railFolded: !folded })}
      >
        <svg width={16} height={16} className="icon" aria-hidden="true">
          <path d={folded ? 'M6 4l4 4-4 4' : 'M10 4l-4 4 4 4'} />
        </svg>
      </button>
      <Carried />
    </nav>
  )
}

/** The symbol under the pointer on its way to the canvas. */
function Carried() {
  const carried = usePlacingStore((state) => state.carried)
  const zoom = useCanvasStore((state) => state.zoom)
  if (!carried) return null
  const form = { options: {}, counts: {} }
  const { width, height } = symbolOf(carried.kind).size(form)
  return (
    <svg
      className="rail-carried"
      aria-hidden="true"
      width={width}
      height={height}
      style={{
        transform: `translate(${carried.at[0]}px, ${carried.at[1]}px) scale(${zoom}) translate(${-width / 2}px, ${-height / 2}px)`,
      }}
    >
      <UnitSymbol kind={carried.kind} form={form} />
    </svg>
  )
}
