import { memo, useMemo } from 'react'
import { type Dimension, formatQuantity, unitOf } from '../../src/document.ts'
import { readValue, useBalanceStore } from '../store/balance-store.ts'
import { useLayout } from '../store/plant-store.ts'
import { useHovered, useSelected, useSelectionStore } from '../store/selection-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { type UnitStreams, unitBalance, unitStreams } from './unit-balances.ts'

function Cell({
  value,
  dimension,
  signed,
}: {
  value: number | null
  dimension: Dimension
  signed?: boolean
}) {
  const units = useUnitChoice()
  const { text } = formatQuantity(value ?? Number.NaN, dimension, units, {
    unit: unitOf(dimension, units).name,
    ...(signed ? { signed } : {}),
  })
  return <td className="cell-number">{text}</td>
}

const Row = memo(function Row({ its }: { its: UnitStreams }) {
  const { id, label } = its.unit
  useBalanceStore((state) => state.balance)
  const selected = useSelected(id)
  const hovered = useHovered(id)
  const { select, hover } = useSelectionStore.getState()
  const { massIn, massOut, energyIn, energyOut } = unitBalance(its, readValue)
  const both = energyIn !== null && energyOut !== null
  const through = its.entering.length > 0 && its.leaving.length > 0
  return (
    <tr
      data-selected={selected}
      data-hovered={hovered}
      onPointerEnter={() => hover(id)}
      onPointerLeave={() => hover(null)}
    >
      <th scope="row" className="cell-name">
        <button
          type="button"
          onClick={(event) => select([id], event.ctrlKey || event.metaKey ? 'toggle' : 'replace')}
        >
          <span>{label || id}</span>
        </button>
      </th>
      <td className="cell-word muted">{its.kindLabel}</td>
      <Cell value={massIn} dimension="massFlow" />
      <Cell value={massOut} dimension="massFlow" />
      <Cell value={energyIn} dimension="heatFlow" />
      <Cell value={energyOut} dimension="heatFlow" />
      <Cell value={both && through ? energyOut - energyIn : null} dimension="heatFlow" signed />
      <Cell value={readValue(`${id}.exergyDestroyed`)} dimension="power" />
    </tr>
  )
})

/** Mass and energy through each unit, from the streams alone. */
export function UnitBalances() {
  const layout = useLayout()
  const units = useUnitChoice()
  const rows = useMemo(() => unitStreams(layout), [layout])
  if (rows.length === 0)
    return <p className="drawer-empty">No units yet. Drag one from the rail.</p>
  const flow = unitOf('massFlow', units).name
  const heat = unitOf('heatFlow', units).name
  const power = unitOf('power', units).name
  return (
    <div className="drawer-scroll">
      <table className="table">
        <thead>
          <tr>
            <th scope="col" className="cell-name">
              Unit
            </th>
            <th scope="col" className="cell-word">
              Kind
            </th>
            <th scope="col" className="cell-number">
              Mass in <small>{flow}</small>
            </th>
            <th scope="col" className="cell-number">
              out <small>{flow}</small>
            </th>
            <th scope="col" className="cell-number">
              Energy in <small>{heat}</small>
            </th>
            <th scope="col" className="cell-number">
              out <small>{heat}</small>
            </th>
            <th
              scope="col"
              className="cell-number"
              title="What the streams gain: heat taken up less work done. Where it is negative they give it off."
            >
              Gain of streams <small>{heat}</small>
            </th>
            <th
              scope="col"
              className="cell-number"
              title="Work that is lost for good, at the ambient temperature."
            >
              Exergy destroyed <small>{power}</small>
            </th>
          </tr>
        </thead>
        <tbody>
          {rows.map((its) => (
            <Row key={its.unit.id} its={its} />
          ))}
        </tbody>
      </table>
    </div>
  )
}
