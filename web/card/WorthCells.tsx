import { describeQuantity, type QuantityEntry, withinSentence } from '../../src/document.ts'
import { dimensionOfPath } from '../number/dimension-of-path.ts'
import { quantityName } from '../number/give.ts'
import { useValue } from '../store/balance-store.ts'
import { readLayout, useLayout } from '../store/plant-store.ts'
import { useQuestionStore } from '../store/questions.ts'
import { useSettingsStore, useUnitChoice } from '../store/settings-store.ts'
import { useWorth } from './use-worth.ts'
import { perText, stepText, worthText, worthUnit } from './worth-text.ts'

/** What worths are told of most often. */
const usualTargets = [
  'unitHeatRate',
  'netTurbineHeatRate',
  'grossTurbineHeatRate',
  'netPower',
  'grossPower',
  'cycleEfficiency',
].map((name) => `plant.${name}`)

function targetName(path: string): string {
  const quantity = describeQuantity(readLayout(), path)
  return quantity?.owner === 'plant' ? quantity.label : quantityName(path)
}

/** Chooses what the worths are of. */
export function WorthTarget() {
  useLayout()
  const target = useQuestionStore((state) => state.worthTarget)
  const chosen = useSettingsStore((state) => state.worthTarget)
  const change = useSettingsStore((state) => state.change)
  const shown = target || chosen
  const choices = usualTargets.includes(shown) ? usualTargets : [...usualTargets, shown]
  return (
    <select
      className="worth-target"
      aria-label="Worth is told of"
      title="What the worth of given numbers is told of. For another quantity click its name, and then 'Tell worth of this'."
      value={shown}
      onChange={(event) => change({ worthTarget: event.target.value })}
    >
      {choices.map((path) => (
        <option key={path} value={path}>
          {targetName(path)}
        </option>
      ))}
    </select>
  )
}

/** 'kJ/kWh per K or %': the unit of the worths, and of the steps of these quantities. */
export function WorthUnits({ entries }: { entries: readonly QuantityEntry[] }) {
  const units = useUnitChoice()
  const target = useQuestionStore((state) => state.worthTarget)
  const worths = useQuestionStore((state) => state.worths)
  const value = useValue(target)
  if (worths.size === 0 || value === null) return null
  const steps = entries.flatMap(({ path, description }) => {
    const worth = worths.get(path)
    return worth ? [stepText(worth.step, description, units)] : []
  })
  const unit = worthUnit(value, dimensionOfPath(readLayout(), target), units)
  return (
    <>
      {unit} {perText(steps)}
    </>
  )
}

/** What a practical step of a given number does to the target: as it is, and with the hardware frozen. */
export function WorthCells({ path, description }: Pick<QuantityEntry, 'path' | 'description'>) {
  const units = useUnitChoice()
  const target = useQuestionStore((state) => state.worthTarget)
  const value = useValue(target)
  const worth = useWorth(path)
  if (!worth || value === null) return <td colSpan={2} />
  const dimension = dimensionOfPath(readLayout(), target)
  const say = (change: number | null | undefined): string =>
    change === undefined ? '…' : change === null ? '–' : worthText(change, value, dimension, units)
  const unit = worthUnit(value, dimension, units)
  const step = stepText(worth.step, description, units)
  const fixed = say(worth.fixed)
  const frozen = say(worth.frozen)
  const of = withinSentence(targetName(target))
  const title = `${/^\d/.test(step) ? step : `1 ${step}`} more: ${of} ${fixed} ${unit} at fixed performance, ${
    worth.frozen === null
      ? 'no meaning with the hardware frozen'
      : `${frozen} ${unit} with the hardware frozen`
  }`
  return (
    <>
      <td className="card-worth" title={title} data-worth="fixed">
        {fixed}
      </td>
      <td className="card-worth card-worth-frozen" title={title} data-worth="frozen">
        {frozen}
      </td>
    </>
  )
}
