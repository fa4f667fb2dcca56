import { useEffect, useId, useRef, useState } from 'react'
import type { Given, QuantityDescription } from '../../src/document.ts'
import { usePlantStore } from '../store/plant-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { focusGranted, useFocusWanted } from './focus.ts'
import { free, give } from './give.ts'
import { Mark } from './Mark.tsx'
import { Quantity, useNumberText } from './Quantity.tsx'
import { fieldText, readTyped, stepOf, usualText } from './typed-number.ts'

interface Editing {
  readonly text: string
  /** The text as the field opened: left so, the value keeps all its digits. */
  readonly first: string
  readonly value: number | null
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
}

const words = {
  given: 'given',
  solved: 'solved',
  open: 'open',
  conflicting: 'given, too many',
  none: 'has no meaning here',
}

let openings = 0

/**
 * A number that can be given: click or type to edit, Delete frees it, Enter gives, Escape leaves it.
 * What cannot be read is said beneath, and stays to be mended.
 */
export function QuantityField({ path, label, description, showUnit = true }: Props) {
  const { state, value, given, unit } = useNumberText(path, description.dimension)
  const units = useUnitChoice()
  const [editing, setEditing] = useState<Editing | null>(null)
  const wanted = useFocusWanted(path)
  const button = useRef<HTMLButtonElement>(null)
  const input = useRef<HTMLInputElement>(null)
  /** The focus goes back to the number once the field has closed. */
  const refocus = useRef(false)
  const noteId = useId()

  const typedOpen = useRef(false)

  const begin = (typed?: string) => {
    openings += 1
    typedOpen.current = typed !== undefined
    const start = value ?? description.usual ?? null
    const first = start === null ? '' : fieldText(start, description, units, given !== undefined)
    setEditing({
      text: typed ?? first,
      first,
      value: start,
      merge: `field/${path}/${openings}`,
      stepped: false,
      before: given,
    })
  }

  useEffect(() => {
    if (wanted === null) return
    focusGranted()
    button.current?.focus()
    button.current?.scrollIntoView({ block: 'nearest' })
    if (wanted) button.current?.click()
  }, [wanted])

  const isOpen = editing !== null
  useEffect(() => {
    if (isOpen) {
      const field = input.current
      field?.focus()
      // A digit typed to open the field is gone on from, not written over.
      if (!typedOpen.current) field?.select()
    } else if (refocus.current) {
      refocus.current = false
      button.current?.focus()
    }
  }, [isOpen])

  const close = () => setEditing(null)

  /** `sure`: by Enter, which gives a solved value as it stands; leaving the field does not. */
  const commit = (sure: boolean): boolean => {
    if (!editing) return true
    if (editing.text === editing.first && editing.value !== null) {
      if (sure && given === undefined) give(path, editing.value)
      close()
      return true
    }
    const typed = readTyped(editing.text, path, description, units)
    switch (typed.outcome) {
      case 'refused':
        setEditing({ ...editing, error: typed.message })
        return false
      case 'empty':
        if (sure) free(path)
        break
      case 'value':
        if (typed.value !== given) give(path, typed.value, editing)
        break
    }
    close()
    return true
  }

  const step = (by: number) => {
    if (!editing) return
    const typed = readTyped(editing.text, path, description, units)
    const from =
      editing.text === editing.first
        ? editing.value
        : typed.outcome === 'value'
          ? typed.value
          : null
    if (from === null) return
    const next = from + by * stepOf(description, from)
    const shown = fieldText(next, description, units, true)
    const rounded = readTyped(shown, path, description, units)
    if (rounded.outcome === 'refused') setEditing({ ...editing, error: rounded.message })
    else if (rounded.outcome === 'value') {
      give(path, rounded.value, editing)
      setEditing({
        before: editing.before,
        text: shown,
        first: shown,
        value: rounded.value,
        merge: editing.merge,
        stepped: true,
      })
    }
  }

  if (!editing) {
    return (
      <button
        ref={button}
        type="button"
        className="quantity-field"
        data-path={path}
        title={usualText(description, units)}
        onClick={() => begin()}
        onKeyDown={(event) => {
          if (event.ctrlKey || event.metaKey || event.altKey) return
          if (/^[0-9.,+\-−]$/.test(event.key)) begin(event.key)
          else if (event.key === 'Delete' || event.key === 'Backspace') free(path)
          else return
          event.preventDefault()
          event.stopPropagation()
        }}
      >
        {given !== undefined && typeof given !== 'number' && <span className="curve">curve</span>}
        <span className="visually-hidden">{label}: </span>
        <Quantity path={path} dimension={description.dimension} showUnit={showUnit} silent />
        <span className="visually-hidden">, {words[state]}</span>
      </button>
    )
  }

  const note = editing.error ?? usualText(description, units)
  return (
    <span className="quantity-edit">
      <input
        ref={input}
        type="text"
        inputMode="decimal"
        data-path={path}
        aria-label={label}
        aria-invalid={editing.error !== undefined}
        aria-describedby={note ? noteId : undefined}
        autoComplete="off"
        spellCheck={false}
        value={editing.text}
        onChange={(event) => {
          const { error: _, ...rest } = editing
          setEditing({ ...rest, text: event.target.value })
        }}
        onBlur={() => commit(false)}
        onKeyDown={(event) => {
          switch (event.key) {
            case 'Enter':
              refocus.current = true
              if (!commit(true)) refocus.current = false
              break
            case 'Escape': {
              const newest = usePlantStore.getState().past.at(-1)
              if (editing.stepped && newest?.merge === editing.merge) {
                usePlantStore.getState().undo()
              }
              refocus.current = true
              close()
              break
            }
            case 'ArrowUp':
              step(event.shiftKey ? 10 : 1)
              break
            case 'ArrowDown':
              step(event.shiftKey ? -10 : -1)
              break
            default:
              event.stopPropagation()
              return
          }
          event.preventDefault()
          event.stopPropagation()
        }}
      />
      {showUnit && unit !== '' && <span className="quantity-unit">{unit}</span>}
      {note && (
        <span
          id={noteId}
          className="field-note"
          data-error={editing.error !== undefined}
          role={editing.error === undefined ? undefined : 'alert'}
        >
          {editing.error !== undefined && <Mark name="error" />}
          {note}
        </span>
      )}
    </span>
  )
}
