import type { Layout } from '../../src/plant/document.ts'
import { type Arrangement, Cycle, type Traits } from './cycle.ts'
import { Draft } from './draft.ts'
import { addOpenLine } from './open-line.ts'
import type { Random } from './random.ts'

/*
 * Random plants of the trade's usual arrangements with everything given that a designer would give:
 * pressures, temperatures, flow, efficiencies. Every plant can be built; nearly all of them work.
 */

export interface RandomPlant extends Traits {
  readonly layout: Layout
}

/** A plant of 3 to 80 units. */
export function randomPlant(random: Random): RandomPlant {
  const draft = new Draft()
  const dice = random.next()
  const arrangement = (): Arrangement =>
    random.chance(0.5) ? 'mixing' : random.chance(0.7) ? 'deaerated' : 'surface'
  let traits: Traits = { reheats: 0, heaters: 0 }
  if (dice < 0.05) addOpenLine(draft, random)
  else if (dice < 0.35) {
    traits = new Cycle(draft, random, random.whole(4, 26), arrangement()).build(0, 0)
  } else {
    const target = Math.round(random.spread(14, 86))
    // Two units in one file, now and then: only the plant's totals join them.
    const second = target > 40 && random.chance(0.25) ? random.whole(8, target - 20) : 0
    traits = new Cycle(draft, random, target - second, arrangement()).build(1, 3)
    if (second > 0) new Cycle(draft, random, second, arrangement()).build(0, 0)
  }
  return { layout: draft.layout(), ...traits }
}
