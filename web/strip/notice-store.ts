import { create } from 'zustand'

export interface NoticeAction {
  readonly name: string
  run(): void
}

/** Something the user should know that belongs to no place on the plant. */
export interface Notice {
  /** A newer notice with the same id takes the place of the older. */
  readonly id: string
  readonly severity: 'error' | 'caution' | 'remark'
  readonly text: string
  readonly actions?: readonly NoticeAction[]
  /** Stays until what it tells of has passed: no close button. */
  readonly lasting?: true
}

interface NoticeState {
  readonly notices: readonly Notice[]
  say(notice: Notice): void
  dismiss(id: string): void
}

export const useNoticeStore = create<NoticeState>()((set, get) => ({
  notices: [],
  say(notice) {
    set({ notices: [...get().notices.filter(({ id }) => id !== notice.id), notice] })
  },
  dismiss(id) {
    if (get().notices.some((one) => one.id === id)) {
      set({ notices: get().notices.filter((one) => one.id !== id) })
    }
  },
}))
