import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { type Catalogue, standardCatalogue } from '../../../src/plant/catalogue.ts'
import {
  applyDifference,
  difference,
  equalParts,
  invertDifference,
} from '../../../src/plant/difference.ts'
import type { Given, Layout, Plant } from '../../../src/plant/document.ts'
import {
  canConnect,
  canReconnect,
  connect,
  reconnect,
  renumberPort,
} from '../../../src/plant/edit/connect.ts'
import { EditRefused } from '../../../src/plant/edit/edit-refused.ts'
import { removeItems } from '../../../src/plant/edit/remove-items.ts'
import { setGiven } from '../../../src/plant/edit/set-given.ts'
import { putOnShaft, setGenerator } from '../../../src/plant/edit/shafts.ts'
import { canInsertOnStream, insertOnStream, setBends } from '../../../src/plant/edit/streams.ts'
import { setTitle } from '../../../src/plant/edit/titles.ts'
import {
  addUnit,
  mirrorUnits,
  moveUnits,
  setLabel,
  setOption,
} from '../../../src/plant/edit/units.ts'
import { emptyPlant } from '../../../src/plant/empty-plant.ts'
import { portsOf } from '../../../src/plant/ports.ts'
import { quantitiesOfId } from '../../../src/plant/quantities.ts'
import { readPlant } from '../../../src/plant/read-plant.ts'
import { writePlant } from '../../../src/plant/write-plant.ts'
import { invented } from '../invented-catalogue.ts'

/*
 * Any sequence of edits keeps a plant that its own file brings back unchanged, shares what it did not
 * touch, changes nothing in place, and is undone by its inverted difference.
 */

/** Draws from what the layout offers at the moment: a step is a list of numbers, read as choices. */
class Dice {
  private at = 0
  private readonly numbers: readonly number[]

  constructor(numbers: readonly number[]) {
    this.numbers = numbers
  }

  number(below: number): number {
    const drawn = this.numbers[this.at++ % this.numbers.length] ?? 0
    return below === 0 ? 0 : drawn % below
  }

  one<T>(list: readonly T[]): T | undefined {
    return list[this.number(list.length)]
  }

  some<T>(list: readonly T[]): T[] {
    return list.filter(() => this.number(3) === 0)
  }
}

const layoutId = 'base'
const layoutOf = (plant: Plant): Layout => plant.layouts.find(({ id }) => id === layoutId) as Layout

function anyPath(layout: Layout, dice: Dice, catalogue: Catalogue): string {
  const owners = [...layout.units, ...layout.streams, ...layout.shafts, { id: 'plant' }]
  const entries = owners.flatMap(({ id }) => quantitiesOfId(layout, id, catalogue))
  return dice.one(entries)?.path ?? 'plant.netPower'
}

function anyGiven(layout: Layout, dice: Dice, catalogue: Catalogue): Given | undefined {
  switch (dice.number(5)) {
    case 0:
      return undefined
    case 1:
      return {
        against: anyPath(layout, dice, catalogue),
        points: [
          [0, dice.number(9)],
          [1.5, dice.number(9)],
        ],
      }
    case 2:
      return {
        against: anyPath(layout, dice, catalogue),
        power: { at: 2, value: dice.number(9), exponent: 0.8 },
      }
    default:
      return dice.number(1000) / 8 - 20
  }
}

type Step = (plant: Plant, dice: Dice, catalogue: Catalogue) => Plant

const allPorts = (layout: Layout, catalogue: Catalogue) =>
  layout.units.flatMap((unit) =>
    portsOf(layout, unit, catalogue).flatMap(({ name, port, number }) => [
      `${unit.id}.${name}`,
      ...(number === undefined ? [] : [`${unit.id}.${port}`]),
    ]),
  )

/** A pair that is allowed, among some drawn. */
function pairThat(
  dice: Dice,
  ports: readonly string[],
  judge: (a: string, b: string) => { readonly allowed: boolean },
): readonly [string?, string?] {
  const first = dice.number(ports.length)
  const second = dice.number(ports.length)
  for (let i = 0; i < 400 && ports.length > 0; i++) {
    const a = ports[(first + i) % ports.length] as string
    const b = ports[(second + 7 * i) % ports.length] as string
    if (judge(a, b).allowed) return [a, b]
  }
  return []
}

