import { create } from 'zustand'

export const tagQuantities = ['p', 'T', 'h', 'm'] as const
export type TagQuantity = (typeof tagQuantities)[number]
export type TagsShown = 'none' | 'given' | 'chief' | 'all'

export interface TagChoice {
  /** Which streams have a tag. */
  readonly which: TagsShown
  /** What a tag says, in this order. */
  readonly quantities: readonly TagQuantity[]
}

interface TagState extends TagChoice {
  show(which: TagsShown): void
  toggle(quantity: TagQuantity): void
}

const key = 'bledsteam/tags'

function kept(): TagChoice {
  const usual: TagChoice = { which: 'chief', quantities: ['p', 'T', 'm'] }
  try {
    const stored: unknown = JSON.parse(localStorage.getItem(key) ?? 'null')
    if (typeof stored !== 'object' || stored === null) return usual
    const { which, quantities } = stored as Record<string, unknown>
    return {
      which:
        (['none', 'given', 'chief', 'all'] as const).find((one) => one === which) ?? usual.which,
      quantities: Array.isArray(quantities)
        ? tagQuantities.filter((one) => quantities.includes(one))
        : usual.quantities,
    }
  } catch {
    return usual
  }
}

/** What the tags of streams say; kept on this machine. */
export const useTagStore = create<TagState>()((set, get) => {
  const change = (choice: Partial<TagChoice>) => {
    set(choice)
    const { which, quantities } = get()
    try {
      localStorage.setItem(key, JSON.stringify({ which, quantities }))
    } catch {
      // Storage full or forbidden: the choice holds until the window closes.
    }
  }
  return {
    ...kept(),
    show: (which) => change({ which }),
    toggle: (quantity) => {
      const { quantities } = get()
      change({
        quantities: tagQuantities.filter((one) =>
          one === quantity ? !quantities.includes(one) : quantities.includes(one),
        ),
      })
    },
  }
})
