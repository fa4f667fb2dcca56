import { duplicateItems } from '../../src/document.ts'
import { editLayout } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { selectPasted } from './clipboard.ts'
import { say } from './connecting-store.ts'
import { selectedUnits } from './removing.ts'

/** Copies the selected units and the streams between them beside themselves. */
export function duplicateSelected(): void {
  const chosen = selectedUnits()
  if (chosen.length === 0) return
  let ids: readonly string[] = []
  editLayout(
    chosen.length === 1 ? 'Duplicate unit' : `Duplicate ${chosen.length} units`,
    (plant, layoutId) => {
      const result = duplicateItems(
        plant,
        layoutId,
        useSelectionStore.getState().selected,
        [24, 24],
      )
      ids = result.ids
      return result.plant
    },
  )
  selectPasted(ids)
  say(chosen.length === 1 ? 'Duplicated.' : `${chosen.length} units duplicated.`)
}