const steps: Readonly<Record<string, Step>> = {
  add: (plant, dice, catalogue) =>
    addUnit(
      plant,
      layoutId,
      dice.one(catalogue.kinds)?.name ?? '',
      [8 * dice.number(90), 40],
      catalogue,
    ).plant,
  connect: (plant, dice, catalogue) => {
    const layout = layoutOf(plant)
    const [a, b] = pairThat(dice, allPorts(layout, catalogue), (one, other) =>
      canConnect(layout, one, other, {}, catalogue),
    )
    return a && b ? connect(plant, layoutId, a, b, {}, catalogue).plant : plant
  },
  connectBetween: (plant, dice, catalogue) => {
    const layout = layoutOf(plant)
    const [a, b] = pairThat(dice, allPorts(layout, catalogue), (one, other) =>
      canConnect(layout, one, other, { insert: true }, catalogue),
    )
    return a && b ? connect(plant, layoutId, a, b, { insert: true }, catalogue).plant : plant
  },
  reconnect: (plant, dice, catalogue) => {
    const layout = layoutOf(plant)
    const { id } = dice.one(layout.streams) ?? {}
    const end = dice.one(['from', 'to'] as const) ?? 'to'
    if (id === undefined) return plant
    const ports = allPorts(layout, catalogue).filter(
      (port) => canReconnect(layout, id, end, port, catalogue).allowed,
    )
    const port = dice.one(ports)
    return port ? reconnect(plant, layoutId, id, end, port, catalogue) : plant
  },
  renumber: (plant, dice, catalogue) => {
    const ends = layoutOf(plant).streams.flatMap(({ from, to }) => [from, to])
    try {
      return renumberPort(plant, layoutId, dice.one(ends) ?? '', 1 + dice.number(3), catalogue)
    } catch (refusal) {
      if (refusal instanceof EditRefused) return plant
      throw refusal
    }
  },
  insert: (plant, dice, catalogue) => {
    const layout = layoutOf(plant)
    const ways = layout.streams
      .flatMap((stream) => layout.units.map((unit) => [stream.id, unit.id] as const))
      .filter(([s, u]) => canInsertOnStream(layout, s, u, undefined, catalogue).allowed)
    const [s, u] = dice.one(ways) ?? []
    return s && u ? insertOnStream(plant, layoutId, s, u, undefined, catalogue).plant : plant
  },
  remove: (plant, dice, catalogue) => {
    const layout = layoutOf(plant)
    const all = [...layout.units, ...layout.streams, ...layout.shafts].map(({ id }) => id)
    const one = dice.one(all) ?? ''
    return removeItems(plant, layoutId, [one, dice.one(all) ?? one], catalogue)
  },
  give: (plant, dice, catalogue) => {
    const layout = layoutOf(plant)
    const path = anyPath(layout, dice, catalogue)
    try {
      return setGiven(plant, layoutId, path, anyGiven(layout, dice, catalogue), catalogue)
    } catch (refusal) {
      if (refusal instanceof EditRefused) return plant
      throw refusal
    }
  },
  option: (plant, dice, catalogue) => {
    const unit = dice.one(layoutOf(plant).units)
    const [name, option] =
      dice.one(Object.entries(catalogue.kindNamed(unit?.kind ?? '')?.options ?? {})) ?? []
    if (!unit || !name) return plant
    const value = option?.list ? dice.some([1, 2, 3]) : dice.number(2) === 0
    return setOption(plant, layoutId, unit.id, name, value, catalogue)
  },
  shaft: (plant, dice, catalogue) => {
    const layout = layoutOf(plant)
    const movable = layout.units.filter(({ kind }) => catalogue.kindNamed(kind)?.shaft)
    const unit = dice.one(movable)
    const target = dice.one([...layout.shafts.map(({ id }) => id), null, 'new'])
    try {
      return unit ? putOnShaft(plant, layoutId, unit.id, target ?? null, catalogue) : plant
    } catch (refusal) {
      if (refusal instanceof EditRefused) return plant
      throw refusal
    }
  },
  generator: (plant, dice, catalogue) => {
    const shaft = dice.one(layoutOf(plant).shafts)
    return shaft ? setGenerator(plant, layoutId, shaft.id, dice.number(2) === 0, catalogue) : plant
  },
  draw: (plant, dice) => {
    const layout = layoutOf(plant)
    const ids = dice.some(layout.units.map(({ id }) => id))
    const stream = dice.one(layout.streams)
    const moved = moveUnits(plant, layoutId, ids, [8 * dice.number(5), -8 * dice.number(5)])
    const mirrored = mirrorUnits(moved, layoutId, ids)
    const bends = dice.some([
      [1, 2],
      [3, 4.5],
    ] as const)
    return stream ? setBends(mirrored, layoutId, stream.id, bends) : mirrored
  },
  name: (plant, dice) => {
    const layout = layoutOf(plant)
    const one = dice.one([...layout.units, ...layout.streams, ...layout.shafts])
    const label = dice.one(['', 'Heater 5', 'Zunge "Ä"\n', '\u2028']) ?? ''
    const titled = setTitle(plant, `Plant ${label}`)
    return one ? setLabel(titled, layoutId, one.id, label) : titled
  },
  caseOf: (plant, dice, catalogue) => {
    const layout = layoutOf(plant)
    const given = anyGiven(layout, dice, catalogue)
    const path = anyPath(layout, dice, catalogue)
    const depends = typeof given === 'object' && given.against === path
    const one = {
      id: 'design',
      name: 'Design',
      ...(given !== undefined && !depends && { given: { [path]: given } }),
      free: [anyPath(layout, dice, catalogue)],
      outOfService: dice.some(layout.units.map(({ id }) => id)),
    }
    return {
      ...plant,
      layouts: plant.layouts.map((each) => (each === layout ? { ...layout, cases: [one] } : each)),
    }
  },
}

