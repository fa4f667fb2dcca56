import { memo, useCallback, useRef, useState } from 'react'
import { basisOf, type QuantityEntry } from '../../src/document.ts'
import { focusNumber, useFocusWantedAmong } from '../number/focus.ts'
import { free, give } from '../number/give.ts'
import { QuantityField } from '../number/QuantityField.tsx'
import { readValue, useBalanceStore } from '../store/balance-store.ts'
import { readGiven, readLayout, usePlantStore } from '../store/plant-store.ts'
import { useQuestionStore } from '../store/questions.ts'
import type { CardContent } from './card-content.ts'
import { RowDetail } from './RowDetail.tsx'
import { useWorthWanted } from './use-worth.ts'
import { WorthCells, WorthTarget, WorthUnits } from './WorthCells.tsx'

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

interface RowProps {
  readonly entry: QuantityEntry
  readonly given: boolean
  readonly open: boolean
  onToggle(path: string): void
}

const Row = memo(function Row({ entry, given, open, onToggle }: RowProps) {
  const { path, label, description } = entry
  return (
    <>
      <tr className="card-row" data-given={given} data-row={path}>
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
        <th scope="row">
          <button
            type="button"
            className="card-label"
            title={description.help}
            aria-expanded={open}
            onClick={() => onToggle(path)}
          >
            {label}
            {description.symbol && <span className="card-symbol">{description.symbol}</span>}
          </button>
        </th>
        <td className="card-value">
          <QuantityField path={path} label={label} description={description} sought />
        </td>
        {given ? <WorthCells path={path} description={description} /> : <td colSpan={2} />}
      </tr>
      {open && (
        <tr className="card-detail">
          <td />
          <td colSpan={4}>
            <RowDetail entry={entry} />
          </td>
        </tr>
      )}
    </>
  )
})

function SolvedSide() {
  return (
    <tr>
      <th colSpan={5} scope="colgroup" className="card-side card-solved">
        Solved
      </th>
    </tr>
  )
}

function GivenSide({ entries }: { entries: readonly QuantityEntry[] }) {
  useWorthWanted()
  const isKnown = useQuestionStore(({ worths }) => worths.size > 0)
  return (
    <>
      <tr className="card-worth-head">
        {isKnown ? (
          <th colSpan={5} scope="colgroup">
            <WorthTarget />, <WorthUnits entries={entries} />
          </th>
        ) : (
          <td colSpan={5} />
        )}
      </tr>
      <tr>
        <th colSpan={3} scope="colgroup" className="card-side">
          Given
        </th>
        {isKnown ? (
          <>
            <th
              scope="col"
              className="card-worth card-side"
              title="Everything else given stays as it is."
            >
              fixed
            </th>
            <th
              scope="col"
              className="card-worth card-side card-worth-frozen"
              title="The machines and surfaces stay what they are, and follow their laws."
            >
              frozen
            </th>
          </>
        ) : (
          <>
            <td className="card-worth" />
            <td className="card-worth card-worth-frozen" />
          </>
        )}
      </tr>
    </>
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

/** A given number has something to tell where it is said what it rests on. */
function isBased(path: string): boolean {
  return typeof readGiven(path) !== 'number' || basisOf(readLayout(), path) !== undefined
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
export function CardRows({
  content,
  onPoint,
}: {
  content: CardContent
  /** The user has turned to a number. */
  onPoint(path: string): void
}) {
  const table = useRef<HTMLTableElement>(null)
  // A string, so that the rows are sorted anew only when some quantity changed sides.
  const sides = usePlantStore(() =>
    content.entries.map(({ path }) => (readGiven(path) === undefined ? '0' : '1')).join(''),
  )
  const given = content.entries.filter((_, i) => sides[i] === '1')
  const idle = useIdle(content.entries)
  const [all, setAll] = useState(false)
  const [detail, setDetail] = useState<string | null>(null)
  const toggle = useCallback((path: string) => setDetail((old) => (old === path ? null : path)), [])
  const point = (target: EventTarget) => {
    const path = (target as Element).closest<HTMLElement>('[data-row]')?.dataset.row
    const isTold = path !== undefined && (readGiven(path) === undefined || isBased(path))
    if (isTold) onPoint(path)
  }
  const idlePaths = content.entries.filter((_, i) => idle[i] === '1').map(({ path }) => path)
  const lookedFor = useFocusWantedAmong(idlePaths)
  if (lookedFor && !all) setAll(true)
  const solved = content.entries.filter((_, i) => sides[i] === '0' && (all || idle[i] === '0'))
  const hidden = content.entries.length - given.length - solved.length

  if (content.entries.length === 0) {
    return <p className="card-part muted">No numbers of its own: its streams have them.</p>
  }
  const row = (entry: QuantityEntry, isGiven: boolean) => (
    <Row
      key={entry.path}
      entry={entry}
      given={isGiven}
      open={detail === entry.path}
      onToggle={toggle}
    />
  )
  return (
    <table
      ref={table}
      className="card-rows"
      onFocus={(event) => point(event.target)}
      onPointerMove={(event) => {
        // A card that opens under a pointer at rest is not pointed at.
        if (event.movementX !== 0 || event.movementY !== 0) point(event.target)
      }}
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
          ...(given.length > 0 ? [<GivenSide key="given" entries={given} />] : []),
          ...given.map((entry) => row(entry, true)),
          ...(solved.length > 0 ? [<SolvedSide key="solved" />] : []),
          ...solved.map((entry) => row(entry, false)),
        ]}
        {hidden > 0 && (
          <tr key="more">
            <td colSpan={5} className="card-more">
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
