import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../core/problems/problem'
import { generalizedEsd, grubbsTest } from '../../../core/statistics/outliers'
import { summarize } from '../../../core/statistics/summarize'
import { GRUBBS_URANIUM, ROSNER_STEPS } from '../../reference/nist-handbook-statistics'
import { strdRows } from '../../reference/nist-strd'

const rosner = Float64Array.from(strdRows('handbook-rosner'), ([y]) => Number(y))

describe('published values', () => {
  it('NIST e-Handbook 1.3.5.17.3: Rosner’s 54 values have three outliers, though the first two tests fail', () => {
    const { rows, steps } = generalizedEsd({ values: rosner, atMost: 10 })
    expect(rows.map((i) => rosner[i])).toEqual([6.01, 5.42, 5.34])
    steps.forEach(({ statistic, critical }, i) => {
      expect(Math.abs(statistic - ROSNER_STEPS[i][0])).toBeLessThan(0.51e-6)
      expect(Math.abs(critical - ROSNER_STEPS[i][1])).toBeLessThan(0.51e-6)
    })
    expect(steps.map(({ statistic, critical }) => statistic > critical).slice(0, 3)).toEqual([false, false, true])
  })

  it('NIST e-Handbook 1.3.5.17.1: Grubbs’ test of eight uranium measurements', () => {
    const values = Float64Array.from(GRUBBS_URANIUM.values)
    const largest = grubbsTest({ values, side: 'largest' })
    expect([largest.row, largest.isOutlier]).toEqual([7, true])
    expect(Math.abs(largest.statistic - GRUBBS_URANIUM.statistic)).toBeLessThan(0.5e-6)
    expect(Math.abs(largest.critical - GRUBBS_URANIUM.criticalLargest)).toBeLessThan(0.5e-6)
    expect(Math.abs(grubbsTest({ values }).critical - GRUBBS_URANIUM.criticalEither)).toBeLessThan(0.5e-4)
  })
})

describe('limits', () => {
  it('all equal: nothing to test, nothing found', () => {
    expect(generalizedEsd({ values: new Float64Array(9).fill(92), atMost: 3 })).toEqual({
      alpha: 0.05,
      rows: [],
      steps: [],
    })
  })

  it('one unlike nine equal ones is found, and then nothing is left to test', () => {
    const { rows, steps } = generalizedEsd({
      values: Float64Array.of(92, 92, 92, 80, 92, 92, 92, 92, 92, 92),
      atMost: 3,
    })
    expect(rows).toEqual([3])
    expect(steps).toHaveLength(1)
    expect(steps[0].statistic).toBeCloseTo(9 / Math.sqrt(10), 12)
  })

  it('a giant does not drown the next one', () => {
    const values = Float64Array.from({ length: 40 }, (_, i) => 92 + Math.sin(i))
    values[5] = 1e12
    values[17] = 200
    expect(generalizedEsd({ values, atMost: 4 }).rows).toEqual([5, 17])
  })

  it('a normal sample as it should be, the normal scores themselves, has none', () => {
    const values = Float64Array.from({ length: 49 }, (_, i) => Math.tan((i - 24) / 40))
    expect(generalizedEsd({ values, atMost: 4 }).rows).toEqual([])
  })
})

describe('laws', () => {
  const column = fc.array(fc.integer({ min: 0, max: 1000 }), { minLength: 6, maxLength: 40 })

  it('turned over and stretched the same rows are found; the order of the values does not matter', () => {
    fc.assert(
      fc.property(column, (drawn) => {
        // Distinct and off centre, so that no two are equally far out.
        const values = Float64Array.from(drawn, (v, i) => v + Math.sqrt(i + 2) / 100)
        const atMost = Math.floor(values.length / 2)
        const of = (column: Float64Array) => generalizedEsd({ values: column, atMost })
        const { rows, steps } = of(values)
        expect(of(values.map((v) => 5 - 2 * v)).rows).toEqual(rows)
        const backwards = of(values.slice().reverse())
        expect(backwards.steps.map(({ row }) => values.length - 1 - row)).toEqual(steps.map(({ row }) => row))
      }),
    )
  })

  it('of one candidate it is Grubbs’ test', () => {
    fc.assert(
      fc.property(column, (drawn) => {
        const values = Float64Array.from(drawn, (v, i) => v + Math.sqrt(i + 2) / 100)
        const { steps, rows } = generalizedEsd({ values, atMost: 1 })
        const { isOutlier, row, statistic, critical } = grubbsTest({ values })
        expect(steps[0].row).toBe(row)
        expect(rows).toEqual(isOutlier ? [row] : [])
        expect(steps[0].statistic).toBeCloseTo(statistic, 9)
        expect(steps[0].critical).toBe(critical)
      }),
    )
  })
})

describe('a second implementation: set aside, and summarize anew', () => {
  it.each([1, 2, 3])('seed %d', (seed) => {
    const values = Float64Array.from({ length: 60 }, (_, i) => 92 + 5 * Math.sin(seed * 37 * (i + 1) ** 2))
    const indices = Uint32Array.from({ length: 30 }, (_, i) => 2 * i)
    let left = [...indices]
    for (const { row, statistic } of generalizedEsd({ values, indices, atMost: 15 }).steps) {
      const { mean, standardDeviation } = summarize(values, Uint32Array.from(left))
      const distance = (i: number) => Math.abs(values[i] - mean) / standardDeviation
      expect(distance(row)).toBeCloseTo(Math.max(...left.map(distance)), 10)
      expect(statistic).toBeCloseTo(distance(row), 10)
      left = left.filter((i) => i !== row)
    }
    expect(left).toHaveLength(15)
  })
})

describe('refusals', () => {
  const values = Float64Array.of(1, 2, 3, 4)
  it('two values, no candidate, more than half, a NaN, an alpha out of range', () => {
    expect(() => generalizedEsd({ values: Float64Array.of(1, 2), atMost: 1 })).toThrow(CoreError)
    expect(() => generalizedEsd({ values, atMost: 0 })).toThrow(CoreError)
    expect(() => generalizedEsd({ values, atMost: 3 })).toThrow(CoreError)
    expect(() => generalizedEsd({ values, atMost: 1, alpha: 0.6 })).toThrow(CoreError)
    expect(() => generalizedEsd({ values: Float64Array.of(1, NaN, 3), atMost: 1 })).toThrow(CoreError)
    expect(() => grubbsTest({ values: Float64Array.of(2, 2, 2) })).toThrow(CoreError)
  })
})