const anySteps = fc.array(
  fc.tuple(
    fc.constantFrom(...Object.keys(steps), 'add', 'add', 'connect', 'connect', 'connect'),
    fc.array(fc.nat(10_000), { minLength: 6, maxLength: 30 }),
  ),
  { minLength: 8, maxLength: 30 },
)

/** Two units of each kind, and streams between them as they come. */
function furnished(catalogue: Catalogue): Plant {
  let plant = emptyPlant('Harrow Fen', catalogue)
  for (const { name } of [...catalogue.kinds, ...catalogue.kinds]) {
    plant = addUnit(plant, layoutId, name, [0, 0], catalogue).plant
  }
  for (let i = 0; i < 16; i++) {
    plant = (steps.connect as Step)(plant, new Dice([i * 7919]), catalogue)
  }
  return plant
}

function frozen<T>(value: T): T {
  if (typeof value === 'object' && value !== null && !Object.isFrozen(value)) {
    Object.freeze(value)
    for (const part of Object.values(value)) frozen(part)
  }
  return value
}

describe.each([
  ['invented kinds', invented],
  ['the registry', standardCatalogue],
])('any sequence of edits, with %s', (_, catalogue) => {
  const start = frozen(furnished(catalogue))

  test('keeps a plant that its file brings back unchanged', { timeout: 120_000 }, () => {
    fc.assert(
      fc.property(anySteps, (sequence) => {
        let plant = start
        for (const [name, numbers] of sequence) {
          // Frozen: an edit that changed something in place would throw.
          plant = frozen((steps[name] as Step)(plant, new Dice(numbers), catalogue))
          const text = writePlant(plant, catalogue)
          const back = readPlant(text, catalogue)
          if (back.outcome === 'unusable') throw new Error(`after ${name}: ${back.message}`)
          expect(back.repairs).toEqual([])
          expect(back.plant).toEqual(plant)
          expect(writePlant(back.plant, catalogue)).toBe(text)
        }
      }),
      { numRuns: 10 },
    )
  })

  test('is undone and redone by differences', { timeout: 120_000 }, () => {
    fc.assert(
      fc.property(anySteps, (sequence) => {
        const states = [start]
        const changes = []
        for (const [name, numbers] of sequence) {
          const before = states.at(-1) as Plant
          const after = (steps[name] as Step)(before, new Dice(numbers), catalogue)
          // Kept as text, as an undo stack may be.
          changes.push(JSON.parse(JSON.stringify(difference(before, after))))
          states.push(frozen(after))
        }
        let plant = states.at(-1) as Plant
        for (let i = changes.length - 1; i >= 0; i--) {
          plant = applyDifference(plant, invertDifference(changes[i]))
          expect(plant).toEqual(states[i])
        }
        changes.forEach((change, i) => {
          plant = applyDifference(plant, change)
          expect(plant).toEqual(states[i + 1])
        })
        const whole = difference(start, plant)
        expect(applyDifference(start, whole)).toEqual(plant)
        expect(equalParts(applyDifference(plant, invertDifference(whole)), start)).toBe(true)
      }),
      { numRuns: 10 },
    )
  })
})
