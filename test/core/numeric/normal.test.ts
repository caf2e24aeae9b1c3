import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  normalDensity,
  normalProbability,
  normalProbabilityBetween,
  normalQuantile,
} from '../../../core/numeric/normal'
import { CoreError } from '../../../core/problems/problem'

describe('published values', () => {
  // M. Abramowitz and I. Stegun, Handbook of Mathematical Functions (1964), table 26.1 (from memory).
  it.each([
    [0, 0.5],
    [1, 0.841344746068543],
    [2, 0.977249868051821],
    [3, 0.99865010196837],
    [-1, 0.158655253931457],
  ])('Phi(%s)', (z, p) => expect(normalProbability(z)).toBeCloseTo(p, 14))

  it('the 97.5 % point is 1.959963984540', () => expect(normalQuantile(0.975)).toBeCloseTo(1.95996398454, 11))
})

describe('limits', () => {
  it('far tails keep their digits', () => {
    // z = -10: 7.619853024160527e-24 (from memory; the asymptotic series below agrees).
    const series = (normalDensity(10) / 10) * (1 - 1e-2 + 3e-4 - 15e-6 + 105e-8 - 945e-10 + 10395e-12)
    expect(normalProbability(-10) / series).toBeCloseTo(1, 6)
    expect(normalProbability(-10) / 7.619853024160527e-24).toBeCloseTo(1, 12)
    expect(normalProbabilityBetween(10, 11) / (normalProbability(-10) - normalProbability(-11))).toBeCloseTo(1, 12)
  })

  it('at infinity', () => {
    expect([normalProbability(-Infinity), normalProbability(Infinity), normalDensity(Infinity)]).toEqual([0, 1, 0])
    expect([normalQuantile(0), normalQuantile(1), normalQuantile(0.5)]).toEqual([-Infinity, Infinity, 0])
    expect(normalProbabilityBetween(-Infinity, Infinity)).toBe(1)
  })
})

describe('laws', () => {
  it('the quantile undoes the probability', () => {
    fc.assert(
      fc.property(fc.double({ min: -8, max: 5, noNaN: true }), (z) => {
        expect(normalQuantile(normalProbability(z))).toBeCloseTo(z, 8)
      }),
    )
  })

  it('both tails make up the whole', () => {
    fc.assert(
      fc.property(fc.double({ min: -8, max: 8, noNaN: true }), (z) => {
        expect(normalProbability(z) + normalProbability(-z)).toBeCloseTo(1, 14)
      }),
    )
  })
})

describe('a second implementation: Simpson over the density', () => {
  it.each([-2.5, -0.3, 0.7, 1.96])('z = %s', (z) => {
    const steps = 2000
    const h = z / steps
    let sum = normalDensity(0) + normalDensity(z)
    for (let i = 1; i < steps; i++) sum += (i % 2 === 0 ? 2 : 4) * normalDensity(i * h)
    expect(normalProbability(z)).toBeCloseTo(0.5 + (sum * h) / 3, 12)
  })
})

describe('refusals', () => {
  it.each([NaN, -0.1, 1.1])('no quantile at %s', (p) => expect(() => normalQuantile(p)).toThrow(CoreError))
})
