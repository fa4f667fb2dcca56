import { useMemo, useState } from 'react'
import { basisOf } from '../../src/document.ts'
import { useWorthWanted } from '../card/use-worth.ts'
import { WorthCells, WorthTarget, WorthUnits } from '../card/WorthCells.tsx'
import { basisText } from '../number/basis-text.ts'
import { ManyInput } from '../number/ManyInput.tsx'
import { QuantityField } from '../number/QuantityField.tsx'
import { usualText } from '../number/typed-number.ts'
import { readValue } from '../store/balance-store.ts'
import { readGiven, useLayout, usePlantStore } from '../store/plant-store.ts'
import { useQuestionStore } from '../store/questions.ts'
import { useHovered, useSelected, useSelectionStore } from '../store/selection-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { type GivenRow, givenRows, sortsOf } from './given-rows.ts'
import './givens.css'

type Order = 'place' | 'fixed' | 'frozen'

function Row({ row }: { row: GivenRow }) {
  const { path, owner, ownerLabel, label, description } = row
  const layout = useLayout()
  const units = useUnitChoice()
  const selected = useSelected(owner)
  const hovered = useHovered(owner)
  const { select, hover } = useSelectionStore.getState()
  const basis = basisOf(layout, path)
  return (
    <tr
      data-selected={selected}
      data-hovered={hovered}
      data-given-row={path}
      onPointerEnter={() => hover(owner)}
      onPointerLeave={() => hover(null)}
    >
      <th scope="row" className="cell-name">
        <button type="button" onClick={() => select([owner])}>
          <span>{ownerLabel}</span>
        </button>
      </th>
      <td className="cell-word" title={description.help}>
        {label}
      </td>
      <td className="cell-number given-value">
        <QuantityField path={path} label={`${ownerLabel}, ${label}`} description={description} />
      </td>
      <td className="cell-word muted given-usual" title={usualText(description, units)}>
        {usualText(description, units)
          ?.replace(/ \(.*$/, '')
          .replace(/^Usual /, '')}
      </td>
      <td className="cell-word muted given-basis" title={basis?.note}>
        {basisText(layout, path, units)}
      </td>
      <WorthCells path={path} description={description} />
    </tr>
  )
}

function Head({ order, onOrder }: { order: Order; onOrder(order: Order): void }) {
  const by = (one: Order, name: string, title: string) => (
    <th
      scope="col"
      className={one === 'place' ? 'cell-name' : 'card-worth'}
      aria-sort={order === one ? 'descending' : 'none'}
    >
      <button type="button" title={title} onClick={() => onOrder(one)}>
        {name}
        {order === one && one !== 'place' ? ' ↓' : ''}
      </button>
    </th>
  )
  return (
    <thead>
      <tr>
        {by('place', 'Given for', 'In the order of the plant')}
        <th scope="col" className="cell-word">
          Quantity
        </th>
        <th scope="col" className="cell-number">
          Value
        </th>
        <th scope="col" className="cell-word">
          Usual
        </th>
        <th scope="col" className="cell-word">
          Basis
        </th>
        {by('fixed', 'fixed', 'Worth at fixed performance, the largest first')}
        {by('frozen', 'frozen', 'Worth with the hardware frozen, the largest first')}
      </tr>
    </thead>
  )
}

/** Every given number in one table: found by what it is, edited there, ranked by what a step is worth. */
export function Givens() {
  const layout = useLayout()
  const caseId = usePlantStore((state) => state.caseId)
  const [sort, setSort] = useState('')
  const [order, setOrder] = useState<Order>('place')
  useWorthWanted()
  // biome-ignore lint/correctness/useExhaustiveDependencies: what is given depends on the case.
  const all = useMemo(
    () => givenRows(layout, (path) => readGiven(path) !== undefined),
    [layout, caseId],
  )
  const sorts = useMemo(() => sortsOf(all), [all])
  const ranking = useQuestionStore((state) =>
    order === 'place' ? null : order === 'fixed' ? state.worths : state.frozenWorths,
  )
  const rows = useMemo(() => {
    const shown = sort === '' ? all : all.filter((row) => row.sort === sort)
    if (!ranking || order === 'place') return shown
    const size = ({ path }: GivenRow) => Math.abs(ranking.get(path)?.[order] ?? 0)
    return [...shown].sort((a, b) => size(b) - size(a))
  }, [all, sort, ranking, order])
  const chosen = sorts.find((one) => one.sort === sort)
  const [first] = rows
  if (all.length === 0) return <p className="drawer-empty">Nothing is given yet.</p>
  return (
    <div className="drawer-scroll">
      <div className="givens-tools">
        <label>
          <span className="muted">Show</span>
          <select value={chosen ? sort : ''} onChange={(event) => setSort(event.target.value)}>
            <option value="">all {all.length} given numbers</option>
            {sorts.map(({ sort: one, label, count }) => (
              <option key={one} value={one}>
                {label} ({count})
              </option>
            ))}
          </select>
        </label>
        <span className="givens-worth muted">
          Worth: <WorthTarget />, <WorthUnits entries={rows} />
        </span>
        {chosen && first && rows.length > 1 && (
          <span>
            <span className="muted">Set all {rows.length} to </span>
            <ManyInput
              key={sort}
              paths={rows.map(({ path }) => path)}
              name={`${chosen.label}, all ${rows.length}`}
              description={first.description}
              value={readValue(first.path)}
              placeholder=""
            />
          </span>
        )}
      </div>
      <table className="table givens">
        <Head order={order} onOrder={setOrder} />
        <tbody>
          {rows.map((row) => (
            <Row key={row.path} row={row} />
          ))}
        </tbody>
      </table>
    </div>
  )
}
