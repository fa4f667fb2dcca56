import { create } from 'zustand'

/** The quantity whose curve is being edited. */
export const useCurveStore = create<{ readonly path: string | null }>()(() => ({ path: null }))

export function openCurve(path: string): void {
  useCurveStore.setState({ path })
}

export function closeCurve(): void {
  useCurveStore.setState({ path: null })
}
