import { addPump, type End, Line, type Site, shaftGivens } from './parts.ts'
import { rounded } from './random.ts'

/** A feedwater heater, in the order in which the water passes them. */
export interface Heater {
  readonly id: string
  readonly p: number
  readonly isMixing: boolean
  readonly drainCooler: boolean
}

/** The water side: from the condenser through pumps and heaters to the boiler. */
export class FeedTrain {
  private readonly site: Site
  private readonly condenser: string
  private readonly heaters: readonly Heater[]
  /** A turbine that waits for the feed pump to drive. */
  private readonly drive: string | undefined
  /** A pump for the main shaft to drive. */
  onMainShaft: string | undefined

  constructor(
    site: Site,
    condenser: string,
    heaters: readonly Heater[],
    drive: string | undefined,
  ) {
    this.site = site
    this.condenser = condenser
    this.heaters = heaters
    this.drive = drive
  }

  build(condenserPressure: number, boilerPort: string, feed: number, sprayed: string[]): void {
    const { site, heaters } = this
    const { random } = site
    const line = new Line(site, { port: `${this.condenser}.condensate`, p: condenserPressure })
    const losses = heaters.map(({ isMixing }) =>
      isMixing ? 0 : rounded(random.between(0.005, 0.03)),
    )
    const lastMixing = heaters.findLastIndex(({ isMixing }) => isMixing)
    // Without a mixing heater the feed pump stands somewhere between the heaters.
    const hasMixing = lastMixing >= 0
    const feedPumpAt = hasMixing ? lastMixing + 1 : random.whole(0, heaters.length)
    // High enough for the water not to boil in the heaters before the feed pump.
    const hottest = heaters[feedPumpAt - 1]?.p ?? 0
    const between = rounded(Math.max(random.between(1e6, 2.5e6), 1.8 * hottest))
    for (let k = 0; k <= heaters.length; k++) {
      const begins = k === 0 || heaters[k - 1]!.isMixing || k === feedPumpAt
      if (k === feedPumpAt && (hasMixing || k > 0))
        this.feedPumps(line, this.before(losses, k, heaters.length, feed))
      else if (begins) {
        if (k === 0 && feedPumpAt === 0)
          this.feedPumps(line, this.before(losses, 0, heaters.length, feed))
        else this.condensatePump(line, losses, k, hasMixing ? undefined : between)
      }
      const heater = heaters[k]
      if (heater === undefined) break
      if (heater.isMixing) {
        const port = site.draft.numbered(heater.id, 'water').split('.')[1]!
        line.pass(heater.id, port, 'outlet', heater.p)
        this.ventOf(heater)
      } else this.surfaceHeater(line, heater, k, losses[k]!)
    }
    this.serveSprays(line, sprayed)
    line.finish(boilerPort)
  }

  /** Pressure before heaters k .. end - 1 that leaves `after` behind them. */
  private before(losses: readonly number[], k: number, end: number, after: number): number {
    let p = after
    for (let i = k; i < end; i++) p /= 1 - losses[i]!
    return p
  }

  /** A pump up to the next mixing heater, or to a pressure of its own. */
  private condensatePump(
    line: Line,
    losses: readonly number[],
    k: number,
    own: number | undefined,
  ): void {
    const { site } = this
    const { draft, random } = site
    const unit = addPump(draft, random, 'pump', true)
    if (own !== undefined) {
      line.pass(unit, 'suction', 'discharge', own, { p: own })
      if (site.more(0.15)) this.heatSource(line)
      return
    }
    const next = this.heaters.findIndex(({ isMixing }, i) => i >= k && isMixing)
    const target = this.before(losses, k, next, this.heaters[next]!.p)
    if (next === k && site.more(0.2)) {
      const p = rounded(target * random.between(1.2, 2.5))
      line.pass(unit, 'suction', 'discharge', p, { p })
      line.throttle(target)
    } else line.pass(unit, 'suction', 'discharge', target)
  }

  /** A little heat from outside the cycle. */
  private heatSource(line: Line): void {
    const { draft, random, flow } = this.site
    const loss = rounded(random.between(0.005, 0.03))
    const unit = draft.add('heatSource', 'source', {
      pressureLossFraction: loss,
      heat: rounded(flow * random.between(2e3, 2e4)),
    })
    line.pass(unit, 'inlet', 'outlet', line.end.p * (1 - loss))
  }

