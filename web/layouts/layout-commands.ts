import { kindOf, labelOf } from '../../src/document.ts'
import type { Command } from '../commands/command-store.ts'
import { readLayout, readShownCase, usePlantStore } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useSettingsStore } from '../store/settings-store.ts'
import { addEmptyLayout, proposeFrom, setInService } from './edits.ts'
import { useSameMachineStore } from './same-machine-store.ts'

/** The one unit selected, with its kind. */
function selectedUnit() {
  const { selected } = useSelectionStore.getState()
  const unit = readLayout().units.find(({ id }) => selected.length === 1 && id === selected[0])
  const kind = unit && kindOf(unit.kind)
  return unit && kind ? { unit, kind } : undefined
}

/** Whether a unit runs in the case shown. */
export function isInService(unitId: string): boolean {
  return !readShownCase()?.outOfService?.includes(unitId)
}

/** Commands of layouts and cases. */
export const layoutCommands: readonly Command[] = [
  {
    id: 'propose',
    name: 'Propose a change: a layout on the same machine',
    group: 'Plant',
    run: () => proposeFrom(usePlantStore.getState().layoutId),
  },
  {
    id: 'add-layout',
    name: 'Add an empty layout',
    group: 'Plant',
    hidden: true,
    run: addEmptyLayout,
  },
  {
    id: 'compare',
    name: 'Compare layouts and cases',
    group: 'View',
    run: () => useSettingsStore.getState().change({ drawerTab: 'compare', drawerFolded: false }),
  },
  {
    id: 'service',
    name: () => {
      const found = selectedUnit()
      if (!found) return 'Take the heater selected out of service'
      const label = labelOf(readLayout(), found.unit.id)
      return isInService(found.unit.id)
        ? `Take ${label} out of service`
        : `Put ${label} back in service`
    },
    group: 'Edit',
    enabled: () => selectedUnit()?.kind.outOfService !== undefined,
    run: () => {
      const found = selectedUnit()
      if (found) setInService(found.unit.id, !isInService(found.unit.id))
    },
  },
  {
    id: 'same-machine',
    name: 'Put a heater on a new bleed, in the same machine',
    group: 'Edit',
    enabled: () => selectedUnit()?.kind.shaft === 'driving',
    run: () => {
      const found = selectedUnit()
      if (found) useSameMachineStore.getState().ask(found.unit.id)
    },
  },
]
