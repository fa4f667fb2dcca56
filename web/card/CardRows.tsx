import { useLayoutEffect, useRef, useState } from 'react'
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

  // A row that changes sides takes the focus along.
  const focused = useRef<string | null>(null)
  useLayoutEffect(() => {
    const mark = focused.current
    if (sides === '' || !mark || document.activeElement !== document.body) return
    table.current?.querySelector<HTMLElement>(mark)?.focus()
  }, [sides])

  if (content.entries.length === 0) {
    return <p className="card-part muted">No numbers of its own: its streams have them.</p>
  }
  return (
    <table
      ref={table}
      className="card-rows"
      onFocus={(event) => {
        const { path, turn } = event.target.dataset
        focused.current = turn ? `[data-turn="${turn}"]` : path ? `[data-path="${path}"]` : null
      }}
      onBlur={(event) => {
        if (event.relatedTarget && !table.current?.contains(event.relatedTarget)) {
          focused.current = null
        }
      }}
      onKeyDown={(event) => {
        const step = { ArrowDown: 1, ArrowUp: -1 }[event.key]
        if (step && table.current && moveFocus(table.current, step)) {
          event.preventDefault()
          event.stopPropagation()
        }
      }}
    >
      {given.length > 0 && (
        <tbody aria-label="Given">
          <tr>
            <th colSpan={3} scope="rowgroup" className="card-side">
              Given
            </th>
          </tr>
          {given.map((entry) => (
            <Row key={entry.path} entry={entry} given />
          ))}
        </tbody>
      )}
      {solved.length > 0 && (
        <tbody aria-label="Solved">
          <tr>
            <th colSpan={3} scope="rowgroup" className="card-side">
              Solved
            </th>
          </tr>
          {solved.map((entry) => (
            <Row key={entry.path} entry={entry} given={false} />
          ))}
        </tbody>
      )}
      {hidden > 0 && (
        <tbody>
          <tr>
            <td colSpan={3} className="card-more">
              <button type="button" onClick={() => setAll(true)}>
                and {hidden} open
              </button>
            </td>
          </tr>
        </tbody>
      )}
    </table>
  )
}
