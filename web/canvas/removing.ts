import { removeAndJoin } from '../../src/document.ts'
import { editLayout, readLayout } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useCanvasStore } from './canvas-store.ts'
import { say } from './connecting-store.ts'
import { layoutOf } from './joins.ts'
import { withAxesKept } from './steady.ts'

export function selectedUnits(): string[] {
  const { units } = useCanvasStore.getState().sheet
  return useSelectionStore.getState().selected.filter((id) => units.has(id))
}

function nameOf(ids: readonly string[]): string {
  if (ids.length !== 1) return `${ids.length} things`
  const unit = readLayout().units.find(({ id }) => id === ids[0])
  if (unit) return unit.label || unit.id
  return readLayout().streams.some(({ id }) => id === ids[0]) ? 'stream' : 'shaft'
}

/** Removes what is selected; lines that it stood in are joined again. */
export function removeSelected(name = 'Delete'): void {
  const { selected, select } = useSelectionStore.getState()
  if (selected.length === 0) return
  let joined = 0
  editLayout(`${name} ${nameOf(selected)}`, (plant, layoutId) => {
    const result = removeAndJoin(plant, layoutId, selected)
    joined = result.joined.length
    return withAxesKept(layoutOf(plant, layoutId), result.plant)
  })
  select([])
  // The focus went with what was deleted.
  document.querySelector<HTMLElement>('.canvas')?.focus({ preventScroll: true })
  const what = selected.length === 1 ? 'Deleted' : `${selected.length} things deleted`
  say(joined > 0 ? `${what}, the line joined again.` : `${what}.`)
}
