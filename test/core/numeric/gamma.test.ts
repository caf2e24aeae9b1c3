import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { erfc } from '../../../core/numeric/erfc'
import { deviance, lowerIncompleteGamma, stirlingError, upperIncompleteGamma } from '../../../core/numeric/gamma'
import { CoreError } from '../../../core/problems/problem'

describe('limits', () => {
  it('a = 1/2 is the error function, a = 1 the exponential', () => {
    for (const x of [1e-6, 0.3, 1, 1.6, 4, 30, 600]) {
      expect(upperIncompleteGamma(0.5, x) / erfc(Math.sqrt(x))).toBeCloseTo(1, 12)
      expect(upperIncompleteGamma(1, x) / Math.exp(-x)).toBeCloseTo(1, 12)
      expect(lowerIncompleteGamma(1, x) / -Math.expm1(-x)).toBeCloseTo(1, 13)
    }
  })

  it.each([1e4, 1e6, 1e8])('a = x = %s: half, and 1 / (3 sqrt(2 pi a)) more below (DLMF 8.11.12)', (a) => {
    const more = 1 / (3 * Math.sqrt(2 * Math.PI * a))
    expect((lowerIncompleteGamma(a, a) - 0.5) / more).toBeCloseTo(1, 4)
    expect((0.5 - upperIncompleteGamma(a, a)) / more).toBeCloseTo(1, 4)
  })

  it('Stirling’s error of the whole numbers is that of their factorials', () => {
    for (let n = 1, factorial = 1; n <= 20; factorial *= ++n) {
      const left = Math.log(factorial) - (n + 0.5) * Math.log(n) + n - 0.5 * Math.log(2 * Math.PI)
      expect(stirlingError(n)).toBeCloseTo(left, 13)
    }
    expect(stirlingError(0.5)).toBeCloseTo(0.5 * Math.log(Math.PI) + 0.5 - 0.5 * Math.log(2 * Math.PI), 14)
  })

  it('the deviance is quadratic beside its zero', () => {
    expect(deviance(1e6, 1e6)).toBe(0)
    expect(deviance(1e6, 1e6 + 1) / 5e-7).toBeCloseTo(1, 5)
  })
})

describe('laws', () => {
  it('the recurrence in a: P(a + 1, x) = P(a, x) - x^a exp(-x) / Gamma(a + 1)', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 60 }), fc.double({ min: 0.01, max: 120, noNaN: true }), (a, x) => {
        let term = Math.exp(-x)
        for (let k = 1; k <= a; k++) term *= x / k
        expect(lowerIncompleteGamma(a + 1, x)).toBeCloseTo(lowerIncompleteGamma(a, x) - term, 12)
      }),
    )
  })
})

describe('a second implementation: the Poisson sum for whole a', () => {
  it.each([[3, 2], [10, 25], [80, 60], [150, 150]])('Q(%d, %d)', (a, x) => {
    let [term, sum] = [Math.exp(-x), Math.exp(-x)]
    for (let k = 1; k < a; k++) sum += term *= x / k
    expect(upperIncompleteGamma(a, x) / sum).toBeCloseTo(1, 12)
  }) // prettier-ignore
})

describe('refusals', () => {
  it.each([[NaN, 1], [0, 1], [1e10, 1], [1, NaN], [1, -1]])('a = %s, x = %s', (a, x) => {
    expect(() => lowerIncompleteGamma(a, x)).toThrow(CoreError)
    expect(() => upperIncompleteGamma(a, x)).toThrow(CoreError)
  }) // prettier-ignore
})
