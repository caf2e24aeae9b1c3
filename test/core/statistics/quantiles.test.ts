import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { normalQuantile } from '../../../core/numeric/normal'
import { CoreError } from '../../../core/problems/problem'
import { MAD_TO_SIGMA, medianAndMad, quantile } from '../../../core/statistics/quantiles'

const readings = fc.array(fc.double({ min: -1e6, max: 1e6, noNaN: true }), { minLength: 1, maxLength: 80 })

describe('by hand', () => {
  it('the median of an even count is the mean of the middle two', () => {
    expect(quantile(Float64Array.of(4, 1, 3, 2), 0.5)).toBe(2.5)
  })

  it('definition 7 of Hyndman and Fan: quartiles of 1, 2, 3, 4', () => {
    expect(quantile(Float64Array.of(4, 1, 3, 2), 0.25)).toBe(1.75)
    expect(quantile(Float64Array.of(4, 1, 3, 2), 0.75)).toBe(3.25)
  })

  it('median and median absolute deviation of 1, 1, 2, 2, 4, 6, 9', () => {
    expect(medianAndMad(Float64Array.of(6, 1, 9, 2, 1, 4, 2))).toEqual({ median: 2, mad: 1 })
  })

  it('the factor to sigma is that of the normal distribution', () => {
    expect(MAD_TO_SIGMA).toBeCloseTo(1 / normalQuantile(0.75), 14)
  })
})

describe('a second implementation: sorting', () => {
  it('agrees at every p, with repeated values too', () => {
    const repeated = fc.array(fc.integer({ min: 0, max: 5 }), { minLength: 1, maxLength: 80 })
    fc.assert(
      fc.property(fc.oneof(readings, repeated), fc.double({ min: 0, max: 1, noNaN: true }), (values, p) => {
        const sorted = [...values].sort((a, b) => a - b)
        const at = (sorted.length - 1) * p
        const [low, high] = [sorted[Math.floor(at)]!, sorted[Math.ceil(at)]!]
        expect(quantile(Float64Array.from(values), p)).toBeCloseTo(low + (at - Math.floor(at)) * (high - low), 9)
      }),
    )
  })

  it('leaves the column as it was', () => {
    const values = Float64Array.of(3, 1, 2)
    quantile(values, 0.5)
    medianAndMad(values)
    expect([...values]).toEqual([3, 1, 2])
  })

  it('is quick on a million ordered values', () => {
    const values = Float64Array.from({ length: 1_000_001 }, (_, i) => i)
    expect(quantile(values, 0.5)).toBe(500_000)
  })
})

describe('refusals', () => {
  it.each([
    ['no values', () => quantile(new Float64Array(0), 0.5)],
    ['no values for a median', () => medianAndMad(new Float64Array(0))],
    ['NaN', () => quantile(Float64Array.of(1, NaN), 0.5)],
    ['p above 1', () => quantile(Float64Array.of(1), 1.1)],
  ])('%s', (_, call) => expect(call).toThrow(CoreError))
})
