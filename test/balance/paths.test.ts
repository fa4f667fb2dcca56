import { describe, expect, it } from 'vitest'
import {
  type Course,
  domePoints,
  isobarPoints,
  isobarPressures,
  PointList,
  processPoints,
} from '../../src/balance/paths.ts'
import {
  enthalpyAtPressureEntropy,
  enthalpyAtPressureTemperature,
  Outcome,
  SATURATION_SIZE,
  Saturation,
  STATE_SIZE,
  State,
  saturationAtPressure,
  saturationAtTemperature,
  stateAtPressureEnthalpy,
} from '../../src/steam/index.ts'

interface Point {
  readonly s: number
  readonly T: number
  readonly h: number
}

function pointsOf(values: Float64Array): Point[] {
  return Array.from({ length: values.length / 3 }, (_, i) => ({
    s: values[3 * i] as number,
    T: values[3 * i + 1] as number,
    h: values[3 * i + 2] as number,
  }))
}

function process(course: Course, p1: number, h1: number, p2: number, h2: number): Point[] {
  const out = new PointList()
  const written = processPoints(course, p1, h1, p2, h2, out)
  expect(written).toBe(out.count)
  return pointsOf(out.copy())
}

function stateAt(p: number, h: number): Point {
  const record = new Float64Array(STATE_SIZE)
  expect(stateAtPressureEnthalpy(record, 0, p, h)).toBe(Outcome.fine)
  return {
    s: record[State.s] as number,
    T: record[State.T] as number,
    h: record[State.h] as number,
  }
}

function saturatedAt(p: number) {
  const record = new Float64Array(SATURATION_SIZE)
  expect(saturationAtPressure(record, 0, p)).toBe(Outcome.fine)
  const value = (slot: number) => record[slot] as number
  return {
    T: value(Saturation.T),
    liquid: { s: value(Saturation.sL), T: value(Saturation.T), h: value(Saturation.hL) },
    steam: { s: value(Saturation.sV), T: value(Saturation.T), h: value(Saturation.hV) },
  }
}

function enthalpyAt(p: number, T: number): number {
  const out = new Float64Array(4)
  expect(enthalpyAtPressureTemperature(out, 0, p, T)).toBe(Outcome.fine)
  return out[0] as number
}

function enthalpyAtEntropy(p: number, s: number): number {
  const out = new Float64Array(4)
  expect(enthalpyAtPressureEntropy(out, 0, p, s)).toBe(Outcome.fine)
  return out[0] as number
}

function expectPoint(found: Point | undefined, wanted: Point): void {
  expect(found?.s).toBeCloseTo(wanted.s, 6)
  expect(found?.T).toBeCloseTo(wanted.T, 8)
  expect(found?.h).toBeCloseTo(wanted.h, 4)
}

/** True when every value is at least the one before it, a round-off apart. */
function rising(values: readonly number[]): boolean {
  return values.every((value, i) => i === 0 || value >= (values[i - 1] as number) * (1 - 1e-12))
}

/**
 * Greatest distance of true states between neighbours (in h) from their chord, as a share of a chart that
 * spans 10 kJ/(kg K) and 600 K.
 */
function worstChord(points: readonly Point[], p: number): number {
  let worst = 0
  for (let i = 0; i + 1 < points.length; i += 1) {
    const [a, b] = [points[i] as Point, points[i + 1] as Point]
    const [dx, dy] = [(b.s - a.s) / 10_000, (b.T - a.T) / 600]
    for (const t of [0.25, 0.5, 0.75]) {
      const { s, T } = stateAt(p, a.h + t * (b.h - a.h))
      const [x, y] = [(s - a.s) / 10_000, (T - a.T) / 600]
      worst = Math.max(worst, Math.abs(x * dy - y * dx) / Math.hypot(dx, dy))
    }
  }
  return worst
}

const boiler = { p: 130e5, cold: 1075e3, hot: 3445e3 }

