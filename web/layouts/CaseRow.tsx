import {
  type Case,
  describeQuantity,
  type Given,
  givenOf,
  type Layout,
  labelOf,
} from '../../src/document.ts'
import { focusNumber } from '../number/focus.ts'
import { givenText, quantityName } from '../number/give.ts'
import { useLayout, usePlantStore, useShownCase } from '../store/plant-store.ts'
import { useDesignValue } from '../store/reference-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useSettingsStore } from '../store/settings-store.ts'
import { Icon } from '../strip/Icon.tsx'
import { showComparison } from './comparison.ts'
import {
  deleteCase,
  duplicateCase,
  editCase,
  followLayout,
  isEmpty,
  renameCase,
  setInService,
  shiftCase,
} from './edits.ts'
import { NewCase } from './NewCase.tsx'
import { Tabs } from './Tabs.tsx'
import './layouts.css'

/** The tab for the layout's own givens, where no case stands for them. */
const asGiven = ''

/** The first case, where it only gives the layout's own givens a name. */
function designOf({ cases }: Layout): Case | undefined {
  const [first] = cases
  return first && isEmpty(first) ? first : undefined
}

/** True where there are cases to choose from beside the design. */
export function hasCases(layout: Layout): boolean {
  return layout.cases.length > (designOf(layout) ? 1 : 0)
}

function Chip({
  text,
  detail,
  close,
  onClose,
  onOpen,
}: {
  readonly text: string
  readonly detail?: string | undefined
  readonly close: string
  onClose(): void
  onOpen?: (() => void) | undefined
}) {
  return (
    <li className="chip">
      {onOpen ? (
        <button type="button" className="chip-text" onClick={onOpen}>
          {text}
        </button>
      ) : (
        <span className="chip-text">{text}</span>
      )}
      {detail && <span className="muted">{detail}</span>}
      <button
        type="button"
        className="chip-close"
        aria-label={close}
        title={close}
        onClick={onClose}
      >
        <Icon name="close" size={10} />
      </button>
    </li>
  )
}

function showNumber(path: string): void {
  const [owner] = path.split('.')
  if (owner) useSelectionStore.getState().select([owner])
  focusNumber(path)
}

function GivenChip({ one, path, given }: { one: Case; path: string; given: Given | undefined }) {
  const layout = useLayout()
  // The text is in the units in force.
  useSettingsStore((state) => state.unitSet)
  const solvedAtDesign = useDesignValue(path)
  const design = givenOf(layout, path) ?? solvedAtDesign ?? undefined
  const name = describeQuantity(layout, path) ? quantityName(path) : path
  return (
    <Chip
      text={given === undefined ? `${name} free` : `${name} ${givenText(path, given)}`}
      detail={design === undefined ? undefined : `design ${givenText(path, design)}`}
      close={`${name} as in the layout`}
      onClose={() => followLayout(one.id, path)}
      onOpen={() => showNumber(path)}
    />
  )
}

const controls = [
  ['', 'Load as given'],
  ['sliding', 'Sliding pressure'],
  ['throttled', 'Throttled'],
  ['wideOpen', 'Valves wide open'],
] as const

function Hardware({ one }: { one: Case }) {
  const layouts = usePlantStore((state) => state.plant.layouts)
  const own = usePlantStore((state) => state.layoutId)
  return (
    <li className="chip">
      <select
        aria-label="Hardware of the case"
        title="Frozen hardware: surfaces, swallowing capacity and lines stay what they are at that design."
        value={one.frozen ? (one.hardwareFrom?.layout ?? own) : ''}
        onChange={({ target: { value } }) =>
          editCase(one.id, value ? 'hardware frozen' : 'hardware not frozen', {
            frozen: value ? true : undefined,
            hardwareFrom: value && value !== own ? { layout: value } : undefined,
          })
        }
      >
        <option value="">Performance as given</option>
        {layouts.map(({ id, name }) => (
          <option key={id} value={id}>
            {id === own ? 'Hardware frozen' : `Hardware of ${name}`}
          </option>
        ))}
      </select>
    </li>
  )
}

function Control({ one }: { one: Case }) {
  return (
    <li className="chip">
      <select
        aria-label="Load control of the case"
        value={one.loadControl ?? ''}
        onChange={({ target: { value } }) => {
          const control = controls.find(([name]) => name === value)?.[0]
          editCase(one.id, 'load control', { loadControl: control || undefined })
        }}
      >
        {controls.map(([name, words]) => (
          <option key={name} value={name}>
            {words}
          </option>
        ))}
      </select>
    </li>
  )
}

/** What a case changes, each with the way back. */
function Changes({ one }: { one: Case }) {
  const layout = useLayout()
  return (
    <ul className="chips" aria-label={`What ${one.name} changes`}>
      <Hardware one={one} />
      <Control one={one} />
      {one.outOfService?.map((id) => (
        <Chip
          key={id}
          text={`${labelOf(layout, id)} out of service`}
          close={`${labelOf(layout, id)} back in service`}
          onClose={() => setInService(id, true)}
          onOpen={() => useSelectionStore.getState().select([id])}
        />
      ))}
      {Object.entries(one.given ?? {}).map(([path, given]) => (
        <GivenChip key={path} one={one} path={path} given={given} />
      ))}
      {one.free?.map((path) => (
        <GivenChip key={path} one={one} path={path} given={undefined} />
      ))}
    </ul>
  )
}

/** The cases of the layout as a row of tabs over the canvas, and what the one shown changes. */
export function CaseRow() {
  const layout = useLayout()
  const caseId = usePlantStore((state) => state.caseId)
  const show = usePlantStore((state) => state.showCase)
  const shown = useShownCase()
  if (!hasCases(layout)) return null
  const design = designOf(layout)
  const tabs = [
    ...(design ? [] : [{ id: asGiven, name: 'As given', fixed: true as const }]),
    ...layout.cases,
  ]
  const at = (id: string) => layout.cases.findIndex((one) => one.id === id)
  const last = layout.cases.length - 1
  return (
    <nav className="case-row" aria-label="Cases of the layout">
      <Tabs
        label="Cases"
        what="case"
        tabs={tabs}
        selected={caseId ?? design?.id ?? asGiven}
        show={(id) => show(id || null)}
        rename={renameCase}
        actions={(id) => [
          { name: 'Duplicate', run: () => duplicateCase(id || null) },
          ...(id
            ? [
                {
                  name: 'Move left',
                  why:
                    at(id) <= (design ? 1 : 0) || id === design?.id
                      ? 'It is the first.'
                      : undefined,
                  run: () => shiftCase(id, -1),
                },
                {
                  name: 'Move right',
                  why:
                    id === design?.id
                      ? 'The design stays first.'
                      : at(id) >= last
                        ? 'It is the last.'
                        : undefined,
                  run: () => shiftCase(id, 1),
                },
              ]
            : []),
          ...tabs
            .filter((other) => other.id !== id)
            .map((other) => ({
              name: `Compare with ${other.name}`,
              run: () =>
                showComparison({
                  layoutId: layout.id,
                  caseId: other.id && other.id !== design?.id ? other.id : null,
                }),
            })),
          ...(id ? [{ name: 'Delete', run: () => deleteCase(id) }] : []),
        ]}
      >
        <NewCase />
      </Tabs>
      {shown && <Changes one={shown} />}
    </nav>
  )
}

/** In the strip, while the layout has no case yet: the way to the first. */
export function FirstCase() {
  const layout = useLayout()
  return hasCases(layout) || layout.units.length === 0 ? null : <NewCase worded />
}
