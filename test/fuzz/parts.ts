import type { Given } from '../../src/plant/document.ts'
import { SATURATION_SIZE, Saturation, saturationAtPressure } from '../../src/steam/index.ts'
import type { Draft } from './draft.ts'
import { type Random, rounded } from './random.ts'

/** An outlet that waits for a stream, and the pressure there by design, Pa. */
export interface End {
  readonly port: string
  readonly p: number
}

/** Where a plant is drawn: what it stands on, how large it may become. */
export class Site {
  readonly draft: Draft
  readonly random: Random
  readonly target: number
  /** Flow of the boiler, kg/s. */
  readonly flow: number
  private readonly limit: number
  /** The plant loses water. */
  loses = false
  /** What will go to the condenser. */
  readonly toCondenser: End[] = []
  /** Inlets that wait for feedwater: of units that a branch of the feed line serves. */
  readonly sprays: { readonly port: string; readonly flowIsOpen: boolean }[] = []

  constructor(draft: Draft, random: Random, target: number) {
    this.draft = draft
    this.random = random
    this.target = target
    this.limit = draft.units.length + target
    this.flow = rounded(random.spread(20, 600))
  }

  /** A detail that the plant has with this chance, as long as it does not grow too large. */
  more(share: number, units = 1): boolean {
    const wish = share + (1 - share) * Math.max(0, Math.min(0.6, (this.target - 25) / 50))
    return this.random.chance(wish) && this.draft.units.length + units + 2 <= this.limit
  }
}

const saturation = new Float64Array(SATURATION_SIZE)

/** Saturation temperature, K, at a pressure below critical, Pa. */
export function saturationTemperature(p: number): number {
  if (saturationAtPressure(saturation, 0, p) !== 0) throw new Error(`no saturation at ${p} Pa`)
  return saturation[Saturation.T]!
}

export function turbineGivens(random: Random, groups: number): Record<string, number> {
  const given: Record<string, number> = {
    wetnessFactor: random.choose([0, 1, 0.8, rounded(random.between(0.4, 1.2), 2)]),
    exhaustLoss: random.chance(0.6) ? 0 : rounded(random.between(5e3, 25e3)),
  }
  for (let k = 1; k <= groups; k++) {
    given[`groupEfficiency${k}`] = rounded(random.between(0.8, 0.92))
  }
  return given
}

export function shaftGivens(random: Random, generator = true): Record<string, number> {
  return {
    mechanicalEfficiency: rounded(random.between(0.985, 0.998), 4),
    mechanicalLoss: random.chance(0.7) ? 0 : rounded(random.between(1e3, 5e4)),
    ...(generator && {
      generatorEfficiency: rounded(random.between(0.965, 0.99), 4),
      generatorLoss: random.chance(0.7) ? 0 : rounded(random.between(1e3, 5e4)),
    }),
  }
}

export function addPump(draft: Draft, random: Random, stem: string, motor: boolean): string {
  return draft.add('pump', stem, {
    efficiency: rounded(random.between(0.65, 0.88)),
    ...(motor && { driveEfficiency: rounded(random.between(0.92, 0.975)) }),
    ...(random.chance(0.1) && { suctionHeight: rounded(random.between(2, 30), 2) }),
  })
}

export function addCondenser(draft: Draft, random: Random, pressure: number): string {
  return draft.add('condenser', 'condenser', {
    pressure: rounded(pressure),
    subcooling: random.chance(0.6) ? 0 : rounded(random.between(0.5, 3), 2),
    coolingHeatCapacity: 4180,
    ...(random.chance(0.4) &&
      (random.chance(0.7)
        ? { coolingInletT: rounded(random.between(278, 284), 4), coolingRise: 6 }
        : { coolingRise: rounded(random.between(5, 9), 2) })),
  })
}

/** A line that grows unit by unit from an outlet. */
export class Line {
  end: End
  readonly streams: { readonly id: string; readonly p: number }[] = []
  private readonly draft: Draft
  private readonly random: Random
  /** What to give on the next stream. */
  private given: Record<string, Given>

  constructor({ draft, random }: Pick<Site, 'draft' | 'random'>, end: End, given = {}) {
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
    const loss: Record<string, Given> = random.chance(0.7)
      ? { pressureLossFraction: fraction }
      : { pressureDrop: fraction * this.end.p }
    const unit = random.chance(0.6)
      ? draft.add('pipe', 'pipe', {
          ...loss,
          heatLoss: random.chance(0.6) ? 0 : rounded(random.spread(1e3, 3e4)),
        })
      : draft.add('valve', 'valve', loss)
    this.pass(unit, 'inlet', 'outlet', p)
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
