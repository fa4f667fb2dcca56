import { useEffect, useId, useRef, useState } from 'react'
import { createPortal } from 'react-dom'
import {
  copyLayout,
  EditRefused,
  formatQuantity,
  heaterInSameMachine,
  labelOf,
  type Plant,
  parseQuantity,
} from '../../src/document.ts'
import { readValue } from '../store/balance-store.ts'
import { useLayout, usePlantStore } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { Icon } from '../strip/Icon.tsx'
import { heaterOf, stageGroups, waterPlaces } from './bleed-places.ts'
import { freeName } from './edits.ts'
import { useSameMachineStore } from './same-machine-store.ts'

function Form({ turbine, close }: { readonly turbine: string; close(): void }) {
  const layout = useLayout()
  const layouts = usePlantStore((state) => state.plant.layouts)
  const choice = useUnitChoice()
  const groups = stageGroups(layout, turbine)
  const places = waterPlaces(layout)
  const known = layout.cases.find(({ hardwareFrom }) => hardwareFrom)?.hardwareFrom?.layout
  const [number, setNumber] = useState(Math.min(2, groups.length))
  const [typed, setTyped] = useState<string | null>(null)
  const [chosen, setChosen] = useState<string | null>(null)
  const [trouble, setTrouble] = useState<string | null>(null)
  const group = groups.find((one) => one.number === number)
  const pressures = (one: typeof group) =>
    one ? ([readValue(`${one.from}.p`), readValue(`${one.to}.p`)] as const) : [null, null]
  const [above, below] = pressures(group)
  const text = (p: number | null) => {
    if (p === null) return '–'
    const { text: digits, unit } = formatQuantity(p, 'pressure', choice)
    return `${digits} ${unit}`
  }
  // The middle of the expansion, as the eye takes it on a chart.
  const usual = above !== null && below !== null ? text(Math.sqrt(above * below)) : ''
  const lower = group && heaterOf(layout, group.to)
  const water = chosen ?? places.find(({ before }) => before === lower)?.stream ?? places[0]?.stream

  const make = () => {
    const read = parseQuantity(typed ?? usual, 'pressure', choice)
    if (read.outcome !== 'value') {
      setTrouble(read.message)
      return
    }
    if (above !== null && below !== null && !(read.value < above && read.value > below)) {
      setTrouble(`The group runs from ${text(above)} to ${text(below)}: give a pressure between.`)
      return
    }
    if (!water) return
    const { edit, showLayout } = usePlantStore.getState()
    let shown = layout.id
    let heater = ''
    try {
      edit(`New heater on ${labelOf(layout, turbine)}`, (plant: Plant) => {
        let next = plant
        let base = known ?? layouts.find(({ id }) => id !== layout.id)?.id
        // The machine as it is keeps this layout; the heater goes into a proposal beside it.
        if (!known) {
          base = layout.id
          const copied = copyLayout(
            plant,
            layout.id,
            freeName(
              'Proposal',
              layouts.map((l) => l.name),
            ),
          )
          next = copied.plant
          shown = copied.id
        }
        const label = freeName(
          'New heater',
          layout.units.map((unit) => unit.label),
        )
        const pressure = read.value
        const made = heaterInSameMachine(next, shown, {
          turbine,
          group: number,
          pressure,
          base: base ?? layout.id,
          water,
          label,
        })
        heater = made.id
        return made.plant
      })
    } catch (error) {
      if (!(error instanceof EditRefused)) throw error
      setTrouble(error.message)
      return
    }
    close()
    showLayout(shown)
    useSelectionStore.getState().select([heater])
  }

  if (groups.length === 0 || places.length === 0) {
    return (
      <p>
        {groups.length === 0
          ? 'The turbine has no steam yet: connect its inlet and exhaust.'
          : 'A heater goes into the water between two heaters of one kind; this layout has none.'}
      </p>
    )
  }
  return (
    <form
      className="new-case"
      onSubmit={(event) => {
        event.preventDefault()
        make()
      }}
    >
      <p>
        The machine stays what it is: the new bleed lies on the expansion line that is there, and
        the parts of the group swallow what the group did.
        {!known &&
          ' This layout keeps the plant as it is; the heater goes into a proposal beside it.'}
      </p>
      <label>
        <span className="muted">Stage group</span>{' '}
        <select
          value={number}
          onChange={({ target }) => {
            setNumber(Number(target.value))
            setTyped(null)
            setChosen(null)
          }}
        >
          {groups.map((one) => (
            <option key={one.number} value={one.number}>
              {one.number}, {text(pressures(one)[0])} to {text(pressures(one)[1])}
            </option>
          ))}
        </select>
      </label>
      <label>
        <span className="muted">Pressure at the new bleed</span>{' '}
        <input
          className="share"
          value={typed ?? usual}
          onChange={({ target }) => setTyped(target.value)}
        />
      </label>
      <label>
        <span className="muted">New heater in the water</span>{' '}
        <select value={water} onChange={({ target }) => setChosen(target.value)}>
          {places.map(({ stream, name }) => (
            <option key={stream} value={stream}>
              {name}
            </option>
          ))}
        </select>
      </label>
      {trouble && <p role="alert">{trouble}</p>}
      <button type="submit" className="button">
        Put it in
      </button>
    </form>
  )
}

/** Asks where a new bleed lies and where its heater goes, and puts both in. */
export function SameMachine() {
  const turbine = useSameMachineStore((state) => state.turbine)
  // Out of the strip, in which no dialog may have its heading.
  return turbine ? createPortal(<Question key={turbine} turbine={turbine} />, document.body) : null
}

function Question({ turbine }: { readonly turbine: string }) {
  const layout = useLayout()
  const close = useSameMachineStore((state) => state.close)
  const place = useRef<HTMLDialogElement>(null)
  const titleId = useId()
  useEffect(() => {
    place.current?.showModal()
  }, [])
  return (
    <dialog ref={place} className="dialog" aria-labelledby={titleId} onClose={close}>
      <header>
        <h2 id={titleId}>A heater on a new bleed of {labelOf(layout, turbine)}</h2>
        <button
          type="button"
          className="icon-button"
          aria-label="Close"
          onClick={() => place.current?.close()}
        >
          <Icon name="close" size={12} />
        </button>
      </header>
      <div className="dialog-body">
        <Form turbine={turbine} close={close} />
      </div>
    </dialog>
  )
}
