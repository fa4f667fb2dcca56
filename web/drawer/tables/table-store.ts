import { create } from 'zustand'
import type { Sorting, Table } from './table.ts'

interface Choice {
  /** Ids of columns that the user shows or hides against the usual choice. */
  readonly shown: Readonly<Record<string, boolean>>
  readonly sorting: Sorting | null
}

interface TableState {
  readonly choices: Readonly<Record<string, Choice>>
  showColumn(table: string, column: string, shown: boolean): void
  sort(table: string, column: string): void
}

const key = 'bledsteam/tables'
const usual: Choice = { shown: {}, sorting: null }

function kept(): TableState['choices'] {
  try {
    const stored: unknown = JSON.parse(localStorage.getItem(key) ?? '{}')
    if (typeof stored !== 'object' || stored === null) return {}
    const choices: Record<string, Choice> = {}
    for (const [name, one] of Object.entries(stored as Record<string, Partial<Choice>>)) {
      const shown: Record<string, boolean> = {}
      for (const [column, value] of Object.entries(one?.shown ?? {})) shown[column] = value === true
      const sorting =
        typeof one?.sorting?.column === 'string'
          ? { column: one.sorting.column, falling: one.sorting.falling === true }
          : null
      choices[name] = { shown, sorting }
    }
    return choices
  } catch {
    return {}
  }
}

/** Which columns of the tables are shown, and in which order their rows; kept on this machine. */
export const useTableStore = create<TableState>()((set, get) => {
  const change = (table: string, next: (choice: Choice) => Choice) => {
    const { choices } = get()
    const changed = { ...choices, [table]: next(choices[table] ?? usual) }
    set({ choices: changed })
    try {
      localStorage.setItem(key, JSON.stringify(changed))
    } catch {
      // Storage full or forbidden: the choice holds until the window closes.
    }
  }
  return {
    choices: kept(),
    showColumn: (table, column, shown) =>
      change(table, (choice) => ({ ...choice, shown: { ...choice.shown, [column]: shown } })),
    // Rising, falling, as it was.
    sort: (table, column) =>
      change(table, (choice) => ({
        ...choice,
        sorting:
          choice.sorting?.column !== column
            ? { column, falling: false }
            : choice.sorting.falling
              ? null
              : { column, falling: true },
      })),
  }
})

export function useSorting(table: string): Sorting | null {
  return useTableStore((state) => state.choices[table]?.sorting ?? null)
}

/** Places of the columns that are shown. */
export function useShownColumns(table: Table): readonly number[] {
  const shown = useTableStore((state) => state.choices[table.name]?.shown)
  return shownColumns(table, shown)
}

function shownColumns(
  { columns }: Table,
  shown: Readonly<Record<string, boolean>> | undefined,
): readonly number[] {
  return columns.flatMap(({ id, hidden }, i) => ((shown?.[id] ?? !hidden) ? [i] : []))
}

/** As `useShownColumns`, for use outside React. */
export function readShownColumns(table: Table): readonly number[] {
  return shownColumns(table, useTableStore.getState().choices[table.name]?.shown)
}
