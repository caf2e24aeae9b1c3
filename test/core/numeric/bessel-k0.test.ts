import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { besselK0 } from '../../../core/numeric/bessel-k0'
import { CoreError } from '../../../core/problems/problem'

const relative = (found: number, expected: number) => Math.abs(found / expected - 1)

/** K0 by its ascending series, I0 and harmonic numbers (NIST DLMF 10.31.2); good for x <= 4. */
function ascendingSeries(x: number): number {
  const square = (x / 2) ** 2
  let term = 1
  let harmonic = 0
  let bessel = 0
  let rest = 0
  for (let k = 0; k < 60; k++) {
    if (k > 0) {
      term *= square / (k * k)
      harmonic += 1 / k
    }
    bessel += term
    rest += term * harmonic
  }
  return -(Math.log(x / 2) + 0.5772156649015329) * bessel + rest
}

/** sqrt(pi/2x) e^-x (1 - 1/8x + 9/128x^2 - ...), NIST DLMF 10.40.2; good for x >= 25. */
function asymptoticSeries(x: number): number {
  let term = 1
  let sum = 1
  for (let k = 1; k < 25; k++) {
    term *= -((2 * k - 1) ** 2) / (8 * k * x)
    sum += term
  }
  return Math.sqrt(Math.PI / (2 * x)) * Math.exp(-x) * sum
}

describe('besselK0', () => {
  it.each([
    [0.1, 2.427069024702017],
    [1, 0.4210244382407083],
    [2, 0.1138938727495334],
  ])('K0(%f) is the published value (Abramowitz & Stegun table 9.8)', (x, expected) => {
    expect(relative(besselK0(x), expected)).toBeLessThan(2e-15)
  })

  it('tends to -ln(x/2) - gamma and underflows to 0', () => {
    expect(relative(besselK0(1e-12), -Math.log(0.5e-12) - 0.5772156649015329)).toBeLessThan(1e-14)
    expect(besselK0(800)).toBe(0)
  })

  it('falls and is convex', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-3, max: 300, noNaN: true }), (x) => {
        const step = 0.1 * x
        const [low, middle, high] = [besselK0(x - step), besselK0(x), besselK0(x + step)]
        expect(low).toBeGreaterThan(middle)
        expect(middle).toBeGreaterThan(high)
        expect(low + high).toBeGreaterThan(2 * middle)
      }),
    )
  })

  it('agrees with the ascending series below 3 and the asymptotic one above 25', () => {
    for (let x = 1e-4; x < 3; x *= 1.3) expect(relative(besselK0(x), ascendingSeries(x))).toBeLessThan(1e-13)
    for (let x = 25; x < 700; x *= 1.1) expect(relative(besselK0(x), asymptoticSeries(x))).toBeLessThan(1e-13)
  })

  it('agrees between them with Simpson-refined quadrature of exp(-x cosh t)', () => {
    for (let x = 2; x < 40; x *= 1.17) {
      const steps = 4000
      const end = Math.acosh(1 + 45 / x)
      let sum = 0
      for (let n = 0; n <= steps; n++) {
        const weight = n === 0 || n === steps ? 1 : n % 2 ? 4 : 2
        sum += weight * Math.exp(-x * (Math.cosh((n * end) / steps) - 1))
      }
      expect(relative(besselK0(x), ((sum * end) / steps / 3) * Math.exp(-x))).toBeLessThan(1e-13)
    }
  })

  it.each([0, -1, NaN, Infinity])('refuses %f', (x) => {
    expect(() => besselK0(x)).toThrow(CoreError)
  })
})
