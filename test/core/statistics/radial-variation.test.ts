import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../core/problems/problem'
import { radialVariation } from '../../../core/statistics/radial-variation'
import { concentricPlan } from '../../../core/wafer/site-patterns'

/** Centre, four sites at half radius, four 6 mm from the edge of a 200 mm wafer. */
const x_mm = Float64Array.of(0, 50, 0, -50, 0, 94, 0, -94, 0)
const y_mm = Float64Array.of(0, 0, 50, 0, -50, 0, 94, 0, -94)
const values = Float64Array.of(100, 101, 102, 103, 102, 104, 105, 106, 105)
const wafer = { values, x_mm, y_mm, radius_mm: 100 }

describe('by hand, SEMI MF81 from memory', () => {
  it('centre, half radius and near edge', () => {
    const found = radialVariation(wafer)!
    expect(found.centre).toBe(100)
    expect(found.halfRadius).toEqual({ sites: 4, meanRadius_mm: 50, mean: 102, variationPercent: 2 })
    expect(found.nearEdge).toEqual({ sites: 4, meanRadius_mm: 94, mean: 105, variationPercent: 5 })
    expect(found.maximumPercent).toBe(6)
    expect(found.source).toContain('not read')
  })

  it('either group alone, by the rows that count', () => {
    const half = radialVariation({ ...wafer, indices: Uint32Array.of(0, 1, 2, 3, 4) })!
    expect([half.nearEdge, half.maximumPercent]).toEqual([null, 3])
    const edge = radialVariation({ ...wafer, indices: Uint32Array.of(0, 5, 6, 7, 8) })!
    expect([edge.halfRadius, edge.nearEdge!.variationPercent]).toEqual([null, 5])
  })
})

describe('limits', () => {
  it('49 sites have no circle at half radius, 81 have; the outermost alone is near the edge', () => {
    const of = (circles: number) => {
      const plan = concentricPlan({ circles, outerRadius_mm: 95 })
      return radialVariation({ ...plan, values: new Float64Array(plan.count).fill(92), radius_mm: 100 })!
    }
    expect([of(3).halfRadius, of(3).nearEdge!.sites]).toEqual([null, 24])
    expect([of(4).halfRadius!.sites, of(4).nearEdge!.sites]).toEqual([16, 32])
    expect(of(4).maximumPercent).toBe(0)
  })

  it.each([
    ['no site at the centre', { indices: Uint32Array.of(1, 2, 5) }],
    ['the centre alone', { indices: Uint32Array.of(0) }],
    ['neither group', { radius_mm: 300 }],
    ['a value that is not above 0', { values: values.map((v) => v - 101) }],
    ['no site', { indices: new Uint32Array(0) }],
    ['no places', { x_mm: new Float64Array(9).fill(NaN) }],
  ])('%s: none', (_, change) => {
    expect(radialVariation({ ...wafer, ...change })).toBeNull()
  })
})

describe('laws', () => {
  it('does not depend on the unit', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-3, max: 1e6, noNaN: true }), (unit) => {
        const found = radialVariation({ ...wafer, values: values.map((v) => v * unit) })!
        expect(found.nearEdge!.variationPercent).toBeCloseTo(5, 10)
        expect(found.maximumPercent).toBeCloseTo(6, 10)
      }),
    )
  })
})

describe('refusals', () => {
  it('a NaN that counts, no radius', () => {
    expect(() => radialVariation({ ...wafer, values: values.map((v, i) => (i === 6 ? NaN : v)) })).toThrow(CoreError)
    expect(() => radialVariation({ ...wafer, radius_mm: 0 })).toThrow(CoreError)
  })
})
