import { type Catalogue, standardCatalogue } from './catalogue.ts'
import type { Givens, Layout, Plant } from './document.ts'
import { quantitiesOfPlant } from './quantities.ts'
import { usualGivens } from './usual-givens.ts'

/** A layout without units. The plant's usual quantities (no other auxiliary power) are given, in sight. */
export function emptyLayout(
  id: string,
  name: string,
  catalogue: Catalogue = standardCatalogue,
): Layout {
  const given: Givens = usualGivens(quantitiesOfPlant(catalogue))
  return {
    id,
    name,
    ambient: { T: 298.15, p: 101325 },
    units: [],
    streams: [],
    shafts: [],
    plant: { given },
    cases: [{ id: 'design', name: 'Design' }],
    stated: [],
  }
}

/** A plant with one empty layout. */
export function emptyPlant(
  title = 'Untitled plant',
  catalogue: Catalogue = standardCatalogue,
): Plant {
  return {
    format: 'bledsteam/plant',
    version: 1,
    title,
    layouts: [emptyLayout('base', 'As built', catalogue)],
  }
}