  private surfaceHeater(line: Line, heater: Heater, k: number, loss: number): void {
    const { site } = this
    const { draft, random } = site
    draft.give(`${heater.id}.pressureLossFraction`, loss)
    const drain: End = { port: `${heater.id}.drain`, p: heater.p }
    const lower = this.heaters.slice(0, k).findLast(({ p }) => p < 0.9 * heater.p)
    // The condensate takes what heat is left in the last drain, now and then.
    const coolsDrain = lower === undefined && !heater.drainCooler && site.more(0.15)
    if (coolsDrain) {
      const coldLoss = rounded(random.between(0.002, 0.01))
      const unit = draft.add('heatExchanger', 'exchanger', {
        hotLossFraction: rounded(random.between(0.01, 0.05)),
        coldLossFraction: coldLoss,
        coldEndDifference: rounded(random.between(5, 12), 2),
      })
      line.pass(unit, 'cold', 'coldOutlet', line.end.p)
      draft.join(drain.port, `${unit}.hot`)
      site.toCondenser.push({ port: `${unit}.hotOutlet`, p: heater.p })
    }
    line.pass(heater.id, 'water', 'outlet', line.end.p * (1 - loss))
    if (coolsDrain) return
    if (site.more(0.12, 2)) {
      // Pumped forward into the line behind the heater.
      const unit = addPump(draft, random, 'pump', true)
      const junction = draft.add('junction', 'junction', {})
      draft.join(drain.port, `${unit}.suction`)
      const port = draft.numbered(junction, 'inlet').split('.')[1]!
      line.pass(junction, port, 'outlet', line.end.p)
      draft.join(`${unit}.discharge`, draft.numbered(junction, 'inlet'))
      return
    }
    if (lower === undefined) site.toCondenser.push(drain)
    else draft.join(drain.port, draft.numbered(lower.id, 'drain'))
  }

  /** Vent of a mixing heater, to a lower one or the condenser. */
  private ventOf(heater: Heater): void {
    const { draft, random, toCondenser } = this.site
    if (heater.p < 1e5 || !random.chance(0.2)) return
    draft.give(`${heater.id}.ventFraction`, rounded(random.between(0.0005, 0.003), 2))
    const lower = this.heaters.filter(({ p }) => p < 0.6 * heater.p)
    const vent = `${heater.id}.vent`
    if (lower.length > 0 && random.chance(0.5)) {
      draft.join(vent, draft.numbered(random.choose(lower).id, 'drain'))
    } else toCondenser.push({ port: vent, p: heater.p })
  }

  /** One pump or two side by side, driven by a motor, by its own turbine or by the main shaft. */
  private feedPumps(line: Line, feed: number): void {
    const { site } = this
    const { draft, random } = site
    const held = site.more(0.25)
    const p = held ? rounded(feed * random.between(1.05, 1.25)) : feed
    if (this.drive === undefined && site.more(0.15, 4)) {
      const { unit, end } = line.split()
      draft.give(`${unit}.share2`, rounded(random.between(0.3, 0.5)))
      const both = [line.end, end]
      const junction = draft.add('junction', 'junction', {})
      for (const one of both) {
        const id = addPump(draft, random, 'feedpump', true)
        draft.join(one.port, `${id}.suction`)
        draft.join(`${id}.discharge`, draft.numbered(junction, 'inlet'))
      }
      line.end = { port: `${junction}.outlet`, p }
    } else {
      const driven = this.drive !== undefined || random.chance(0.05)
      const id = addPump(draft, random, 'feedpump', !driven)
      line.pass(id, 'suction', 'discharge', p)
      if (this.drive !== undefined) {
        draft.addShaft([this.drive], [id], false, shaftGivens(random, false))
      } else if (driven) this.onMainShaft = id
    }
    if (held) {
      line.throttle(feed)
      draft.give(`${line.streams.at(-1)!.id}.p`, p)
    }
  }

  /** Branches of the feed line: what waits for water, and a little into boiler and reheaters. */
  private serveSprays(line: Line, sprayed: readonly string[]): void {
    const { site } = this
    const { draft, random, flow } = site
    for (const { port, flowIsOpen } of site.sprays) {
      const spray = line.split()
      const stream = draft.join(spray.end.port, port)
      if (!flowIsOpen) draft.give(`${stream}.m`, rounded(flow * random.between(0.005, 0.03)))
    }
    for (const id of sprayed) {
      if (!site.more(0.12)) continue
      const spray = line.split()
      const stream = draft.join(spray.end.port, `${id}.spray`)
      if (random.chance(0.7)) {
        draft.give(`${stream}.m`, rounded(flow * random.between(0.005, 0.03)))
      } else draft.give(`${spray.unit}.share2`, rounded(random.between(0.005, 0.03)))
    }
  }
}
