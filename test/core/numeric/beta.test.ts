import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { incompleteBeta } from '../../../core/numeric/beta'
import { CoreError } from '../../../core/problems/problem'

const share = fc.double({ min: 1e-9, max: 1 - 1e-9, noNaN: true })

describe('limits', () => {
  it('powers where one of a, b is 1; the arcsine where both are 1/2', () => {
    for (const x of [1e-9, 0.01, 0.4, 0.8, 0.999]) {
      expect(incompleteBeta(7.5, 1, x) / x ** 7.5).toBeCloseTo(1, 12)
      expect(incompleteBeta(1, 300, x) / -Math.expm1(300 * Math.log1p(-x))).toBeCloseTo(1, 12)
      expect(incompleteBeta(0.5, 0.5, x) / ((2 / Math.PI) * Math.asin(Math.sqrt(x)))).toBeCloseTo(1, 12)
    }
    expect([incompleteBeta(2, 3, 0), incompleteBeta(2, 3, 1)]).toEqual([0, 1])
  })

  it('a complement that is known better than by subtraction', () => {
    // 1 - I = y^b / (b B(a, b)) for small y; of a = 2, b = 3 that is 4 y^3.
    expect(incompleteBeta(3, 2, 1e-20, 1) / 4e-60).toBeCloseTo(1, 12)
    expect(incompleteBeta(1, 0.5, 1, 1e-20)).toBe(1 - 1e-10)
  })
})

describe('laws', () => {
  const shape = fc.double({ min: 0.25, max: 2000, noNaN: true })

  it('the mirror image makes up the whole', () => {
    fc.assert(
      fc.property(shape, shape, share, (a, b, x) => {
        expect(incompleteBeta(a, b, x) + incompleteBeta(b, a, 1 - x, x)).toBeCloseTo(1, 12)
      }),
    )
  })

  it('the recurrence I(a, b) = x I(a - 1, b) + (1 - x) I(a, b - 1) (Abramowitz and Stegun 26.5.10)', () => {
    fc.assert(
      fc.property(shape, shape, share, (a, b, x) => {
        const right = x * incompleteBeta(a, b + 1, x) + (1 - x) * incompleteBeta(a + 1, b, x)
        expect(incompleteBeta(a + 1, b + 1, x)).toBeCloseTo(right, 11)
      }),
    )
  })
})

describe('a second implementation: the binomial sum for whole a and b', () => {
  it.each([[3, 5, 0.2], [20, 4, 0.7], [40, 60, 0.45]])('I(%d, %d) at %s', (a, b, x) => {
    const n = a + b - 1
    let sum = 0
    for (let j = a; j <= n; j++) {
      let term = 1
      for (let k = 1; k <= j; k++) term *= ((n - j + k) / k) * x
      sum += term * (1 - x) ** (n - j)
    }
    expect(incompleteBeta(a, b, x) / sum).toBeCloseTo(1, 12)
  }) // prettier-ignore
})

describe('refusals', () => {
  it.each([[0, 1, 0.5], [1, NaN, 0.5], [1, 1, -0.1], [1, 1, 1.1], [1, 1, NaN]])('%s, %s at %s', (a, b, x) => {
    expect(() => incompleteBeta(a, b, x)).toThrow(CoreError)
  }) // prettier-ignore
})
