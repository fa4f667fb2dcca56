import type { Layout } from '../../src/plant/document.ts'
import { Draft } from './draft.ts'
import { type Random, rounded } from './random.ts'

/*
 * Random plants of the trade's usual arrangement with everything given that a designer would give:
 * pressures, temperatures, flow, efficiencies. Every plant can be built; nearly all of them work.
 */

/** An outlet that waits for a stream, and the pressure there by design, Pa. */
interface End {
  readonly port: string
  readonly p: number
}

interface Traits {
  readonly reheats: number
  readonly heaters: number
}

export interface RandomPlant extends Traits {
  readonly layout: Layout
}

/** A stretch of the expansion in one casing. */
interface Section {
  readonly from: number
  readonly to: number
  /** Pressures of its bleeds, falling; without a heater they serve process. */
  readonly bleeds: { readonly p: number; readonly heater?: number }[]
  /** A heater is fed from its exhaust. */
  feedsHeater: number | undefined
}

/** A plant of 3 to 80 units. */
export function randomPlant(random: Random): RandomPlant {
  const draft = new Draft()
  const dice = random.next()
  let traits: Traits = { reheats: 0, heaters: 0 }
  if (dice < 0.05) openLine(draft, random)
  else if (dice < 0.35) traits = new Cycle(draft, random, random.whole(4, 26)).build(0, 0)
  else {
    const target = Math.round(random.spread(14, 86))
    // Two units in one file, now and then: only the plant's totals join them.
    const second = target > 40 && random.chance(0.25) ? random.whole(8, target - 20) : 0
    traits = new Cycle(draft, random, target - second).build(1, 3)
    if (second > 0) new Cycle(draft, random, second).build(0, 0)
  }
  return { layout: draft.layout(), ...traits }
}

