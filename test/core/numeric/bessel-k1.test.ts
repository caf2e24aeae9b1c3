import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { besselK0 } from '../../../core/numeric/bessel-k0'
import { besselK1 } from '../../../core/numeric/bessel-k1'
import { CoreError } from '../../../core/problems/problem'

describe('besselK1', () => {
  it('K1(1) is the published value (Abramowitz & Stegun table 9.8)', () => {
    expect(besselK1(1)).toBeCloseTo(0.6019072301972346, 14)
  })

  it('tends to 1/x', () => {
    expect(besselK1(1e-9) * 1e-9).toBeCloseTo(1, 14)
  })

  it('is minus the slope of K0', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.01, max: 200, noNaN: true }), (x) => {
        const step = 1e-4 * Math.min(x, 1)
        // Five points: the remainder is step^4 K0'''''/30.
        const near = besselK0(x + step) - besselK0(x - step)
        const far = besselK0(x + 2 * step) - besselK0(x - 2 * step)
        const slope = (8 * near - far) / (12 * step)
        expect(Math.abs(slope / besselK1(x) + 1)).toBeLessThan(1e-9)
      }),
    )
  })

  it.each([0, -1, NaN, Infinity])('refuses %f', (x) => {
    expect(() => besselK1(x)).toThrow(CoreError)
  })
})
