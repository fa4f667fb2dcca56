import { type Catalogue, standardCatalogue } from '../catalogue.ts'
import { equalParts } from '../difference.ts'
import type { Case, Given, Layout, Plant } from '../document.ts'
import { withGiven } from '../givens.ts'
import { givenOf } from '../quantities.ts'
import { changeLayout, layoutNamed } from './change-layout.ts'
import { EditRefused } from './edit-refused.ts'
import { whyNotGiven } from './set-given.ts'

function changeCases(
  plant: Plant,
  layoutId: string,
  caseId: string,
  change: (one: Case, layout: Layout) => Case,
): Plant {
  return changeLayout(plant, layoutId, (layout) => {
    const before = layout.cases.find(({ id }) => id === caseId)
    if (!before) throw new EditRefused(`Layout ${layout.name} has no case ${caseId}.`)
    const after = withoutEmpty(change(before, layout))
    if (equalParts(before, after)) return layout
    return { ...layout, cases: layout.cases.map((one) => (one === before ? after : one)) }
  })
}

/** Keys without a value go. */
function withoutEmpty(one: Case): Case {
  const entries = Object.entries(one).filter(([, value]) => value !== undefined)
  return Object.fromEntries(entries) as unknown as Case
}

/** Adds a case that starts as the layout is; `like`: as another case of it. */
export function addCase(
  plant: Plant,
  layoutId: string,
  name: string,
  like?: string,
): { plant: Plant; id: string } {
  const { cases } = layoutNamed(plant, layoutId)
  const taken = new Set(cases.map(({ id }) => id))
  let number = 1
  while (taken.has(`case${number}`)) number++
  const id = `case${number}`
  const model = cases.find((one) => one.id === like)
  return {
    plant: changeLayout(plant, layoutId, (layout) => ({
      ...layout,
      cases: [...layout.cases, { ...model, id, name }],
    })),
    id,
  }
}

/** Changes what a case says apart from its givens; undefined takes a key away. */
export function changeCase(
  plant: Plant,
  layoutId: string,
  caseId: string,
  change: {
    readonly [K in 'name' | 'frozen' | 'hardwareFrom' | 'loadControl' | 'outOfService']?:
      | Case[K]
      | undefined
  },
): Plant {
  const { name, hardwareFrom } = change
  if ('name' in change && name === undefined) throw new EditRefused('A case keeps a name.')
  if (hardwareFrom) {
    const source = layoutNamed(plant, hardwareFrom.layout)
    const { case: wanted } = hardwareFrom
    if (wanted !== undefined && !source.cases.some(({ id }) => id === wanted)) {
      throw new EditRefused(`Layout ${source.name} has no case ${wanted}.`)
    }
  }
  return changeCases(plant, layoutId, caseId, (one, layout) => {
    const missing = change.outOfService?.find((id) => !layout.units.some((unit) => unit.id === id))
    if (missing !== undefined) throw new EditRefused(`There is no unit ${missing}.`)
    return { ...one, ...change } as Case
  })
}

/**
 * What a case gives for a path: a value, `'free'` (solved in this case, whatever the layout gives), or
 * `'layout'` (what the layout gives).
 */
export function setInCase(
  plant: Plant,
  layoutId: string,
  caseId: string,
  path: string,
  to: Given | 'free' | 'layout',
  catalogue: Catalogue = standardCatalogue,
): Plant {
  return changeCases(plant, layoutId, caseId, (one, layout) => {
    const value = to === 'free' || to === 'layout' ? undefined : to
    const why = whyNotGiven(layout, path, value ?? 0, catalogue)
    if (why !== undefined) throw new EditRefused(why)
    const given = withGiven(one.given ?? {}, path, value)
    const others = (one.free ?? []).filter((freed) => freed !== path)
    // A frozen case gives hardware that the layout does not.
    const frees = to === 'free' && (one.frozen === true || givenOf(layout, path) !== undefined)
    const free = frees ? [...others, path] : others
    return {
      ...one,
      given: Object.keys(given).length > 0 ? given : undefined,
      free: free.length > 0 ? free : undefined,
    } as Case
  })
}

/** Removes a case. Refused while another takes its hardware from it. */
export function removeCase(plant: Plant, layoutId: string, caseId: string): Plant {
  for (const { name, cases } of plant.layouts) {
    const user = cases.find(
      ({ hardwareFrom }) => hardwareFrom?.layout === layoutId && hardwareFrom.case === caseId,
    )
    if (user) {
      throw new EditRefused(
        `Case ${user.name} of layout ${name} takes its hardware from this case.`,
      )
    }
  }
  return changeLayout(plant, layoutId, (layout) => {
    const cases = layout.cases.filter(({ id }) => id !== caseId)
    return cases.length === layout.cases.length ? layout : { ...layout, cases }
  })
}
