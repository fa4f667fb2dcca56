import { create } from 'zustand'
import type { Point } from './geometry.ts'

/** A kind that can be chosen in a menu at a place of the canvas. */
export interface KindItem {
  readonly kind: string
  readonly label: string
  /** The port by which it is connected, say. */
  readonly detail?: string
  readonly port?: string
}

interface KindMenu {
  /** What the choice is for: 'Kinds that can follow'. */
  readonly title: string
  readonly items: readonly KindItem[]
  /** In the window. */
  readonly at: Point
  take(item: KindItem): void
  /** Closed without a choice. */
  close?(): void
}

interface KindMenuState {
  readonly menu: KindMenu | null
}

export const useKindMenuStore = create<KindMenuState>()(() => ({ menu: null }))

export function openKindMenu(menu: KindMenu): void {
  useKindMenuStore.setState({ menu })
}

export function closeKindMenu(): void {
  const { menu } = useKindMenuStore.getState()
  if (!menu) return
  useKindMenuStore.setState({ menu: null })
  menu.close?.()
}

export function takeKind(item: KindItem): void {
  const { menu } = useKindMenuStore.getState()
  useKindMenuStore.setState({ menu: null })
  menu?.take(item)
}
