import { useId, useState } from 'react'
import {
  type Curve,
  describeQuantity,
  formatQuantity,
  parseQuantity,
  unitOf,
  whyNotGiven,
} from '../../src/document.ts'
import { Dialog } from '../commands/Dialog.tsx'
import { readValue } from '../store/balance-store.ts'
import { readGiven, useLayout } from '../store/plant-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { CurveDrawing } from './CurveDrawing.tsx'
import { likelyAgainst } from './curve-against.ts'
import { closeCurve, useCurveStore } from './curve-store.ts'
import { type CurveColumn, type CurvePoint, curveText, readCurve } from './curve-text.ts'
import { give, quantityName } from './give.ts'
import './curve.css'

type Form = 'points' | 'power'

function columnOf(
  dimension: CurveColumn['dimension'],
  value: number | null,
  units: Parameters<typeof unitOf>[1],
): CurveColumn {
  return { dimension, unit: unitOf(dimension, units, value ?? undefined).name }
}

/** Edits a given that depends on another quantity: a table of points, or a power law. */
function Editor({ path }: { path: string }) {
  const layout = useLayout()
  const units = useUnitChoice()
  const given = readGiven(path)
  const curve = given !== undefined && typeof given !== 'number' ? given : undefined
  const choices = likelyAgainst(layout, path)
  const listed = curve && !choices.includes(curve.against) ? [curve.against, ...choices] : choices
  const [against, setAgainst] = useState(curve?.against ?? choices[0] ?? '')
  const [form, setForm] = useState<Form>(curve && 'power' in curve ? 'power' : 'points')
  const own = describeQuantity(layout, path)
  const other = describeQuantity(layout, against)
  const value = readValue(path)
  const at = readValue(against)
  const columns: readonly [CurveColumn, CurveColumn] = [
    columnOf(other?.dimension ?? 'number', at, units),
    columnOf(own?.dimension ?? 'number', value, units),
  ]
  const [table, setTable] = useState(() =>
    curve && 'points' in curve ? curveText(curve.points, columns, units) : '',
  )
  const power = curve && 'power' in curve ? curve.power : undefined
  const fieldOf = (number: number | null, k: 0 | 1) =>
    number === null
      ? ''
      : formatQuantity(number, columns[k].dimension, units, {
          digits: power ? 'all' : 'shown',
          unit: columns[k].unit,
        }).text
  const [law, setLaw] = useState(() => ({
    at: fieldOf(power?.at ?? at, 0),
    value: fieldOf(power?.value ?? value, 1),
    exponent: String(power?.exponent ?? 1),
  }))
  const [error, setError] = useState<string | null>(null)
  const errorId = useId()
  const read = readCurve(table, columns, units)
  const heads = columns.map(({ unit }, k) => {
    const name = k === 0 ? (other?.label ?? against) : (own?.label ?? path)
    return unit === '' ? name : `${name}, ${unit}`
  })

  const wanted = (): Curve | string => {
    if (form === 'points') {
      return read.outcome === 'points' ? { against, points: read.points } : read.message
    }
    const numbers: number[] = []
    for (const [k, key] of (['at', 'value', 'exponent'] as const).entries()) {
      const column = columns[k] ?? { dimension: 'number' as const, unit: '' }
      const one = parseQuantity(law[key], column.dimension, units, { unit: column.unit })
      if (one.outcome === 'unreadable') return one.message
      numbers.push(one.value)
    }
    const [r = 0, q = 0, exponent = 0] = numbers
    return { against, power: { at: r, value: q, exponent } }
  }
  const commit = () => {
    const next = wanted()
    const why = typeof next === 'string' ? next : whyNotGiven(layout, path, next)
    if (why !== undefined) {
      setError(why)
      return
    }
    give(path, next as Curve)
    closeCurve()
  }
  const present: CurvePoint | null = at === null || value === null ? null : [at, value]
  return (
    <form
      className="curve-editor"
      onSubmit={(event) => {
        event.preventDefault()
        commit()
      }}
      onKeyDown={(event) => event.key !== 'Escape' && event.stopPropagation()}
    >
      <label>
        <span className="muted">Depends on</span>
        <select value={against} onChange={(event) => setAgainst(event.target.value)}>
          {listed.map((one) => (
            <option key={one} value={one}>
              {quantityName(one)}
            </option>
          ))}
        </select>
      </label>
      <fieldset>
        <legend className="visually-hidden">Form of the curve</legend>
        {(['points', 'power'] as const).map((one) => (
          <label key={one}>
            <input
              type="radio"
              name="form"
              checked={form === one}
              onChange={() => {
                setForm(one)
                setError(null)
              }}
            />
            {one === 'points' ? 'Points' : 'Power law'}
          </label>
        ))}
      </fieldset>
      {form === 'points' ? (
        <div className="curve-table">
          <label>
            <span className="curve-heads muted">
              <span>{heads[0]}</span>
              <span>{heads[1]}</span>
            </span>
            <textarea
              rows={8}
              spellCheck={false}
              aria-label={`Points: ${heads.join('; ')}`}
              aria-invalid={error !== null}
              aria-describedby={error === null ? undefined : errorId}
              placeholder={'One point a line, or paste two columns'}
              value={table}
              onChange={(event) => {
                setTable(event.target.value)
                setError(null)
              }}
            />
          </label>
          {read.outcome === 'points' ? (
            <CurveDrawing points={read.points} at={present} width={200} height={150} />
          ) : (
            <p className="muted curve-hint">
              {table.trim() === '' ? 'The curve is drawn here as it is typed.' : read.message}
            </p>
          )}
        </div>
      ) : (
        <p className="curve-law">
          {own?.label} ={' '}
          <input
            aria-label={heads[1]}
            value={law.value}
            onChange={(event) => setLaw({ ...law, value: event.target.value })}
          />{' '}
          {columns[1].unit} × ({other?.label} /{' '}
          <input
            aria-label={heads[0]}
            value={law.at}
            onChange={(event) => setLaw({ ...law, at: event.target.value })}
          />{' '}
          {columns[0].unit})
          <sup>
            <input
              className="curve-exponent"
              aria-label="Exponent"
              value={law.exponent}
              onChange={(event) => setLaw({ ...law, exponent: event.target.value })}
            />
          </sup>
        </p>
      )}
      {error !== null && (
        <p id={errorId} className="curve-error" role="alert">
          {error}
        </p>
      )}
      <p className="muted">
        Between points a smooth curve that keeps rises and falls; beyond the ends straight on, with
        a caution.
      </p>
      <div className="curve-buttons">
        <button type="button" className="button" onClick={closeCurve}>
          Leave it
        </button>
        <button type="submit" className="button button-main">
          Give the curve
        </button>
      </div>
    </form>
  )
}

/** The dialog of the curve that is being edited, if one is. */
export function CurveDialog() {
  const path = useCurveStore((state) => state.path)
  if (path === null) return null
  return (
    <Dialog key={path} title={`Curve: ${quantityName(path)}`} onClose={closeCurve}>
      <Editor path={path} />
    </Dialog>
  )
}
