import type { Case, Layout, Plant } from '../document.ts'
import { changeLayout } from './change-layout.ts'

function moved<T extends { readonly id: string }>(
  list: readonly T[],
  id: string,
  by: number,
): readonly T[] {
  const at = list.findIndex((one) => one.id === id)
  const to = Math.min(list.length - 1, Math.max(0, at + by))
  const one = list[at]
  if (!one || to === at) return list
  return list.toSpliced(at, 1).toSpliced(to, 0, one)
}

/** Moves a layout by places in the order of layouts, at most to an end. */
export function moveLayout(plant: Plant, layoutId: string, by: number): Plant {
  const layouts: readonly Layout[] = moved(plant.layouts, layoutId, by)
  return layouts === plant.layouts ? plant : { ...plant, layouts }
}

/** Moves a case by places in the order of a layout's cases, at most to an end. */
export function moveCase(plant: Plant, layoutId: string, caseId: string, by: number): Plant {
  return changeLayout(plant, layoutId, (layout) => {
    const cases: readonly Case[] = moved(layout.cases, caseId, by)
    return cases === layout.cases ? layout : { ...layout, cases }
  })
}
