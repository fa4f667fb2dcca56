import {
  describeQuantity,
  formatQuantity,
  type Given,
  labelOf,
  withinSentence,
} from '../../src/document.ts'
import { type EditOptions, editGiven, readGiven, readLayout } from '../store/plant-store.ts'
import { readUnitChoice } from '../store/settings-store.ts'

/** A quantity by name: 'Heater 5, terminal difference'; the path itself where nothing bears it. */
export function quantityName(path: string): string {
  const quantity = describeQuantity(readLayout(), path)
  if (!quantity) return path
  return quantity.owner === 'plant'
    ? quantity.label
    : `${labelOf(readLayout(), quantity.owner)}, ${withinSentence(quantity.label)}`
}

/** A given in the units in force: '12.82 bar'; a curve by its word. */
export function givenText(path: string, given: Given): string {
  const dimension = describeQuantity(readLayout(), path)?.dimension ?? 'number'
  if (typeof given !== 'number') return 'a curve'
  const { text, unit } = formatQuantity(given, dimension, readUnitChoice())
  return unit ? `${text} ${unit}` : text
}

/** The path given last: where too many numbers are given, it is the likeliest culprit. */
let newestGiven: string | null = null

export function lastGiven(): string | null {
  return newestGiven
}

/** Gives a quantity a value: an undo step by name. */
export function give(
  path: string,
  given: Given,
  options: EditOptions & {
    /** What was given before a row of merged edits began, for their common name. */
    readonly before?: Given | undefined
  } = {},
): void {
  const before = options.before ?? readGiven(path)
  if (before === undefined) newestGiven = path
  const to = givenText(path, given)
  const name =
    before === undefined
      ? `${quantityName(path)} given as ${to}`
      : `${quantityName(path)} ${givenText(path, before)} to ${to}`
  editGiven(name, path, given, options)
}

let rows = 0

/** Gives several quantities the same value, or frees them with undefined: one undo step. */
export function giveMany(name: string, paths: readonly string[], given: Given | undefined): void {
  rows += 1
  const merge = `many/${rows}`
  for (const path of paths) {
    if (given !== undefined || readGiven(path) !== undefined)
      editGiven(name, path, given, { merge })
  }
}

/** Frees a quantity: from now on it is solved. */
export function free(path: string): void {
  if (readGiven(path) === undefined) return
  editGiven(`${quantityName(path)} freed`, path, undefined)
}