/** A few units in a row between a supply and an offtake. */
function openLine(draft: Draft, random: Random): void {
  const supply = draft.add('supply', 'supply', {})
  const offtake = draft.add('offtake', 'offtake', {})
  const start = {
    p: rounded(random.spread(2e5, 8e6)),
    T: rounded(random.between(285, 330), 4),
    m: rounded(random.spread(1, 300)),
  }
  const p = rounded(start.p * random.spread(1.5, 8))
  const line = new Line(draft, random, { port: `${supply}.outlet`, p: start.p }, start)
  const feedPump = pump(draft, random, 'pump', true)
  line.pass(feedPump, 'suction', 'discharge', p, { p })
  if (random.chance(0.7)) {
    const loss = rounded(random.between(0.01, 0.1))
    const boiler = draft.add('boiler', 'boiler', {
      pressureLossFraction: loss,
      efficiency: rounded(random.between(0.82, 0.95)),
    })
    line.pass(boiler, 'feedwater', 'steam', p * (1 - loss), {
      T: rounded(random.between(640, 820), 4),
    })
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

function turbineGivens(random: Random, groups: number): Record<string, number> {
  const given: Record<string, number> = {
    wetnessFactor: random.choose([0, 1, 0.8, rounded(random.between(0.4, 1.2), 2)]),
    exhaustLoss: random.chance(0.6) ? 0 : rounded(random.between(5e3, 25e3)),
  }
  for (let k = 1; k <= groups; k++) {
    given[`groupEfficiency${k}`] = rounded(random.between(0.8, 0.92))
  }
  return given
}

function shaftGivens(random: Random, generator = true): Record<string, number> {
  return {
    mechanicalEfficiency: rounded(random.between(0.985, 0.998), 4),
    mechanicalLoss: random.chance(0.7) ? 0 : rounded(random.between(1e3, 5e4)),
    ...(generator && {
      generatorEfficiency: rounded(random.between(0.965, 0.99), 4),
      generatorLoss: random.chance(0.7) ? 0 : rounded(random.between(1e3, 5e4)),
    }),
  }
}

function pump(draft: Draft, random: Random, stem: string, motor: boolean): string {
  return draft.add('pump', stem, {
    efficiency: rounded(random.between(0.65, 0.88)),
    ...(motor && { driveEfficiency: rounded(random.between(0.92, 0.975)) }),
    ...(random.chance(0.1) && { suctionHeight: rounded(random.between(2, 30), 2) }),
  })
}

/** A line that grows unit by unit from an outlet. */
class Line {
  end: End
  readonly streams: { readonly id: string; readonly p: number }[] = []
  private readonly draft: Draft
  private readonly random: Random
  /** What to give on the next stream. */
  private given: Record<string, number>

  constructor(draft: Draft, random: Random, end: End, given: Record<string, number> = {}) {
    this.draft = draft
    this.random = random
    this.end = end
    this.given = given
  }

  /** Through a unit; `given` falls on the stream that leaves it. */
  pass(unit: string, inlet: string, outlet: string, p: number, given = {}): void {
    this.connect(`${unit}.${inlet}`)
    this.end = { port: `${unit}.${outlet}`, p }
    this.given = given
  }

  /** To its last port; returns the stream's id. */
  finish(port: string): string {
    return this.connect(port)
  }

  private connect(port: string): string {
    const id = this.draft.join(this.end.port, port, this.given)
    this.given = {}
    this.streams.push({ id, p: this.end.p })
    return id
  }

  /** Perhaps through a pipe or a valve with its loss given. */
  lead(share: number): void {
    const { draft, random } = this
    if (!random.chance(share)) return
    const fraction = rounded(random.between(0.01, 0.08))
    const p = this.end.p * (1 - fraction)
    if (random.chance(0.6)) {
      const pipe = draft.add('pipe', 'pipe', {
        ...(random.chance(0.75)
          ? { pressureLossFraction: fraction }
          : { pressureDrop: fraction * this.end.p }),
        heatLoss: random.chance(0.6) ? 0 : rounded(random.spread(1e3, 3e4)),
      })
      this.pass(pipe, 'inlet', 'outlet', p)
      return
    }
    const valve = draft.add(
      'valve',
      'valve',
      random.chance(0.6)
        ? { pressureLossFraction: fraction }
        : { pressureDrop: fraction * this.end.p },
    )
    this.pass(valve, 'inlet', 'outlet', p)
  }

  /** Through a valve that holds whatever pressure there is behind it. */
  throttle(p: number): void {
    this.pass(this.draft.add('valve', 'valve', {}), 'inlet', 'outlet', p)
  }

  /** Splits the line: it goes on at the first outlet, the second is returned. */
  split(): { readonly unit: string; readonly end: End } {
    const unit = this.draft.add('branch', 'branch', {})
    this.connect(`${unit}.inlet`)
    this.end = { port: this.draft.numbered(unit, 'outlet'), p: this.end.p }
    return { unit, end: { port: this.draft.numbered(unit, 'outlet'), p: this.end.p } }
  }
}

/** A closed cycle with what hangs on it. */
class Cycle {
  private readonly draft: Draft
  private readonly random: Random
  private readonly target: number
  /** Units of the whole plant that this cycle may fill it up to. */
  private readonly limit: number
  /** Flow of the boilers, kg/s. */
  private flow = 100
  private readonly turbines: string[] = []
  private condenser = ''
  private condenserPressure = 5000
  /** Waits for its feed pump. */
  private drive: string | undefined
  /** The plant loses water. */
  private loses = false
  private readonly reheaters: { readonly id: string; readonly p: number }[] = []
  /** By heater, rising pressure. */
  private heaters: {
    readonly p: number
    readonly id: string
  }[] = []

  constructor(draft: Draft, random: Random, target: number) {
    this.draft = draft
    this.random = random
    this.target = target
    this.limit = draft.units.length + target
  }

  /** A detail that the plant has with this chance, as long as it does not grow too large. */
  private more(share: number, units = 1): boolean {
    const wish = share + (1 - share) * Math.max(0, Math.min(0.6, (this.target - 25) / 50))
    return this.random.chance(wish) && this.draft.units.length + units + 2 <= this.limit
  }

  build(leastReheats: number, leastHeaters: number): Traits {
    const { random, target } = this
    this.flow = rounded(random.spread(20, 600))
    this.condenserPressure = rounded(random.spread(2500, 20e3))
    const reheats = Math.max(
      leastReheats,
      target < 9 ? 0 : random.chance(0.35) ? 0 : target > 30 && random.chance(0.2) ? 2 : 1,
    )
    const room = Math.floor((target - 5 - 2 * reheats) / 2.6)
    const most = Math.min(10, Math.max(leastHeaters, room))
    const heaters = random.whole(Math.min(leastHeaters, most), most)
    const main = reheats > 0 ? random.spread(7e6, 27e6) : random.spread(2e6, 12e6)
    const p = rounded(main)
    const { sections, heaterPressures } = this.plan(p, reheats, heaters)

    const boiler = this.addBoiler(p)
    let line = new Line(this.draft, random, boiler.steam)
    line.lead(target > 12 ? 0.5 : 0.2)
    if (this.more(0.08)) this.steamDrain(line)
    if (this.more(0.3)) line.lead(1)
    const main1: Line = line
    this.condenser = this.draft.add('condenser', 'condenser', {
      pressure: this.condenserPressure,
      subcooling: random.chance(0.6) ? 0 : rounded(random.between(0.5, 3), 2),
      coolingHeatCapacity: 4180,
      ...(random.chance(0.4) && this.coolingSide()),
    })
    this.heaters = heaterPressures.map((pressure) => ({
      p: pressure,
      id: this.draft.add('mixingHeater', 'heater', {
        subcooling: random.chance(0.7) ? 0 : rounded(random.between(0.2, 3), 2),
      }),
    }))
    sections.forEach((section, k) => {
      line = this.expand(line, section, k, k === sections.length - 1, reheats)
      if (k === 0) this.giveMain(main1, p)
    })
    this.feedLine(boiler)
    this.gatherShafts()
    if (this.loses) this.makeUp()
    return { reheats, heaters: heaterPressures.length }
  }

  /** Where the casings begin and end, and what is bled from each. */
  private plan(p: number, reheats: number, heaters: number) {
    const { random } = this
    const pc = this.condenserPressure
    const borders: number[] = []
    let at = p
    for (let k = 0; k < reheats; k++) {
      at = rounded(at * random.between(0.2, 0.32))
      borders.push(at)
    }
    const crossover = this.target > 16 && random.chance(0.6)
    if (crossover) borders.push(rounded(Math.min(at * 0.4, random.spread(2.5e5, 9e5))))
    const low = Math.max(pc * 3.5, 12e3)
    const high = Math.min(0.3 * p, 7e6)
    const heaterPressures: number[] = []
    const sections: Section[] = [p, ...borders].map((from, k) => ({
      from,
      to: borders[k] ?? pc,
      bleeds: [],
      feedsHeater: undefined,
    }))
    for (let i = 0; i < heaters; i++) {
      const share = (i + random.between(0.35, 0.65)) / heaters
      const pressure = rounded(low * (high / low) ** share)
      // Between an exhaust and the next casing's inlet nothing can be bled.
      const at = borders.findIndex((border) => pressure > 0.7 * border && pressure < 1.15 * border)
      const section = sections[at]
      if (section === undefined) heaterPressures.push(pressure)
      else if (section.feedsHeater === undefined) {
        section.feedsHeater = heaterPressures.length
        heaterPressures.push(rounded(section.to * random.between(0.9, 0.97)))
      }
    }
    const spacing = random.between(1.02, 1.09)
    for (const section of sections) {
      heaterPressures.forEach((pressure, i) => {
        if (sections.some(({ feedsHeater }) => feedsHeater === i)) return
        if (pressure < section.from && pressure > section.to) {
          section.bleeds.push({ p: pressure * spacing, heater: i })
        }
      })
      if (section.to > 1e5 && this.target > 14 && random.chance(0.15)) {
        const free = Math.sqrt(section.from * section.to) * random.between(0.9, 1.1)
        if (section.bleeds.every((bleed) => Math.abs(Math.log(bleed.p / free)) > 0.1)) {
          section.bleeds.push({ p: rounded(free) })
        }
      }
      section.bleeds.sort((a, b) => b.p - a.p)
    }
    return { sections, heaterPressures }
  }

  private coolingSide(): Record<string, number> {
    const { random } = this
    return random.chance(0.7)
      ? { coolingInletT: rounded(random.between(278, 284), 4), coolingRise: 6 }
      : { coolingRise: rounded(random.between(5, 9), 2) }
  }

  private addBoiler(p: number) {
    const { draft, random } = this
    const loss = rounded(random.between(0.01, 0.12))
    const id = draft.add('boiler', 'boiler', {
      pressureLossFraction: loss,
      efficiency: rounded(random.between(0.82, 0.95)),
    })
    // The main line is led from here to a turbine inlet at p.
    const pBoiler = p * random.between(1, 1.04)
    if (p < 17e6 && this.more(0.35)) {
      const drum = rounded(pBoiler * random.between(1.02, 1.06))
      draft.give(`${id}.blowdownFraction`, rounded(random.between(0.003, 0.02), 2))
      draft.give(`${id}.drumPressure`, drum)
      this.blowdown = { port: `${id}.blowdown`, p: drum }
    }
    return { id, loss, steam: { port: `${id}.steam`, p: pBoiler }, feed: pBoiler / (1 - loss) }
  }

  private blowdown: End | undefined

  /** Pressure, temperature and flow of the live steam, each somewhere on the line. */
  private giveMain(line: Line, p: number): void {
    const { draft, random } = this
    const { streams } = line
    const pressureAt = random.choose(streams)
    draft.give(`${pressureAt.id}.p`, rounded(pressureAt.p, 4))
    const hot = rounded(p > 6e6 ? random.between(770, 873) : random.between(690, 790), 4)
    draft.give(`${random.choose(streams).id}.T`, hot)
    draft.give(`${random.choose(streams).id}.m`, this.flow)
  }

  /** A little steam from the line to the condenser. */
  private steamDrain(line: Line): void {
    const { draft, random } = this
    const { unit, end } = line.split()
    draft.give(`${unit}.share2`, rounded(random.between(0.001, 0.01), 2))
    this.toCondenser.push(end)
  }

  private readonly toCondenser: End[] = []

  /** One casing with its bleeds, and the way from its exhaust to the next. */
  private expand(line: Line, section: Section, k: number, last: boolean, reheats: number): Line {
    const { draft, random } = this
    const id = draft.add('turbine', 'turbine', turbineGivens(random, section.bleeds.length + 1))
    this.turbines.push(id)
    line.finish(`${id}.inlet`)
    for (const { p, heater } of section.bleeds) {
      const end = { port: draft.numbered(id, 'bleed'), p }
      if (heater === undefined) this.process(end, true)
      else this.feedHeater(end, this.heaters[heater]!)
    }
    const exhaust = { port: `${id}.exhaust`, p: section.to }
    if (last) {
      draft.join(exhaust.port, draft.numbered(this.condenser, 'steam'))
      return line
    }
    const next = new Line(draft, random, exhaust, { p: section.to })
    if (section.feedsHeater !== undefined) {
      const { end } = next.split()
      this.feedHeater(end, this.heaters[section.feedsHeater]!, false)
    }
    if (this.more(0.06)) this.process(next.split().end, false)
    if (section.to < 3e6 && this.drive === undefined && this.more(0.4, 3)) this.addDrive(next)
    if (k < reheats) this.reheat(next)
    else {
      next.lead(this.target > 20 ? 0.4 : 0.1)
      if (this.more(0.12, 3)) this.secondLow(next, section.to)
    }
    return next
  }

  /** Steam to a heater; its pressure is given at one of the ends. */
  private feedHeater(end: End, heater: { readonly id: string; readonly p: number }, open = true) {
    const { draft, random } = this
    const port = draft.numbered(heater.id, 'steam')
    const line = new Line(draft, random, end)
    const fraction = rounded(1 - heater.p / end.p, 4)
    const held = !open && random.chance(0.4)
    // Behind an exhaust the pressure is known; a loss or the heater's own pressure fixes it here.
    if (open ? !this.more(0.5) : false) {
      const stream = line.finish(port)
      draft.give(random.chance(0.5) ? `${stream}.p` : `${heater.id}.pressure`, rounded(end.p))
      return
    }
    if (held) {
      line.throttle(heater.p)
      draft.give(`${heater.id}.pressure`, heater.p)
      line.finish(port)
      return
    }
    const pipe = random.chance(0.7)
      ? draft.add('pipe', 'pipe', {
          pressureLossFraction: fraction,
          heatLoss: random.chance(0.7) ? 0 : rounded(random.spread(1e3, 2e4)),
        })
      : draft.add('valve', 'valve', { pressureLossFraction: fraction })
    line.pass(pipe, 'inlet', 'outlet', heater.p)
    line.finish(port)
    if (!open) return
    if (random.chance(0.5)) draft.give(`${line.streams[0]!.id}.p`, rounded(end.p))
    else draft.give(`${heater.id}.pressure`, rounded(heater.p))
  }

  /** Steam that leaves the plant. */
  private process(end: End, givePressure: boolean): void {
    const { draft, random } = this
    const line = new Line(draft, random, end, givePressure ? { p: rounded(end.p) } : {})
    if (this.more(0.4)) line.lead(1)
    const offtake = draft.add('offtake', 'offtake', {})
    const stream = line.finish(`${offtake}.inlet`)
    draft.give(`${stream}.m`, rounded(this.flow * random.between(0.005, 0.06)))
    this.loses = true
  }

  /** A turbine that will drive the feed pump. */
  private addDrive(line: Line): void {
    const { draft, random } = this
    const { end } = line.split()
    const id = draft.add('turbine', 'drive', turbineGivens(random, 1))
    const steam = new Line(draft, random, end)
    if (this.more(0.4)) steam.lead(1)
    steam.finish(`${id}.inlet`)
    this.drive = id
    if (this.more(0.4)) {
      const own = draft.add('condenser', 'condenser', {
        pressure: rounded(this.condenserPressure * random.between(1.05, 1.6)),
        subcooling: 0,
        coolingHeatCapacity: 4180,
      })
      draft.join(`${id}.exhaust`, draft.numbered(own, 'steam'))
      draft.join(`${own}.condensate`, draft.numbered(this.condenser, 'drain'))
    } else draft.join(`${id}.exhaust`, draft.numbered(this.condenser, 'steam'))
  }

  private reheat(line: Line): void {
    const { draft, random } = this
    line.lead(this.target > 16 ? 0.5 : 0.2)
    const loss = rounded(random.between(0.03, 0.1))
    const id = draft.add('reheater', 'reheater', {
      pressureLossFraction: loss,
      efficiency: rounded(random.between(0.82, 0.95)),
    })
    this.reheaters.push({ id, p: line.end.p })
    const hot = rounded(random.between(760, 873), 4)
    line.pass(id, 'inlet', 'outlet', line.end.p * (1 - loss), { T: hot })
    line.lead(this.target > 16 ? 0.5 : 0.2)
  }

  /** A second low-pressure casing beside the first, without bleeds. */
  private secondLow(line: Line, p: number): void {
    const { draft, random } = this
    const { unit, end } = line.split()
    draft.give(`${unit}.share2`, rounded(random.between(0.2, 0.5)))
    const id = draft.add('turbine', 'turbine', turbineGivens(random, 1))
    this.turbines.push(id)
    draft.join(end.port, `${id}.inlet`)
    if (this.more(0.4, 2)) {
      const own = draft.add('condenser', 'condenser', {
        pressure: rounded(Math.min(p / 3, this.condenserPressure * random.between(1.05, 1.4))),
        subcooling: 0,
        coolingHeatCapacity: 4180,
      })
      draft.join(`${id}.exhaust`, draft.numbered(own, 'steam'))
      draft.join(`${own}.condensate`, draft.numbered(this.condenser, 'drain'))
    } else draft.join(`${id}.exhaust`, draft.numbered(this.condenser, 'steam'))
  }

  /** From the condenser through pumps and heaters to the boiler. */
  private feedLine(boiler: { readonly id: string; readonly feed: number }): void {
    const { draft, random } = this
    const line = new Line(draft, random, {
      port: `${this.condenser}.condensate`,
      p: this.condenserPressure,
    })
    for (const heater of this.heaters) {
      const unit = pump(draft, random, 'pump', true)
      if (this.more(0.2)) {
        const p = rounded(heater.p * random.between(1.2, 2.5))
        line.pass(unit, 'suction', 'discharge', p, { p })
        line.throttle(heater.p)
      } else line.pass(unit, 'suction', 'discharge', heater.p)
      const p = heater.p
      line.pass(heater.id, draft.numbered(heater.id, 'water').split('.')[1]!, 'outlet', p)
      this.ventOf(heater)
    }
    this.feedPumps(line, boiler.feed)
    const sprayed = [boiler.id, ...this.reheaters.map(({ id }) => id)]
    for (const id of sprayed) {
      if (!this.more(0.12)) continue
      const spray = line.split()
      const stream = draft.join(spray.end.port, `${id}.spray`)
      if (random.chance(0.7)) {
        draft.give(`${stream}.m`, rounded(this.flow * random.between(0.005, 0.03)))
      } else draft.give(`${spray.unit}.share2`, rounded(random.between(0.005, 0.03)))
    }
    line.finish(`${boiler.id}.feedwater`)
    this.endBlowdown()
    for (const end of this.toCondenser) {
      draft.join(end.port, draft.numbered(this.condenser, 'drain'))
    }
  }

  /** Vent of a heater, to a lower one or the condenser. */
  private ventOf(heater: { readonly id: string; readonly p: number }): void {
    const { draft, random } = this
    if (heater.p < 1e5 || !random.chance(0.2)) return
    draft.give(`${heater.id}.ventFraction`, rounded(random.between(0.0005, 0.003), 2))
    const lower = this.heaters.filter(({ p }) => p < 0.6 * heater.p)
    const to = lower.length > 0 && random.chance(0.5) ? random.choose(lower).id : this.condenser
    draft.join(`${heater.id}.vent`, draft.numbered(to, 'drain'))
  }

  /** One pump or two side by side, driven by a motor, by its own turbine or by the main shaft. */
  private feedPumps(line: Line, feed: number): void {
    const { draft, random } = this
    const held = this.more(0.25)
    const p = held ? rounded(feed * random.between(1.05, 1.25)) : feed
    if (this.drive === undefined && this.more(0.15, 4)) {
      const { unit, end } = line.split()
      draft.give(`${unit}.share2`, rounded(random.between(0.3, 0.5)))
      const both = [line.end, end]
      const junction = draft.add('junction', 'junction', {})
      for (const one of both) {
        const id = pump(draft, random, 'feedpump', true)
        draft.join(one.port, `${id}.suction`)
        draft.join(`${id}.discharge`, draft.numbered(junction, 'inlet'))
      }
      line.end = { port: `${junction}.outlet`, p }
    } else {
      const driven = this.drive !== undefined || random.chance(0.05)
      const id = pump(draft, random, 'feedpump', !driven)
      line.pass(id, 'suction', 'discharge', p)
      if (this.drive !== undefined) {
        draft.addShaft([this.drive], [id], false, shaftGivens(random, false))
      } else if (driven) this.onMainShaft = id
    }
    if (held) {
      line.pass(draft.add('valve', 'valve', {}), 'inlet', 'outlet', feed)
      draft.give(`${line.streams.at(-1)!.id}.p`, p)
    }
  }

  private onMainShaft: string | undefined

  private endBlowdown(): void {
    const { draft, random } = this
    const end = this.blowdown
    if (end === undefined) return
    const lower = this.heaters.filter(({ p }) => p < 0.5 * end.p)
    if (lower.length > 0 && random.chance(0.5)) {
      draft.join(end.port, draft.numbered(random.choose(lower).id, 'drain'))
      return
    }
    const line = new Line(draft, random, end)
    if (this.more(0.5)) {
      const p = rounded(random.spread(1.2e5, 5e5))
      line.throttle(p)
      const offtake = draft.add('offtake', 'offtake', {})
      draft.give(`${line.finish(`${offtake}.inlet`)}.p`, p)
    } else line.finish(`${draft.add('offtake', 'offtake', {})}.inlet`)
    this.loses = true
  }

  private gatherShafts(): void {
    const { draft, random, turbines } = this
    const pumps = this.onMainShaft === undefined ? [] : [this.onMainShaft]
    if (turbines.length > 1 && random.chance(0.3)) {
      const at = random.whole(1, turbines.length - 1)
      draft.addShaft(turbines.slice(0, at), pumps, true, shaftGivens(random))
      draft.addShaft(turbines.slice(at), [], true, shaftGivens(random))
    } else draft.addShaft(turbines, pumps, true, shaftGivens(random))
    if (random.chance(0.5)) {
      draft.give('plant.otherAuxiliary', rounded(this.flow * random.between(5e3, 5e4)))
    }
  }

  /** Water for what the plant loses, to the condenser or a heater. */
  private makeUp(): void {
    const { draft, random } = this
    const lower = this.heaters.filter(({ p }) => p < 3e5)
    const heater = lower.length > 0 && random.chance(0.4) ? random.choose(lower) : undefined
    const line = new Line(
      draft,
      random,
      { port: `${draft.add('supply', 'supply', {})}.outlet`, p: 5e5 },
      { p: rounded(random.between(4e5, 6e5)), T: rounded(random.between(283, 310), 4) },
    )
    if (this.more(0.4)) line.lead(1)
    line.finish(draft.numbered(heater?.id ?? this.condenser, 'drain'))
  }
}
