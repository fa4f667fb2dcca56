import { useState } from 'react'
import type { Given } from '../../src/document.ts'
import type { Finding, Remedy } from '../../src/messages.ts'
import { focusNumber } from '../number/focus.ts'
import { free, give, givenText, lastGiven, quantityName } from '../number/give.ts'
import { readValueBefore } from '../store/balance-store.ts'
import { readGiven, useLayout } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'

/** How many remedies stand there before 'and n more'. */
const nearest = 4

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

function inOrder(remedies: readonly Remedy[]): readonly Remedy[] {
  const newest = remedies.find(isNewest)
  return newest ? [newest, ...remedies.filter((one) => one !== newest)] : remedies
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
        const value = suggestion(remedy)
        const [id = ''] = remedy.path.split('.')
        return (
          <button
            key={`${remedy.action}/${remedy.path}`}
            type="button"
            className="remedy"
            data-remedy={remedy.path}
            aria-label={`${remedy.action === 'give' ? 'Give' : 'Free'} ${quantityName(remedy.path)}${value ? `, ${value}` : ''}`}
            onClick={() => {
              hover(null)
              apply(remedy)
            }}
            onPointerEnter={() => hover(id)}
            onPointerLeave={() => hover(null)}
            onFocus={() => hover(id)}
            onBlur={() => hover(null)}
          >
            {quantityName(remedy.path)}
            {value && <span className="remedy-value">{value}</span>}
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
