import { labelOf, withinSentence } from '../../src/document.ts'
import type { AccountItem, BalanceMessage, NamesMessage } from '../../src/messages.ts'
import type { ChartSource } from './chart-source.ts'

/** One bar of the plant's account. */
export interface EnergyBar {
  /** Unit, shaft or `plant`. */
  readonly owner: string
  readonly item: AccountItem
  readonly label: string
  /** W */
  readonly value: number
  /** Of all that enters. */
  readonly share: number
}

export interface EnergyAccount {
  /** W that enter: fuel, recovered heat and streams above the ambient state. */
  readonly energyEntering: number
  readonly exergyEntering: number
  readonly entering: readonly EnergyBar[]
  /** Where the energy goes, largest first. */
  readonly energy: readonly EnergyBar[]
  /** What leaves as exergy, largest first. */
  readonly exergyLeaving: readonly EnergyBar[]
  /** Where exergy is destroyed, largest first. */
  readonly destroyed: readonly EnergyBar[]
}

/** The words of an item; a star stands for the owner's name. */
const words: Readonly<Record<AccountItem, string>> = {
  fuel: 'Fuel, *',
  heatInput: 'Heat to the steam, *',
  recovered: 'Recovered heat, *',
  supply: 'Supplied, *',
  netPower: 'Net power',
  otherAuxiliary: 'Other auxiliaries',
  firingLoss: 'Firing loss, *',
  rejected: 'Rejected, *',
  lineLoss: 'Heat loss, *',
  process: 'Process heat, *',
  unreturned: 'Condensate not returned, *',
  shaftLoss: 'Bearings and generator, *',
  driveLoss: 'Drive, *',
  offtake: 'Taken off, *',
  destroyed: '*',
}

/** Below this share of what enters a bar could not be seen. */
const least = 1e-6

const byValue = (a: EnergyBar, b: EnergyBar): number => b.value - a.value

/** What enters the plant, what leaves it and what is destroyed within; undefined while it is open. */
export function energyAccount({ layout, names, balance }: ChartSource): EnergyAccount | undefined {
  if (!names || !balance || balance.status !== 'solved') return undefined
  const sum = (part: 0 | 1): number => {
    let total = 0
    names.derived.account.forEach(({ side }, k) => {
      if (side === 'enters') total += balance.derived.account[2 * k + part] ?? Number.NaN
    })
    return total
  }
  const [energyEntering, exergyEntering] = [sum(0), sum(1)]
  if (!(energyEntering > 0)) return undefined
  const bars = (part: 0 | 1, chosen: (item: AccountItem, side: string) => boolean): EnergyBar[] => {
    const whole = part === 0 ? energyEntering : exergyEntering
    return names.derived.account
      .flatMap(({ owner, item, side }, k) => {
        const value = balance.derived.account[2 * k + part] ?? Number.NaN
        if (!chosen(item, side) || !(Math.abs(value) > least * whole)) return []
        const name = labelOf(layout, owner)
        const label = words[item].replace('*', item === 'destroyed' ? name : withinSentence(name))
        return [{ owner, item, label, value, share: value / whole }]
      })
      .sort(byValue)
  }
  const isLoss = (item: AccountItem) => item === 'shaftLoss' || item === 'driveLoss'
  return {
    energyEntering,
    exergyEntering,
    entering: bars(0, (_, side) => side === 'enters'),
    energy: bars(0, (_, side) => side === 'leaves'),
    exergyLeaving: bars(1, (item, side) => side === 'leaves' && !isLoss(item)),
    destroyed: bars(1, (item, side) => side === 'destroyed' || isLoss(item)),
  }
}

/** A bar's value in another balance (that of a ghost), W; undefined where it has none such. */
export function barIn(
  names: NamesMessage,
  balance: BalanceMessage,
  bar: EnergyBar,
  part: 'energy' | 'exergy',
): number | undefined {
  const k = names.derived.account.findIndex(
    ({ owner, item }) => owner === bar.owner && item === bar.item,
  )
  const value = k < 0 ? undefined : balance.derived.account[2 * k + (part === 'energy' ? 0 : 1)]
  return value !== undefined && Number.isFinite(value) ? value : undefined
}
