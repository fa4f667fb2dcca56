import { create } from 'zustand'

export type Paper = 'a4' | 'letter'

export const sectionNames = [
  'totals',
  'diagram',
  'charts',
  'states',
  'units',
  'heaters',
  'groups',
  'pumps',
  'account',
  'givens',
  'findings',
] as const
export type SectionName = (typeof sectionNames)[number]

export const sectionWords: Readonly<Record<SectionName, string>> = {
  totals: 'Plant totals',
  diagram: 'Flow diagram',
  charts: 'Charts',
  states: 'State points',
  units: 'Units',
  heaters: 'Heaters and condensers',
  groups: 'Stage groups',
  pumps: 'Pumps',
  account: 'Energy and exergy',
  givens: 'Given numbers and their basis',
  findings: 'Findings',
}

interface ReportChoice {
  readonly paper: Paper
  readonly left: readonly SectionName[]
  readonly frame: boolean
  readonly legend: boolean
}

interface ReportState extends ReportChoice {
  /** The report is open over the window. */
  readonly open: boolean
  change(change: Partial<ReportChoice>): void
  show(open: boolean): void
}

const key = 'bledsteam/report'
/** Where letter paper is usual, it is chosen at first. */
const usualPaper = (): Paper =>
  /-(US|CA|MX|PH|CL|CO|CR|GT|PA|PR|SV|VE)\b/.test(globalThis.navigator?.language ?? '')
    ? 'letter'
    : 'a4'

function kept(): ReportChoice {
  const usual: ReportChoice = { paper: usualPaper(), left: [], frame: true, legend: true }
  try {
    const stored = JSON.parse(localStorage.getItem(key) ?? 'null') as Partial<ReportChoice> | null
    if (!stored) return usual
    return {
      paper: stored.paper === 'letter' || stored.paper === 'a4' ? stored.paper : usual.paper,
      left: sectionNames.filter((name) => stored.left?.includes?.(name)),
      frame: stored.frame !== false,
      legend: stored.legend !== false,
    }
  } catch {
    return usual
  }
}

/** What goes into the report and onto which paper; kept on this machine. */
export const useReportStore = create<ReportState>()((set, get) => ({
  ...kept(),
  open: false,
  change(change) {
    set(change)
    const { paper, left, frame, legend } = get()
    try {
      localStorage.setItem(key, JSON.stringify({ paper, left, frame, legend }))
    } catch {
      // Storage full or forbidden: the choice holds until the window closes.
    }
  },
  show: (open) => set({ open }),
}))
