import { type KeyboardEvent, useId, useState } from 'react'
import type { QuantityDescription } from '../../src/document.ts'
import { usePlantStore } from '../store/plant-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { giveMany } from './give.ts'
import { fieldUnit, readTyped } from './typed-number.ts'

interface Props {
  /** The quantities that get the value. */
  readonly paths: readonly string[]
  /** 'Terminal difference of 7 units' */
  readonly name: string
  readonly description: QuantityDescription
  /** One of their values, SI: it chooses the unit. */
  readonly value: number | null
  readonly placeholder: string
}

function isUndo({ key, ctrlKey, metaKey, shiftKey, altKey }: KeyboardEvent): boolean {
  return key.toLowerCase() === 'z' && (ctrlKey || metaKey) && !shiftKey && !altKey
}

/** Gives many quantities the same value at once: one undo step. */
export function ManyInput({ paths, name, description, value, placeholder }: Props) {
  const units = useUnitChoice()
  const unit = fieldUnit(value, description, units)
  const [text, setText] = useState('')
  const [error, setError] = useState<string | null>(null)
  const errorId = useId()
  const commit = () => {
    const [first] = paths
    if (first === undefined || text.trim() === '') {
      setError(null)
      return
    }
    for (const path of paths) {
      const read = readTyped(text, path, description, units, unit)
      if (read.outcome === 'refused') {
        setError(read.message)
        return
      }
    }
    const read = readTyped(text, first, description, units, unit)
    if (read.outcome === 'value') giveMany(`${name} to ${text.trim()}`, paths, read.value)
    setText('')
    setError(null)
  }
  return (
    <span className="quantity-edit many-input">
      <input
        type="text"
        inputMode="decimal"
        aria-label={`${name}: one value for all`}
        aria-invalid={error !== null}
        aria-describedby={error === null ? undefined : errorId}
        placeholder={placeholder}
        autoComplete="off"
        spellCheck={false}
        value={text}
        onChange={(event) => {
          setText(event.target.value)
          setError(null)
        }}
        onBlur={commit}
        onKeyDown={(event) => {
          if (!event.ctrlKey && !event.metaKey) event.stopPropagation()
          // An empty field has nothing of its own to undo: the keys mean the edit just made.
          if (isUndo(event) && text === '') usePlantStore.getState().undo()
          else if (event.key === 'Enter') commit()
          else if (event.key === 'Escape') {
            setText('')
            setError(null)
            event.currentTarget.blur()
          } else return
          event.preventDefault()
        }}
      />
      {/* Stands there without a unit too, so that the fields of a card keep one line. */}
      <span className="quantity-unit">{unit}</span>
      {error !== null && (
        <span id={errorId} className="field-note" data-error="true" role="alert">
          {error}
        </span>
      )}
    </span>
  )
}
