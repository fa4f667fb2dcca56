import type { Draft } from './draft.ts'
import { FeedTrain, type Heater } from './feed-train.ts'
import {
  addCondenser,
  addPump,
  type End,
  Line,
  Site,
  saturationTemperature,
  shaftGivens,
  turbineGivens,
} from './parts.ts'
import { type Random, rounded } from './random.ts'

export interface Traits {
  readonly reheats: number
  readonly heaters: number
}

/** How the water is heated: by mixing, in shells, or in shells with a mixing heater as deaerator. */
export type Arrangement = 'mixing' | 'surface' | 'deaerated'

/** A stretch of the expansion in one casing. */
interface Section {
  readonly from: number
  readonly to: number
  /** Pressures of its bleeds, falling; without a heater they serve process. */
  readonly bleeds: { readonly p: number; readonly heater?: number }[]
  /** A heater is fed from its exhaust. */
  feedsHeater: number | undefined
}

/** A closed cycle with what hangs on it. */
export class Cycle {
  private readonly draft: Draft
  private readonly random: Random
  private readonly site: Site
  private readonly arrangement: Arrangement
  private readonly turbines: string[] = []
  private readonly condenserPressure: number
  private readonly condenser: string
  /** Waits for its feed pump. */
  private drive: string | undefined
  private blowdown: End | undefined
  private readonly reheaters: string[] = []
  /** In the water's order, rising pressure. */
  private heaters: Heater[] = []
  /** Live steam to heat the steam between casings with. */
  private liveSteam: End | undefined

  constructor(draft: Draft, random: Random, target: number, arrangement: Arrangement) {
    this.draft = draft
    this.random = random
    this.site = new Site(draft, random, target)
    this.arrangement = arrangement
    this.condenserPressure = rounded(random.spread(2500, 20e3))
    this.condenser = addCondenser(draft, random, this.condenserPressure)
  }

  build(leastReheats: number, leastHeaters: number): Traits {
    const { random, site } = this
    const { target } = site
    const saturated = leastReheats === 0 && target > 9 && random.chance(0.12)
    const reheats = saturated
      ? 0
      : Math.max(
          leastReheats,
          target < 9 || random.chance(0.35) ? 0 : target > 30 && random.chance(0.2) ? 2 : 1,
        )
    const room = Math.floor((target - 5 - 2 * reheats) / (this.arrangement === 'mixing' ? 2.6 : 2))
    const most = Math.min(10, Math.max(leastHeaters, room))
    const heaters = random.whole(Math.min(leastHeaters, most), most)
    const p = rounded(
      saturated
        ? random.spread(4e6, 7.5e6)
        : reheats > 0
          ? random.spread(7e6, 27e6)
          : random.spread(2e6, 12e6),
    )
    const { sections, heaterPressures } = this.plan(p, reheats, heaters, saturated)
    const boiler = this.addBoiler(p)
    let line = new Line(site, boiler.steam)
    line.lead(target > 12 ? 0.5 : 0.2)
    if (site.more(0.08)) this.steamDrain(line)
    if (site.more(0.3)) line.lead(1)
    if (saturated && site.more(0.6, 2)) this.liveSteam = line.split().end
    const main = line
    this.addHeaters(heaterPressures, sections, reheats)
    sections.forEach((section, k) => {
      line = this.expand(line, section, k, k === sections.length - 1, reheats, saturated)
      if (k === 0) this.giveMain(main, p, saturated)
    })
    const train = new FeedTrain(site, this.condenser, this.heaters, this.drive)
    train.build(this.condenserPressure, `${boiler.id}.feedwater`, boiler.feed, [
      boiler.id,
      ...this.reheaters,
    ])
    this.endBlowdown()
    for (const end of site.toCondenser) {
      this.draft.join(end.port, this.draft.numbered(this.condenser, 'drain'))
    }
    this.gatherShafts(train.onMainShaft)
    if (site.loses) this.makeUp()
    return { reheats, heaters: heaterPressures.length }
  }

