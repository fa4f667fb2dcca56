import { useState } from 'react'
import { type Given, type Layout, splitPath } from '../../src/document.ts'
import type { Finding, Remedy } from '../../src/messages.ts'
import { focusNumber } from '../number/focus.ts'
import { free, give, givenText, lastGiven, quantityName } from '../number/give.ts'
import { readValueBefore } from '../store/balance-store.ts'
import { readGiven, readLayout, useLayout } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'

/** How many remedies stand there before 'and n more'. */
const nearest = 6

/** What a remedy would give: what the quantity was when the plant was last solved, else what suggests itself. */
function valueToGive({ path, value }: Remedy): Given | undefined {
  return readValueBefore(path) ?? value
}

function apply(remedy: Remedy): void {
  const { action, path } = remedy
  if (action === 'free') {
    free(path)
    return
  }
  const value = valueToGive(remedy)
  if (value !== undefined) give(path, value)
  // Shown where it can be changed at once: the value that suggests itself is seldom the one wanted.
  const [id] = path.split('.')
  if (id !== undefined) useSelectionStore.getState().select([id])
  focusNumber(path, true)
}

function suggestion(remedy: Remedy): string {
  const { action, path } = remedy
  const shown: Given | undefined = action === 'free' ? readGiven(path) : valueToGive(remedy)
  const text = shown === undefined ? '' : givenText(path, shown)
  if (action === 'give' && readValueBefore(path) !== null) return `was ${text}`
  return isNewest(remedy) ? `${text}, just given` : text
}

/** Freeing what was given last comes first: that takes back what made the numbers too many. */
function isNewest({ action, path }: Remedy): boolean {
  return action === 'free' && path === lastGiven()
}

/** How far a quantity is from what was given last: at the same thing, at what meets it, elsewhere. */
function farness(path: string, near: ReadonlySet<string>, own: string): number {
  const id = splitPath(path)?.[0] ?? ''
  return id === own ? 0 : near.has(id) ? 1 : 2
}

/** What was given last, then what is near it, then the others as they come. */
function inOrder(remedies: readonly Remedy[]): readonly Remedy[] {
  const newest = remedies.find(isNewest)
  if (!newest) return remedies
  const own = splitPath(newest.path)?.[0] ?? ''
  const near = neighboursOf(readLayout(), own)
  const others = remedies.filter((one) => one !== newest)
  return [
    newest,
    ...[0, 1, 2].flatMap((far) => others.filter(({ path }) => farness(path, near, own) === far)),
  ]
}

/** The streams at a unit, or the units at a stream's ends. */
function neighboursOf(layout: Layout, id: string): ReadonlySet<string> {
  const near = new Set<string>()
  for (const { id: stream, from, to } of layout.streams) {
    const ends = [from, to].map((end) => splitPath(end)?.[0] ?? end)
    if (ends.includes(id)) near.add(stream)
    if (stream === id) for (const end of ends) near.add(end)
  }
  return near
}

/** Quantities of which one must be given or freed, each a click; the nearest first. */
export function Remedies({ finding }: { finding: Finding }) {
  const [all, setAll] = useState(false)
  const hover = useSelectionStore((state) => state.hover)
  useLayout()
  useUnitChoice()
  const remedies = inOrder(finding.remedies ?? [])
  const shown = all ? remedies : remedies.slice(0, nearest)
  const more = remedies.length - shown.length
  if (remedies.length === 0) return null
  return (
    <div className="remedies">
      {shown.map((remedy) => {
        const { action, path } = remedy
        const value = suggestion(remedy)
        const name = quantityName(path)
        const [id = ''] = path.split('.')
        return (
          <button
            key={`${action}/${path}`}
            type="button"
            className="remedy"
            data-remedy={path}
            onClick={() => {
              hover(null)
              apply(remedy)
            }}
            onPointerEnter={() => hover(id)}
            onPointerLeave={() => hover(null)}
            onFocus={() => hover(id)}
            onBlur={() => hover(null)}
          >
            <span className="visually-hidden">
              {`${action === 'give' ? 'Give' : 'Free'} ${name}${value ? `, ${value}` : ''}`}
            </span>
            <span aria-hidden="true">
              {name}
              {value && <span className="remedy-value">{value}</span>}
            </span>
          </button>
        )
      })}
      {more > 0 && (
        <button type="button" className="remedy-more" onClick={() => setAll(true)}>
          and {more} more
        </button>
      )}
    </div>
  )
}
