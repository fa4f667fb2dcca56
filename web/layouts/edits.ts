import {
  addCase,
  addLayout,
  type Case,
  changeCase,
  copyLayout,
  EditRefused,
  labelOf,
  moveCase,
  moveLayout,
  type Plant,
  removeCase,
  removeLayout,
  setInCase,
  setLayoutName,
} from '../../src/document.ts'
import { editLayout, readLayout, usePlantStore } from '../store/plant-store.ts'
import { useNoticeStore } from '../strip/notice-store.ts'
import { loadOf } from './load.ts'

/** Does an edit; what is refused is said below the strip, and nothing changes. */
function attempt(edit: () => void): void {
  try {
    edit()
    useNoticeStore.getState().dismiss('layouts')
  } catch (error) {
    if (!(error instanceof EditRefused)) throw error
    useNoticeStore.getState().say({ id: 'layouts', severity: 'caution', text: error.message })
  }
}

const nameOf = (layoutId: string): string =>
  usePlantStore.getState().plant.layouts.find(({ id }) => id === layoutId)?.name ?? layoutId

const caseNameOf = (id: string): string =>
  readLayout().cases.find((one) => one.id === id)?.name ?? id

/** 'Proposal', 'Proposal 2' ...: the first that no other bears. */
export function freeName(stem: string, taken: readonly string[]): string {
  for (let number = 1; ; number++) {
    const name = number === 1 ? stem : `${stem} ${number}`
    if (!taken.includes(name)) return name
  }
}

const layoutNames = () => usePlantStore.getState().plant.layouts.map(({ name }) => name)

/** Adds something and shows it, in one undo step. */
function adding(name: string, add: (plant: Plant) => { plant: Plant; id: string }): string | null {
  let id: string | null = null
  attempt(() => {
    usePlantStore.getState().edit(name, (plant) => {
      const added = add(plant)
      id = added.id
      return added.plant
    })
  })
  return id
}

export function addEmptyLayout(): void {
  const name = freeName('New layout', layoutNames())
  const id = adding(`Add layout ${name}`, (plant) => addLayout(plant, name))
  if (id) usePlantStore.getState().showLayout(id)
}

/** A copy to become a proposal: its frozen cases and turbines stay on the machine of the original. */
export function proposeFrom(layoutId: string): void {
  const name = freeName('Proposal', layoutNames())
  const id = adding(`Propose a change of ${nameOf(layoutId)}`, (plant) =>
    copyLayout(plant, layoutId, name),
  )
  if (id) usePlantStore.getState().showLayout(id)
}

export function renameLayout(layoutId: string, name: string): void {
  attempt(() =>
    usePlantStore
      .getState()
      .edit(`Rename ${nameOf(layoutId)} ${name}`, (plant) => setLayoutName(plant, layoutId, name)),
  )
}

export function shiftLayout(layoutId: string, by: number): void {
  usePlantStore
    .getState()
    .edit(`Move layout ${nameOf(layoutId)}`, (plant) => moveLayout(plant, layoutId, by))
}

export function deleteLayout(layoutId: string): void {
  attempt(() =>
    usePlantStore
      .getState()
      .edit(`Delete layout ${nameOf(layoutId)}`, (plant) => removeLayout(plant, layoutId)),
  )
}

export interface NewCase {
  readonly control: NonNullable<Case['loadControl']> | null
  /** Part of the load at design; null: as it is. */
  readonly share: number | null
  /** Whose hardware: a layout, this one where absent. */
  readonly hardwareFrom?: string | undefined
}

const controlWords = { sliding: 'sliding', throttled: 'throttled', wideOpen: 'wide open' }

