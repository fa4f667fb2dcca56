import { unitSets } from '../../src/document.ts'
import { readLayout, usePlantStore } from '../store/plant-store.ts'
import { useSettingsStore } from '../store/settings-store.ts'

/** 'As built, case Low load' */
export function subject(): string {
  const layout = readLayout()
  const { caseId } = usePlantStore.getState()
  const its = layout.cases.find(({ id }) => id === caseId)
  return its ? `${layout.name}, case ${its.name}` : layout.name
}

/** What stands in the title block of drawings and reports. */
export function titleLines(now = new Date()): {
  readonly title: string
  readonly lines: readonly string[]
} {
  const { plant } = usePlantStore.getState()
  const { unitSet } = useSettingsStore.getState()
  const units = unitSets.find(({ name }) => name === unitSet)
  return {
    title: plant.title || 'Untitled plant',
    lines: [
      subject(),
      `${now.toISOString().slice(0, 10)}, units: ${units?.label ?? unitSet}, pressures absolute`,
    ],
  }
}
