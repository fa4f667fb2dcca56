import { useEffect } from 'react'
import { useReactFlow } from 'reactflow'
import { kinds, mirrorUnits, removeItems } from '../../src/document.ts'
import { type Command, useCommandStore } from '../commands/command-store.ts'
import { editLayout, readLayout } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useCanvasStore } from './canvas-store.ts'
import { say } from './connecting-store.ts'
import { layoutOf } from './joins.ts'
import { connectFromHere } from './keyboard.ts'
import { placeFreely } from './placing.ts'
import { withSmallStart } from './spoken-names.tsx'
import { withAxesKept } from './steady.ts'
import { useTagStore } from './tag-store.ts'

const selectedUnits = (): string[] => {
  const { units } = useCanvasStore.getState().sheet
  return useSelectionStore.getState().selected.filter((id) => units.has(id))
}

/** Removes what is selected. */
function removeSelected(): void {
  const { selected, select } = useSelectionStore.getState()
  if (selected.length === 0) return
  editLayout(
    selected.length === 1 ? 'Delete' : `Delete ${selected.length} things`,
    (plant, layoutId) =>
      withAxesKept(layoutOf(plant, layoutId), removeItems(plant, layoutId, selected)),
  )
  select([])
  // The focus went with what was deleted.
  document.querySelector<HTMLElement>('.canvas')?.focus({ preventScroll: true })
  say(selected.length === 1 ? 'Deleted.' : `${selected.length} things deleted.`)
}

/** 'Place a pump' for every kind, for the command box; a boiler on the empty sheet has a key of its own. */
const placing = kinds.map(
  ({ name, label }): Command => ({
    id: `canvas.place-another-${name}`,
    name: `Place ${/^[aeiou]/i.test(label) ? 'an' : 'a'} ${withSmallStart(label)}`,
    group: 'Edit',
    hidden: true,
    enabled: () => name !== 'boiler' || readLayout().units.length > 0,
    run: () => placeFreely(name),
  }),
)

/** What the canvas can be told to do, by key, menu or command box. */
export function useCanvasCommands(showWhole: (duration?: number) => void): void {
  const flow = useReactFlow()
  const register = useCommandStore((state) => state.register)
  useEffect(
    () =>
      register([
        {
          id: 'canvas.delete',
          name: 'Delete what is selected',
          group: 'Edit',
          keys: 'Delete Backspace',
          enabled: () => useSelectionStore.getState().selected.length > 0,
          run: removeSelected,
        },
        {
          id: 'canvas.select-all',
          name: 'Select all units',
          group: 'Edit',
          keys: 'Mod+A',
          enabled: () => readLayout().units.length > 0,
          run: () => useSelectionStore.getState().select(readLayout().units.map((unit) => unit.id)),
        },
        {
          id: 'canvas.select-none',
          name: 'Select nothing',
          group: 'Edit',
          keys: 'Escape',
          hidden: true,
          enabled: () => useSelectionStore.getState().selected.length > 0,
          run: () => useSelectionStore.getState().select([]),
        },
        {
          id: 'canvas.mirror',
          name: 'Mirror the selected units',
          group: 'Edit',
          keys: 'M',
          enabled: () => selectedUnits().length > 0,
          run: () =>
            editLayout('Mirror', (plant, layoutId) =>
              mirrorUnits(plant, layoutId, selectedUnits()),
            ),
        },
        {
          id: 'canvas.connect',
          name: 'Connect from the selected unit',
          group: 'Edit',
          keys: 'C',
          enabled: () => readLayout().units.length > 1,
          run: connectFromHere,
        },
        {
          id: 'canvas.place-boiler',
          name: 'Place a boiler',
          group: 'Edit',
          keys: 'B',
          hidden: true,
          enabled: () => readLayout().units.length === 0,
          run: () => placeFreely('boiler'),
        },
        ...placing,
        {
          id: 'canvas.fit',
          name: 'Show the whole plant',
          group: 'View',
          keys: 'F',
          run: () => showWhole(120),
        },
        {
          id: 'canvas.zoom-in',
          name: 'Zoom in',
          group: 'View',
          keys: '+ =',
          run: () => void flow.zoomIn({ duration: 120 }),
        },
        {
          id: 'canvas.zoom-out',
          name: 'Zoom out',
          group: 'View',
          keys: '-',
          run: () => void flow.zoomOut({ duration: 120 }),
        },
        {
          id: 'canvas.tags',
          name: 'Tags of streams',
          group: 'View',
          keys: 'T',
          checked: () => useTagStore.getState().which !== 'none',
          run: () => {
            const { which, show } = useTagStore.getState()
            show(which === 'none' ? 'chief' : 'none')
          },
        },
      ]),
    [register, flow, showWhole],
  )
}
