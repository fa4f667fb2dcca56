import { createStore } from 'zustand'
import {
  applyDifference,
  type Case,
  type Difference,
  difference,
  emptyPlant,
  type Given,
  givenOf,
  invertDifference,
  type Layout,
  type Plant,
  setGiven,
  setInCase,
} from '../../src/document.ts'
import type { NamesMessage } from '../../src/messages.ts'
import { type BalanceState, useBalanceStore } from './balance-store.ts'
import { editWithBalance, shownTogether } from './shown-together.ts'

/** One undo step: a named difference between two states of the plant. */
export interface Step {
  /** What the step did, as it reads after 'Undo': 'Move heater 5'. */
  readonly name: string
  readonly difference: Difference
  /** The layout in which it happened: undoing shows it again. */
  readonly layoutId: string
  readonly merge?: string
}

export interface EditOptions {
  /** Consecutive edits with the same key become one undo step: give each drag a key of its own. */
  readonly merge?: string
}

interface PlantState {
  readonly plant: Plant
  readonly layoutId: string
  /** Null: the layout's own givens hold. */
  readonly caseId: string | null
  /** Oldest first; all of the session, for a difference holds only what changed. */
  readonly past: readonly Step[]
  /** The next to redo last. */
  readonly future: readonly Step[]
  /** Counts steps done and undone, so that two balances can tell whether an edit lies between them. */
  readonly step: number
  /** What the newest of them did: 'Move heater 5', 'Undo: move heater 5'. */
  readonly stepName: string
  /** Counts plants opened: balances of different plants are never compared. */
  readonly opened: number
  edit(name: string, change: (plant: Plant) => Plant, options?: EditOptions): void
  undo(): void
  redo(): void
  /** Shows another plant; the undo stack starts anew. */
  open(plant: Plant): void
  showLayout(id: string): void
  showCase(id: string | null): void
}

/** The plant before the newest step, against which merged edits are taken anew. */
let beforeNewest: Plant | null = null

/** Shown at first: the case that changes nothing, so that what is given in the layout is what is solved. */
function firstCase(layout: Layout | undefined): string | null {
  const first = layout?.cases[0]
  return first && changesNothing(first) ? first.id : null
}

function changesNothing(one: Case): boolean {
  return (
    !one.frozen &&
    !one.loadControl &&
    Object.keys(one.given ?? {}).length === 0 &&
    (one.free ?? []).length === 0 &&
    (one.outOfService ?? []).length === 0
  )
}

function layoutOf(plant: Plant, wanted: string): string {
  if (plant.layouts.some((layout) => layout.id === wanted)) return wanted
  return plant.layouts[0]?.id ?? wanted
}

function caseOf(plant: Plant, layoutId: string, wanted: string | null): string | null {
  const layout = plant.layouts.find((one) => one.id === layoutId)
  return wanted !== null && layout?.cases.some((one) => one.id === wanted) ? wanted : null
}

const untitled = emptyPlant()

const plantStore = createStore<PlantState>()((set, get) => {
  /** Shows `plant` in the layout wanted, or in the nearest that exists. */
  const place = (plant: Plant, wanted: string) => {
    const layoutId = layoutOf(plant, wanted)
    const caseId =
      layoutId === get().layoutId
        ? caseOf(plant, layoutId, get().caseId)
        : firstCase(plant.layouts.find((layout) => layout.id === layoutId))
    return { plant, layoutId, caseId }
  }
  return {
    plant: untitled,
    layoutId: untitled.layouts[0]?.id ?? '',
    caseId: firstCase(untitled.layouts[0]),
    past: [],
    future: [],
    step: 0,
    stepName: '',
    opened: 0,

    edit(name, change, options) {
      const state = get()
      const after = change(state.plant)
      if (after === state.plant) return
      const newest = state.past.at(-1)
      const merge = options?.merge
      const joins =
        merge !== undefined && newest?.merge === merge && state.future.length === 0 && beforeNewest
      const before = joins ? beforeNewest : state.plant
      const change_ = difference(before as Plant, after)
      const earlier = joins ? state.past.slice(0, -1) : state.past
      beforeNewest = before as Plant
      set({
        ...place(after, state.layoutId),
        past: [
          ...earlier,
          {
            name,
            difference: change_,
            layoutId: state.layoutId,
            ...(merge === undefined ? {} : { merge }),
          },
        ],
        future: [],
        step: joins ? state.step : state.step + 1,
        stepName: name,
      })
    },

    undo() {
      const { past, future, plant, step } = get()
      const newest = past.at(-1)
      if (!newest) return
      beforeNewest = null
      set({
        ...place(applyDifference(plant, invertDifference(newest.difference)), newest.layoutId),
        past: past.slice(0, -1),
        future: [...future, newest],
        step: step + 1,
        stepName: `Undo: ${newest.name}`,
      })
    },

    redo() {
      const { past, future, plant, step } = get()
      const next = future.at(-1)
      if (!next) return
      beforeNewest = null
      set({
        ...place(applyDifference(plant, next.difference), next.layoutId),
        past: [...past, next],
        future: future.slice(0, -1),
        step: step + 1,
        stepName: next.name,
      })
    },

    open(plant) {
      beforeNewest = null
      const layout = plant.layouts[0]
      set({
        plant,
        layoutId: layout?.id ?? '',
        caseId: firstCase(layout),
        past: [],
        future: [],
        step: get().step + 1,
        stepName: '',
        opened: get().opened + 1,
      })
    },

    showLayout(id) {
      const { plant, layoutId } = get()
      if (id !== layoutId) set(place(plant, id))
    },

    showCase(id) {
      const { plant, layoutId } = get()
      set({ caseId: caseOf(plant, layoutId, id) })
    },
  }
})

