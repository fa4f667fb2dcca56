import { useMemo } from 'react'
import { kindOf, type Layout } from '../../src/document.ts'
import type { BalanceMessage, NamesMessage } from '../../src/messages.ts'
import { useBalanceStore } from '../store/balance-store.ts'
import { useLayout } from '../store/plant-store.ts'
import { type Geometry, pathThrough } from './geometry.ts'

interface Area {
  readonly index: number
  readonly d: string
  readonly way: 'added' | 'rejected'
}

/** Areas under the processes that take heat from outside or give it off, down to the axis. */
function areasOf(
  layout: Layout,
  names: NamesMessage,
  { points, starts }: BalanceMessage['curves'],
  geometry: Geometry,
): Area[] {
  const ways = new Map<string, Area['way']>()
  for (const { id, kind } of layout.units) {
    const its = kindOf(kind)
    if (its?.secondLaw === 'fired' || its?.secondLaw === 'heated') ways.set(id, 'added')
    else if (its?.secondLaw === 'losesHeat' && its.heatPassage) ways.set(id, 'rejected')
  }
  const floor = geometry.plot.y + geometry.plot.height
  return names.processes.flatMap(({ unit }, index) => {
    const way = ways.get(unit)
    const [start, end] = [starts[index] as number, starts[index + 1] as number]
    if (!way || end - start < 2) return []
    const x = (i: number) => (geometry.x0 + geometry.kx * (points[3 * i] as number)).toFixed(1)
    const line = pathThrough(points, start, end, geometry)
    return line ? [{ index, way, d: `${line}V${floor}H${x(start)}Z` }] : []
  })
}

/** Heat added and rejected, as areas under their processes. */
export function Areas({ geometry }: { readonly geometry: Geometry }) {
  const layout = useLayout()
  const names = useBalanceStore((state) => state.names)
  const balance = useBalanceStore((state) => state.balance)
  const areas = useMemo(
    () => (names && balance ? areasOf(layout, names, balance.curves, geometry) : []),
    [layout, names, balance, geometry],
  )
  return (
    <g className="chart-areas">
      {areas.map(({ index, d, way }) => (
        <path key={index} d={d} data-way={way} />
      ))}
    </g>
  )
}
