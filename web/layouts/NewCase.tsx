import { useState } from 'react'
import { type Case, describeQuantity, formatQuantity, type Layout } from '../../src/document.ts'
import { quantityName } from '../number/give.ts'
import { useLayout, usePlantStore } from '../store/plant-store.ts'
import { useSettingsStore } from '../store/settings-store.ts'
import { Icon } from '../strip/Icon.tsx'
import { makeCase } from './edits.ts'
import { canThrottle, loadOf } from './load.ts'
import { Pop } from './PopMenu.tsx'

type Control = NonNullable<Case['loadControl']>

const controls: readonly (readonly [Control, string, string])[] = [
  ['sliding', 'Sliding', 'The boiler pressure follows the load; the valves stay open.'],
  ['throttled', 'Throttled', 'The pressure stays; the valves before the turbine close.'],
  [
    'wideOpen',
    'Wide open',
    'Valves open at the pressure given: the machine takes what it swallows.',
  ],
]

const loads = [1, 0.75, 0.5, 0.3]

function whyNot(layout: Layout, control: Control): string | undefined {
  return control === 'throttled' && !canThrottle(layout)
    ? 'No turbine has an admission: switch that option on, so that its valves have a pressure loss.'
    : undefined
}

function LoadText({ layout, share }: { readonly layout: Layout; readonly share: number }) {
  const unitSet = useSettingsStore((state) => state.unitSet)
  const load = loadOf(layout)
  if (!load) return null
  const dimension = describeQuantity(layout, load.path)?.dimension ?? 'number'
  const { text, unit } = formatQuantity(load.full * share, dimension, unitSet)
  return (
    <span className="muted">
      {text}
      {unit && ` ${unit}`}
    </span>
  )
}

function Form({ close }: { close(): void }) {
  const layout = useLayout()
  const layouts = usePlantStore((state) => state.plant.layouts)
  const known = layout.cases.find(({ hardwareFrom }) => hardwareFrom)?.hardwareFrom?.layout
  const [hardware, setHardware] = useState(known ?? layout.id)
  const [control, setControl] = useState<Control | null>(null)
  const [typed, setTyped] = useState('')
  const load = loadOf(layout)
  const make = (share: number | null) => {
    close()
    makeCase({ control: control ?? 'sliding', share, hardwareFrom: hardware })
  }
  const percent = Number(typed.replace('%', '').replace(',', '.').trim())
  const readable = typed.trim() !== '' && percent > 0 && percent <= 150
  return (
    <form
      className="new-case"
      onSubmit={(event) => {
        event.preventDefault()
        if (readable) make(percent / 100)
      }}
    >
      <p>
        <strong>New case.</strong> The hardware stays what it is at design
        {layouts.length > 1 && (
          <>
            {' of '}
            <select
              aria-label="Hardware of"
              value={hardware}
              onChange={(event) => setHardware(event.target.value)}
            >
              {layouts.map(({ id, name }) => (
                <option key={id} value={id}>
                  {name}
                </option>
              ))}
            </select>
          </>
        )}
        .
      </p>
      <fieldset>
        <legend>Load control</legend>
        <div className="choices">
          {controls.map(([name, label, help]) => {
            const why = whyNot(layout, name)
            return (
              <button
                key={name}
                type="button"
                className="choice-button"
                aria-pressed={control === name}
                aria-disabled={why !== undefined}
                title={why ?? help}
                onClick={() => {
                  if (!why) setControl(name)
                }}
              >
                {label}
              </button>
            )
          })}
        </div>
        <p className="muted">
          {controls.find(([name]) => name === control)?.[2] ?? 'Choose one, then the load.'}
        </p>
      </fieldset>
      {control === 'wideOpen' ? (
        <button type="button" className="button" onClick={() => make(null)}>
          Make the case
        </button>
      ) : load ? (
        <fieldset disabled={control === null}>
          <legend>Load: {quantityName(load.path)}</legend>
          <div className="choices">
            {loads.map((share) => (
              <button
                key={share}
                type="button"
                className="choice-button"
                onClick={() => make(share)}
              >
                {share * 100} % <LoadText layout={layout} share={share} />
              </button>
            ))}
            <input
              className="share"
              aria-label="Another load, per cent"
              placeholder="other %"
              value={typed}
              onChange={(event) => setTyped(event.target.value)}
            />
            {readable && (
              <button type="submit" className="button">
                Make
              </button>
            )}
          </div>
        </fieldset>
      ) : (
        <>
          <p className="muted">
            Neither a steam flow nor a plant power is given here: give the load in the case itself.
          </p>
          <button type="button" className="button" onClick={() => make(null)}>
            Make the case
          </button>
        </>
      )}
    </form>
  )
}

/** The button that makes a case: hardware frozen, load control, load. */
export function NewCase({ worded = false }: { readonly worded?: boolean }) {
  return (
    <Pop
      label="New case"
      role="dialog"
      className={worded ? 'tab-more tab-worded' : 'tab-more'}
      button={
        <>
          <Icon name="plus" size={14} />
          {worded && 'Case'}
        </>
      }
    >
      {(close) => <Form close={close} />}
    </Pop>
  )
}
