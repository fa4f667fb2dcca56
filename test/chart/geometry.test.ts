import { describe, expect, it } from 'vitest'
import { type Geometry, lastInside, nearestOnPaths, pathThrough } from '../../web/chart/geometry.ts'

/** 10 px per kJ/(kg K) and 1 px per K; 0 °C at the bottom. */
const geometry: Geometry = {
  plot: { x: 50, y: 20, width: 100, height: 600 },
  x0: 50,
  kx: 0.01,
  y0: 620 + 273.15,
  ky: -1,
}
const points = Float64Array.of(
  ...[0, 273.15, 0],
  ...[2000, 473.15, 850e3],
  ...[6000, 473.15, 2800e3],
  ...[1000, 373.15, 400e3],
  ...[9000, 373.15, 2900e3],
)
const starts = Uint32Array.of(0, 3, 5, 5)

describe('a path', () => {
  it('runs through its points in px', () => {
    expect(pathThrough(points, 0, 3, geometry)).toBe('M50 620L70 420L110 420')
  })

  it('is empty without points, and names no point twice', () => {
    expect(pathThrough(points, 5, 5, geometry)).toBe('')
    const twice = Float64Array.of(0, 273.15, 0, 0, 273.15, 0, 1000, 373.15, 4e5)
    expect(pathThrough(twice, 0, 3, geometry)).toBe('M50 620L60 520')
  })
})

describe('the nearest place on the paths', () => {
  it('is interpolated between two states', () => {
    const hit = nearestOnPaths(points, starts, geometry, 90, 424, 8)
    expect(hit).toMatchObject({ path: 0, T: 473.15 })
    expect(hit?.s).toBeCloseTo(4000, 9)
    expect(hit?.h).toBeCloseTo(1825e3, 6)
    expect(hit?.distance).toBeCloseTo(4, 9)
  })

  it('is the nearer path, and none out of reach', () => {
    expect(nearestOnPaths(points, starts, geometry, 100, 515, 8)?.path).toBe(1)
    expect(nearestOnPaths(points, starts, geometry, 100, 470, 8)).toBeUndefined()
    expect(nearestOnPaths(points, Uint32Array.of(0), geometry, 90, 424, 8)).toBeUndefined()
  })
})

describe('the end of a line', () => {
  it('is where it leaves the plot through the top', () => {
    const up = Float64Array.of(7000, 800, 3.4e6, 7400, 900, 3.7e6)
    const end = lastInside(up, 0, 2, geometry)
    expect(end?.edge).toBe('top')
    expect(end?.y).toBeCloseTo(20, 9)
    expect(end?.x).toBeCloseTo(120 + 4 * 0.7315, 9)
  })

  it('or through the right', () => {
    const along = Float64Array.of(9000, 400, 3e6, 11_000, 420, 3.1e6)
    expect(lastInside(along, 0, 2, geometry)).toMatchObject({ edge: 'right', x: 150 })
  })

  it('is its last point where it ends inside, and nothing where it is outside altogether', () => {
    expect(lastInside(points, 0, 3, geometry)).toEqual({ x: 110, y: 420, edge: 'none' })
    expect(lastInside(Float64Array.of(20_000, 400, 0), 0, 1, geometry)).toBeUndefined()
  })
})