describe('a process at constant pressure', () => {
  const points = process('line', boiler.p, boiler.cold, boiler.p, boiler.hot)

  it('begins and ends at the states given', () => {
    expectPoint(points[0], stateAt(boiler.p, boiler.cold))
    expectPoint(points.at(-1), stateAt(boiler.p, boiler.hot))
  })

  it('consists of states of that pressure', () => {
    for (const point of points) expectPoint(stateAt(boiler.p, point.h), point)
  })

  it('has the two saturated states among its points, exactly', () => {
    const { liquid, steam } = saturatedAt(boiler.p)
    expect(points).toContainEqual(liquid)
    expect(points).toContainEqual(steam)
  })

  it('crosses the dome in one straight plateau', () => {
    const { liquid, steam, T } = saturatedAt(boiler.p)
    const from = points.findIndex(({ h }) => h === liquid.h)
    expect(points[from + 1]).toEqual(steam)
    expect(points[from]?.T).toBe(T)
  })

  it('rises in enthalpy, entropy and temperature', () => {
    expect(rising(points.map(({ h }) => h))).toBe(true)
    expect(rising(points.map(({ s }) => s))).toBe(true)
    expect(rising(points.map(({ T }) => T))).toBe(true)
  })

  it('is followed to a quarter of a pixel in 500 with at most 48 points', () => {
    expect(points.length).toBeLessThanOrEqual(48)
    expect(worstChord(points, boiler.p)).toBeLessThan(1 / 2000)
  })

  it('runs the other way when heat is given up', () => {
    const back = process('line', boiler.p, boiler.hot, boiler.p, boiler.cold)
    expect(back.length).toBe(points.length)
    for (const [i, point] of back.reverse().entries()) expectPoint(points[i], point)
  })

  it('takes two points for a condenser, all of it on the plateau', () => {
    expect(process('line', 5200, 2400e3, 5200, 141e3)).toHaveLength(2)
  })

  it('begins on the saturation line without doubling the point', () => {
    const { liquid, steam } = saturatedAt(1e6)
    const points = process('line', 1e6, steam.h, 1e6, liquid.h)
    expect(points).toHaveLength(2)
  })
})

describe('a process whose pressure falls with its enthalpy', () => {
  it('meets the saturation line at the pressure that it has there', () => {
    const [p1, h1, p2, h2] = [138e5, 1075e3, 130e5, 3445e3] as const
    const points = process('line', p1, h1, p2, h2)
    const saturated = points.filter(({ h }) => {
      const p = p1 + ((p2 - p1) * (h - h1)) / (h2 - h1)
      const { liquid, steam } = saturatedAt(p)
      return Math.abs(h - liquid.h) < 1e-3 || Math.abs(h - steam.h) < 1e-3
    })
    expect(saturated).toHaveLength(2)
    for (const point of points) {
      const p = p1 + ((p2 - p1) * (point.h - h1)) / (h2 - h1)
      expectPoint(stateAt(p, point.h), point)
    }
  })
})

describe('a supercritical process', () => {
  const points = process('line', 250e5, 1275e3, 250e5, 3345e3)

  it('rises steadily past the critical temperature without a plateau', () => {
    expect(points.length).toBeGreaterThan(10)
    expect(rising(points.map(({ s }) => s))).toBe(true)
    const temperatures = points.map(({ T }) => T)
    for (const [i, T] of temperatures.entries()) {
      if (i > 0) expect(T).toBeGreaterThan(temperatures[i - 1] as number)
    }
  })

  it('stays above the dome between its points too', () => {
    const dome = pointsOf(domePoints())
    for (let i = 0; i + 1 < points.length; i += 1) {
      const [a, b] = [points[i] as Point, points[i + 1] as Point]
      for (const t of [0, 0.25, 0.5, 0.75, 1]) {
        const s = a.s + t * (b.s - a.s)
        const T = a.T + t * (b.T - a.T)
        const k = dome.findIndex((point) => point.s > s)
        if (k <= 0) continue
        const [left, right] = [dome[k - 1] as Point, dome[k] as Point]
        const onDome = left.T + ((right.T - left.T) * (s - left.s)) / (right.s - left.s)
        expect(T).toBeGreaterThan(onDome - 0.3)
      }
    }
  })
})

