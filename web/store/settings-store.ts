import { create } from 'zustand'
import type { Dimension, UnitChoice, UnitSetName } from '../../src/document.ts'

export type Theme = 'system' | 'light' | 'dark'
export const drawerTabs = [
  'states',
  'units',
  'heaters',
  'groups',
  'pumps',
  'totals',
  'givens',
  'ledger',
  'findings',
  'compare',
  'report',
] as const
export type DrawerTab = (typeof drawerTabs)[number]

interface Settings {
  readonly unitSet: UnitSetName
  /** Single units chosen against the set: dimension to unit. */
  readonly unitOverrides: Readonly<Partial<Record<Dimension, string>>>
  /** The quantity that the worth of given numbers is told of. */
  readonly worthTarget: string
  readonly theme: Theme
  /** Share of the window's width that the chart takes. */
  readonly chartShare: number
  /** Height of the open drawer, px. Null: as much as suits the window. */
  readonly drawerHeight: number | null
  readonly drawerTab: DrawerTab
  readonly drawerFolded: boolean
  readonly chartFolded: boolean
  /** Null: folded where the window is narrow. */
  readonly railFolded: boolean | null
}

interface SettingsState extends Settings {
  change(change: Partial<Settings>): void
}

const usual: Settings = {
  unitSet: 'metric',
  unitOverrides: {},
  worthTarget: 'plant.unitHeatRate',
  theme: 'system',
  chartShare: 0.28,
  drawerHeight: null,
  drawerTab: 'states',
  drawerFolded: false,
  chartFolded: false,
  railFolded: null,
}

const key = 'bledsteam/settings'

const isNumber = (value: unknown): value is number =>
  typeof value === 'number' && Number.isFinite(value)
const isBoolean = (value: unknown): value is boolean => typeof value === 'boolean'

/** What was kept, field by field: one that cannot be read falls back to the usual. */
function kept(): Settings {
  let stored: Record<string, unknown> = {}
  try {
    const value: unknown = JSON.parse(localStorage.getItem(key) ?? '{}')
    if (typeof value === 'object' && value !== null) stored = value as Record<string, unknown>
  } catch {
    // Unreadable or forbidden storage: the usual settings serve.
  }
  const among = <T extends string>(value: unknown, all: readonly T[], otherwise: T): T =>
    all.find((one) => one === value) ?? otherwise
  const { unitOverrides } = stored
  return {
    unitSet: among(stored.unitSet, ['si', 'metric', 'us'], usual.unitSet),
    unitOverrides:
      typeof unitOverrides === 'object' && unitOverrides !== null
        ? (Object.fromEntries(
            Object.entries(unitOverrides).filter(([, unit]) => typeof unit === 'string'),
          ) as Settings['unitOverrides'])
        : {},
    worthTarget: typeof stored.worthTarget === 'string' ? stored.worthTarget : usual.worthTarget,
    theme: among(stored.theme, ['system', 'light', 'dark'], usual.theme),
    chartShare: isNumber(stored.chartShare)
      ? Math.min(0.6, Math.max(0.15, stored.chartShare))
      : usual.chartShare,
    drawerHeight: isNumber(stored.drawerHeight)
      ? Math.min(1200, Math.max(80, stored.drawerHeight))
      : usual.drawerHeight,
    drawerTab: among(stored.drawerTab, drawerTabs, usual.drawerTab),
    drawerFolded: isBoolean(stored.drawerFolded) ? stored.drawerFolded : usual.drawerFolded,
    chartFolded: isBoolean(stored.chartFolded) ? stored.chartFolded : usual.chartFolded,
    railFolded: isBoolean(stored.railFolded) ? stored.railFolded : null,
  }
}

/** How the window is set up on this machine; kept in local storage, never in a plant file. */
export const useSettingsStore = create<SettingsState>()((set, get) => ({
  ...kept(),
  change(change) {
    set(change)
    const { change: _, ...settings } = get()
    try {
      localStorage.setItem(key, JSON.stringify(settings))
    } catch {
      // Storage full or forbidden: the settings hold until the window closes.
    }
  },
}))

let choice: Exclude<UnitChoice, UnitSetName> = {
  set: usual.unitSet,
  overrides: usual.unitOverrides,
}

function unitChoice({ unitSet, unitOverrides }: Settings): UnitChoice {
  if (choice.set !== unitSet || choice.overrides !== unitOverrides) {
    choice = { set: unitSet, overrides: unitOverrides }
  }
  return choice
}

/** The units in force, for `formatQuantity`, `parseQuantity` and `unitOf`. */
export function useUnitChoice(): UnitChoice {
  return useSettingsStore(unitChoice)
}

/** As `useUnitChoice`, for use outside React. */
export function readUnitChoice(): UnitChoice {
  return unitChoice(useSettingsStore.getState())
}
