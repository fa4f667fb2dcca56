import { type Catalogue, standardCatalogue } from './catalogue.ts'
import { checkLayout } from './check-layout.ts'
import type { Layout, Plant } from './document.ts'
import { currentVersion } from './migrate.ts'
import { listAt, refuse, refuseTwins, strictObjectAt, textAt, Unusable } from './place.ts'
import type { NoteRepair, Remark } from './remark.ts'

export type ReadResult =
  /** `repairs`: what the file lacked and what was put there; its physics is never touched. */
  | { readonly outcome: 'plant'; readonly plant: Plant; readonly repairs: readonly Remark[] }
  /** One line that names the place: line and column, or `layouts[0].units[3].given.foo`. */
  | { readonly outcome: 'unusable'; readonly message: string }

/**
 * Checks what a file holds, of the version in force: wrong types, unknown keys, kinds, ports and
 * quantities, ids, numbering, curves, references. What a plant merely lacks (a required port without
 * a stream, a turbine on no shaft) passes: findings tell of it. Nothing is thrown.
 */
export function checkPlant(value: unknown, catalogue: Catalogue = standardCatalogue): ReadResult {
  const repairs: Remark[] = []
  try {
    return { outcome: 'plant', plant: plantAt(value, catalogue, repairs), repairs }
  } catch (fault) {
    if (fault instanceof Unusable) return { outcome: 'unusable', message: fault.message }
    throw fault
  }
}

const plantKeys = ['format', 'version', 'title', 'layouts']

function plantAt(value: unknown, catalogue: Catalogue, repairs: Remark[]): Plant {
  const file = strictObjectAt(value, '', plantKeys, 'the plant')
  if (file.format !== 'bledsteam/plant') {
    refuse('format', 'a plant file has the format "bledsteam/plant".')
  }
  if (file.version !== currentVersion) refuse('version', `only version ${currentVersion} is known.`)
  const note: NoteRepair = (place, what, where = []) => {
    repairs.push({
      severity: 'remark',
      code: 'repaired',
      where,
      quantities: [],
      message: `${place} was missing: ${what}.`,
    })
  }
  if (file.title === undefined) note('title', 'the plant is called Untitled plant')
  const list = listAt(file.layouts, 'layouts')
  if (list.length === 0) refuse('layouts', 'a plant has at least one layout.')
  const layouts = list.map((one, i) => checkLayout(one, `layouts[${i}]`, catalogue, note))
  refuseTwins(
    layouts.map(({ id }) => id),
    (i) => `layouts[${i}]`,
  )
  layouts.forEach((layout, i) => {
    checkHardware(layout, layouts, `layouts[${i}]`)
  })
  return {
    format: 'bledsteam/plant',
    version: currentVersion,
    title: file.title === undefined ? 'Untitled plant' : textAt(file.title, 'title'),
    layouts,
  }
}

/** The layouts and cases that a layout's cases take their hardware from exist. */
function checkHardware(layout: Layout, layouts: readonly Layout[], place: string): void {
  layout.cases.forEach(({ hardwareFrom }, i) => {
    if (!hardwareFrom) return
    const here = `${place}.cases[${i}].hardwareFrom`
    const source = layouts.find(({ id }) => id === hardwareFrom.layout)
    if (!source) {
      const ids = layouts.map(({ id }) => id).join(', ')
      refuse(`${here}.layout`, `there is no layout ${hardwareFrom.layout}; there is ${ids}.`)
    }
    if (hardwareFrom.case === undefined) return
    if (!source.cases.some(({ id }) => id === hardwareFrom.case)) {
      const ids = source.cases.map(({ id }) => id).join(', ') || 'none'
      refuse(
        `${here}.case`,
        `layout ${source.id} has no case ${hardwareFrom.case}; its cases: ${ids}.`,
      )
    }
  })
}