describe('a throttle', () => {
  const [p1, p2, h] = [130e5, 5e5, 1200e3] as const
  const points = process('isenthalp', p1, h, p2, h)

  it('keeps its enthalpy and gains entropy', () => {
    for (const point of points) expect(point.h).toBeCloseTo(h, 3)
    expect(rising(points.map(({ s }) => s))).toBe(true)
  })

  it('flashes where saturated liquid has its enthalpy', () => {
    const flash = points.find(({ T }) => Math.abs(T - 546.06) < 0.5)
    const record = new Float64Array(SATURATION_SIZE)
    saturationAtTemperature(record, 0, flash?.T as number)
    const onLine = points.some((point) => {
      saturationAtTemperature(record, 0, point.T)
      return (
        Math.abs((record[Saturation.sL] as number) - point.s) < 1e-6 &&
        Math.abs((record[Saturation.hL] as number) - h) < 1e-3
      )
    })
    expect(onLine).toBe(true)
  })

  it('from above the critical pressure enters the dome once', () => {
    const points = process('isenthalp', 250e5, 2200e3, 1e5, 2200e3)
    expectPoint(points[0], stateAt(250e5, 2200e3))
    expectPoint(points.at(-1), stateAt(1e5, 2200e3))
    expect(rising(points.map(({ s }) => s))).toBe(true)
  })
})

describe('a drain throttled into a vessel', () => {
  // Some 184 K drain at 13 bar into a shell of 2 bar, where it leaves as saturated liquid.
  const [p1, h1, p2] = [13e5, 780e3, 2e5] as const
  const end = saturatedAt(p2).liquid.h
  const points = process('throttledLine', p1, h1, p2, end)

  it('keeps its enthalpy down to the pressure of the vessel and follows that pressure on', () => {
    const behind = stateAt(p2, h1)
    const kink = points.findIndex(({ s }) => Math.abs(s - behind.s) < 1e-6)
    expect(kink).toBeGreaterThan(0)
    for (const point of points.slice(0, kink + 1)) expect(point.h).toBeCloseTo(h1, 3)
    for (const point of points.slice(kink)) expectPoint(stateAt(p2, point.h), point)
    expectPoint(points[0], stateAt(p1, h1))
    expectPoint(points.at(-1), stateAt(p2, end))
  })

  it('takes no state twice and does not depend on the path drawn before', () => {
    process('expansion', 6.2e5, 3140e3, 5200, 2400e3)
    expect(process('throttledLine', p1, h1, p2, end)).toEqual(points)
    for (let i = 1; i < points.length; i += 1) expect(points[i]).not.toEqual(points[i - 1])
  })

  it('is a plain line where there is nothing to throttle', () => {
    expect(process('throttledLine', p2, h1, p2, end)).toEqual(process('line', p2, h1, p2, end))
  })
})

describe('an expansion', () => {
  const [p1, h1, p2, h2] = [6.2e5, 3140e3, 5200, 2400e3] as const
  const points = process('expansion', p1, h1, p2, h2)
  const { s: s1 } = stateAt(p1, h1)
  const efficiency = (h2 - h1) / (enthalpyAtEntropy(p2, s1) - h1)

  it('has the same efficiency from its first state to each of its states', () => {
    // The pressure of each point, found from its s and T outside the dome, from T on the plateau.
    const inside = points.slice(1, -1)
    expect(inside.length).toBeGreaterThan(3)
    for (const { s, h } of inside) {
      let [low, high] = [Math.log(p2), Math.log(p1)]
      for (let step = 0; step < 80; step += 1) {
        const middle = (low + high) / 2
        if (stateAt(Math.exp(middle), h).s > s) low = middle
        else high = middle
      }
      const p = Math.exp(low)
      expect((h - h1) / (enthalpyAtEntropy(p, s1) - h1)).toBeCloseTo(efficiency, 6)
    }
  })

  it('loses enthalpy, gains entropy and shows where it turns wet', () => {
    expect(rising(points.map(({ s }) => s))).toBe(true)
    expect(rising(points.map(({ h }) => -h + 1e7))).toBe(true)
    const record = new Float64Array(SATURATION_SIZE)
    const dry = points.filter(({ s, T }) => {
      saturationAtTemperature(record, 0, T)
      return Math.abs((record[Saturation.sV] as number) - s) < 1e-6
    })
    expect(dry).toHaveLength(1)
  })

  it('without a change of pressure is a line', () => {
    expect(process('expansion', 1e6, 2900e3, 1e6, 2800e3).length).toBeGreaterThanOrEqual(2)
  })
})

describe('a compression', () => {
  it('leads from suction to discharge', () => {
    const points = process('compression', 5200, 140e3, 150e5, 160e3)
    expectPoint(points[0], stateAt(5200, 140e3))
    expectPoint(points.at(-1), stateAt(150e5, 160e3))
    expect(rising(points.map(({ h }) => h))).toBe(true)
  })
})

