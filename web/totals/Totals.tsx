import {
  type Dimension,
  formatQuantity,
  plantQuantities,
  type QuantityTable,
} from '../../src/document.ts'
import { focusNumber } from '../number/focus.ts'
import { Mark } from '../number/Mark.tsx'
import { useNumberText } from '../number/Quantity.tsx'
import { useBalanceStore, useValue, useValueBefore } from '../store/balance-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useSettingsStore, useUnitChoice } from '../store/settings-store.ts'
import './totals.css'

interface Total {
  readonly name: string
  readonly label: string
  /** What is left away where there is little room; the card of the plant says it. */
  readonly basis?: string
}

const chief: readonly Total[] = [
  { name: 'netPower', label: 'Net power' },
  { name: 'unitHeatRate', label: 'Unit heat rate', basis: ', net' },
  { name: 'unitEfficiency', label: 'Unit efficiency', basis: ', net' },
]

const others: readonly Total[] = [
  { name: 'grossPower', label: 'Gross power' },
  { name: 'heatInput', label: 'Heat to steam' },
  { name: 'auxiliaryPower', label: 'Auxiliaries' },
  { name: 'fuelHeat', label: 'Fuel heat' },
  { name: 'heatRejected', label: 'Heat rejected' },
  { name: 'netTurbineHeatRate', label: 'Net turbine heat rate' },
]

const table: QuantityTable = plantQuantities
const dimensionOf = (name: string): Dimension => table[name]?.dimension ?? 'power'

const asking = 'A click shows it in its card; W, or a click with Alt, where it comes from.'

/** Opens the plant's card at a total: there it can be given. */
function show(name: string): void {
  useSelectionStore.getState().select(['plant'])
  focusNumber(`plant.${name}`)
}

/** What the last edit did to a total; nothing where there is nothing to compare. */
function Change({ name }: { name: string }) {
  const path = `plant.${name}`
  const now = useValue(path)
  const before = useValueBefore(path)
  const solved = useBalanceStore((state) => state.balance?.status === 'solved')
  const units = useUnitChoice()
  if (!solved || now === null || before === null) return <span className="total-change" />
  const change = now - before
  const dimension = dimensionOf(name)
  const shown = formatQuantity(now, dimension, units)
  // Told to one digit more than the total itself, or a small gain would read as none.
  const { text } = formatQuantity(Math.abs(change), dimension, units, { unit: shown.unit })
  const small = Math.abs(change) <= 1e-9 * Math.abs(now)
  return (
    <span className="total-change">
      {small ? (
        'no change'
      ) : (
        <>
          <svg className="total-arrow" viewBox="0 0 8 8" width="7" height="7" role="img">
            <title>{change > 0 ? 'up' : 'down'}</title>
            <path d={change > 0 ? 'M4 1 7.5 7H0.5Z' : 'M4 7 0.5 1H7.5Z'} />
          </svg>{' '}
          {text}
        </>
      )}
    </span>
  )
}

function Chief({ name, label, basis }: Total) {
  const { state, text, unit } = useNumberText(`plant.${name}`, dimensionOf(name))
  return (
    <div className="total-chief">
      <span className="total-label" title={table[name]?.help}>
        {label}
        {basis && <span className="total-basis">{basis}</span>}
      </span>
      <button
        type="button"
        className="total-value"
        data-state={state}
        data-path={`plant.${name}`}
        title={asking}
        onClick={() => show(name)}
      >
        {state === 'open' && <Mark name="open" />}
        <span className="quantity" data-state={state}>
          <span className="quantity-value">{text}</span>
          <span className="quantity-unit">{`\u2009${unit}`}</span>
        </span>
      </button>
      <Change name={name} />
    </div>
  )
}

function Other({ name, label }: Total) {
  const { state, text, unit } = useNumberText(`plant.${name}`, dimensionOf(name))
  return (
    <div className="total-other">
      <span className="total-label" title={table[name]?.help}>
        {label}
      </span>
      <button type="button" data-path={`plant.${name}`} title={asking} onClick={() => show(name)}>
        <span className="quantity" data-state={state}>
          <span className="quantity-value">{text}</span>
          <span className="quantity-unit">{`\u2009${unit}`}</span>
        </span>
      </button>
    </div>
  )
}

function LastEdit() {
  const lastEdit = useBalanceStore((state) => state.lastEdit)
  const count = useBalanceStore((state) => state.editsSince)
  const compared = useBalanceStore((state) => state.before !== null)
  const solved = useBalanceStore((state) => state.balance?.status === 'solved')
  if (!compared || !solved || lastEdit === '') return null
  const text = count > 1 ? `Last ${count} edits, with: ${lastEdit}` : `Last edit: ${lastEdit}`
  return (
    <p className="total-edit" title={text}>
      {text}
    </p>
  )
}

/** The plant's totals, each with what the last edit did to it. */
export function Totals() {
  const unitSet = useSettingsStore((state) => state.unitSet)
  return (
    <section className="totals" aria-label="Plant totals" data-units={unitSet}>
      <div className="totals-chief">
        {chief.map((total) => (
          <Chief key={total.name} {...total} />
        ))}
      </div>
      <LastEdit />
      <div className="totals-others">
        {others.map((total) => (
          <Other key={total.name} {...total} />
        ))}
      </div>
    </section>
  )
}
