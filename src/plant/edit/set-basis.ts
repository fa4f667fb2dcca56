import type { Basis, Layout, Plant } from '../document.ts'
import { givenOf } from '../quantities.ts'
import { changeLayout } from './change-layout.ts'
import { EditRefused } from './edit-refused.ts'

/** What a given number of the layout rests on, where that is said. */
export function basisOf(layout: Layout, path: string): Basis | undefined {
  const { basis } = layout
  return basis && Object.hasOwn(basis, path) ? basis[path] : undefined
}

/**
 * Says what a given number rests on; undefined takes it back. Refuses a quantity that is not given in
 * the layout, and an uncertainty below zero.
 */
export function setBasis(
  plant: Plant,
  layoutId: string,
  path: string,
  basis: Basis | undefined,
): Plant {
  return changeLayout(plant, layoutId, (layout) => {
    const next = basis && written(basis)
    if (next && givenOf(layout, path) === undefined) {
      throw new EditRefused(`${path} is not given: only a given number rests on something.`)
    }
    if (next?.uncertainty !== undefined && !(next.uncertainty >= 0)) {
      throw new EditRefused('An uncertainty is not below zero.')
    }
    return withBasis(layout, path, next)
  })
}

/** The layout with one basis set or (undefined) taken away; the very same where nothing changes. */
export function withBasis(layout: Layout, path: string, basis: Basis | undefined): Layout {
  const before = layout.basis ?? {}
  if (basis === undefined && !Object.hasOwn(before, path)) return layout
  const { [path]: _, ...rest } = before
  const after = basis === undefined ? rest : { ...before, [path]: basis }
  const { basis: __, ...bare } = layout
  return Object.keys(after).length === 0 ? bare : { ...bare, basis: after }
}

/** A basis as it is kept: without what is empty; undefined where nothing is said. */
function written({ source, note, uncertainty }: Basis): Basis | undefined {
  const text = note?.trim()
  const basis: Basis = {
    ...(source === undefined ? {} : { source }),
    ...(text ? { note: text } : {}),
    ...(uncertainty === undefined ? {} : { uncertainty }),
  }
  return Object.keys(basis).length === 0 ? undefined : basis
}
