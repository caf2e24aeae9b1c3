import { describe, expect, it } from 'vitest'
import type { PinSpacings } from '../../../core/geometry/pin-line'
import { linearSpacingFactor, unequalSpacingFactor } from '../../../core/geometry/spacing'
import { CoreError } from '../../../core/problems/problem'

describe('spacing factors', () => {
  it.each([
    [[1, 0.98, 1], 1.0147129, 1.0145235],
    [[1, 1.05, 1], 0.9656015, 0.9645246],
    [[1.01, 1, 0.99], 0.9999459, 1],
  ] as [PinSpacings, number, number][])('%o: exact, and SEMI MF1527 eq. R2-10', (spacings_mm, exact, linear) => {
    expect(Math.abs(unequalSpacingFactor({ spacings_mm }) - exact)).toBeLessThan(5.1e-8)
    expect(Math.abs(linearSpacingFactor({ spacings_mm }).value - linear)).toBeLessThan(5.1e-8)
  })

  it('both are 1 for equal pins, at any pitch', () => {
    for (const s of [0.25, 1, 1.59]) {
      expect(unequalSpacingFactor({ spacings_mm: [s, s, s] })).toBeCloseTo(1, 13)
      expect(linearSpacingFactor({ spacings_mm: [s, s, s] }).value).toBeCloseTo(1, 15)
    }
  })

  it('differ by less than 1e-4 within 1 % and 1.3e-3 within 5 %', () => {
    for (const [part, bound] of [
      [0.01, 1e-4],
      [0.05, 1.3e-3],
    ] as const) {
      for (const d of [-part, part]) {
        const spacings_mm = [1, 1 + d, 1] as const
        const off = unequalSpacingFactor({ spacings_mm }) - linearSpacingFactor({ spacings_mm }).value
        expect(Math.abs(off)).toBeLessThan(bound)
      }
    }
  })

  it('a second route: the closed form', () => {
    const [s1, s2, s3] = [0.9, 1.1, 1.05] as const
    const closed = (2 * Math.LN2) / Math.log(((s1 + s2) * (s2 + s3)) / (s1 * s3))
    expect(unequalSpacingFactor({ spacings_mm: [s1, s2, s3] })).toBeCloseTo(closed, 13)
  })

  it.each([0, -1, NaN])('refuse a spacing of %f', (bad) => {
    expect(() => unequalSpacingFactor({ spacings_mm: [1, bad, 1] })).toThrow(CoreError)
    expect(() => linearSpacingFactor({ spacings_mm: [1, bad, 1] })).toThrow(CoreError)
  })
})
