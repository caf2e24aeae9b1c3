import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { chiSquareQuantile, fQuantile } from '../../../core/numeric/distributions'
import { CoreError } from '../../../core/problems/problem'
import { componentInterval } from '../../../core/statistics/component-interval'
import { varianceInterval } from '../../../core/statistics/intervals'

const freedom = fc.integer({ min: 1, max: 60 })

describe('limits', () => {
  it('nothing within: the exact interval of the larger mean square, over the divisor', () => {
    const larger = { meanSquare: 12, degreesOfFreedom: 6 }
    const smaller = { meanSquare: 0, degreesOfFreedom: 20 }
    const exact = varianceInterval({ variance: 12, degreesOfFreedom: 6, level: 0.95 })
    const { lower, upper } = componentInterval({ larger, smaller, divisor: 4, level: 0.95 })
    expect(lower).toBeCloseTo(exact.lower / 4, 12)
    expect(upper).toBeCloseTo(exact.upper / 4, 10)
  })

  it('very many values within: the exact interval less the known variance', () => {
    const larger = { meanSquare: 12, degreesOfFreedom: 6 }
    const smaller = { meanSquare: 2, degreesOfFreedom: 1e8 }
    const exact = varianceInterval({ variance: 12, degreesOfFreedom: 6, level: 0.9 })
    const { lower, upper } = componentInterval({ larger, smaller, divisor: 1, level: 0.9 })
    expect(lower).toBeCloseTo(exact.lower - 2, 2)
    expect(upper).toBeCloseTo(exact.upper - 2, 2)
  })
})

describe('laws', () => {
  it('a limit is 0 exactly where F stands at its critical value', () => {
    fc.assert(
      fc.property(freedom, freedom, (m, n) => {
        const at = (p: number, factor: number) => ({
          larger: { meanSquare: 3 * fQuantile(p, m, n) * factor, degreesOfFreedom: m },
          smaller: { meanSquare: 3, degreesOfFreedom: n },
          divisor: 1,
          level: 0.95,
        })
        expect(componentInterval(at(0.975, 1 - 1e-6)).lower).toBe(0)
        expect(componentInterval(at(0.975, 1 + 1e-6)).lower).toBeGreaterThan(0)
        expect(componentInterval(at(0.025, 1 - 1e-6)).upper).toBe(0)
        expect(componentInterval(at(0.025, 1 + 1e-6)).upper).toBeGreaterThan(0)
      }),
    )
  })

  it('holds the estimate, and goes with the unit', () => {
    fc.assert(
      fc.property(freedom, freedom, fc.double({ min: 1, max: 50, noNaN: true }), (m, n, ratio) => {
        const of = (unit: number) =>
          componentInterval({
            larger: { meanSquare: ratio * unit, degreesOfFreedom: m },
            smaller: { meanSquare: unit, degreesOfFreedom: n },
            divisor: 5,
            level: 0.95,
          })
        const { lower, upper } = of(1)
        expect(lower).toBeLessThanOrEqual((ratio - 1) / 5)
        expect(upper).toBeGreaterThan((ratio - 1) / 5)
        expect(of(1000).upper / upper).toBeCloseTo(1000, 6)
      }),
    )
  })
})

describe('a second implementation', () => {
  it('the constants G1, H2, G12, H1, G2, H12 written out', () => {
    const [a, b, m, n, alpha] = [3072.11, 571.659, 20, 63, 0.025]
    const g1 = 1 - m / chiSquareQuantile(1 - alpha, m)
    const h2 = n / chiSquareQuantile(alpha, n) - 1
    const f = fQuantile(1 - alpha, m, n)
    const g12 = ((f - 1) ** 2 - g1 ** 2 * f ** 2 - h2 ** 2) / f
    const h1 = m / chiSquareQuantile(alpha, m) - 1
    const g2 = 1 - n / chiSquareQuantile(1 - alpha, n)
    const low = fQuantile(alpha, m, n)
    const h12 = ((1 - low) ** 2 - h1 ** 2 * low ** 2 - g2 ** 2) / low
    const { lower, upper } = componentInterval({
      larger: { meanSquare: a, degreesOfFreedom: m },
      smaller: { meanSquare: b, degreesOfFreedom: n },
      divisor: 8,
      level: 0.95,
    })
    expect(lower).toBeCloseTo((a - b - Math.sqrt(g1 ** 2 * a ** 2 + h2 ** 2 * b ** 2 + g12 * a * b)) / 8, 9)
    expect(upper).toBeCloseTo((a - b + Math.sqrt(h1 ** 2 * a ** 2 + g2 ** 2 * b ** 2 + h12 * a * b)) / 8, 9)
  })

  it('covers the true component as often as it says, for few and many groups', () => {
    // Every pair of 40 evenly spread quantiles of both mean squares stands for an equal share of all lots.
    for (const [m, n, theta] of [[4, 20, 1.5], [4, 20, 10], [24, 100, 3], [2, 300, 2]]) {
      let covered = 0
      for (let i = 0; i < 40; i++) {
        const larger = { meanSquare: (theta * chiSquareQuantile((i + 0.5) / 40, m)) / m, degreesOfFreedom: m }
        for (let j = 0; j < 40; j++) {
          const smaller = { meanSquare: chiSquareQuantile((j + 0.5) / 40, n) / n, degreesOfFreedom: n }
          const { lower, upper } = componentInterval({ larger, smaller, divisor: 1, level: 0.9 })
          if (lower <= theta - 1 && theta - 1 <= upper) covered++
        }
      }
      expect(covered / 1600).toBeGreaterThan(0.885)
      expect(covered / 1600).toBeLessThan(0.915)
    } // prettier-ignore
  })
})

describe('refusals', () => {
  it.each([
    [NaN, 1, 1],
    [-1, 1, 1],
    [1, NaN, 1],
    [1, 1, 0],
  ])('mean squares %s and %s over %s', (a, b, divisor) => {
    const of = (meanSquare: number) => ({ meanSquare, degreesOfFreedom: 5 })
    expect(() => componentInterval({ larger: of(a), smaller: of(b), divisor, level: 0.95 })).toThrow(CoreError)
  })
})