describe('states outside the formulation', () => {
  it('leave nothing behind when the whole process lies outside', () => {
    expect(process('line', 1e6, 9e7, 1e6, 9.1e7)).toEqual([])
    expect(process('line', Number.NaN, 1e6, 1e6, 2e6)).toEqual([])
    expect(process('isenthalp', -1, 1e6, 1e6, 1e6)).toEqual([])
  })

  it('are skipped when only one end lies outside', () => {
    const points = process('line', 1e6, 3e6, 1e6, 3e7)
    expect(points.length).toBeGreaterThan(1)
    for (const point of points) {
      expect(Number.isFinite(point.s + point.T + point.h)).toBe(true)
    }
  })

  it('add to what the list holds already', () => {
    const out = new PointList()
    out.add(1, 2, 3)
    const written = processPoints('line', 5200, 2400e3, 5200, 141e3, out)
    expect(out.count).toBe(1 + written)
    expect([...out.copy().slice(0, 3)]).toEqual([1, 2, 3])
  })
})

describe('the dome', () => {
  const points = pointsOf(domePoints())

  it('consists of saturated states, liquid side up, steam side down', () => {
    const top = points.reduce(
      (best, point, i) => (point.T > (points[best]?.T as number) ? i : best),
      0,
    )
    for (const [i, { s, T, h }] of points.entries()) {
      const record = new Float64Array(SATURATION_SIZE)
      expect(saturationAtTemperature(record, 0, T)).toBe(Outcome.fine)
      const liquid = i <= top
      expect(s).toBeCloseTo(record[liquid ? Saturation.sL : Saturation.sV] as number, 8)
      expect(h).toBeCloseTo(record[liquid ? Saturation.hL : Saturation.hV] as number, 4)
    }
    expect(rising(points.slice(0, top + 1).map(({ T }) => T))).toBe(true)
    expect(rising(points.slice(top).map(({ T }) => 1000 - T))).toBe(true)
    expect(rising(points.map(({ s }) => s + 1))).toBe(true)
  })

  it('reaches from 273.15 K to the critical temperature', () => {
    // 647.096 K: IAPWS R7-97(2012), Eq. (2).
    expect(points[0]?.T).toBe(273.15)
    expect(points.at(-1)?.T).toBe(273.15)
    expect(Math.max(...points.map(({ T }) => T))).toBeCloseTo(647.096, 5)
  })

  it('closes at the critical point', () => {
    // s = 4.41202148 kJ/(kg K) at the critical point: IAPWS-95 (R6-95(2018)) critical entropy, from memory.
    const top = points.reduce((best, point) => (point.T > best.T ? point : best))
    expect(Math.abs(top.s - 4412)).toBeLessThan(15)
  })
})

describe('an isobar', () => {
  it('runs from 273.15 K to the highest temperature at its pressure', () => {
    const out = new PointList()
    expect(isobarPoints(25e5, out, 950)).toBe(out.count)
    const points = pointsOf(out.copy())
    expect(points[0]?.T).toBeCloseTo(273.15, 6)
    expect(points.at(-1)?.T).toBeCloseTo(950, 6)
    expect(points[0]?.h).toBeCloseTo(enthalpyAt(25e5, 273.15), 4)
    for (const point of points) expectPoint(stateAt(25e5, point.h), point)
  })

  it('exists above the critical pressure and below the triple point', () => {
    for (const p of [300e5, 400]) expect(isobarPoints(p, new PointList())).toBeGreaterThan(5)
  })

  it('is not drawn where the formulation has none', () => {
    for (const p of [0, -1, Number.NaN, 1e12]) expect(isobarPoints(p, new PointList())).toBe(0)
  })
})

describe('the pressures of isobars', () => {
  const pressures = Float64Array.of(145e5, 130e5, 138e5, 25e5, 24e5, 5200, 1e5, Number.NaN, 3e5)
  const flows = Float64Array.of(300, 120, 121, 100, 110, 80, 2, 50, 0)
  const isLiquid = (stream: number) => stream === 0

  it('are those of steam with the greatest flows, near ones joined', () => {
    expect([...isobarPressures(pressures, flows, isLiquid)]).toEqual([5200, 1e5, 24e5, 138e5])
    expect([...isobarPressures(pressures, flows, isLiquid, 2)]).toEqual([24e5, 138e5])
  })
})
