import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../core/problems/problem'
import { analysisOfVariance } from '../../../core/statistics/analysis-of-variance'
import { componentsOfVariance } from '../../../core/statistics/components-of-variance'
import { nestedVariance } from '../../../core/statistics/nested-variance'
import { FURNACE_ANOVA } from '../../reference/nist-handbook-statistics'
import { strdRows } from '../../reference/nist-strd'

const furnace = Float64Array.from(strdRows('handbook-furnace'), (row) => Number(row[3]))

/** Rows in order: the first index slowest. */
function nestedRows(a: number, b: number, n: number): Uint32Array[][] {
  return Array.from({ length: a }, (_, i) =>
    Array.from({ length: b }, (_, j) => Uint32Array.from({ length: n }, (_, k) => (i * b + j) * n + k)),
  )
}

describe('published values', () => {
  const found = nestedVariance({ values: furnace, nested: nestedRows(21, 4, 2) })

  it.each(['outer', 'middle', 'inner'] as const)('NIST e-Handbook 3.5.1.4: furnace, %s', (level) => {
    const [printed, line] = [FURNACE_ANOVA[level], found[level]]
    expect(line.degreesOfFreedom).toBe(printed.df)
    expect(Math.abs(line.sumOfSquares - printed.ss)).toBeLessThan(0.005)
    expect(Math.abs(line.meanSquare - printed.ms)).toBeLessThan(0.005)
    expect(line.variance.toFixed(5)).toBe(printed.variance.toFixed(5))
    expect(line.percent!.toFixed(2)).toBe(printed.percent.toFixed(2))
    expect(line.standardDeviation!.toFixed(3)).toBe(printed.s.toFixed(3))
    if ('f' in printed) {
      expect(line.f!.toFixed(5)).toBe(printed.f.toFixed(5))
      expect(Math.abs(line.p! / printed.p - 1)).toBeLessThan(0.01)
    }
  })

  it('NIST e-Handbook 3.5.1.4: furnace, the total', () => {
    expect(found.total.sumOfSquares.toFixed(1)).toBe(FURNACE_ANOVA.total.ss.toFixed(1))
    expect(found.total.degreesOfFreedom).toBe(FURNACE_ANOVA.total.df)
  })
})

describe('limits', () => {
  it('nothing varies: no component, no share', () => {
    const { outer, inner } = nestedVariance({ values: new Float64Array(8).fill(92), nested: nestedRows(2, 2, 2) })
    expect([outer.variance, outer.f, outer.p, outer.percent]).toEqual([0, null, null, null])
    expect(inner.interval).toEqual({ level: 0.95, lower: 0, upper: 0 })
  })

  it('groups that differ less than what they hold: a negative component, left so, its interval from 0', () => {
    const { middle, outer } = nestedVariance({
      values: Float64Array.of(90, 94, 91, 93, 95, 99, 96, 98),
      nested: nestedRows(2, 2, 2),
    })
    expect(middle.variance).toBe(-2.5)
    expect([middle.standardDeviation, middle.percent, middle.interval.lower]).toEqual([null, 0, 0])
    // MSO = 4 (2.5^2 + 2.5^2) = 50, MSM = 0: (50 - 0) / 4.
    expect(outer.variance).toBe(12.5)
    expect(outer.f).toBeNull()
  })
})

describe('laws', () => {
  const column = fc.array(fc.integer({ min: 500, max: 600 }), { minLength: 24, maxLength: 24 })

  it('the sums of squares make up the whole, and so do the shares', () => {
    fc.assert(
      fc.property(column, (values) => {
        const { outer, middle, inner, total } = nestedVariance({
          values: Float64Array.from(values),
          nested: nestedRows(3, 4, 2),
        })
        const lines = [outer, middle, inner]
        expect(lines.reduce((sum, l) => sum + l.sumOfSquares, 0)).toBeCloseTo(total.sumOfSquares, 7)
        expect(lines.reduce((sum, l) => sum + l.degreesOfFreedom, 0)).toBe(total.degreesOfFreedom)
        if (total.sumOfSquares > 0) expect(lines.reduce((sum, l) => sum + l.percent!, 0)).toBeCloseTo(100, 9)
      }),
    )
  })
})

describe('a second implementation: two one-way analyses', () => {
  it('the innermost of all groups, the outermost of the group means', () => {
    const nested = nestedRows(21, 4, 2)
    const { outer, middle, inner } = nestedVariance({ values: furnace, nested })
    const byZone = analysisOfVariance(furnace, nested.flat())
    expect(inner.sumOfSquares).toBeCloseTo(byZone.within.sumOfSquares, 8)
    const zoneMeans = Float64Array.from(nested.flat(), ([i, j]) => (furnace[i] + furnace[j]) / 2)
    const byRun = componentsOfVariance(zoneMeans, Array.from({ length: 21 }, (_, i) => Uint32Array.of(4 * i, 4 * i + 1, 4 * i + 2, 4 * i + 3)))! // prettier-ignore
    expect(outer.variance).toBeCloseTo(byRun.betweenWafers.variance, 9)
    expect(outer.interval.lower).toBeCloseTo(byRun.betweenWafers.interval.lower, 8)
    expect(outer.interval.upper).toBeCloseTo(byRun.betweenWafers.interval.upper, 8)
    expect(middle.meanSquare).toBeCloseTo(2 * byRun.withinWafer.variance, 9)
  })
})

describe('refusals', () => {
  const values = Float64Array.of(1, 2, 3, 4, 5, 6, 7, NaN)
  it.each([
    ['one outer group', nestedRows(1, 4, 2)],
    ['one middle group', nestedRows(2, 1, 3)],
    ['one value a group', nestedRows(2, 3, 1)],
    ['unequal groups', [[Uint32Array.of(0, 1), Uint32Array.of(2, 3)], [Uint32Array.of(4, 5)]]],
    [
      'unequal numbers',
      [
        [Uint32Array.of(0, 1), Uint32Array.of(2, 3)],
        [Uint32Array.of(4, 5), Uint32Array.of(6)],
      ],
    ],
    ['nothing', []],
    ['a NaN that counts', nestedRows(2, 2, 2)],
  ])('%s', (_, nested) => {
    expect(() => nestedVariance({ values, nested })).toThrow(CoreError)
  })
})
