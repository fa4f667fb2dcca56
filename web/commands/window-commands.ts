import { emptyPlant, unitSets } from '../../src/document.ts'
import { openAsNew } from '../files/keeping.ts'
import { chooseFile, saveFile } from '../files/plant-file.ts'
import { usePlantStore } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { type DrawerTab, type Theme, useSettingsStore } from '../store/settings-store.ts'
import type { Command } from './command-store.ts'
import { useDialogStore } from './dialog-store.ts'

const settings = () => useSettingsStore.getState()

/** Whether the rail shows symbols only at present, by choice or for want of room. */
const railIsFolded = () => document.querySelector('.rail-folded') !== null

const drawerTabs: readonly (readonly [DrawerTab, string])[] = [
  ['states', 'State points'],
  ['units', 'Balances of units'],
  ['heaters', 'Heaters and condensers'],
  ['groups', 'Stage groups'],
  ['pumps', 'Pumps'],
  ['totals', 'Plant totals'],
  ['givens', 'Given numbers, and what each is worth'],
  ['ledger', 'Ledger'],
  ['findings', 'Findings'],
  ['compare', 'Compare layouts and cases'],
  ['report', 'Report and drawings'],
]

const themes: readonly (readonly [Theme, string])[] = [
  ['system', "Colours: the system's"],
  ['light', 'Colours: light'],
  ['dark', 'Colours: dark'],
]

/** The commands of the window itself; those of the canvas come from there. */
export const windowCommands: readonly Command[] = [
  {
    id: 'new',
    name: 'New plant',
    group: 'Plant',
    run: () => void openAsNew(emptyPlant()),
  },
  {
    id: 'open',
    name: 'Open a file',
    group: 'Plant',
    keys: 'Mod+O',
    inFields: true,
    run: chooseFile,
  },
  {
    id: 'open-kept',
    name: 'Open a plant kept here',
    group: 'Plant',
    run: () => useDialogStore.getState().show('kept'),
  },
  {
    id: 'open-example',
    name: 'Open an example',
    group: 'Plant',
    run: () => useDialogStore.getState().show('examples'),
  },
  {
    id: 'save',
    name: 'Save to a file',
    group: 'Plant',
    keys: 'Mod+S',
    inFields: true,
    run: () => void saveFile(),
  },
  {
    id: 'save-as',
    name: 'Save to another file',
    group: 'Plant',
    keys: 'Mod+Shift+S',
    inFields: true,
    run: () => void saveFile(true),
  },
  {
    id: 'undo',
    name: () => {
      const name = usePlantStore.getState().past.at(-1)?.name
      return name ? `Undo: ${name}` : 'Undo'
    },
    group: 'Edit',
    keys: 'Mod+Z',
    enabled: () => usePlantStore.getState().past.length > 0,
    run: () => usePlantStore.getState().undo(),
  },
  {
    id: 'redo',
    name: () => {
      const name = usePlantStore.getState().future.at(-1)?.name
      return name ? `Redo: ${name}` : 'Redo'
    },
    group: 'Edit',
    keys: 'Mod+Shift+Z Mod+Y',
    enabled: () => usePlantStore.getState().future.length > 0,
    run: () => usePlantStore.getState().redo(),
  },
  {
    id: 'find',
    name: 'Find a unit, a quantity, a command',
    group: 'Edit',
    keys: 'Mod+K',
    inFields: true,
    run: () => document.getElementById('command-box')?.focus(),
  },
  {
    id: 'edit-numbers',
    name: 'Numbers of the selected thing',
    group: 'Edit',
    keys: 'Mod+Enter',
    enabled: () => useSelectionStore.getState().selected.length === 1,
    run: () => document.querySelector<HTMLElement>('.card [data-path]')?.focus(),
  },
  {
    id: 'plant-numbers',
    name: 'Numbers of the whole plant',
    group: 'Edit',
    run: () => useSelectionStore.getState().select(['plant']),
  },
  ...drawerTabs.map(
    ([tab, name], i): Command => ({
      id: `drawer-${tab}`,
      name,
      group: 'View',
      ...(i < 9 ? { keys: `Alt+${i + 1}` } : {}),
      hidden: true,
      checked: () => settings().drawerTab === tab && !settings().drawerFolded,
      run: () => settings().change({ drawerTab: tab, drawerFolded: false }),
    }),
  ),
  {
    id: 'fold-drawer',
    name: () => (settings().drawerFolded ? 'Open the drawer' : 'Fold the drawer'),
    group: 'View',
    keys: 'Alt+0',
    run: () => settings().change({ drawerFolded: !settings().drawerFolded }),
  },
  {
    id: 'fold-rail',
    name: 'Names in the rail',
    group: 'View',
    checked: () => !railIsFolded(),
    run: () => settings().change({ railFolded: !railIsFolded() }),
  },
  {
    id: 'fold-chart',
    name: () => (settings().chartFolded ? 'Show chart and totals' : 'Hide chart and totals'),
    group: 'View',
    run: () => settings().change({ chartFolded: !settings().chartFolded }),
  },
  ...themes.map(
    ([theme, name]): Command => ({
      id: `theme-${theme}`,
      name,
      group: 'View',
      checked: () => settings().theme === theme,
      run: () => settings().change({ theme }),
    }),
  ),
  ...unitSets.map(
    ({ name, label, sample }): Command => ({
      id: `units-${name}`,
      name: `Units: ${label} (${sample})`,
      group: 'View',
      hidden: true,
      checked: () => settings().unitSet === name,
      run: () => settings().change({ unitSet: name }),
    }),
  ),
  {
    id: 'shortcuts',
    name: 'Keys',
    group: 'Help',
    keys: '?',
    run: () => useDialogStore.getState().show('keys'),
  },
  {
    id: 'about',
    name: 'About',
    group: 'Help',
    run: () => useDialogStore.getState().show('about'),
  },
]
