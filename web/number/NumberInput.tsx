import { type KeyboardEvent, useEffect, useId, useRef, useState } from 'react'
import type { Given, QuantityDescription } from '../../src/document.ts'
import { usePlantStore } from '../store/plant-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { whenShown } from '../store/shown-together.ts'
import { free, give } from './give.ts'
import { Mark } from './Mark.tsx'
import { fieldText, fieldUnit, readTyped, stepOf, typedNote, usualText } from './typed-number.ts'
import { useNumber } from './use-number.ts'

interface Editing {
  readonly text: string
  /** The text as the field opened: left so, the value keeps all its digits. */
  readonly first: string
  readonly value: number | null
  /** Name of the unit in force when the field opened: bare numbers have it, whatever their size. */
  readonly unit: string
  readonly error?: string
  /** Key under which the arrow keys' steps join into one undo step. */
  readonly merge: string
  readonly stepped: boolean
  /** What was given when the field opened. */
  readonly before: Given | undefined
}

interface Props {
  readonly path: string
  readonly label: string
  readonly description: QuantityDescription
  readonly showUnit?: boolean
  /** The sign that opened the field. */
  readonly typed?: string
  /** `keepFocus`: the user left by a key, not by going elsewhere. */
  onClose(keepFocus: boolean): void
}

let openings = 0

/** The open field of a number, in the units in force; what is typed may name its own unit. */
export function NumberInput(props: Props) {
  const { path, label, description, showUnit = true, typed: opener, onClose } = props
  const { value, given } = useNumber(path)
  const units = useUnitChoice()
  const input = useRef<HTMLInputElement>(null)
  const noteId = useId()
  /** The field is closing: the blur that follows means nothing. */
  const closing = useRef(false)

  const [editing, setEditing] = useState<Editing>(() => {
    openings += 1
    const start = value ?? description.usual ?? null
    const unit = fieldUnit(start, description, units)
    const first =
      start === null ? '' : fieldText(start, description, units, given !== undefined, unit)
    return {
      text: opener ?? first,
      first,
      value: start,
      unit,
      merge: `field/${path}/${openings}`,
      stepped: false,
      before: given,
    }
  })

  useEffect(() => {
    input.current?.focus({ preventScroll: true })
    // A digit typed to open the field is gone on from, not written over.
    if (opener === undefined) input.current?.select()
  }, [opener])

  const close = (keepFocus: boolean) => {
    closing.current = true
    // With the number that it gave, which is shown with its balance.
    whenShown(() => onClose(keepFocus && document.activeElement === input.current))
  }

  /** `sure`: by Enter, which gives a solved value as it stands; leaving the field does not. */
  const commit = (sure: boolean) => {
    if (closing.current) return
    if (editing.text === editing.first && editing.value !== null) {
      if (sure && given === undefined) give(path, editing.value)
      close(sure)
      return
    }
    const typed = readTyped(editing.text, path, description, units, editing.unit)
    if (typed.outcome === 'refused') {
      setEditing({ ...editing, error: typed.message })
      return
    }
    if (typed.outcome === 'empty') {
      if (sure) free(path)
    } else if (typed.value !== given) give(path, typed.value, editing)
    close(sure)
  }

  const leave = () => {
    const { past, undo } = usePlantStore.getState()
    if (editing.stepped && past.at(-1)?.merge === editing.merge) undo()
    close(true)
  }

  /** Changes the value by practical steps, and solves at once. */
  const step = (by: number) => {
    const untouched = editing.text === editing.first
    const typed = untouched ? null : readTyped(editing.text, path, description, units, editing.unit)
    const from = untouched ? editing.value : typed?.outcome === 'value' ? typed.value : null
    if (from === null) return
    const { unit } = editing
    const shown = fieldText(from + by * stepOf(description, from), description, units, true, unit)
    const next = readTyped(shown, path, description, units, unit)
    if (next.outcome === 'refused') setEditing({ ...editing, error: next.message })
    else if (next.outcome === 'value') {
      give(path, next.value, editing)
      const { merge, before } = editing
      setEditing({
        text: shown,
        first: shown,
        value: next.value,
        unit,
        merge,
        before,
        stepped: true,
      })
    }
  }

  const onKeyDown = (event: KeyboardEvent) => {
    // Letters typed here are no shortcuts; what the window listens for even in fields goes on to it.
    if (!event.ctrlKey && !event.metaKey && !event.altKey) event.stopPropagation()
    if (event.key === 'Enter') commit(true)
    else if (event.key === 'Escape') leave()
    else if (event.key === 'ArrowUp') step(event.shiftKey ? 10 : 1)
    else if (event.key === 'ArrowDown') step(event.shiftKey ? -10 : -1)
    else return
    event.preventDefault()
  }

  const { error } = editing
  const note =
    error ??
    typedNote(editing.text, editing.first, path, description, units, editing.unit) ??
    usualText(description, units)
  return (
    <span className="quantity-edit">
      <input
        ref={input}
        type="text"
        inputMode="decimal"
        data-path={path}
        aria-label={label}
        aria-invalid={error !== undefined}
        aria-describedby={note ? noteId : undefined}
        autoComplete="off"
        spellCheck={false}
        value={editing.text}
        onChange={(event) => {
          const { error: _, ...rest } = editing
          setEditing({ ...rest, text: event.target.value })
        }}
        onBlur={() => commit(false)}
        onKeyDown={onKeyDown}
      />
      {showUnit && editing.unit !== '' && <span className="quantity-unit">{editing.unit}</span>}
      {note && (
        <span
          id={noteId}
          className="field-note"
          data-error={error !== undefined}
          {...(error === undefined ? {} : { role: 'alert' })}
        >
          {error !== undefined && <Mark name="error" />}
          {note}
        </span>
      )}
    </span>
  )
}
