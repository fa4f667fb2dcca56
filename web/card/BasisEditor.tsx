import { useId, useState } from 'react'
import {
  type Basis,
  basisOf,
  formatQuantity,
  parseQuantity,
  type QuantityEntry,
  type Source,
  setBasis,
  unitOf,
} from '../../src/document.ts'
import { sourceWords } from '../number/basis-text.ts'
import { differenceOf } from '../number/difference-of.ts'
import { quantityName } from '../number/give.ts'
import { editLayout, useLayout } from '../store/plant-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'

/** What a given number rests on: where it comes from, a note, and how sure it is. */
export function BasisEditor({ path, description }: Pick<QuantityEntry, 'path' | 'description'>) {
  const layout = useLayout()
  const units = useUnitChoice()
  const basis = basisOf(layout, path) ?? {}
  const dimension = differenceOf(description.dimension)
  const unit = unitOf(dimension, units, basis.uncertainty)
  const spread =
    basis.uncertainty === undefined
      ? ''
      : formatQuantity(basis.uncertainty, dimension, units, { digits: 'given', unit: unit.name })
          .text
  const [note, setNote] = useState<string | null>(null)
  const [typed, setTyped] = useState<string | null>(null)
  const [error, setError] = useState<string | null>(null)
  const errorId = useId()

  const change = (part: { [K in keyof Basis]?: Basis[K] | undefined }) => {
    const next = Object.fromEntries(
      Object.entries({ ...basis, ...part }).filter(([, value]) => value !== undefined),
    ) as Basis
    editLayout(`Basis of ${quantityName(path)}`, (plant, layoutId) =>
      setBasis(plant, layoutId, path, next),
    )
  }
  const commitNote = () => {
    if (note !== null && note.trim() !== (basis.note ?? '')) change({ note: note.trim() })
    setNote(null)
  }
  const commitSpread = () => {
    const text = typed?.replace(/^\s*(±|\+\/-|\+-)/, '').trim()
    if (text === undefined || text === spread) {
      setTyped(null)
      setError(null)
      return
    }
    const read =
      text === '' ? undefined : parseQuantity(text, dimension, units, { unit: unit.name })
    if (read?.outcome === 'unreadable' || (read && read.value < 0)) {
      setError(read.outcome === 'unreadable' ? read.message : 'An uncertainty is not below zero.')
      return
    }
    change({ uncertainty: read?.value })
    setTyped(null)
    setError(null)
  }
  return (
    <div className="basis">
      <label>
        <span className="muted">Basis</span>
        <select
          aria-label="Basis"
          value={basis.source ?? ''}
          onChange={(event) =>
            change({
              source: event.target.value === '' ? undefined : (event.target.value as Source),
            })
          }
        >
          <option value="">not said</option>
          {Object.entries(sourceWords).map(([source, word]) => (
            <option key={source} value={source}>
              {word}
            </option>
          ))}
        </select>
      </label>
      <label>
        <span className="muted">±</span>
        <input
          type="text"
          inputMode="decimal"
          className="basis-spread"
          aria-label="Uncertainty, 95 %"
          title="Half the width of the interval in which the true value lies with about 95 %"
          aria-invalid={error !== null}
          aria-describedby={error === null ? undefined : errorId}
          value={typed ?? spread}
          onChange={(event) => setTyped(event.target.value)}
          onBlur={commitSpread}
          onKeyDown={leaveByKeys}
        />
        <span className="quantity-unit">{unit.name}</span>
      </label>
      <input
        type="text"
        className="basis-note"
        aria-label="Note on the basis"
        placeholder="Data sheet, test, reason …"
        value={note ?? basis.note ?? ''}
        onChange={(event) => setNote(event.target.value)}
        onBlur={commitNote}
        onKeyDown={leaveByKeys}
      />
      {error !== null && (
        <p id={errorId} className="basis-error" role="alert">
          {error}
        </p>
      )}
    </div>
  )
}

function leaveByKeys(event: React.KeyboardEvent<HTMLInputElement>): void {
  event.stopPropagation()
  if (event.key === 'Enter' || event.key === 'Escape') event.currentTarget.blur()
}
