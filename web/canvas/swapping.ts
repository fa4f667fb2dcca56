import { kindOf, kinds, moveUnits, swapUnit } from '../../src/document.ts'
import type { Command } from '../commands/command-store.ts'
import { editLayout, readLayout } from '../store/plant-store.ts'
import { useCanvasStore } from './canvas-store.ts'
import { refuse, say } from './connecting-store.ts'
import { onGrid } from './geometry.ts'
import { layoutOf } from './joins.ts'
import { openKindMenu } from './kind-menu-store.ts'
import { selectedUnits } from './removing.ts'
import { withSmallStart } from './spoken-names.tsx'
import { placeUnits } from './standing.ts'
import { toClient } from './view.ts'

/** The one unit selected. */
function chosen(): string | null {
  const [id, another] = selectedUnits()
  return id !== undefined && another === undefined ? id : null
}

export const canSwap = (): boolean => chosen() !== null

/** Offers the kinds that the selected unit can become. */
export function offerSwap(): void {
  const id = chosen()
  const placed = id === null ? undefined : useCanvasStore.getState().sheet.units.get(id)
  if (id === null || !placed) return
  const { body } = placed
  openKindMenu({
    title: 'Swap for',
    items: kinds
      .filter(({ name }) => name !== placed.kind)
      .map(({ name, label }) => ({ kind: name, label })),
    at: toClient([body.x + body.width, body.y]),
    take: ({ kind }) => swap(id, kind),
    close: () => document.querySelector<HTMLElement>('.canvas')?.focus({ preventScroll: true }),
  })
}

function swap(id: string, kind: string): void {
  const before = useCanvasStore.getState().sheet.units.get(id)
  const label = kindOf(kind)?.label ?? kind
  let dropped = 0
  try {
    editLayout(`Swap for ${withSmallStart(label)}`, (plant, layoutId) => {
      const result = swapUnit(plant, layoutId, id, kind)
      dropped = result.dropped.length
      const after = placeUnits(layoutOf(result.plant, layoutId)).get(id)
      if (!before || !after) return result.plant
      // The new symbol stands with its middle where the old one had its own.
      const by = (axis: 'x' | 'y', extent: 'width' | 'height') =>
        onGrid(
          before.body[axis] + before.body[extent] / 2 - after.body[axis] - after.body[extent] / 2,
        )
      return moveUnits(result.plant, layoutId, [id], [by('x', 'width'), by('y', 'height')])
    })
  } catch (error) {
    if (error instanceof Error) refuse(error.message, before?.at ?? [0, 0])
    return
  }
  document.querySelector<HTMLElement>('.canvas')?.focus({ preventScroll: true })
  const lost = dropped === 1 ? '1 stream' : `${dropped} streams`
  const said = `Swapped for ${withSmallStart(label)}${dropped > 0 ? `; ${lost} did not fit and went` : ''}.`
  if (dropped > 0 && before) refuse(said, [before.body.x + before.body.width, before.body.y])
  else say(said)
}

/** For the command box: each kind by its name. */
export const swapCommands: readonly Command[] = kinds.map((kind) => ({
  id: `canvas.swap-${kind.name}`,
  name: `Swap the selected unit for: ${withSmallStart(kind.label)}`,
  group: 'Edit',
  hidden: true,
  enabled: () => {
    const id = chosen()
    const unit = id === null ? undefined : readLayout().units.find((one) => one.id === id)
    return unit !== undefined && unit.kind !== kind.name
  },
  run: () => {
    const id = chosen()
    if (id !== null) swap(id, kind.name)
  },
}))
