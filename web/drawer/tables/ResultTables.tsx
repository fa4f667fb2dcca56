import { useMemo } from 'react'
import { useLayout } from '../../store/plant-store.ts'
import { useSelectionStore } from '../../store/selection-store.ts'
import { type StateRow, stateRows } from '../stream-rows.ts'
import { DataTable, type TableGroup } from './DataTable.tsx'
import { groupTable, heaterTable, pumpTable, stateTable, totalsTable, unitTable } from './tables.ts'

function groupsOf(rows: readonly StateRow[]): readonly TableGroup[] {
  const groups: { title: string; keys: string[] }[] = []
  for (const row of rows) {
    if (row.type === 'head') groups.push({ title: row.name, keys: [] })
    else groups.at(-1)?.keys.push(row.id)
  }
  return groups
}

/** Every stream with its flow and state; what belongs to the selection first. */
export function StateTable() {
  const layout = useLayout()
  const selected = useSelectionStore((state) => state.selected)
  const groups = useMemo(() => groupsOf(stateRows(layout, selected)), [layout, selected])
  return (
    <DataTable
      build={stateTable}
      groups={groups}
      streams
      empty="No streams yet. Connect two ports, and its state appears here."
    />
  )
}

export function UnitTable() {
  return <DataTable build={unitTable} empty="No units yet. Drag one from the rail." />
}

export function HeaterTable() {
  return (
    <DataTable
      build={heaterTable}
      empty="No heater, exchanger or condenser stands in this plant."
    />
  )
}

export function GroupTable() {
  return (
    <DataTable build={groupTable} empty="No stage groups yet: place a turbine on the canvas." />
  )
}

export function PumpTable() {
  return <DataTable build={pumpTable} empty="No pump stands in this plant." />
}

export function TotalsTable() {
  return <DataTable build={totalsTable} empty="No totals yet." />
}
