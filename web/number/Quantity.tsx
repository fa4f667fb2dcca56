import { type Dimension, describeQuantity, formatQuantity } from '../../src/document.ts'
import { readLayout } from '../store/plant-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { Mark } from './Mark.tsx'
import { type NumberShown, useNumber } from './use-number.ts'

/** Digits and unit of a number in the units in force; an en dash while it is open. */
export function useNumberText(
  path: string,
  dimension?: Dimension,
): NumberShown & { readonly text: string; readonly unit: string } {
  const number = useNumber(path)
  const units = useUnitChoice()
  const kind = dimension ?? describeQuantity(readLayout(), path)?.dimension ?? 'number'
  const { text, unit } = formatQuantity(number.value ?? Number.NaN, kind, units, {
    digits: typeof number.given === 'number' ? 'given' : 'shown',
  })
  return { ...number, text, unit }
}

export type NumberText = ReturnType<typeof useNumberText>

interface TextProps {
  readonly number: NumberText
  readonly showUnit?: boolean
  /** The state is said in words beside it. */
  readonly silent?: boolean
  /** Whose number it is, where nothing around it says so: there 'where from' is asked. */
  readonly path?: string
}

/** A number at hand, drawn so that one glance shows whether it went in or came out. */
export function QuantityText({ number, showUnit = true, silent = false, path }: TextProps) {
  const { state, text, unit } = number
  return (
    <span className="quantity" data-state={state} data-path={path}>
      {state === 'open' && <Mark name="open" spoken={!silent} />}
      {state === 'conflicting' && <Mark name="error" spoken={!silent} />}
      <span className="quantity-value">{text}</span>
      {showUnit && unit !== '' && <span className="quantity-unit">{`\u2009${unit}`}</span>}
    </span>
  )
}

interface Props {
  readonly path: string
  /** Saves looking the path up. */
  readonly dimension?: Dimension
  readonly showUnit?: boolean
}

/** A number of the plant with its unit, showing at a glance whether it went in or came out. */
export function Quantity({ path, dimension, showUnit = true }: Props) {
  return <QuantityText number={useNumberText(path, dimension)} showUnit={showUnit} path={path} />
}
