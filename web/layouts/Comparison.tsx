import { type ReactNode, useMemo } from 'react'
import {
  type Case,
  compareLayouts,
  type Dimension,
  describeQuantity,
  formatQuantity,
  type Given,
  type Layout,
  withinSentence,
} from '../../src/document.ts'
import { givenText } from '../number/give.ts'
import { useBalanceStore, valueInSnapshot } from '../store/balance-store.ts'
import { useGhostStore } from '../store/ghost-store.ts'
import { useLayout, usePlantStore } from '../store/plant-store.ts'
import { type Compared, comparedName, useReferenceStore } from '../store/reference-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { compareValues, type ValueRow } from './compare-values.ts'
import './layouts.css'

const bases = [
  ['', 'each as it stands'],
  ['power', 'equal net power'],
  ['fuel', 'equal fuel'],
  ['steam', 'equal main steam'],
] as const

/** Value of a choice: layout and case in one. */
const keyOf = (layoutId: string, caseId: string | null): string => `${layoutId}/${caseId ?? ''}`

function Choose({ children }: { readonly children?: ReactNode }) {
  const layouts = usePlantStore((state) => state.plant.layouts)
  const shownLayout = usePlantStore((state) => state.layoutId)
  const shownCase = usePlantStore((state) => state.caseId)
  const compared = useReferenceStore((state) => state.compared)
  const compare = useReferenceStore((state) => state.compare)
  const choices = layouts.flatMap(({ id, name, cases }) => [
    { key: keyOf(id, null), layoutId: id, caseId: null, name },
    ...cases.map((one) => ({
      key: keyOf(id, one.id),
      layoutId: id,
      caseId: one.id,
      name: `${name}, ${one.name}`,
    })),
  ])
  const choose = (key: string, basis: Compared['basis']) => {
    const choice = choices.find((one) => one.key === key)
    compare(choice ? { layoutId: choice.layoutId, caseId: choice.caseId, basis } : null)
  }
  const key = compared ? keyOf(compared.layoutId, compared.caseId) : ''
  return (
    <div className="compare-head">
      <label>
        <span className="muted">Compared with</span>{' '}
        <select value={key} onChange={({ target }) => choose(target.value, compared?.basis)}>
          <option value="">nothing</option>
          {choices
            .filter((one) => one.key !== keyOf(shownLayout, shownCase))
            .map((one) => (
              <option key={one.key} value={one.key}>
                {one.name}
              </option>
            ))}
        </select>
      </label>
      <label>
        <span className="muted">at</span>{' '}
        <select
          value={compared?.basis ?? ''}
          disabled={!compared}
          onChange={({ target }) =>
            choose(key, bases.find(([name]) => name && name === target.value)?.[0] || undefined)
          }
        >
          {bases.map(([name, words]) => (
            <option key={name} value={name}>
              {words}
            </option>
          ))}
        </select>
      </label>
      {children}
    </div>
  )
}

function Figure({ value, dimension }: { value: number | null; dimension: Dimension }) {
  const choice = useUnitChoice()
  if (value === null) return <>–</>
  const { text, unit } = formatQuantity(value, dimension, choice)
  return (
    <>
      {text}
      {unit && <span className="compare-unit"> {unit}</span>}
    </>
  )
}

/** Dimensions whose differences are told in another. */
const differenceDimension: Partial<Record<Dimension, Dimension>> = {
  temperature: 'temperatureDifference',
  pressure: 'pressureDifference',
}

function Row({ row: { path, label, dimension, first, second } }: { row: ValueRow }) {
  const difference = first === null || second === null ? null : first - second
  const part = difference === null || !second ? null : (100 * difference) / Math.abs(second)
  return (
    <tr>
      <th scope="row">
        <button
          type="button"
          className="row-name"
          onClick={() => useSelectionStore.getState().select([path.slice(0, path.indexOf('.'))])}
        >
          {label}
        </button>
      </th>
      <td>
        <Figure value={first} dimension={dimension} />
      </td>
      <td>
        <Figure value={second} dimension={dimension} />
      </td>
      <td>
        {difference !== null && difference > 0 && '+'}
        <Figure value={difference} dimension={differenceDimension[dimension] ?? dimension} />
      </td>
      <td>{part === null ? '–' : percent(part)}</td>
    </tr>
  )
}

/** '+0.16 %'; what rounds to nothing has no sign. */
function percent(part: number): string {
  const text = Math.abs(part).toFixed(2)
  const sign = Number(text) === 0 ? '' : part > 0 ? '+' : '−'
  return `${sign}${text} %`
}

function words(given: Given | undefined, path: string): string {
  return given === undefined ? 'solved' : givenText(path, given)
}

