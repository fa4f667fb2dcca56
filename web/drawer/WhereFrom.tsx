import { useEffect, useRef, useState } from 'react'
import { describeQuantity, formatQuantity, labelOf, withinSentence } from '../../src/document.ts'
import type { Origin, Worked } from '../../src/messages.ts'
import { basisText } from '../number/basis-text.ts'
import { dimensionOfPath } from '../number/dimension-of-path.ts'
import { quantityName } from '../number/give.ts'
import { QuantityText, useNumberText } from '../number/Quantity.tsx'
import { quantitySymbol } from '../number/quantity-symbol.ts'
import { stepMark, WorkedLine } from '../number/WorkedLine.tsx'
import { useBalanceStore } from '../store/balance-store.ts'
import { readGiven, readLayout, useLayout } from '../store/plant-store.ts'
import { useQuestionStore, wantOrigin } from '../store/questions.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { Icon } from '../strip/Icon.tsx'
import { equationName } from './equation-name.ts'
import { useWhereFromStore } from './where-from-store.ts'
import './where-from.css'

/** How many quantities stand there before the rest is asked for. */
const mostAtFirst = 24

function Trail({ trail, at }: { trail: readonly string[]; at: number }) {
  const layout = useLayout()
  const { goTo, close } = useWhereFromStore.getState()
  return (
    <nav className="trail" aria-label="Trail">
      <button
        type="button"
        className="icon-button"
        aria-label={at > 0 ? 'Back' : 'Back to the table'}
        title={at > 0 ? 'Back (Backspace)' : 'Back to the table (Escape)'}
        onClick={() => goTo(at - 1)}
      >
        <Icon name="undo" size={14} />
      </button>
      <ol>
        {trail.map((path, i) => {
          const { symbol, owner } = quantitySymbol(layout, path)
          return (
            // biome-ignore lint/suspicious/noArrayIndexKey: the same quantity may come twice.
            <li key={`${i}/${path}`}>
              <button
                type="button"
                aria-current={i === at ? 'step' : undefined}
                title={quantityName(path)}
                onClick={() => goTo(i)}
              >
                {symbol}
                {owner && <sub>{owner}</sub>}
              </button>
            </li>
          )
        })}
      </ol>
      <button
        type="button"
        className="icon-button"
        aria-label="Close where from"
        title="Back to the table (Escape)"
        onClick={close}
      >
        <Icon name="close" size={12} />
      </button>
    </nav>
  )
}

/** What fixed the quantity, as a sentence. */
function howText({ how, owner, key, with: together }: Origin): string {
  const whose = owner === undefined ? '' : labelOf(readLayout(), owner)
  const equation =
    owner === undefined || key === undefined
      ? ''
      : `${equationName(key)} of ${owner === 'plant' ? 'the plant' : withinSentence(whose)}`
  switch (how) {
    case 'given':
      return 'Given: it goes in as it is.'
    case 'alone':
      return `Fixed by one equation: ${equation}.`
    case 'together':
      return `Solved together with ${together.length} ${together.length === 1 ? 'other' : 'others'}; its own equation: ${equation}.`
    case 'property':
      return 'Follows from what is solved.'
    case 'open':
      return 'Nothing fixes it: it is open, or has no meaning here.'
  }
}

function GivenBasis({ path }: { path: string }) {
  const layout = useLayout()
  const units = useUnitChoice()
  const text = basisText(layout, path, units)
  const given = readGiven(path)
  return (
    <p className="muted">
      {text ?? 'Nothing is said of what it rests on.'}
      {given !== undefined && typeof given !== 'number' && ' It is given as a curve.'}
    </p>
  )
}