/** Makes a case with the hardware frozen and shows it. */
export function makeCase({ control, share, hardwareFrom }: NewCase): void {
  const layout = readLayout()
  const load = loadOf(layout)
  const words = [
    share === null ? null : `${Number((share * 100).toPrecision(4))} %`,
    control && control !== 'sliding' ? controlWords[control] : null,
  ].filter((word) => word !== null)
  const stem = words.join(' ') || 'Case'
  const name = freeName(
    stem,
    layout.cases.map((one) => one.name),
  )
  const id = adding(`Add case ${name}`, (plant) => {
    const added = addCase(plant, layout.id, name)
    let next = changeCase(added.plant, layout.id, added.id, {
      frozen: true,
      ...(control && { loadControl: control }),
      ...(hardwareFrom && hardwareFrom !== layout.id && { hardwareFrom: { layout: hardwareFrom } }),
    })
    if (share !== null && load && control !== 'wideOpen') {
      next = setInCase(next, layout.id, added.id, load.path, load.full * share)
    }
    return { plant: next, id: added.id }
  })
  if (id) usePlantStore.getState().showCase(id)
}

/** A case like another, or like the design. */
export function duplicateCase(caseId: string | null): void {
  const { id: layoutId, cases } = readLayout()
  const like = caseId === null ? undefined : caseId
  const name = freeName(
    caseId === null ? 'Case' : `${caseNameOf(caseId)}, copy`,
    cases.map((one) => one.name),
  )
  const id = adding(`Add case ${name}`, (plant) => addCase(plant, layoutId, name, like))
  if (id) usePlantStore.getState().showCase(id)
}

type CaseChange = Parameters<typeof changeCase>[3]

export function editCase(caseId: string, what: string, change: CaseChange): void {
  attempt(() =>
    editLayout(`${caseNameOf(caseId)}: ${what}`, (plant, layoutId) =>
      changeCase(plant, layoutId, caseId, change),
    ),
  )
}

/** What a case gives or frees for a path goes: there the layout holds again. */
export function followLayout(caseId: string, path: string): void {
  attempt(() =>
    editLayout(`${caseNameOf(caseId)}: ${path} as in the layout`, (plant, layoutId) =>
      setInCase(plant, layoutId, caseId, path, 'layout'),
    ),
  )
}

export function shiftCase(caseId: string, by: number): void {
  editLayout(`Move case ${caseNameOf(caseId)}`, (plant, layoutId) =>
    moveCase(plant, layoutId, caseId, by),
  )
}

export function deleteCase(caseId: string): void {
  attempt(() =>
    editLayout(`Delete case ${caseNameOf(caseId)}`, (plant, layoutId) =>
      removeCase(plant, layoutId, caseId),
    ),
  )
}

/**
 * Takes a unit out of service in the case shown, or back. While the design is shown a case is made for
 * it: a plant is built with the heater, and runs without it.
 */
export function setInService(unitId: string, inService: boolean): void {
  const layout = readLayout()
  const label = labelOf(layout, unitId)
  const { caseId } = usePlantStore.getState()
  const one = layout.cases.find(({ id }) => id === caseId)
  const isDesign = !one || (one === layout.cases[0] && isEmpty(one))
  if (!isDesign) {
    const others = (one.outOfService ?? []).filter((id) => id !== unitId)
    const outOfService = inService ? others : [...others, unitId]
    editCase(one.id, `${label} ${inService ? 'back in' : 'out of'} service`, {
      outOfService: outOfService.length > 0 ? outOfService : undefined,
    })
    return
  }
  if (inService) return
  const name = freeName(
    `${label} out`,
    layout.cases.map((existing) => existing.name),
  )
  const id = adding(`${label} out of service`, (plant) => {
    const added = addCase(plant, layout.id, name)
    const next = changeCase(added.plant, layout.id, added.id, {
      frozen: true,
      loadControl: 'sliding',
      outOfService: [unitId],
    })
    return { plant: next, id: added.id }
  })
  if (id) usePlantStore.getState().showCase(id)
}

/** A case that says nothing beyond its name. */
export function isEmpty(one: Case): boolean {
  const { id: _, name: __, given = {}, free = [], outOfService = [], ...rest } = one
  return (
    Object.keys(given).length + free.length + outOfService.length === 0 &&
    Object.values(rest).every((value) => value === undefined || value === false)
  )
}

export function renameCase(caseId: string, name: string): void {
  editCase(caseId, `renamed ${name}`, { name })
}
