import { memo } from 'react'
import { create } from 'zustand'
import {
  type Dimension,
  describeQuantity,
  formatQuantity,
  kindOf,
  labelOf,
  type Unit,
} from '../../src/document.ts'
import { readValue, useBalanceStore } from '../store/balance-store.ts'
import { readGiven, readLayout, usePlantStore } from '../store/plant-store.ts'
import { readUnitChoice, useSettingsStore } from '../store/settings-store.ts'

/**
 * Names of units and streams for assistive technology, kept out of sight. They follow once the numbers
 * have come to rest, so that what is seen need not wait for them.
 */

/** How long plant and balance must stand still, ms. */
const rest = 300

const useRest = create<{ readonly count: number }>()(() => ({ count: 0 }))

let stirred = 0
let isWaiting = false

function stir(): void {
  stirred = performance.now()
  if (!isWaiting) waitFor(rest)
}

/** One timer at a time: a busy window sets and clears none. */
function waitFor(time: number): void {
  isWaiting = true
  setTimeout(() => {
    isWaiting = false
    const left = stirred + rest - performance.now()
    if (left > 1) waitFor(left)
    else useRest.setState(({ count }) => ({ count: count + 1 }))
  }, time)
}

useBalanceStore.subscribe(stir)
usePlantStore.subscribe(stir)
useSettingsStore.subscribe(stir)

export const unitNameId = (id: string): string => `unit-name-${id}`
export const streamNameId = (id: string): string => `stream-name-${id}`
export const shaftNameId = (id: string): string => `shaft-name-${id}`

export function kindLabel(kind: string): string {
  return kindOf(kind)?.label ?? kind
}

export const withSmallStart = (text: string): string =>
  // 'HP turbine' keeps its capitals.
  /^[A-Z][a-z]/.test(text) ? text[0]?.toLowerCase() + text.slice(1) : text

/** ', 284.6 MW', or ', open'. */
function spoken(path: string, dimension?: Dimension): string {
  const given = readGiven(path)
  const value = typeof given === 'number' ? given : readValue(path)
  if (value === null) return ', open'
  const kind = dimension ?? describeQuantity(readLayout(), path)?.dimension ?? 'number'
  const digits = typeof given === 'number' ? 'given' : 'shown'
  const { text, unit } = formatQuantity(value, kind, readUnitChoice(), { digits })
  return `, ${text} ${unit}`
}

/** 'Boiler, boiler, 284.6 MW'. */
export const UnitName = memo(function UnitName(props: Pick<Unit, 'id' | 'kind' | 'label'>) {
  const { id, kind, label } = props
  useRest()
  const chief = kindOf(kind)?.chief
  return (
    <span id={unitNameId(id)} className="visually-hidden">
      {label || id}, {withSmallStart(kindLabel(kind))}
      {chief && spoken(`${id}.${chief}`)}
    </span>
  )
})

/** 'Stream Boiler to HP, 130.0 bar, 540.0 °C, 120.0 kg/s'. */
export const StreamName = memo(function StreamName({ id }: { readonly id: string }) {
  useRest()
  return (
    <text id={streamNameId(id)} display="none">
      Stream {labelOf(readLayout(), id)}
      {spoken(`${id}.p`, 'pressure')}
      {spoken(`${id}.T`, 'temperature')}
      {spoken(`${id}.m`, 'massFlow')}
    </text>
  )
})

/** 'Shaft, 152.0 MW'. */
export const ShaftName = memo(function ShaftName({ id }: { readonly id: string }) {
  useRest()
  const layout = readLayout()
  const hasGenerator = layout.shafts.find((shaft) => shaft.id === id)?.generator !== false
  return (
    <text id={shaftNameId(id)} display="none">
      {labelOf(layout, id)}
      {hasGenerator && spoken(`${id}.generatorPower`, 'power')}
    </text>
  )
})
