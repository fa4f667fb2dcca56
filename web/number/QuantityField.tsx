import { memo, useEffect, useMemo, useRef, useState } from 'react'
import type { QuantityDescription } from '../../src/document.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { openCurve } from './curve-store.ts'
import { focusGranted, useFocusWanted } from './focus.ts'
import { free } from './give.ts'
import { NumberInput } from './NumberInput.tsx'
import { QuantityText, useNumberText } from './Quantity.tsx'
import { usualText } from './typed-number.ts'
import { useValueDrag } from './use-value-drag.ts'

interface Props {
  readonly path: string
  readonly label: string
  readonly description: QuantityDescription
  readonly showUnit?: boolean
  /** Takes the focus when its number is looked for: where a number stands twice, one of them does. */
  readonly sought?: true
}

const words = {
  given: 'given',
  solved: 'solved',
  open: 'open',
  conflicting: 'given, too many',
  none: 'has no meaning here',
}

interface ClosedProps extends Props {
  /** The number takes the focus as it appears: its field has just closed. */
  readonly focused: boolean
  /** `typed` is the sign that opened the field; what stood there is written over. */
  onOpen(typed?: string): void
}

function ClosedField({
  path,
  label,
  description,
  showUnit = true,
  sought,
  focused,
  onOpen,
}: ClosedProps) {
  const number = useNumberText(path, description.dimension)
  const units = useUnitChoice()
  const usual = useMemo(() => usualText(description, units), [description, units])
  const wanted = useFocusWanted(sought ? path : null)
  const button = useRef<HTMLButtonElement>(null)
  const { state, given } = number
  const drag = useValueDrag(path, description)
  const isCurve = given !== undefined && typeof given !== 'number'

  useEffect(() => {
    if (focused) button.current?.focus({ preventScroll: true })
  }, [focused])

  useEffect(() => {
    if (wanted === null) return
    focusGranted()
    button.current?.focus()
    button.current?.scrollIntoView({ block: 'nearest' })
    if (wanted) button.current?.click()
  }, [wanted])

  return (
    <button
      ref={button}
      type="button"
      className="quantity-field"
      data-path={path}
      title={usual}
      data-draggable={typeof given === 'number'}
      onPointerDown={drag.onPointerDown}
      onPointerMove={drag.onPointerMove}
      onPointerUp={drag.onPointerUp}
      onPointerCancel={drag.onPointerCancel}
      onClick={() => {
        if (drag.endsDrag()) return
        if (isCurve) openCurve(path)
        else onOpen()
      }}
      onKeyDown={(event) => {
        if (event.key === 'Escape' && drag.cancel(event.currentTarget)) {
          event.preventDefault()
          event.stopPropagation()
          return
        }
        if (event.ctrlKey || event.metaKey || event.altKey) return
        // Letters too: with the focus on a number they are no shortcuts of the canvas.
        if (/^[\p{L}\p{N}.,+\-−]$/u.test(event.key)) onOpen(event.key)
        else if (event.key === 'Delete' || event.key === 'Backspace') free(path)
        else return
        event.preventDefault()
        event.stopPropagation()
      }}
    >
      {isCurve && <span className="curve">curve</span>}
      <span className="visually-hidden">{label}: </span>
      <QuantityText number={number} showUnit={showUnit} silent />
      <span className="visually-hidden">, {words[state]}</span>
    </button>
  )
}

/**
 * A number that can be given: click or type to edit, Delete frees it, Enter gives, Escape leaves it.
 * What cannot be read is said beneath, and stays to be mended.
 */
export const QuantityField = memo(function QuantityField(props: Props) {
  const [open, setOpen] = useState<{ readonly typed?: string } | null>(null)
  const [focused, setFocused] = useState(false)
  if (open) {
    return (
      <NumberInput
        {...props}
        {...open}
        onClose={(keepFocus) => {
          setOpen(null)
          setFocused(keepFocus)
        }}
      />
    )
  }
  return (
    <ClosedField
      {...props}
      focused={focused}
      onOpen={(typed) => setOpen(typed === undefined ? {} : { typed })}
    />
  )
})
