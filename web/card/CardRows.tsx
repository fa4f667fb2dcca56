import { useRef, useState } from 'react'
import type { QuantityEntry } from '../../src/document.ts'
import { focusNumber, useFocusWantedAmong } from '../number/focus.ts'
import { free, give } from '../number/give.ts'
import { QuantityField } from '../number/QuantityField.tsx'
import { readValue, useBalanceStore } from '../store/balance-store.ts'
import { readGiven, usePlantStore } from '../store/plant-store.ts'
import type { CardContent } from './card-content.ts'

/** Turns a number round: a given is freed; a solved one is given as it is, an open one at its usual value. */
function turnRound({ path, description }: QuantityEntry): void {
  if (readGiven(path) !== undefined) {
    free(path)
    return
  }
  const value = readValue(path) ?? description.usual
  if (value !== undefined) give(path, value)
  focusNumber(path, true)
}

function Row({ entry, given }: { entry: QuantityEntry; given: boolean }) {
  const { path, label, description } = entry
  return (
    <tr className="card-row" data-given={given}>
      <td className="card-turn">
        <button
          type="button"
          role="switch"
          aria-checked={given}
          aria-label={`${label} given`}
          title={
            given ? 'Given. Click to free it: then it is solved.' : 'Click to give it a value.'
          }
          data-turn={path}
          onClick={() => turnRound(entry)}
        />
      </td>
      <th scope="row" title={description.help}>
        {label}
        {description.symbol && <span className="card-symbol">{description.symbol}</span>}
      </th>
      <td className="card-value">
        <QuantityField path={path} label={label} description={description} />
      </td>
    </tr>
  )
}

function Side({ name }: { name: string }) {
  return (
    <tr>
      <th colSpan={3} scope="colgroup" className="card-side">
        {name}
      </th>
    </tr>
  )
}

/**
 * Which quantities stay open in a solved plant: they only describe, and nothing needs them. One digit
 * an entry. While the plant is not solved none counts as such: any may be the one that is missing.
 */
function useIdle(entries: readonly QuantityEntry[]): string {
  return useBalanceStore(({ balance }) =>
    entries
      .map(({ path }) => (balance?.status === 'solved' && readValue(path) === null ? '1' : '0'))
      .join(''),
  )
}

/** Moves the focus by rows, within its column. */
function moveFocus(table: HTMLElement, step: number): boolean {
  const here = document.activeElement
  const selector = here?.hasAttribute('data-turn') ? 'button[data-turn]' : 'button[data-path]'
  const all = Array.from(table.querySelectorAll<HTMLElement>(selector))
  const next = all[all.indexOf(here as HTMLElement) + step]
  if (!next || !here || !table.contains(here)) return false
  next.focus()
  return true
}

/** The numbers of a card: what is given first, what is solved after. */
export function CardRows({ content }: { content: CardContent }) {
  const table = useRef<HTMLTableElement>(null)
  // A string, so that the rows are sorted anew only when some quantity changed sides.
  const sides = usePlantStore(() =>
    content.entries.map(({ path }) => (readGiven(path) === undefined ? '0' : '1')).join(''),
  )
  const given = content.entries.filter((_, i) => sides[i] === '1')
  const idle = useIdle(content.entries)
  const [all, setAll] = useState(false)
  const idlePaths = content.entries.filter((_, i) => idle[i] === '1').map(({ path }) => path)
  const lookedFor = useFocusWantedAmong(idlePaths)
  if (lookedFor && !all) setAll(true)
  const solved = content.entries.filter((_, i) => sides[i] === '0' && (all || idle[i] === '0'))
  const hidden = content.entries.length - given.length - solved.length

  if (content.entries.length === 0) {
    return <p className="card-part muted">No numbers of its own: its streams have them.</p>
  }
  return (
    <table
      ref={table}
      className="card-rows"
      onKeyDown={(event) => {
        const step = { ArrowDown: 1, ArrowUp: -1 }[event.key]
        if (step && table.current && moveFocus(table.current, step)) {
          event.preventDefault()
          event.stopPropagation()
        }
      }}
    >
      {/* All rows in one body: one that changes sides moves, and keeps its open field and the focus. */}
      <tbody>
        {[
          ...(given.length > 0 ? [<Side key="given" name="Given" />] : []),
          ...given.map((entry) => <Row key={entry.path} entry={entry} given />),
          ...(solved.length > 0 ? [<Side key="solved" name="Solved" />] : []),
          ...solved.map((entry) => <Row key={entry.path} entry={entry} given={false} />),
        ]}
        {hidden > 0 && (
          <tr key="more">
            <td colSpan={3} className="card-more">
              <button type="button" onClick={() => setAll(true)}>
                and {hidden} open
              </button>
            </td>
          </tr>
        )}
      </tbody>
    </table>
  )
}
