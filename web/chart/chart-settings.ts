import { create } from 'zustand'

export const chartNames = ['ts', 'hs', 'tq', 'energy'] as const
export type ChartName = (typeof chartNames)[number]

interface ChartChoice {
  readonly chart: ChartName
  readonly isobars: boolean
  readonly areas: boolean
  readonly dryness: boolean
  readonly ghost: boolean
}

interface ChartSettings extends ChartChoice {
  change(change: Partial<ChartChoice>): void
}

const key = 'bledsteam/charts'
const usual: ChartChoice = {
  chart: 'ts',
  isobars: true,
  areas: false,
  dryness: false,
  ghost: true,
}

function kept(): ChartChoice {
  try {
    const stored: unknown = JSON.parse(localStorage.getItem(key) ?? 'null')
    if (typeof stored !== 'object' || stored === null) return usual
    const its = stored as Record<string, unknown>
    const flag = (name: 'isobars' | 'areas' | 'dryness' | 'ghost'): boolean =>
      typeof its[name] === 'boolean' ? its[name] : usual[name]
    return {
      chart: chartNames.find((name) => name === its.chart) ?? usual.chart,
      isobars: flag('isobars'),
      areas: flag('areas'),
      dryness: flag('dryness'),
      ghost: flag('ghost'),
    }
  } catch {
    return usual
  }
}

/** Which chart is shown and what lies on it; kept on this machine. */
export const useChartSettings = create<ChartSettings>()((set, get) => ({
  ...kept(),
  change(change) {
    set(change)
    const { change: _, ...choice } = get()
    try {
      localStorage.setItem(key, JSON.stringify(choice))
    } catch {
      // Storage full or forbidden: the choice holds until the window closes.
    }
  },
}))