function Differences({
  layouts: [first, second],
  cases: [firstCase, secondCase],
}: {
  readonly layouts: readonly [Layout, Layout]
  readonly cases: readonly [Case | undefined, Case | undefined]
}) {
  useUnitChoice()
  const { units, streams, givens } = useMemo(
    () => compareLayouts(first, second, firstCase, secondCase),
    [first, second, firstCase, secondCase],
  )
  const items = [...units, ...streams]
  const list = (where: 'first' | 'second' | 'both') =>
    items
      .filter((one) => one.where === where)
      .map(({ label }) => label)
      .join(', ')
  const lines = (
    [
      ['Only here', list('first')],
      ['Only there', list('second')],
      ['Joined or equipped otherwise', list('both')],
    ] as const
  ).filter(([, text]) => text !== '')
  return (
    <section className="compare-part" aria-label="What differs">
      <h3>What differs</h3>
      {lines.map(([name, text]) => (
        <p key={name}>
          <span className="muted">{name}:</span> {text}
        </p>
      ))}
      {lines.length === 0 && <p className="muted">Units and streams are the same.</p>}
      {givens.length === 0 ? (
        <p className="muted">What is given is the same.</p>
      ) : (
        <table className="compare-table">
          <thead>
            <tr>
              <th scope="col">Given</th>
              <th scope="col">Here</th>
              <th scope="col">There</th>
            </tr>
          </thead>
          <tbody>
            {givens.map(({ path, first: here, second: there }) => {
              const known = describeQuantity(first, path)
              return (
                <tr key={path}>
                  <th scope="row">
                    {known ? `${known.ownerLabel}, ${withinSentence(known.label)}` : path}
                  </th>
                  <td>{words(here, path)}</td>
                  <td>{words(there, path)}</td>
                </tr>
              )
            })}
          </tbody>
        </table>
      )}
    </section>
  )
}

function Ghosting() {
  const ghost = useGhostStore((state) => state.ghost)
  return (
    <span className="muted">
      {ghost
        ? `${ghost.label} lies as a ghost under the charts.`
        : 'The other is not solved: there is no ghost of it.'}
    </span>
  )
}

/** Two layouts or cases side by side: what differs in them, and what differs in their balances. */
export function Comparison() {
  const compared = useReferenceStore((state) => state.compared)
  const other = useReferenceStore((state) => state.other)
  const trouble = useReferenceStore((state) => state.trouble)
  const names = useBalanceStore((state) => state.names)
  const balance = useBalanceStore((state) => state.balance)
  const layout = useLayout()
  const caseId = usePlantStore((state) => state.caseId)
  const layouts = usePlantStore((state) => state.plant.layouts)
  const there = layouts.find(({ id }) => id === compared?.layoutId)
  const groups = useMemo(
    () =>
      names && balance && other && there
        ? compareValues(
            [layout, there],
            [
              (path) => valueInSnapshot({ names, balance }, path),
              (path) => valueInSnapshot(other, path),
            ],
          )
        : [],
    [names, balance, other, layout, there],
  )
  if (!compared || !there) {
    return (
      <div className="compare">
        <Choose />
        <p className="muted">
          Choose another layout or case: what differs is listed here, and it lies as a ghost under
          the charts.
        </p>
      </div>
    )
  }
  const caseIn = (one: Layout, id: string | null) => one.cases.find((found) => found.id === id)
  return (
    <div className="compare">
      <Choose>
        <Ghosting />
      </Choose>
      {trouble && <p role="alert">{trouble}</p>}
      {other && other.balance.status !== 'solved' && (
        <p role="alert">
          {comparedName(compared)} is not solved:{' '}
          {other.balance.findings[0]?.message ?? other.balance.status}
        </p>
      )}
      <div className="compare-parts">
        <section className="compare-part" aria-label="Differences of the balances">
          <table className="compare-table">
            <thead>
              <tr>
                <th scope="col">Quantity</th>
                <th scope="col">Here</th>
                <th scope="col">{comparedName(compared)}</th>
                <th scope="col">Difference</th>
                <th scope="col">Part</th>
              </tr>
            </thead>
            {groups.map(({ name, rows }) => (
              <tbody key={name}>
                <tr className="compare-group">
                  <th scope="rowgroup" colSpan={5}>
                    {name}
                  </th>
                </tr>
                {rows.map((row) => (
                  <Row key={row.path} row={row} />
                ))}
              </tbody>
            ))}
          </table>
          {other && groups.length === 0 && <p className="muted">The balances are the same.</p>}
        </section>
        <Differences
          layouts={[layout, there]}
          cases={[caseIn(layout, caseId), caseIn(there, compared.caseId)]}
        />
      </div>
    </div>
  )
}
