import { mirrorUnits, placeUnits, setBends } from '../../src/document.ts'
import { editLayout, readLayout } from '../store/plant-store.ts'
import { say } from './connecting-store.ts'
import { layoutOf } from './joins.ts'
import { usePinStore } from './pin-store.ts'
import { canvasBox } from './view.ts'

/** Room that legend and hints take, px. */
const foot = 96

/** Lays the sheet out anew, but for what is pinned: one step of undo. */
export async function tidySheet(): Promise<void> {
  // With its library it is loaded when it is first wanted.
  const { tidy } = await import('./tidy/tidy.ts')
  const layout = readLayout()
  const { pinned } = usePinStore.getState()
  const box = canvasBox()
  const shape = box && box.width > 0 ? Math.max(0.2, box.height - foot) / box.width : undefined
  const places = tidy(layout, pinned, shape)
  editLayout('Tidy', (plant, layoutId) => {
    const turned = layoutOf(plant, layoutId)
      .units.filter(({ id, mirrored = false }) => {
        const place = places.get(id)
        return place !== undefined && place.mirrored !== mirrored
      })
      .map(({ id }) => id)
    let after = placeUnits(
      plant,
      layoutId,
      Object.fromEntries([...places].map(([id, { at }]) => [id, at])),
    )
    after = mirrorUnits(after, layoutId, turned)
    for (const { id, from, to, bends } of layoutOf(after, layoutId).streams) {
      const stays = [from, to].every((end) => pinned.has(end.slice(0, end.indexOf('.'))))
      if (bends && !stays) after = setBends(after, layoutId, id, [])
    }
    return after
  })
  const kept = layout.units.filter(({ id }) => pinned.has(id)).length
  say(kept === 0 ? 'Tidied.' : `Tidied; ${kept} kept in place.`)
}
