import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../core/problems/problem'
import { areaWeighted } from '../../../core/statistics/area-weighted'
import { siteAreas } from '../../../core/statistics/site-areas'
import { summarize } from '../../../core/statistics/summarize'
import type { UsableRegion } from '../../../core/statistics/usable-region'
import { cartesianPlan, concentricPlan, diameterPlan, type SitePlan } from '../../../core/wafer/site-patterns'

const disc = (radius_mm: number): UsableRegion => ({ shape: 'disc', radius_mm })

function overArea(plan: SitePlan, radius_mm: number, field: (x: number, y: number) => number) {
  const { area_mm2 } = siteAreas({ ...plan, region: disc(radius_mm) })
  return areaWeighted({ values: plan.x_mm.map((x, i) => field(x, plan.y_mm[i])), weights: area_mm2 })
}

describe('fields whose mean over the area is known', () => {
  const plans: [string, SitePlan][] = [
    ['49 sites', concentricPlan({ circles: 3, outerRadius_mm: 95 })],
    ['121 sites', concentricPlan({ circles: 5, outerRadius_mm: 95 })],
    ['a lattice of 97', cartesianPlan({ rows: 11, outerRadius_mm: 95 })],
    ['a diameter of 49', diameterPlan({ count: 49, outerRadius_mm: 95 })],
  ]

  it.each(plans)('a plane: its value at the centre, %s', (_, plan) => {
    expect(overArea(plan, 97, (x, y) => 92 + 0.01 * x - 0.02 * y).mean).toBeCloseTo(92, 9)
  })

  // The mean of r^2 over a disc is R^2 / 2. Unweighted, 49 sites out to the edge give 0.63 of R^2.
  it.each(plans)('a bowl: half its depth, nearer than the plain mean, %s', (_, plan) => {
    const bowl = (x: number, y: number) => 92 + (x * x + y * y) / 97 ** 2
    const plain = summarize(plan.x_mm.map((x, i) => bowl(x, plan.y_mm[i]))).mean
    const { mean } = overArea(plan, 97, bowl)
    expect(Math.abs(mean - 92.5)).toBeLessThan(0.03)
    expect(Math.abs(mean - 92.5)).toBeLessThan(0.7 * Math.abs(plain - 92.5))
  })

  it('and the finer the plan the nearer', () => {
    const off = (circles: number) =>
      Math.abs(
        overArea(concentricPlan({ circles, outerRadius_mm: 97 }), 97, (x, y) => (x * x + y * y) / 97 ** 2).mean - 0.5,
      )
    expect(off(6)).toBeLessThan(off(3) / 3)
    expect(off(12)).toBeLessThan(off(6) / 3)
  })
})

describe('limits', () => {
  it('equal weights: the plain mean and sample standard deviation', () => {
    const values = Float64Array.of(90, 92, 94, 96, 98)
    const { mean, standardDeviation, effectiveCount } = areaWeighted({ values, weights: new Float64Array(5).fill(0.3) })
    expect(mean).toBeCloseTo(94, 13)
    expect(standardDeviation).toBeCloseTo(Math.sqrt(10), 13)
    expect(effectiveCount).toBeCloseTo(5, 13)
  })

  it('one value, or all weight on one: no spread', () => {
    const one = areaWeighted({ values: Float64Array.of(92), weights: Float64Array.of(3) })
    expect(one).toEqual({ mean: 92, standardDeviation: null, effectiveCount: 1 })
    const all = areaWeighted({ values: Float64Array.of(92, 80), weights: Float64Array.of(3, 0) })
    expect(all).toEqual({ mean: 92, standardDeviation: null, effectiveCount: 1 })
  })

  it('by hand: 10 and 20 with weights 1 and 3', () => {
    // m = 70 / 4; sum w d^2 = 56.25 + 18.75 = 75; V1 - V2 / V1 = 4 - 10 / 4 = 1.5.
    const { mean, standardDeviation, effectiveCount } = areaWeighted({
      values: Float64Array.of(10, 20),
      weights: Float64Array.of(1, 3),
    })
    expect([mean, effectiveCount]).toEqual([17.5, 1.6])
    expect(standardDeviation).toBeCloseTo(Math.sqrt(50), 13)
  })
})

describe('laws', () => {
  const pair = fc.tuple(fc.double({ min: 50, max: 150, noNaN: true }), fc.double({ min: 0.1, max: 9, noNaN: true }))

  it('only ratios of the weights matter, and the unit of the values goes through', () => {
    fc.assert(
      fc.property(fc.array(pair, { minLength: 2, maxLength: 30 }), (pairs) => {
        const values = Float64Array.from(pairs, ([v]) => v)
        const weights = Float64Array.from(pairs, ([, w]) => w)
        const one = areaWeighted({ values, weights })
        const other = areaWeighted({ values: values.map((v) => 3 * v + 7), weights: weights.map((w) => w * 1000) })
        expect(other.mean).toBeCloseTo(3 * one.mean + 7, 9)
        expect(other.standardDeviation).toBeCloseTo(3 * one.standardDeviation!, 8)
        expect(other.effectiveCount).toBeCloseTo(one.effectiveCount, 9)
        expect(one.effectiveCount).toBeLessThanOrEqual(pairs.length + 1e-9)
      }),
    )
  })

  it('unbiased: over all samples of four from two values its square is on average their variance', () => {
    const weights = Float64Array.of(1, 2, 5, 7)
    let sum = 0
    for (let sample = 0; sample < 16; sample++) {
      const values = Float64Array.from({ length: 4 }, (_, bit) => ((sample >> bit) & 1 ? 1 : -1))
      sum += areaWeighted({ values, weights }).standardDeviation! ** 2
    }
    expect(sum / 16).toBeCloseTo(1, 13)
  })
})

describe('refusals', () => {
  it('no values, unequal numbers, no weight, a negative one, a NaN', () => {
    const [two, values] = [Float64Array.of(1, 2), Float64Array.of(3, 4)]
    expect(() => areaWeighted({ values: new Float64Array(0), weights: new Float64Array(0) })).toThrow(CoreError)
    expect(() => areaWeighted({ values, weights: Float64Array.of(1) })).toThrow(CoreError)
    expect(() => areaWeighted({ values, weights: Float64Array.of(0, 0) })).toThrow(CoreError)
    expect(() => areaWeighted({ values, weights: Float64Array.of(1, -1) })).toThrow(CoreError)
    expect(() => areaWeighted({ values: Float64Array.of(1, NaN), weights: two })).toThrow(CoreError)
  })
})
