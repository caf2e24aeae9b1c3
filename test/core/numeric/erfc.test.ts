import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { erfc, erfcInverse } from '../../../core/numeric/erfc'

describe('complementary error function', () => {
  it('has its published values (Abramowitz and Stegun 1964, table 7.1)', () => {
    // erf: 0.5204998778 at 0.5, 0.8427007929 at 1, 0.9953222650 at 2.
    expect(1 - erfc(0.5)).toBeCloseTo(0.5204998778, 10)
    expect(1 - erfc(1)).toBeCloseTo(0.8427007929, 10)
    expect(1 - erfc(2)).toBeCloseTo(0.995322265, 10)
  })

  it('goes from 2 to 0', () => {
    expect([erfc(-Infinity), erfc(0), erfc(Infinity)]).toEqual([2, 1, 0])
  })

  it('agrees with its integral, by Simpson over 20 000 intervals', () => {
    for (const x of [0.1, 1.3, 3, 4.5]) {
      const n = 20000
      const h = 6 / n
      let sum = 0
      for (let i = 0; i <= n; i++) sum += (i % n === 0 ? 1 : i % 2 === 0 ? 2 : 4) * Math.exp(-((x + i * h) ** 2))
      expect((((sum * h) / 3) * 2) / Math.sqrt(Math.PI) / erfc(x)).toBeCloseTo(1, 11)
    }
  })
})

describe('its inverse', () => {
  it('returns what it was made from, over the ratios a layer can have', () => {
    fc.assert(
      fc.property(fc.double({ min: -28, max: -0.001, noNaN: true }), (lnRatio) => {
        const ratio = Math.exp(lnRatio)
        expect(Math.abs(erfc(erfcInverse(ratio)) / ratio - 1)).toBeLessThan(1e-13)
      }),
    )
  })

  it('is not a number where there is no such x', () => {
    expect(erfcInverse(-0.1)).toBeNaN()
    expect(erfcInverse(2.1)).toBeNaN()
  })
})
