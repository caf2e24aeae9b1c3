import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { contourBands, niceThresholds, type ContourBand, type Ring } from '../../../core/map/contours'
import { cellsWithMargin, rasterGrid } from '../../../core/map/grid'
import { CoreError } from '../../../core/problems/problem'
import { bumpy, columnOf } from './patterns'

const disc = { shape: 'disc', diameter_mm: 200, fiducial: 'notch' } as const
const grid = rasterGrid(disc, 81)
const bandsOf = (valueAt: (x: number, y: number) => number, thresholds: readonly number[]) =>
  contourBands(grid, cellsWithMargin(grid, columnOf(grid.targets, valueAt)), thresholds)

/** Even-odd: how often a ray to the right crosses the rings. */
function encloses(band: ContourBand, x: number, y: number): boolean {
  let crossings = 0
  for (const ring of band.polygons.flat()) {
    for (let i = 0; i < ring.length; i += 2) {
      const [ax, ay] = [ring[i]!, ring[i + 1]!]
      const [bx, by] = [ring[(i + 2) % ring.length]!, ring[(i + 3) % ring.length]!]
      if (ay > y !== by > y && x < ax + ((y - ay) / (by - ay)) * (bx - ax)) crossings++
    }
  }
  return crossings % 2 === 1
}

const radiusRange = (ring: Ring) => {
  const radii = Array.from({ length: ring.length / 2 }, (_, i) => Math.hypot(ring[2 * i]!, ring[2 * i + 1]!))
  return [Math.min(...radii), Math.max(...radii)] as const
}

describe('contours', () => {
  it('of a bowl are circles in the right place, in mm', () => {
    const [, band] = bandsOf((x, y) => 100 - (x * x + y * y) / 100, [64])
    const [low, high] = radiusRange(band!.polygons[0]![0]!)
    // Level 64 at r = 60. Between points 2.5 mm apart a parabola errs by h^2 / (8 R) in radius.
    expect(low).toBeGreaterThan(60 - 0.05)
    expect(high).toBeLessThan(60 + 0.05)
    expect(band!.polygons).toHaveLength(1)
  })

  it('of a crater have a hole', () => {
    const [, band] = bandsOf((x, y) => (x * x + y * y) / 100, [36])
    expect(band!.polygons).toHaveLength(1)
    const [outer, hole] = band!.polygons[0]!
    expect(radiusRange(outer!)[0]).toBeGreaterThan(100)
    expect(radiusRange(hole!)[1]).toBeCloseTo(60, 1)
  })

  it('of a tilt are straight, and rise the right way', () => {
    const [, band] = bandsOf((x, y) => 2 * x + y, [10])
    expect(encloses(band!, 20, 0)).toBe(true)
    expect(encloses(band!, -20, 0)).toBe(false)
    expect(encloses(band!, 0, 20)).toBe(true)
  })

  it('enclose what is at least their threshold, and nothing else', () => {
    const thresholds = [91, 92, 93, 94, 95]
    const bands = bandsOf(bumpy, thresholds)
    expect(bands.map(({ lower, upper }) => [lower, upper])).toEqual([
      [-Infinity, 91], [91, 92], [92, 93], [93, 94], [94, 95], [95, Infinity],
    ]) // prettier-ignore
    const onWafer = fc.tuple(fc.double({ min: 0, max: 98, noNaN: true }), fc.double({ min: 0, max: 6.3, noNaN: true }))
    fc.assert(
      fc.property(onWafer, ([r, angle]) => {
        const [x, y] = [r * Math.cos(angle), r * Math.sin(angle)]
        for (const band of bands) {
          const value = bumpy(x, y)
          // Slope below 0.2 a mm, step 2.5 mm: a linear contour is off by far less than this.
          if (Math.abs(value - band.lower) > 0.02) expect(encloses(band, x, y)).toBe(value >= band.lower)
        }
      }),
    )
  })

  it('without thresholds leave one band that covers the wafer', () => {
    const [only, ...others] = bandsOf(bumpy, [])
    expect(others).toEqual([])
    for (const [x, y] of [[0, 0], [99, 0], [0, -99], [-70, 70]] as const) expect(encloses(only!, x, y)).toBe(true) // prettier-ignore
  })

  it('refuse a threshold that is no number', () => {
    expect(() => bandsOf(bumpy, [NaN])).toThrow(CoreError)
  })
})

describe('round thresholds', () => {
  it.each([
    [87, 97, 10, [88, 89, 90, 91, 92, 93, 94, 95, 96]],
    [0, 1, 10, [0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9]],
    [91.62, 92.71, 5, [91.8, 92, 92.2, 92.4, 92.6]],
    [1.2e-6, 4.9e-6, 4, [2e-6, 3e-6, 4e-6]],
    [12000, 18000, 3, [14000, 16000]],
    [92, 92, 8, []],
    [NaN, 92, 8, []],
  ])('from %s to %s in about %s', (min, max, count, thresholds) => {
    expect(niceThresholds(min, max, count)).toEqual(thresholds)
  })

  it('lie within, rise evenly, and are about as many as wanted', () => {
    const range = fc.tuple(
      fc.double({ min: -1e3, max: 1e3, noNaN: true }),
      fc.double({ min: 1e-3, max: 1e3, noNaN: true }),
    )
    fc.assert(
      fc.property(range, fc.integer({ min: 4, max: 12 }), ([min, width], count) => {
        const thresholds = niceThresholds(min, min + width, count)
        expect(thresholds.length).toBeGreaterThan(count / 2.4 - 2)
        expect(thresholds.length).toBeLessThan(count * 1.6 + 2)
        for (const threshold of thresholds) expect(threshold > min && threshold < min + width).toBe(true)
      }),
    )
  })
})