  /** Where the casings begin and end, and what is bled from each. */
  private plan(p: number, reheats: number, heaters: number, saturated: boolean) {
    const { random } = this
    const pc = this.condenserPressure
    const borders: number[] = []
    let at = p
    for (let k = 0; k < reheats; k++) {
      at = rounded(at * random.between(0.2, 0.32))
      borders.push(at)
    }
    const crossover = saturated || (this.site.target > 16 && random.chance(0.6))
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
      if (section.to > 1e5 && this.site.target > 14 && random.chance(0.15)) {
        const free = Math.sqrt(section.from * section.to) * random.between(0.9, 1.1)
        if (section.bleeds.every((bleed) => Math.abs(Math.log(bleed.p / free)) > 0.1)) {
          section.bleeds.push({ p: rounded(free) })
        }
      }
      section.bleeds.sort((a, b) => b.p - a.p)
    }
    return { sections, heaterPressures }
  }

  private addHeaters(
    pressures: readonly number[],
    sections: readonly Section[],
    reheats: number,
  ): void {
    const { draft, random } = this
    const deaerator = pressures.findIndex((p) => p > 1.2e5)
    this.heaters = pressures.map((p, i) => {
      const isMixing =
        this.arrangement === 'mixing' || (this.arrangement === 'deaerated' && i === deaerator)
      if (isMixing) {
        const subcooling = random.chance(0.7) ? 0 : rounded(random.between(0.2, 3), 2)
        const id = draft.add('mixingHeater', 'heater', { subcooling })
        return { p, isMixing, drainCooler: false, id }
      }
      // Superheat enough for a zone of its own there is just behind a reheat.
      const hot = sections.findIndex(({ bleeds }) => bleeds[0]?.heater === i)
      const desuperheater = hot > 0 && hot <= reheats && random.chance(0.6)
      const drainCooler = random.chance(0.6)
      const id = draft.add(
        'surfaceHeater',
        'heater',
        {
          terminalDifference: rounded(random.between(desuperheater ? -1 : 1.5, 4), 2),
          ...(drainCooler && { drainApproach: rounded(random.between(4, 9), 2) }),
          ...(desuperheater && { residualSuperheat: rounded(random.between(15, 30), 2) }),
        },
        {
          ...(drainCooler && { drainCooler }),
          ...(desuperheater && { desuperheater }),
        },
      )
      return { p, isMixing, drainCooler, id }
    })
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
    if (p < 17e6 && this.site.more(0.35)) {
      const drum = rounded(pBoiler * random.between(1.02, 1.06))
      draft.give(`${id}.blowdownFraction`, rounded(random.between(0.003, 0.02), 2))
      draft.give(`${id}.drumPressure`, drum)
      this.blowdown = { port: `${id}.blowdown`, p: drum }
    }
    return { id, loss, steam: { port: `${id}.steam`, p: pBoiler }, feed: pBoiler / (1 - loss) }
  }

  /** Pressure, temperature and flow of the live steam, each somewhere on the line. */
  private giveMain(line: Line, p: number, saturated: boolean): void {
    const { draft, random } = this
    const { streams } = line
    const pressureAt = random.choose(streams)
    draft.give(`${pressureAt.id}.p`, rounded(pressureAt.p, 4))
    if (saturated) draft.give(`${streams[0]!.id}.x`, rounded(random.between(0.993, 0.9985), 4))
    else {
      const hot = rounded(p > 6e6 ? random.between(770, 873) : random.between(690, 790), 4)
      draft.give(`${random.choose(streams).id}.T`, hot)
    }
    draft.give(`${random.choose(streams).id}.m`, this.site.flow)
  }

  /** A little steam from the line to the condenser, through a drain or a gland. */
  private steamDrain(line: Line): void {
    const { draft, random, site } = this
    const { unit, end } = line.split()
    if (random.chance(0.5)) {
      draft.give(`${unit}.share2`, rounded(random.between(0.001, 0.01), 2))
      site.toCondenser.push(end)
      return
    }
    const leak = draft.add('leak', 'leak', {})
    const stream = draft.join(end.port, `${leak}.inlet`)
    draft.give(`${stream}.m`, rounded(site.flow * random.between(0.001, 0.005), 2))
    const condenser = draft.numbered(this.condenser, 'drain')
    draft.join(`${leak}.outlet`, condenser, { p: rounded(random.between(1, 2) * 1e5) })
  }

  /** One casing with its bleeds, and the way from its exhaust to the next. */
  private expand(
    line: Line,
    section: Section,
    k: number,
    last: boolean,
    reheats: number,
    saturated: boolean,
  ): Line {
    const { draft, random, site } = this
    const admission = k === 0 && random.chance(0.12)
    const removal = last && section.bleeds.length > 0 && random.chance(0.12)
    const given = turbineGivens(random, section.bleeds.length + 1)
    if (admission) {
      given.admissionLossFraction = rounded(random.between(0.02, 0.08))
      given.admissionEfficiency = random.chance(0.5) ? 0 : rounded(random.between(0.4, 0.7))
    }
    if (removal) {
      section.bleeds.forEach((_, i) => {
        given[`moistureRemoval${i + 1}`] = rounded(random.between(0.05, 0.25), 2)
      })
    }
    const id = draft.add('turbine', 'turbine', given, {
      ...(admission && { admission }),
      ...(removal && { moistureRemoval: removal }),
    })
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
    const next = new Line(site, exhaust, { p: section.to })
    if (section.feedsHeater !== undefined) {
      this.feedHeater(next.split().end, this.heaters[section.feedsHeater]!, false)
    }
    if (site.more(0.06)) this.process(next.split().end, false)
    if (section.to < 3e6 && this.drive === undefined && !saturated && site.more(0.4, 3)) {
      this.addDrive(next)
    }
    if (k < reheats) this.reheat(next)
    else {
      if (saturated) this.dry(next)
      next.lead(site.target > 20 ? 0.4 : 0.1)
      if (site.more(0.12, 3)) this.secondLow(next, section.to)
    }
    return next
  }

  /** Steam to a heater; its pressure is given at one of the ends. */
  private feedHeater(end: End, heater: Heater, open = true): void {
    const { draft, random } = this
    const port = draft.numbered(heater.id, 'steam')
    const line = new Line(this.site, end)
    const fraction = rounded(1 - heater.p / end.p, 4)
    if (open && !this.site.more(0.5)) {
      const stream = line.finish(port)
      draft.give(random.chance(0.5) ? `${stream}.p` : `${heater.id}.pressure`, rounded(end.p))
      return
    }
    // Behind an exhaust the pressure is known; a loss or the heater's own pressure fixes it here.
    if (!open && random.chance(0.4)) {
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

  /** Steam that leaves the plant, or a user who sends part of the condensate back. */
  private process(end: End, givePressure: boolean): void {
    const { draft, random, site } = this
    const line = new Line(site, end, givePressure ? { p: rounded(end.p) } : {})
    if (site.more(0.4)) line.lead(1)
    const m = rounded(site.flow * random.between(0.005, 0.06))
    if (end.p < 21e6 && site.more(0.15, 3)) {
      const unit = draft.add('desuperheater', 'desuper', {})
      const T = rounded(saturationTemperature(line.end.p) + random.between(5, 20), 5)
      line.pass(unit, 'steam', 'outlet', line.end.p, { T })
      site.sprays.push({ port: `${unit}.spray`, flowIsOpen: true })
    }
    site.loses = true
    if (random.chance(0.7)) {
      const offtake = draft.add('offtake', 'offtake', {})
      draft.give(`${line.finish(`${offtake}.inlet`)}.m`, m)
      return
    }
    const user = draft.add('heatUser', 'user', {
      returnFraction: rounded(random.between(0.4, 0.95)),
    })
    draft.give(`${line.finish(`${user}.steam`)}.m`, m)
    const p = rounded(Math.max(2 * this.condenserPressure, line.end.p * random.between(0.4, 0.9)))
    const T = rounded(saturationTemperature(Math.min(p, 5e5)) - random.between(5, 30), 4)
    draft.join(`${user}.condensate`, draft.numbered(this.condenser, 'drain'), { p, T })
  }

  /** A turbine that will drive the feed pump. */
  private addDrive(line: Line): void {
    const { draft, random, site } = this
    const { end } = line.split()
    const id = draft.add('turbine', 'drive', turbineGivens(random, 1))
    const steam = new Line(site, end)
    if (site.more(0.4)) steam.lead(1)
    steam.finish(`${id}.inlet`)
    this.drive = id
    if (site.more(0.4)) this.ownCondenser(id, 1.6)
    else draft.join(`${id}.exhaust`, draft.numbered(this.condenser, 'steam'))
  }

  /** A condenser of its own, at a little more pressure, that drains into the main one. */
  private ownCondenser(turbine: string, most: number): void {
    const { draft, random } = this
    const own = addCondenser(draft, random, this.condenserPressure * random.between(1.05, most))
    draft.join(`${turbine}.exhaust`, draft.numbered(own, 'steam'))
    draft.join(`${own}.condensate`, draft.numbered(this.condenser, 'drain'))
  }

  private reheat(line: Line): void {
    const { draft, random, site } = this
    line.lead(site.target > 16 ? 0.5 : 0.2)
    const loss = rounded(random.between(0.03, 0.1))
    const id = draft.add('reheater', 'reheater', {
      pressureLossFraction: loss,
      efficiency: rounded(random.between(0.82, 0.95)),
    })
    this.reheaters.push(id)
    const hot = rounded(random.between(760, 873), 4)
    line.pass(id, 'inlet', 'outlet', line.end.p * (1 - loss), { T: hot })
    line.lead(site.target > 16 ? 0.5 : 0.2)
  }

  /** Takes the water out of wet steam, and heats it with live steam where there is any. */
  private dry(line: Line): void {
    const { draft, random } = this
    const loss = rounded(random.between(0.01, 0.04))
    const id = draft.add('separator', 'separator', {
      effectiveness: rounded(random.between(0.9, 0.99)),
      pressureLossFraction: loss,
    })
    line.pass(id, 'inlet', 'steam', line.end.p * (1 - loss))
    this.toLower({ port: `${id}.drain`, p: line.end.p })
    if (this.liveSteam === undefined) return
    const tubeLoss = rounded(random.between(0.01, 0.04))
    const unit = draft.add('surfaceHeater', 'steamheater', {
      pressureLossFraction: tubeLoss,
      terminalDifference: rounded(random.between(8, 20), 2),
    })
    draft.join(this.liveSteam.port, draft.numbered(unit, 'steam'))
    line.pass(unit, 'water', 'outlet', line.end.p * (1 - tubeLoss))
    this.toLower({ port: `${unit}.drain`, p: this.liveSteam.p })
  }

  /** A drain to a heater of lower pressure, or to the condenser. */
  private toLower(end: End): void {
    const lower = this.heaters.filter(({ p }) => p < 0.8 * end.p)
    if (lower.length > 0 && this.random.chance(0.7)) {
      this.draft.join(end.port, this.draft.numbered(this.random.choose(lower).id, 'drain'))
    } else this.site.toCondenser.push(end)
  }

  /** A second low-pressure casing beside the first, without bleeds. */
  private secondLow(line: Line, p: number): void {
    const { draft, random, site } = this
    const { unit, end } = line.split()
    draft.give(`${unit}.share2`, rounded(random.between(0.2, 0.5)))
    const id = draft.add('turbine', 'turbine', turbineGivens(random, 1))
    this.turbines.push(id)
    draft.join(end.port, `${id}.inlet`)
    if (p > 5 * this.condenserPressure && site.more(0.4, 2)) this.ownCondenser(id, 1.4)
    else draft.join(`${id}.exhaust`, draft.numbered(this.condenser, 'steam'))
  }

  private endBlowdown(): void {
    const { draft, random, site } = this
    const end = this.blowdown
    if (end === undefined) return
    const lower = this.heaters.filter(({ p }) => p < 0.5 * end.p)
    if (lower.length > 0 && random.chance(0.4)) {
      draft.join(end.port, draft.numbered(random.choose(lower).id, 'drain'))
      return
    }
    const line = new Line(site, end)
    if (lower.length > 0 && site.more(0.25, 2)) {
      // Flashed at a heater's pressure: the steam is used there.
      const heater = random.choose(lower)
      const flash = draft.add('flashVessel', 'flash', {})
      line.finish(draft.numbered(flash, 'inlet'))
      draft.join(`${flash}.steam`, draft.numbered(heater.id, 'steam'))
      draft.join(`${flash}.water`, `${draft.add('offtake', 'offtake', {})}.inlet`)
    } else if (site.more(0.5)) {
      const p = rounded(random.spread(1.2e5, 5e5))
      line.throttle(p)
      const offtake = draft.add('offtake', 'offtake', {})
      draft.give(`${line.finish(`${offtake}.inlet`)}.p`, p)
    } else line.finish(`${draft.add('offtake', 'offtake', {})}.inlet`)
    site.loses = true
  }

  private gatherShafts(pumpOnShaft: string | undefined): void {
    const { draft, random, turbines } = this
    const pumps = pumpOnShaft === undefined ? [] : [pumpOnShaft]
    if (turbines.length > 1 && random.chance(0.3)) {
      const at = random.whole(1, turbines.length - 1)
      draft.addShaft(turbines.slice(0, at), pumps, true, shaftGivens(random))
      draft.addShaft(turbines.slice(at), [], true, shaftGivens(random))
    } else draft.addShaft(turbines, pumps, true, shaftGivens(random))
    if (random.chance(0.5)) {
      draft.give('plant.otherAuxiliary', rounded(this.site.flow * random.between(5e3, 5e4)))
    }
  }

  /** Water for what the plant loses, to the condenser or a heater. */
  private makeUp(): void {
    const { draft, random, site } = this
    const lower = this.heaters.filter(({ p, isMixing }) => isMixing && p < 3e5)
    const heater = lower.length > 0 && random.chance(0.4) ? random.choose(lower) : undefined
    const line = new Line(
      site,
      { port: `${draft.add('supply', 'supply', {})}.outlet`, p: 5e5 },
      { p: rounded(random.between(4e5, 6e5)), T: rounded(random.between(283, 310), 4) },
    )
    if (site.more(0.2)) {
      const p = rounded(random.between(7e5, 12e5))
      line.pass(addPump(draft, random, 'pump', true), 'suction', 'discharge', p, { p })
    } else if (site.more(0.4)) line.lead(1)
    line.finish(draft.numbered(heater?.id ?? this.condenser, 'drain'))
  }
}
