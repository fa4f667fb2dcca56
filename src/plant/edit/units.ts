import { type Catalogue, standardCatalogue } from '../catalogue.ts'
import type { Plant } from '../document.ts'

/** Adds a unit with its usual quantities given; a turbine is put on a shaft. `at`: px at 100 %. */
export function addUnit(
  _plant: Plant,
  _layoutId: string,
  _kindName: string,
  _at: readonly [number, number],
  _catalogue: Catalogue = standardCatalogue,
): { plant: Plant; id: string } {
  throw new Error('not there yet')
}

/** Moves units by px at 100 %. */
export function moveUnits(
  _plant: Plant,
  _layoutId: string,
  _ids: readonly string[],
  _by: readonly [number, number],
): Plant {
  throw new Error('not there yet')
}

export function mirrorUnits(_plant: Plant, _layoutId: string, _ids: readonly string[]): Plant {
  throw new Error('not there yet')
}

/** The label of a unit, stream or shaft; an empty one of a stream or shaft is taken away. */
export function setLabel(_plant: Plant, _layoutId: string, _id: string, _label: string): Plant {
  throw new Error('not there yet')
}

/** Sets an option of a unit; false or undefined takes it away. Quantities that go with it come and go. */
export function setOption(
  _plant: Plant,
  _layoutId: string,
  _unitId: string,
  _option: string,
  _value: boolean | readonly number[] | undefined,
  _catalogue: Catalogue = standardCatalogue,
): Plant {
  throw new Error('not there yet')
}
