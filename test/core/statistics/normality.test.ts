import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { normalProbability } from '../../../core/numeric/normal'
import { CoreError } from '../../../core/problems/problem'
import { andersonDarling, normalScores } from '../../../core/statistics/normality'
import { summarize } from '../../../core/statistics/summarize'
import { ANDERSON_DARLING_POINTS } from '../../reference/dagostino-stephens'
import { ZARR13 } from '../../reference/nist-handbook-statistics'
import { strdRows } from '../../reference/nist-strd'

const zarr13 = Float64Array.from(strdRows('handbook-zarr13'), ([y]) => Number(y))

describe('published values', () => {
  it('NIST e-Handbook 1.4.2.8: 195 calibration factors, with the adjustment printed there', () => {
    const { statistic, count } = andersonDarling(zarr13)
    expect((statistic * (1 + 4 / count - 25 / count ** 2)).toFixed(3)).toBe(ZARR13.andersonDarling1974.toFixed(3))
  })

  it.each(ANDERSON_DARLING_POINTS)('D’Agostino and Stephens 1986 table 4.7: p %s at %s', (p, adjusted) => {
    const found = andersonDarling(sampleWith(adjusted))
    expect(found.adjusted).toBeCloseTo(adjusted, 6)
    expect(Math.abs(found.p / p - 1)).toBeLessThan(0.02)
  })

  it('Filliben 1975: the median of the largest of two is 1 - 0.29289, of the middle of three 1/2', () => {
    expect(normalProbability(normalScores(2)[0])).toBeCloseTo(1 - Math.SQRT1_2, 14)
    expect(normalScores(3)[1]).toBeCloseTo(0, 15)
    expect(normalScores(1)[0]).toBe(0)
  })
})

describe('limits', () => {
  it('the normal scores themselves are as normal as can be', () => {
    expect(andersonDarling(normalScores(49)).p).toBeGreaterThan(0.999)
  })

  it('two heaps are beyond doubt, and an outlier beyond all tails gives no NaN', () => {
    const heaps = Float64Array.from({ length: 200 }, (_, i) => (i % 2) * 100 + i / 1000)
    expect(andersonDarling(heaps).p).toBe(0)
    const far = Float64Array.from({ length: 4000 }, (_, i) => Math.sin(i))
    far[7] = 1e9
    expect(andersonDarling(far).p).toBe(0)
  })

  it('p falls steadily, where its pieces meet too', () => {
    let last = 1
    for (let adjusted = 0.15; adjusted < 1.5; adjusted += 0.01) {
      const { p } = andersonDarling(sampleWith(adjusted))
      expect(p).toBeLessThan(last + 0.003)
      last = p
    }
  })
})

describe('laws', () => {
  it('does not move with the unit or the origin, nor by turning over', () => {
    const column = fc.array(fc.integer({ min: 0, max: 1000 }), { minLength: 8, maxLength: 40 })
    fc.assert(
      fc.property(column, (drawn) => {
        const values = Float64Array.from(drawn, (v, i) => v + i / 100)
        const { statistic } = andersonDarling(values)
        expect(andersonDarling(values.map((v) => 7 - 3 * v)).statistic).toBeCloseTo(statistic, 8)
      }),
    )
  })

  it('normal scores rise and are odd about the middle', () => {
    const scores = normalScores(30)
    for (let i = 0; i < 30; i++) {
      expect(scores[i]).toBeCloseTo(-scores[29 - i], 13)
      if (i > 0) expect(scores[i]).toBeGreaterThan(scores[i - 1])
    }
  })
})

describe('a second implementation: the integral of the squared distance of the distributions', () => {
  it('n integral (Fn - F)^2 / (F (1 - F)) dF', () => {
    const values = Float64Array.of(90.1, 91.7, 92, 92.2, 93.5, 94.4, 94.9, 97.3, 99)
    const { mean, standardDeviation, count } = summarize(values)
    const u = Float64Array.from(values, (v) => normalProbability((v - mean) / standardDeviation))
    // Between two values Fn = k / n is constant; (c - F)^2 / (F (1 - F)) by its antiderivative.
    const antiderivative = (c: number, f: number) =>
      (c > 0 ? c * c * Math.log(f) : 0) - (c < 1 ? (1 - c) ** 2 * Math.log1p(-f) : 0) - f
    let sum = 0
    for (let k = 0; k <= count; k++) {
      const [from, to] = [k === 0 ? 0 : u[k - 1], k === count ? 1 : u[k]]
      sum += antiderivative(k / count, to) - antiderivative(k / count, from)
    }
    expect(andersonDarling(values).statistic).toBeCloseTo(count * sum, 12)
  })
})

describe('refusals', () => {
  it('seven values, all equal, a NaN that counts, no scores of nothing', () => {
    expect(() => andersonDarling(Float64Array.of(1, 2, 3, 4, 5, 6, 7))).toThrow(CoreError)
    expect(() => andersonDarling(new Float64Array(9).fill(92))).toThrow(CoreError)
    expect(() => andersonDarling(Float64Array.of(1, 2, 3, 4, 5, 6, 7, NaN))).toThrow(CoreError)
    expect(() => normalScores(0)).toThrow(CoreError)
  })
})

/** Normal scores bent by a cube until their adjusted statistic is that: bisection. */
function sampleWith(adjusted: number): Float64Array {
  const bent = (by: number) => normalScores(60).map((z) => z + by * z ** 3)
  let [low, high] = [-0.06, 40]
  if (andersonDarling(bent(0)).adjusted < adjusted) low = 0
  for (let i = 0; i < 60; i++) {
    const middle = (low + high) / 2
    if (andersonDarling(bent(middle)).adjusted < adjusted) low = middle
    else high = middle
  }
  return bent(low)
}
