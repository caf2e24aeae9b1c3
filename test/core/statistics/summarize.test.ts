import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../core/problems/problem'
import { summarize } from '../../../core/statistics/summarize'
import { BY_HAND } from '../../reference/semi-mf1618'
import { STRD_UNIVARIATE, agreeingDigits, strdRows } from '../../reference/nist-strd'
import { exactMean, exactSumOfSquares } from './exact-rational'

const columnOf = (set: string) => Float64Array.from(strdRows(`strd-univariate-${set}`), ([y]) => Number(y))
const readings = fc.array(fc.double({ min: 1, max: 1e4, noNaN: true }), { minLength: 2, maxLength: 60 })

describe('published values', () => {
  it.each(STRD_UNIVARIATE)('NIST StRD $set to $digits digits', ({ set, count, mean, standardDeviation, digits }) => {
    const statistics = summarize(columnOf(set))
    expect(statistics.count).toBe(count)
    const reached = agreeingDigits(statistics.standardDeviation, Number(standardDeviation))
    expect(agreeingDigits(statistics.mean, Number(mean))).toBeGreaterThanOrEqual(14.5)
    expect(reached).toBeGreaterThanOrEqual(digits)
  })

  it.each(STRD_UNIVARIATE)('NIST StRD $set: all digits of the doubles that were read', ({ set }) => {
    const values = columnOf(set)
    const { mean, standardDeviation, count } = summarize(values)
    expect(agreeingDigits(mean, exactMean(values))).toBeGreaterThan(15 - 1e-9)
    expect(agreeingDigits(standardDeviation, Math.sqrt(exactSumOfSquares(values) / (count - 1)))).toBeGreaterThan(14.8)
  })

  it('SEMI MF1618: SUP and HLV by hand', () => {
    const statistics = summarize(Float64Array.from(BY_HAND.values))
    expect(statistics.nonuniformityPercent).toBeCloseTo(BY_HAND.sup, 13)
    expect(statistics.rangePercent).toBeCloseTo(BY_HAND.hlv, 13)
    expect(statistics).toMatchObject({ count: 5, mean: 94, median: 94, min: 90, max: 98, range: 8 })
  })
})

describe('limits', () => {
  it('of one site there is no standard deviation', () => {
    const one = summarize(Float64Array.of(92))
    expect(one).toMatchObject({ count: 1, mean: 92, median: 92, min: 92, max: 92, range: 0, rangePercent: 0 })
    expect(one.standardDeviation).toBeNaN()
    expect(one.nonuniformityPercent).toBeNaN()
  })

  it('of no site there is nothing', () => {
    const none = summarize(new Float64Array(0))
    expect(none.count).toBe(0)
    for (const figure of [none.mean, none.median, none.standardDeviation, none.min, none.max]) expect(figure).toBeNaN()
  })

  it('neighbouring doubles: the mean lies between them, the spread is exact all the same', () => {
    const step = Number.EPSILON
    expect(summarize(Float64Array.of(1, 1 + step)).standardDeviation).toBeCloseTo(step / Math.SQRT2, 30)
  })

  it('equal sites do not spread at all', () => {
    expect(summarize(new Float64Array(49).fill(0.1)).standardDeviation).toBe(0)
  })
})

describe('laws', () => {
  it('a shift moves where the values lie and not how far they spread', () => {
    fc.assert(
      fc.property(readings, fc.integer({ min: 0, max: 1000 }), (values, shift) => {
        const before = summarize(Float64Array.from(values))
        const after = summarize(Float64Array.from(values, (value) => value + shift))
        expect(after.mean).toBeCloseTo(before.mean + shift, 8)
        expect(after.median).toBeCloseTo(before.median + shift, 8)
        expect(after.standardDeviation).toBeCloseTo(before.standardDeviation, 8)
      }),
    )
  })

  it('a change of unit by a power of two changes everything by it exactly, and no percentage', () => {
    fc.assert(
      fc.property(readings, fc.integer({ min: -20, max: 20 }), (values, power) => {
        const before = summarize(Float64Array.from(values))
        const after = summarize(Float64Array.from(values, (value) => value * 2 ** power))
        expect(after.mean).toBe(before.mean * 2 ** power)
        expect(after.standardDeviation).toBe(before.standardDeviation * 2 ** power)
        expect(after.nonuniformity).toEqual(before.nonuniformity)
      }),
    )
  })

  it('the order of the sites does not matter', () => {
    fc.assert(
      fc.property(readings, (values) => {
        const forward = summarize(Float64Array.from(values))
        const backward = summarize(Float64Array.from(values).reverse())
        expect(backward.median).toBe(forward.median)
        expect(agreeingDigits(backward.mean, forward.mean)).toBeGreaterThan(14.9)
      }),
    )
  })

  it('indices choose the sites that count, and the columns stay as they were', () => {
    const values = Float64Array.of(NaN, 90, 1e9, 94, 92)
    const before = values.slice()
    expect(summarize(values, Uint32Array.of(1, 3, 4))).toEqual(summarize(Float64Array.of(90, 94, 92)))
    expect(values).toEqual(before)
  })
})

describe('a second implementation: whole-number arithmetic', () => {
  it('agrees to the last digits, however far from zero', () => {
    fc.assert(
      fc.property(readings, fc.integer({ min: 0, max: 30 }), (values, power) => {
        const shifted = Float64Array.from(values, (value) => value + 2 ** power)
        const { standardDeviation, count } = summarize(shifted)
        const exact = Math.sqrt(exactSumOfSquares(shifted) / (count - 1))
        expect(Math.abs(standardDeviation - exact)).toBeLessThanOrEqual(4e-16 * exact)
      }),
    )
  })
})

describe('refusals', () => {
  it.each([NaN, Infinity, -Infinity])('%s among the sites that count', (bad) => {
    expect(() => summarize(Float64Array.of(92, bad))).toThrow(CoreError)
  })

  it('an index beyond the column', () => {
    expect(() => summarize(Float64Array.of(92), Uint32Array.of(1))).toThrow(CoreError)
  })
})
