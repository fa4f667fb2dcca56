import { placeUnits as setPlaces } from '../../src/document.ts'
import type { Command } from '../commands/command-store.ts'
import { editLayout, readLayout } from '../store/plant-store.ts'
import { type Alignment, type Arranged, aligned, distributed, type Places } from './arranging.ts'
import { useCanvasStore } from './canvas-store.ts'
import { say } from './connecting-store.ts'
import { pin, unpin, usePinStore } from './pin-store.ts'
import { selectedUnits } from './removing.ts'
import { tidySheet } from './tidying.ts'

function arranged(): Arranged[] {
  const { units } = useCanvasStore.getState().sheet
  return selectedUnits().flatMap((id) => {
    const unit = units.get(id)
    if (!unit) return []
    const axis = unit.symbol.axis?.(unit.form)
    return [
      { id, at: unit.at, body: unit.body, ...(axis !== undefined && { axis: unit.at[1] + axis }) },
    ]
  })
}

function set(name: string, places: Places): void {
  editLayout(name, (plant, layoutId) => setPlaces(plant, layoutId, places))
  pin(Object.keys(places))
}

const alignments: readonly (readonly [Alignment, string, string?])[] = [
  ['left', 'Align left edges', 'Mod+Shift+ArrowLeft'],
  ['right', 'Align right edges', 'Mod+Shift+ArrowRight'],
  ['top', 'Align top edges', 'Mod+Shift+ArrowUp'],
  ['bottom', 'Align bottom edges', 'Mod+Shift+ArrowDown'],
  ['across', 'Align middles on a level line'],
  ['down', 'Align middles on an upright line'],
]

/** Align, distribute, pin and tidy. */
export function arrangeCommands(showWhole: (duration?: number) => void): readonly Command[] {
  return [
    {
      id: 'canvas.tidy',
      name: 'Tidy the flowsheet',
      group: 'Edit',
      keys: 'Shift+T',
      enabled: () => readLayout().units.length > 1,
      run: () => void tidySheet().then(() => showWhole()),
    },
    {
      id: 'canvas.pin',
      name: 'Keep the selected units in place when tidying',
      group: 'Edit',
      keys: 'P',
      enabled: () => selectedUnits().length > 0,
      checked: () => {
        const chosen = selectedUnits()
        const { pinned } = usePinStore.getState()
        return chosen.length > 0 && chosen.every((id) => pinned.has(id))
      },
      run: () => {
        const chosen = selectedUnits()
        const { pinned } = usePinStore.getState()
        const all = chosen.every((id) => pinned.has(id))
        if (all) unpin(chosen)
        else pin(chosen)
        say(all ? 'Free to be tidied.' : 'Kept in place.')
      },
    },
    ...alignments.map(
      ([how, name, keys]): Command => ({
        id: `canvas.align-${how}`,
        name,
        group: 'Edit',
        ...(keys ? { keys } : {}),
        hidden: true,
        enabled: () => selectedUnits().length > 1,
        run: () => set(name, aligned(arranged(), how)),
      }),
    ),
    ...(['across', 'down'] as const).map(
      (along): Command => ({
        id: `canvas.distribute-${along}`,
        name:
          along === 'across' ? 'Distribute from left to right' : 'Distribute from top to bottom',
        group: 'Edit',
        hidden: true,
        enabled: () => selectedUnits().length > 2,
        run: () => set('Distribute', distributed(arranged(), along)),
      }),
    ),
  ]
}
