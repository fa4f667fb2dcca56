import { type Compared, useReferenceStore } from '../store/reference-store.ts'
import { useSettingsStore } from '../store/settings-store.ts'

/** Compares the balance shown with another and opens the table of it. */
export function showComparison(compared: Compared): void {
  useReferenceStore.getState().compare(compared)
  useSettingsStore.getState().change({ drawerTab: 'compare', drawerFolded: false })
}
