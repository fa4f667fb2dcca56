import { useMemo, useRef } from 'react'
import { formatQuantity, type Given, withinSentence } from '../../src/document.ts'
import { giveMany } from '../number/give.ts'
import { ManyInput } from '../number/ManyInput.tsx'
import { readValue, useBalanceStore } from '../store/balance-store.ts'
import { readGiven, useLayout, usePlantStore } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { Icon } from '../strip/Icon.tsx'
import { CardTrouble } from './CardTrouble.tsx'
import { type CommonQuantity, commonQuantities } from './common-quantities.ts'
import { usePlace } from './use-place.ts'

function numberOf(path: string): number | null {
  const given: Given | undefined = readGiven(path)
  return typeof given === 'number' ? given : readValue(path)
}

function Row({ quantity, count }: { quantity: CommonQuantity; count: number }) {
  const { label, description, paths } = quantity
  const units = useUnitChoice()
  const given = usePlantStore(() => paths.filter((path) => readGiven(path) !== undefined).join())
  useBalanceStore((state) => state.balance)
  const givenPaths = given === '' ? [] : given.split(',')
  // What is solved stays solved while others of its kind are given: only those change.
  const targets = givenPaths.length > 0 ? givenPaths : paths
  const values = targets.map(numberOf).filter((value) => value !== null)
  const [least, most] = [Math.min(...values), Math.max(...values)]
  const say = (value: number) => formatQuantity(value, description.dimension, units).text
  const spread =
    values.length === 0
      ? '–'
      : say(least) === say(most)
        ? say(least)
        : `${say(least)} to ${say(most)}`
  const name = `${label} of ${targets.length} selected`
  return (
    <tr className="card-row" data-given={givenPaths.length > 0} data-common={quantity.name}>
      <td className="card-turn">
        <button
          type="button"
          role="switch"
          aria-checked={givenPaths.length > 0}
          aria-label={`${label} given`}
          title={
            givenPaths.length > 0
              ? `Given for ${givenPaths.length}. Click to free all: then they are solved.`
              : 'Solved for all. Type a value to give it to all.'
          }
          disabled={givenPaths.length === 0}
          onClick={() => giveMany(`${label} of ${givenPaths.length} freed`, givenPaths, undefined)}
        />
      </td>
      <th scope="row" title={description.help}>
        {label}
      </th>
      <td className="many-count">
        {paths.length < count || givenPaths.length < paths.length
          ? `${givenPaths.length} given of ${paths.length}`
          : `all ${count} given`}
      </td>
      <td className="card-value">
        <ManyInput
          paths={targets}
          name={name}
          description={description}
          value={values[0] ?? null}
          placeholder={spread}
        />
      </td>
    </tr>
  )
}

/** The card of several things selected: what they have in common, changed for all at once. */
export function ManyCard({ ids }: { ids: readonly string[] }) {
  const layout = useLayout()
  const card = useRef<HTMLElement>(null)
  const { place, startMove } = usePlace(card, ids[0] ?? '')
  const select = useSelectionStore((state) => state.select)
  const common = useMemo(() => commonQuantities(layout, ids), [layout, ids])
  return (
    <section
      ref={card}
      className="card"
      aria-label={`${ids.length} selected`}
      style={place ? { left: place.left, top: place.top } : { opacity: 0 }}
      onKeyDown={(event) => {
        if (event.key !== 'Escape') return
        event.stopPropagation()
        select([])
      }}
    >
      <header className="card-head" onPointerDown={startMove}>
        <h2>{ids.length} selected</h2>
        <span className="card-about">{withinSentence('One value for all of them')}</span>
        <button
          type="button"
          className="icon-button"
          aria-label="Close the card"
          onClick={() => select([])}
        >
          <Icon name="close" size={12} />
        </button>
      </header>
      <div className="card-body">
        {common.length === 0 ? (
          <p className="card-part muted">They have no quantity in common.</p>
        ) : (
          <table className="card-rows card-many">
            <tbody>
              {common.map((quantity) => (
                <Row
                  key={`${quantity.name}/${quantity.description.dimension}`}
                  quantity={quantity}
                  count={ids.length}
                />
              ))}
            </tbody>
          </table>
        )}
      </div>
      <CardTrouble />
    </section>
  )
}
