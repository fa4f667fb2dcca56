import { useEffect } from 'react'
import {
  type Dimension,
  dimensionLabel,
  dimensions,
  unitOf,
  unitSets,
  unitsOf,
} from '../../src/document.ts'
import { useCommandStore } from '../commands/command-store.ts'
import { Dialog } from '../commands/Dialog.tsx'
import { useSettingsStore } from '../store/settings-store.ts'
import { closeUnits, openUnits, useUnitsStore } from './units-store.ts'
import './units.css'

const choosable = dimensions.filter((dimension) => unitsOf(dimension).length > 1)

function Row({ dimension }: { dimension: Dimension }) {
  const unitSet = useSettingsStore((state) => state.unitSet)
  const overrides = useSettingsStore((state) => state.unitOverrides)
  const change = useSettingsStore((state) => state.change)
  const usual = unitOf(dimension, unitSet).name
  const chosen = overrides[dimension]
  const label = dimensionLabel(dimension)
  return (
    <label className="unit-row" data-chosen={chosen !== undefined}>
      <span>{label.charAt(0).toUpperCase() + label.slice(1)}</span>
      <select
        value={chosen ?? ''}
        onChange={(event) => {
          const { [dimension]: _, ...rest } = overrides
          const wanted = event.target.value
          change({ unitOverrides: wanted === '' ? rest : { ...rest, [dimension]: wanted } })
        }}
      >
        <option value="">{usual === '' ? 'none' : usual}, as the set has it</option>
        {unitsOf(dimension)
          .filter(({ name }) => name !== usual && name !== '')
          .map(({ name }) => (
            <option key={name} value={name}>
              {name}
            </option>
          ))}
      </select>
    </label>
  )
}

function Units() {
  const unitSet = useSettingsStore((state) => state.unitSet)
  const overrides = useSettingsStore((state) => state.unitOverrides)
  const change = useSettingsStore((state) => state.change)
  const count = Object.keys(overrides).length
  return (
    <>
      <fieldset className="unit-sets">
        <legend className="visually-hidden">Set of units</legend>
        {unitSets.map(({ name, label, sample }) => (
          <label key={name}>
            <input
              type="radio"
              name="unit-set"
              checked={unitSet === name}
              onChange={() => change({ unitSet: name })}
            />
            {label} <span className="muted">{sample}</span>
          </label>
        ))}
      </fieldset>
      <div className="unit-rows">
        {choosable.map((dimension) => (
          <Row key={dimension} dimension={dimension} />
        ))}
      </div>
      <p className="muted">
        Pressures are shown absolute, always; typed with a g (barg, psig) or as vacuum they are
        converted with the standard atmosphere. Files hold SI, whatever is shown.
      </p>
      {count > 0 && (
        <p>
          <button type="button" className="link" onClick={() => change({ unitOverrides: {} })}>
            Back to the set: take back {count === 1 ? 'the single unit' : `${count} single units`}
          </button>
        </p>
      )}
    </>
  )
}

/** Sets of units and single ones against the set. */
export function UnitsDialog() {
  const open = useUnitsStore((state) => state.open)
  useEffect(
    () =>
      useCommandStore
        .getState()
        .register([
          { id: 'units', name: 'Units of measure', group: 'View', keys: 'Mod+U', run: openUnits },
        ]),
    [],
  )
  return open ? (
    <Dialog title="Units of measure" onClose={closeUnits}>
      <Units />
    </Dialog>
  ) : null
}
