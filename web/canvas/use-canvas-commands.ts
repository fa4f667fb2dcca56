import { useEffect } from 'react'
import { useReactFlow } from 'reactflow'
import { kinds, mirrorUnits } from '../../src/document.ts'
import { type Command, useCommandStore } from '../commands/command-store.ts'
import { editLayout, readLayout } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { arrangeCommands } from './arrange-commands.ts'
import {
  copySelected,
  cutSelected,
  listenForClipboard,
  pasteFromClipboard,
  writeClipboard,
} from './clipboard.ts'
import { duplicateSelected } from './duplicating.ts'
import { connectFromHere } from './keyboard.ts'
import { motion } from './motion.ts'
import { placeFreely } from './placing.ts'
import { printSheet } from './printing.ts'
import { removeSelected, selectedUnits } from './removing.ts'
import { startRenaming } from './rename-store.ts'
import { withSmallStart } from './spoken-names.tsx'
import { canSwap, offerSwap, swapCommands } from './swapping.ts'
import { useTagStore } from './tag-store.ts'

const someSelected = () => useSelectionStore.getState().selected.length > 0
const someUnits = () => selectedUnits().length > 0

/** The one unit, stream or shaft whose label can be edited. */
function renamable(): string | null {
  const [id, another] = useSelectionStore.getState().selected
  return id !== undefined && another === undefined && id !== 'plant' ? id : null
}

/** What the canvas can be told to do, by key, menu or command box. */
export function useCanvasCommands(showWhole: (duration?: number) => void): void {
  const flow = useReactFlow()
  const register = useCommandStore((state) => state.register)
  useEffect(() => listenForClipboard(), [])
  useEffect(() => {
    const view: readonly Command[] = [
      {
        id: 'canvas.fit',
        name: 'Show the whole plant',
        group: 'View',
        keys: 'F',
        run: () => showWhole(motion()),
      },
      {
        id: 'canvas.zoom-in',
        name: 'Zoom in',
        group: 'View',
        keys: '+ =',
        run: () => void flow.zoomIn({ duration: motion() }),
      },
      {
        id: 'canvas.zoom-out',
        name: 'Zoom out',
        group: 'View',
        keys: '-',
        run: () => void flow.zoomOut({ duration: motion() }),
      },
      {
        id: 'canvas.zoom-true',
        name: 'Zoom to 100 %',
        group: 'View',
        keys: '0',
        hidden: true,
        run: () => void flow.zoomTo(1, { duration: motion() }),
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
    ]
    return register([
      ...editing,
      ...placing,
      ...arrangeCommands(showWhole),
      ...swapCommands,
      ...view,
    ])
  }, [register, flow, showWhole])
}

/** What a plant starts with: the first kind of the rail. */
const [startingKind] = kinds

/** 'Place a pump' for every kind, for the command box; a boiler on the empty sheet has a key of its own. */
const placing = kinds.map(
  ({ name, label }): Command => ({
    id: `canvas.place-another-${name}`,
    name: `Place ${/^[aeiou]/i.test(label) ? 'an' : 'a'} ${withSmallStart(label)}`,
    group: 'Edit',
    hidden: true,
    enabled: () => name !== startingKind?.name || readLayout().units.length > 0,
    run: () => placeFreely(name),
  }),
)

const editing: readonly Command[] = [
  {
    id: 'canvas.cut',
    name: 'Cut the selected units',
    group: 'Edit',
    keys: 'Mod+X',
    native: true,
    enabled: someUnits,
    run: () => writeClipboard(cutSelected()),
  },
  {
    id: 'canvas.copy',
    name: 'Copy the selected units',
    group: 'Edit',
    keys: 'Mod+C',
    native: true,
    enabled: someUnits,
    run: () => writeClipboard(copySelected()),
  },
  {
    id: 'canvas.paste',
    name: 'Paste units',
    group: 'Edit',
    keys: 'Mod+V',
    native: true,
    run: pasteFromClipboard,
  },
  {
    id: 'canvas.duplicate',
    name: 'Duplicate the selected units',
    group: 'Edit',
    keys: 'Mod+D',
    enabled: someUnits,
    run: duplicateSelected,
  },
  {
    id: 'canvas.delete',
    name: 'Delete what is selected',
    group: 'Edit',
    keys: 'Delete Backspace',
    enabled: someSelected,
    run: () => removeSelected(),
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
    enabled: someSelected,
    run: () => useSelectionStore.getState().select([]),
  },
  {
    id: 'canvas.rename',
    name: 'Rename the selected thing',
    group: 'Edit',
    keys: 'F2',
    enabled: () => renamable() !== null,
    run: () => {
      const id = renamable()
      if (id !== null) startRenaming(id)
    },
  },
  {
    id: 'canvas.mirror',
    name: 'Mirror the selected units',
    group: 'Edit',
    keys: 'M',
    enabled: someUnits,
    run: () =>
      editLayout('Mirror', (plant, layoutId) => mirrorUnits(plant, layoutId, selectedUnits())),
  },
  {
    id: 'canvas.connect',
    name: 'Connect from the selected unit',
    group: 'Edit',
    keys: 'C',
    enabled: () => readLayout().units.length > 1,
    run: () => connectFromHere(),
  },
  {
    id: 'canvas.follow',
    name: 'Place what follows the selected unit',
    group: 'Edit',
    keys: 'N',
    enabled: () => readLayout().units.length > 0,
    run: () => connectFromHere(true),
  },
  {
    id: 'canvas.swap',
    name: 'Swap the selected unit for another kind',
    group: 'Edit',
    keys: 'S',
    enabled: canSwap,
    run: offerSwap,
  },
  {
    id: 'canvas.place-boiler',
    name: 'Place a boiler',
    group: 'Edit',
    keys: 'B',
    hidden: true,
    enabled: () => readLayout().units.length === 0,
    run: () => {
      if (startingKind) placeFreely(startingKind.name)
    },
  },
  {
    id: 'canvas.print',
    name: 'Print the flowsheet',
    group: 'Plant',
    keys: 'Mod+P',
    enabled: () => readLayout().units.length > 0,
    run: printSheet,
  },
]