export const usePlantStore = shownTogether(plantStore)

const noLayout: Layout = {
  id: '',
  name: '',
  ambient: { T: 298.15, p: 101325 },
  units: [],
  streams: [],
  shafts: [],
  plant: { given: {} },
  cases: [],
  stated: [],
}

function currentLayout(state: Pick<PlantState, 'plant' | 'layoutId'>): Layout {
  return state.plant.layouts.find((layout) => layout.id === state.layoutId) ?? noLayout
}

/** The layout shown. */
export function useLayout(): Layout {
  return usePlantStore(currentLayout)
}

/** The layout shown, for use outside React. */
export function readLayout(): Layout {
  return currentLayout(usePlantStore.getState())
}

/** Edits the layout shown, for use in handlers: `editLayout('Delete heater 5', (plant, id) => ...)`. */
export function editLayout(
  name: string,
  change: (plant: Plant, layoutId: string) => Plant,
  options?: EditOptions,
): void {
  const { edit, layoutId } = usePlantStore.getState()
  edit(name, (plant) => change(plant, layoutId), options)
}

/** The case shown, unless it is the design: null, or the first one where it changes nothing. */
function shownCase(state: Pick<PlantState, 'plant' | 'layoutId' | 'caseId'>): Case | undefined {
  if (state.caseId === null) return undefined
  const { cases } = currentLayout(state)
  const one = cases.find(({ id }) => id === state.caseId)
  return one && one === cases[0] && changesNothing(one) ? undefined : one
}

/** The case shown whose givens differ from the layout's; undefined while the design is shown. */
export function useShownCase(): Case | undefined {
  return usePlantStore(shownCase)
}

export function readShownCase(): Case | undefined {
  return shownCase(usePlantStore.getState())
}

/** What the plant's file says of a path in the layout and case shown. */
type Said =
  | { readonly given: Given | undefined }
  /** The freeze may have taken it, or given it: only the balance of the case knows. */
  | { readonly frozen: true; readonly layoutGiven: Given | undefined }

function saidOf(state: PlantState, path: string): Said {
  const layout = currentLayout(state)
  const one = shownCase(state)
  if (one?.given && Object.hasOwn(one.given, path)) return { given: one.given[path] }
  if (one?.free?.includes(path)) return { given: undefined }
  const layoutGiven = givenOf(layout, path)
  return one && !changesOnlyGivens(one) ? { frozen: true, layoutGiven } : { given: layoutGiven }
}

function changesOnlyGivens({ frozen, loadControl, outOfService = [] }: Case): boolean {
  return !frozen && !loadControl && outOfService.length === 0
}

/** What a balance of this layout and case says: given or not, and the value; null where it is of another. */
function inBalance(
  { names, balance, index }: BalanceState,
  { layoutId, caseId }: PlantState,
  path: string,
): { readonly given: boolean; readonly value: number | undefined } | null {
  if (!names || names.layout !== layoutId || names.case !== caseId) return null
  const value = balance?.values[index.paths.get(path) ?? -1]
  return {
    given: givenPaths(names).has(path),
    value: value !== undefined && Number.isFinite(value) ? value : undefined,
  }
}

const givenSets = new WeakMap<object, ReadonlySet<string>>()

function givenPaths(names: NamesMessage): ReadonlySet<string> {
  let set = givenSets.get(names)
  if (!set) {
    set = new Set(names.given)
    givenSets.set(names, set)
  }
  return set
}

function effectiveGiven(state: PlantState, shown: BalanceState, path: string): Given | undefined {
  const said = saidOf(state, path)
  if (!('frozen' in said)) return said.given
  const found = inBalance(shown, state, path)
  if (!found) return said.layoutGiven
  if (!found.given) return undefined
  // A given of the layout that the freeze left alone, or the hardware's value.
  return said.layoutGiven ?? found.value
}

/**
 * What is given for a path in the layout and case shown, frozen hardware included; undefined where it
 * is solved or open. Redraws only when this given changed.
 */
export function useGiven(path: string): Given | undefined {
  const plant = usePlantStore((state) => effectiveGiven(state, useBalanceStore.getState(), path))
  const solved = useBalanceStore((shown) => effectiveGiven(usePlantStore.getState(), shown, path))
  // Both look at both stores; whichever changed last has drawn this anew.
  return plant === solved
    ? plant
    : effectiveGiven(usePlantStore.getState(), useBalanceStore.getState(), path)
}

/** As `useGiven`, for use outside React. */
export function readGiven(path: string): Given | undefined {
  return effectiveGiven(usePlantStore.getState(), useBalanceStore.getState(), path)
}

/**
 * Gives a quantity, or frees it with undefined, where it belongs: in the case shown, or in the layout
 * while the design is shown. Throws `EditRefused`.
 */
export function editGiven(
  name: string,
  path: string,
  given: Given | undefined,
  options?: EditOptions,
): void {
  const one = readShownCase()
  editWithBalance(() =>
    editLayout(
      one ? `${one.name}: ${name}` : name,
      (plant, layoutId) =>
        one
          ? setInCase(plant, layoutId, one.id, path, given ?? 'free')
          : setGiven(plant, layoutId, path, given),
      options,
    ),
  )
}
