import type { Draft } from './draft.ts'
import { addPump, Line, shaftGivens, turbineGivens } from './parts.ts'
import { type Random, rounded } from './random.ts'

/** A few units in a row between a supply and an offtake. */
export function addOpenLine(draft: Draft, random: Random): void {
  const supply = draft.add('supply', 'supply', {})
  const offtake = draft.add('offtake', 'offtake', {})
  const start = {
    p: rounded(random.spread(2e5, 8e6)),
    T: rounded(random.between(285, 330), 4),
    m: rounded(random.spread(1, 300)),
  }
  const p = rounded(start.p * random.spread(1.5, 8))
  const line = new Line({ draft, random }, { port: `${supply}.outlet`, p: start.p }, start)
  const feedPump = addPump(draft, random, 'pump', true)
  line.pass(feedPump, 'suction', 'discharge', p, { p })
  if (random.chance(0.7)) {
    const loss = rounded(random.between(0.01, 0.1))
    const boiler = draft.add('boiler', 'boiler', {
      pressureLossFraction: loss,
      efficiency: rounded(random.between(0.82, 0.95)),
    })
    const hot = rounded(random.between(640, 820), 4)
    line.pass(boiler, 'feedwater', 'steam', p * (1 - loss), { T: hot })
    line.lead(0.5)
    if (random.chance(0.5)) {
      const turbine = draft.add('turbine', 'turbine', turbineGivens(random, 1))
      const out = rounded(line.end.p * random.between(0.1, 0.5))
      line.pass(turbine, 'inlet', 'exhaust', out, { p: out })
      draft.addShaft([turbine], random.chance(0.3) ? [feedPump] : [], true, shaftGivens(random))
    }
  } else line.lead(0.8)
  line.finish(`${offtake}.inlet`)
}
