import { type Dimension, kindOf, labelOf, type Unit } from '../../src/document.ts'
import { useNumberText } from '../number/Quantity.tsx'
import { readLayout, usePlantStore } from '../store/plant-store.ts'

/** Names of units and streams for assistive technology, kept out of sight. */

export const unitNameId = (id: string): string => `unit-name-${id}`
export const streamNameId = (id: string): string => `stream-name-${id}`

export const shaftNameId = (id: string): string => `shaft-name-${id}`

export function kindLabel(kind: string): string {
  return kindOf(kind)?.label ?? kind
}

export const withSmallStart = (text: string): string =>
  // 'HP turbine' keeps its capitals.
  /^[A-Z][a-z]/.test(text) ? text[0]?.toLowerCase() + text.slice(1) : text

/** 'Boiler, boiler, 284.6 MW'. */
export function UnitName({ unit }: { readonly unit: Pick<Unit, 'id' | 'kind' | 'label'> }) {
  const chief = kindOf(unit.kind)?.chief
  return (
    <span id={unitNameId(unit.id)} className="visually-hidden">
      {unit.label || unit.id}, {withSmallStart(kindLabel(unit.kind))}
      {chief && <SpokenQuantity path={`${unit.id}.${chief}`} />}
    </span>
  )
}

function SpokenQuantity({
  path,
  dimension,
}: {
  readonly path: string
  readonly dimension?: Dimension
}) {
  const { text, unit, state } = useNumberText(path, dimension)
  return state === 'open' ? ', open' : `, ${text} ${unit}`
}

/** 'Stream Boiler to HP, 130.0 bar, 540.0 °C, 120.0 kg/s'. */
export function StreamName({ id }: { readonly id: string }) {
  const name = usePlantStore(() => labelOf(readLayout(), id))
  return (
    <text id={streamNameId(id)} display="none">
      Stream {name}
      <SpokenQuantity path={`${id}.p`} dimension="pressure" />
      <SpokenQuantity path={`${id}.T`} dimension="temperature" />
      <SpokenQuantity path={`${id}.m`} dimension="massFlow" />
    </text>
  )
}

/** 'Shaft, generator 152.0 MW'. */
export function ShaftName({ id }: { readonly id: string }) {
  const name = usePlantStore(() => labelOf(readLayout(), id))
  const hasGenerator = usePlantStore(
    () => readLayout().shafts.find((shaft) => shaft.id === id)?.generator !== false,
  )
  return (
    <text id={shaftNameId(id)} display="none">
      {name}
      {hasGenerator && <SpokenQuantity path={`${id}.generatorPower`} dimension="power" />}
    </text>
  )
}