function Statement({ worked, path }: { worked: Worked; path: string }) {
  const { follow } = useWhereFromStore.getState()
  const units = useUnitChoice()
  const { result, steps } = worked
  const dimension = dimensionOfPath(readLayout(), path)
  const value = useNumberText(path, dimension)
  const shown = formatQuantity(value.value ?? Number.NaN, dimension, units)
  const isOtherUnit = shown.unit !== result.unit && result.path !== undefined
  return (
    <>
      <p className="worked-statement" data-line="symbols">
        <WorkedLine pieces={worked.symbols} onFollow={follow} />
      </p>
      <p className="worked-statement" data-line="figures">
        {result.path !== undefined && (
          <>
            <WorkedLine pieces={[result]} />
            {' = '}
          </>
        )}
        <WorkedLine pieces={worked.figures} onFollow={follow} />
        {isOtherUnit && (
          <span className="muted">{`  that is ${`${shown.text}\u2009${shown.unit}`.trim()}`}</span>
        )}
      </p>
      {steps.length > 0 && (
        <table className="worked-steps">
          <caption className="muted">Read off on the way</caption>
          <tbody>
            {steps.map((step, i) => (
              // biome-ignore lint/suspicious/noArrayIndexKey: a step is its number.
              <tr key={i}>
                <th scope="row">{stepMark(i)}</th>
                <td>
                  <WorkedLine pieces={step.symbols} onFollow={follow} />
                </td>
                <td>
                  = <WorkedLine pieces={step.figures} onFollow={follow} />
                </td>
                <td className="worked-step-result">
                  = <WorkedLine pieces={[step.result]} />
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
    </>
  )
}

function Quantities({ title, paths }: { title: string; paths: readonly string[] }) {
  const { follow } = useWhereFromStore.getState()
  const { hover } = useSelectionStore.getState()
  const [all, setAll] = useState(false)
  if (paths.length === 0) return null
  const shown = all ? paths : paths.slice(0, mostAtFirst)
  return (
    <section className="went-in" aria-label={title}>
      <h3 className="muted">{title}</h3>
      <ul>
        {shown.map((path) => (
          <li key={path}>
            <button
              type="button"
              data-follow={path}
              onClick={() => follow(path)}
              onPointerEnter={() => hover(path.split('.')[0] ?? null)}
              onPointerLeave={() => hover(null)}
            >
              <span>{quantityName(path)}</span>
              <Number_ path={path} />
            </button>
          </li>
        ))}
      </ul>
      {paths.length > shown.length && (
        <button type="button" className="remedy-more" onClick={() => setAll(true)}>
          and {paths.length - shown.length} more
        </button>
      )}
    </section>
  )
}

function Number_({ path }: { path: string }) {
  const number = useNumberText(path, dimensionOfPath(readLayout(), path))
  return <QuantityText number={number} silent />
}

/** Where a number comes from: its equation in symbols and figures, and what went in, step by step. */
export function WhereFrom() {
  const { trail, at, goTo, close } = useWhereFromStore()
  const path = trail[at] ?? ''
  const layout = useLayout()
  const origin = useQuestionStore(({ origins }) => origins.get(path))
  const trouble = useBalanceStore((state) => state.trouble)
  const place = useRef<HTMLElement>(null)
  useEffect(() => wantOrigin(path), [path])
  // biome-ignore lint/correctness/useExhaustiveDependencies: each new place takes the focus.
  useEffect(() => {
    place.current?.focus()
    place.current?.scrollTo(0, 0)
  }, [path, at])
  return (
    <section
      ref={place}
      className="drawer-scroll where-from"
      aria-label="Where from"
      data-origin={origin ? path : undefined}
      tabIndex={-1}
      onKeyDown={(event) => {
        if (event.key === 'Escape') close()
        else if (event.key === 'Backspace') goTo(at - 1)
        else return
        event.preventDefault()
        event.stopPropagation()
      }}
    >
      <Trail trail={trail} at={at} />
      <header>
        <h2>{quantityName(path)}</h2>
        <Number_ path={path} />
        <span className="muted">
          {origin ? howText(origin) : (trouble ?? 'The worker is being asked.')}
        </span>
      </header>
      {origin?.how === 'given' && <GivenBasis path={path} />}
      {origin?.worked && <Statement worked={origin.worked} path={path} />}
      {origin && origin.how !== 'given' && (
        <div key={path} className="went-ins">
          <Quantities title="What went in" paths={origin.inputs} />
          <Quantities title="Solved together with" paths={origin.with} />
        </div>
      )}
      {describeQuantity(layout, path) && (
        <p className="muted">{describeQuantity(layout, path)?.description.help}</p>
      )}
    </section>
  )
}
