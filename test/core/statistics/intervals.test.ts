import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../core/problems/problem'
import { meanInterval, standardDeviationInterval, varianceInterval } from '../../../core/statistics/intervals'
import { summarize } from '../../../core/statistics/summarize'
import { FURNACE_CAPABILITY, ZARR13 } from '../../reference/nist-handbook-statistics'
import { strdRows } from '../../reference/nist-strd'

const furnace = Float64Array.from(strdRows('handbook-furnace'), (row) => Number(row[3]))
const zarr13 = Float64Array.from(strdRows('handbook-zarr13'), ([y]) => Number(y))

describe('published values', () => {
  it('NIST e-Handbook 3.5.1.2: the furnace data, all printed digits', () => {
    const { count, mean, standardDeviation } = summarize(furnace)
    const m = meanInterval({ mean, standardDeviation, count, level: 0.95 })
    const s = standardDeviationInterval({ standardDeviation, degreesOfFreedom: count - 1, level: 0.95 })
    expect([mean, m.lower, m.upper].map((x) => x.toFixed(4))).toEqual(FURNACE_CAPABILITY.mean.map(String))
    expect([standardDeviation, s.lower, s.upper].map((x) => x.toFixed(4))).toEqual(
      FURNACE_CAPABILITY.standardDeviation.map(String),
    )
  })

  it('NIST e-Handbook 1.3.5.2: 195 calibration factors of a heat flow meter', () => {
    const { count, mean, standardDeviation } = summarize(zarr13)
    const { lower, upper } = meanInterval({ mean, standardDeviation, count, level: 0.95 })
    expect([lower, upper].map((x) => x.toFixed(6))).toEqual(ZARR13.interval.map(String))
    expect(standardDeviation).toBeCloseTo(ZARR13.standardDeviation, 6)
  })
})

describe('limits', () => {
  it('no spread: the interval of the mean is the mean, that of the spread is none', () => {
    const still = { standardDeviation: 0, level: 0.95 }
    expect(meanInterval({ ...still, mean: 92, count: 5 })).toEqual({ level: 0.95, lower: 92, upper: 92 })
    expect(standardDeviationInterval({ ...still, degreesOfFreedom: 4 })).toEqual({ level: 0.95, lower: 0, upper: 0 })
  })

  it('two values: mean +/- 12.706 half ranges', () => {
    const { upper } = meanInterval({ mean: 0, standardDeviation: Math.SQRT2, count: 2, level: 0.95 })
    expect(upper).toBeCloseTo(Math.tan(0.475 * Math.PI), 12)
  })

  it('a million values: the normal interval, s +/- 1.96 s / sqrt(2 n)', () => {
    const { lower, upper } = standardDeviationInterval({ standardDeviation: 1, degreesOfFreedom: 1e6, level: 0.95 })
    expect((upper - lower) / (2 * 1.959963985 * Math.sqrt(0.5e-6))).toBeCloseTo(1, 5)
  })
})

describe('laws', () => {
  it('wider for a higher level, narrower for more values, in the unit of the values', () => {
    const level = fc.double({ min: 0.5, max: 0.99, noNaN: true })
    fc.assert(
      fc.property(level, fc.integer({ min: 2, max: 500 }), (level, count) => {
        const width = (l: number, n: number, s = 1) => {
          const m = meanInterval({ mean: 5, standardDeviation: s, count: n, level: l })
          const d = standardDeviationInterval({ standardDeviation: s, degreesOfFreedom: n - 1, level: l })
          expect(m.upper + m.lower).toBeCloseTo(10, 9)
          expect(d.lower).toBeLessThan(s)
          return [m.upper - m.lower, d.upper - d.lower]
        }
        const base = width(level, count)
        width(level + 0.005, count).forEach((wide, i) => expect(wide).toBeGreaterThan(base[i]))
        width(level, count + 1).forEach((narrow, i) => expect(narrow).toBeLessThan(base[i]))
        width(level, count, 2).forEach((twice, i) => expect(twice / base[i]).toBeCloseTo(2, 9))
      }),
    )
  })
})

describe('refusals', () => {
  it.each([NaN, 0.4, 1])('a level of %s', (level) => {
    expect(() => meanInterval({ mean: 0, standardDeviation: 1, count: 5, level })).toThrow(CoreError)
    expect(() => varianceInterval({ variance: 1, degreesOfFreedom: 4, level })).toThrow(CoreError)
  })

  it('one value, a spread that is none', () => {
    expect(() => meanInterval({ mean: 0, standardDeviation: 1, count: 1, level: 0.95 })).toThrow(CoreError)
    expect(() => meanInterval({ mean: 0, standardDeviation: NaN, count: 5, level: 0.95 })).toThrow(CoreError)
    expect(() => varianceInterval({ variance: -1, degreesOfFreedom: 4, level: 0.95 })).toThrow(CoreError)
    expect(() => varianceInterval({ variance: 1, degreesOfFreedom: 0, level: 0.95 })).toThrow(CoreError)
  })
})
