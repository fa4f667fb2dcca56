import { createContext, useContext } from 'react'
import { createStore, type StoreApi, useStore } from 'zustand'
import type { Geometry } from './geometry.ts'

/** What the pointer or the keyboard is on. */
export type Pointed =
  /** A stream's state, which may move with the numbers. */
  | { readonly kind: 'state'; readonly stream: string }
  /** A place on a process: J/(kg K), K, J/kg. */
  | {
      readonly kind: 'process'
      readonly process: number
      readonly s: number
      readonly T: number
      readonly h: number
    }

interface ChartState {
  readonly pointed: Pointed | null
  /** Where the axes stand now; null until they are drawn. */
  readonly geometry: Geometry | null
}

export type ChartStore = StoreApi<ChartState>

/** A store of its own for each chart: a moving pointer redraws the read-out and nothing else. */
export function createChartStore(): ChartStore {
  return createStore<ChartState>()(() => ({ pointed: null, geometry: null }))
}

export const ChartContext = createContext<ChartStore | null>(null)

export function useChartStore(): ChartStore {
  const store = useContext(ChartContext)
  if (!store) throw new Error('A part of the chart stands outside it.')
  return store
}

export function useChart<T>(select: (state: ChartState) => T): T {
  return useStore(useChartStore(), select)
}
