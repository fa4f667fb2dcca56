import { create } from 'zustand'
import { readLayout, usePlantStore } from '../store/plant-store.ts'
import type { Point } from './geometry.ts'

/** Where the user has put tags: corners relative to the middle of the stream's route, px at 100 %. */
type Places = Readonly<Record<string, Point>>

interface TagPlacesState {
  readonly places: Places
}

const key = 'bledsteam/tag-places'
/** Layouts remembered; the oldest goes. */
const most = 40

const none: Places = {}

/** Plants have no identity of their own in a file: the title and the layout stand for it. */
const nameOfLayout = (): string => `${usePlantStore.getState().plant.title}/${readLayout().id}`

function stored(): [string, Places][] {
  try {
    const value: unknown = JSON.parse(localStorage.getItem(key) ?? '[]')
    return Array.isArray(value) ? (value as [string, Places][]) : []
  } catch {
    return []
  }
}

const kept = (): Places => stored().find(([name]) => name === nameOfLayout())?.[1] ?? none

/** Tags that the user has moved; kept on this machine, no part of the plant. */
export const useTagPlaces = create<TagPlacesState>()(() => ({ places: kept() }))

usePlantStore.subscribe((now, then) => {
  if (now.opened !== then.opened || now.layoutId !== then.layoutId) {
    useTagPlaces.setState({ places: kept() })
  }
})

/** Puts a tag at a place, or, with null, gives it back to the automatic setting. */
export function putTag(stream: string, at: Point | null): void {
  const { [stream]: _, ...others } = useTagPlaces.getState().places
  const places = at ? { ...others, [stream]: at } : others
  useTagPlaces.setState({ places })
  const rest = stored().filter(([name]) => name !== nameOfLayout())
  const all = Object.keys(places).length > 0 ? [...rest, [nameOfLayout(), places] as const] : rest
  try {
    localStorage.setItem(key, JSON.stringify(all.slice(-most)))
  } catch {
    // Storage full or forbidden: the places hold until the window closes.
  }
}
