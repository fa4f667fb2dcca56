import { useCanvasStore } from '../canvas/canvas-store.ts'
import { useTagStore } from '../canvas/tag-store.ts'
import { readPhase, readValue, useBalanceStore } from '../store/balance-store.ts'
import { readGiven, readLayout } from '../store/plant-store.ts'
import { readUnitChoice } from '../store/settings-store.ts'
import type { DrawingSource } from './PlantDrawing.tsx'

/** The plant as the canvas has it at 100 %, whatever the zoom on screen. */
export function readDrawingSource(): DrawingSource {
  const { zoom, setZoom } = useCanvasStore.getState()
  setZoom(1)
  const { sheet, labels, tags } = useCanvasStore.getState()
  setZoom(zoom)
  const { coldest, hottest, largestFlow } = useBalanceStore.getState()
  return {
    layout: readLayout(),
    sheet,
    labels,
    tags,
    tagQuantities: useTagStore.getState().quantities,
    units: readUnitChoice(),
    coldest,
    hottest,
    largestFlow,
    value: readValue,
    phase: readPhase,
    isGiven: (path) => readGiven(path) !== undefined,
  }
}
