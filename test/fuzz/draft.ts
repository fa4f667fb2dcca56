import type {
  Given,
  Layout,
  Options,
  Plant,
  Shaft,
  Stream,
  Unit,
} from '../../src/plant/document.ts'

type Givens = Record<string, Given>

/** A plant in the making. */
export class Draft {
  readonly units: (Unit & { readonly given: Givens })[] = []
  readonly streams: (Stream & { readonly given: Givens })[] = []
  readonly shafts: (Shaft & { readonly given: Givens })[] = []
  readonly plantGiven: Givens = { otherAuxiliary: 0 }
  private readonly counts = new Map<string, number>()

  private count(key: string): number {
    const count = (this.counts.get(key) ?? 0) + 1
    this.counts.set(key, count)
    return count
  }

  add(kind: string, stem: string, given: Givens, options: Options = {}): string {
    const id = `${stem}${this.count(`unit ${stem}`)}`
    this.units.push({
      id,
      kind,
      label: id.toUpperCase(),
      at: [80 + 160 * (this.units.length % 12), 40 + 160 * Math.floor(this.units.length / 12)],
      ...(Object.keys(options).length > 0 && { options }),
      given,
    })
    return id
  }

  /** The next of a unit's numbered ports. */
  numbered(unit: string, port: string): string {
    return `${unit}.${port}${this.count(`port ${unit}.${port}`)}`
  }

  /** Joins two ports; returns the stream's id. */
  join(from: string, to: string, given: Givens = {}, stem = 's'): string {
    const id = `${stem}${this.count(`stream ${stem}`)}`
    this.streams.push({ id, from, to, given })
    return id
  }

  addShaft(
    turbines: readonly string[],
    pumps: readonly string[],
    generator: boolean,
    given: Givens,
  ): string {
    const id = `shaft${this.count('shaft')}`
    this.shafts.push({ id, turbines, pumps, ...(!generator && { generator }), given })
    return id
  }

  /** Gives a quantity of a unit, stream or shaft, or of the plant. */
  give(path: string, value: Given): void {
    const dot = path.indexOf('.')
    const id = path.slice(0, dot)
    const owner = [...this.units, ...this.streams, ...this.shafts].find((one) => one.id === id)
    ;(id === 'plant' ? this.plantGiven : owner!.given)[path.slice(dot + 1)] = value
  }

  layout(): Layout {
    return {
      id: 'base',
      name: 'As drawn',
      ambient: { T: 298.15, p: 101325 },
      units: this.units,
      streams: this.streams,
      shafts: this.shafts,
      plant: { given: this.plantGiven },
      cases: [{ id: 'design', name: 'Design' }],
      stated: [],
    }
  }
}

export function plantOf(layout: Layout, title: string): Plant {
  return { format: 'bledsteam/plant', version: 1, title, layouts: [layout] }
}

/** The layout with quantities freed and others given. */
export function withGivens(
  layout: Layout,
  free: readonly string[],
  give: ReadonlyMap<string, Given>,
): Layout {
  const change = (id: string, given: Readonly<Record<string, Given>>): Givens => {
    const changed: Givens = { ...given }
    for (const path of free)
      if (path.startsWith(`${id}.`)) delete changed[path.slice(id.length + 1)]
    for (const [path, value] of give) {
      if (path.startsWith(`${id}.`)) changed[path.slice(id.length + 1)] = value
    }
    return changed
  }
  return {
    ...layout,
    units: layout.units.map((unit) => ({ ...unit, given: change(unit.id, unit.given) })),
    streams: layout.streams.map((stream) => ({
      ...stream,
      given: change(stream.id, stream.given),
    })),
    shafts: layout.shafts.map((shaft) => ({ ...shaft, given: change(shaft.id, shaft.given) })),
    plant: { given: change('plant', layout.plant.given) },
  }
}
