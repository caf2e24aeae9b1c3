import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { semiInfiniteResistivity_ohm_cm } from '../../../core/geometry/semi-infinite'
import type { Back } from '../../../core/geometry/slab'
import { thicknessFactor, unequalThicknessFactor } from '../../../core/geometry/thickness'
import { thinSheetFactor } from '../../../core/geometry/thin-sheet'
import { CoreError } from '../../../core/problems/problem'
import { MF43_TABLE_1, MF43_TOLERANCE } from '../../reference/semi-mf43'
import { mf1527ThicknessPolynomial } from '../../reference/semi-mf1527'
import { SMITS_THICKNESS } from '../../reference/smits-1958'

const at = (ratio: number, back: Back = 'insulating') =>
  thicknessFactor({ thickness_um: 1000 * ratio, spacing_mm: 1, back })

describe('published values', () => {
  it.each(MF43_TABLE_1)('SEMI MF43 Table 1: w/S = %f', (ratio, expected) => {
    expect(Math.abs(at(ratio).value - expected)).toBeLessThan(MF43_TOLERANCE)
  })

  it.each(SMITS_THICKNESS)('Smits 1958: w/S = %f', (ratio, expected) => {
    expect(Math.abs(at(ratio).value - expected)).toBeLessThan(1.1e-4)
  })

  it('SEMI MF1527 eq. R2-8 within 0.052 % up to w/S = 1.5, and not within 0.05 %', () => {
    const ratios = Array.from({ length: 150 }, (_, n) => (n + 1) / 100)
    const worst = Math.max(...ratios.map((ratio) => Math.abs(mf1527ThicknessPolynomial(ratio) / at(ratio).value - 1)))
    expect(worst).toBeLessThan(0.00052)
    expect(worst).toBeGreaterThan(0.0005)
  })

  it.each([
    [0.3, 0.99996871],
    [0.4, 0.99950678],
    [0.5, 0.99736227],
    [0.6, 0.99183942],
    [0.7, 0.98162936],
    [0.8, 0.96622949],
    [0.9, 0.94590869],
    [1, 0.9214568],
    [2, 0.63365644],
    [4, 0.34198737],
  ])('insulating back to eight decimals, both series: w/S = %f', (ratio, expected) => {
    expect(Math.abs(at(ratio).value - expected)).toBeLessThan(5.1e-9)
  })

  it.each([
    [0.3, 122.00424, 5.1e-6],
    [0.5, 12.107511, 5.1e-7],
    [1, 2.0287919, 5.1e-8],
    [2, 0.74297387, 5.1e-9],
    [4, 0.35005056, 5.1e-9],
  ])('conducting back, both series: w/S = %f', (ratio, expected, tolerance) => {
    expect(Math.abs(at(ratio, 'conducting').value - expected)).toBeLessThan(tolerance)
  })

  it('is not the sinh closed form, which is 7.5 % low at w/S = 1', () => {
    const closed = Math.LN2 / Math.log(Math.sinh(1) / Math.sinh(0.5))
    expect(closed / at(1).value - 1).toBeCloseTo(-0.075, 3)
  })
})

describe('limits', () => {
  it('is exactly 1 for a thin slab on an insulating back, with no slope', () => {
    for (const ratio of [1e-300, 1e-9, 0.01, 0.05]) {
      const { value, dLnRatio } = thicknessFactor({ thickness_um: ratio, spacing_mm: 0.001, back: 'insulating' })
      expect(value).toBe(1)
      expect(Math.abs(dLnRatio)).toBeLessThan(1e-15)
    }
  })

  it.each(['insulating', 'conducting'] as const)('tends to the semi-infinite solid, %s back', (back) => {
    const { value, dLnRatio } = at(100, back)
    // (pi/ln 2) (V/I) w F against 2 pi s (V/I), w = 10 cm, s = 0.1 cm.
    const solid = semiInfiniteResistivity_ohm_cm({ spacings_mm: [1, 1, 1], vOverI_ohm: 1 })
    expect(Math.abs(((Math.PI / Math.LN2) * 10 * value) / solid - 1)).toBeLessThan(1e-5)
    expect(dLnRatio).toBeCloseTo(-1, 5)
  })
})

const ratioOf = (min: number) => fc.double({ min: Math.log(min), max: Math.log(99.9), noNaN: true }).map(Math.exp)
const pins = fc.tuple(...[0, 1, 2].map(() => fc.double({ min: 0.7, max: 1.4, noNaN: true }))) as fc.Arbitrary<
  [number, number, number]
>

describe('laws', () => {
  it('a conducting back shunts: its factor is the larger, both fall with thickness', () => {
    fc.assert(
      fc.property(ratioOf(0.1), (ratio) => {
        expect(at(ratio, 'conducting').value).toBeGreaterThan(at(ratio).value)
        expect(at(ratio * 1.01 > 100 ? 100 : ratio * 1.01).value).toBeLessThanOrEqual(at(ratio).value)
      }),
    )
  })

  it('only the ratio matters', () => {
    fc.assert(
      fc.property(ratioOf(0.1), (ratio) => {
        const scaled = thicknessFactor({ thickness_um: 635 * ratio, spacing_mm: 0.635, back: 'insulating' }).value
        expect(Math.abs(scaled / at(ratio).value - 1)).toBeLessThan(1e-12)
      }),
    )
  })

  it.each(['insulating', 'conducting'] as const)('the derivative agrees with central differences, %s back', (back) => {
    fc.assert(
      fc.property(ratioOf(0.2), (ratio) => {
        const step = 1e-5
        const [low, high] = [at(ratio * 0.999 * Math.exp(-step), back), at(ratio * 0.999 * Math.exp(step), back)]
        const slope = Math.log(high.value / low.value) / (2 * step)
        expect(Math.abs(slope - at(ratio * 0.999, back).dLnRatio)).toBeLessThan(2e-8)
      }),
    )
  })

  it('is continuous where the series change over, r = w', () => {
    for (const back of ['insulating', 'conducting'] as const) {
      for (const ratio of [1, 2, 3]) {
        const jump = at(ratio * (1 + 1e-13), back).value / at(ratio * (1 - 1e-13), back).value - 1
        expect(Math.abs(jump)).toBeLessThan(2e-12)
      }
    }
  })

  it('turning the probe end for end changes nothing', () => {
    fc.assert(
      fc.property(ratioOf(0.1), pins, (ratio, [s1, s2, s3]) => {
        const thickness_um = 700 * ratio
        const one = unequalThicknessFactor({ thickness_um, spacings_mm: [s1, s2, s3], back: 'insulating' }).value
        const other = unequalThicknessFactor({ thickness_um, spacings_mm: [s3, s2, s1], back: 'insulating' }).value
        expect(Math.abs(one / other - 1)).toBeLessThan(1e-12)
      }),
    )
  })

  it('unequal pins within 2 % of their mean change F by less than 0.2 % at w/S = 1', () => {
    for (const spacings_mm of [
      [1.02, 0.98, 1],
      [0.98, 1.02, 1],
      [0.99, 1.02, 0.99],
    ] as const) {
      const exact = unequalThicknessFactor({ thickness_um: 1000, spacings_mm, back: 'insulating' }).value
      expect(Math.abs(exact / at(1).value - 1)).toBeLessThan(2e-3)
    }
  })
})

/** J0 by its integral, trapezoidal rule over the half period (exact to rounding for 64 points and x below 60). */
function besselJ0(x: number): number {
  let sum = 0
  for (let n = 0; n < 64; n++) sum += Math.cos(x * Math.sin((Math.PI * (n + 0.5)) / 64))
  return sum / 64
}

/**
 * T of the slab per rho/w by the Hankel integral: the surface potential of a point current is
 * (rho I/2 pi) Int J0(k r) coth(k w) dk, tanh for a conducting back.
 */
function hankelSum(spacings: readonly [number, number, number], w: number, back: Back): number {
  const [s1, s2, s3] = spacings
  const terms: readonly (readonly [number, number])[] = [[s1, 1], [s3, 1], [s1 + s2, -1], [s2 + s3, -1]] // prettier-ignore
  const integrand = (k: number) => {
    const rest = 2 / Math.expm1(2 * k * w)
    const beside = back === 'insulating' ? rest : -2 / (Math.exp(2 * k * w) + 1)
    return terms.reduce((sum, [r, sign]) => sum + sign * besselJ0(k * r), 0) * beside
  }
  const end = 20 / w
  const steps = 8000
  let sum = integrand(end)
  for (let n = 1; n < steps; n++) sum += (n % 2 ? 4 : 2) * integrand((n * end) / steps)
  // At k = 0 the integrand vanishes like k.
  return w * (terms.reduce((total, [r, sign]) => total + sign / r, 0) + (sum * end) / steps / 3)
}

describe('a second route', () => {
  it.each(['insulating', 'conducting'] as const)('Hankel integral, %s back', (back) => {
    for (const ratio of [0.5, 0.8, 1, 1.3, 2, 3.5, 8]) {
      const expected = (2 * Math.LN2) / hankelSum([1, 1, 1], ratio, back)
      expect(Math.abs(at(ratio, back).value / expected - 1)).toBeLessThan(1e-9)
    }
  })

  it('Hankel integral, unequal pins', () => {
    const spacings_mm = [0.9, 1.1, 1.05] as const
    const sheet = { outline: { shape: 'infinite' }, configuration: 'A', x_mm: 0, y_mm: 0 } as const
    const thin = (2 * Math.PI) / thinSheetFactor({ ...sheet, orientation: 'radial', spacings_mm }).value
    for (const ratio of [0.7, 1.5, 4]) {
      const { value } = unequalThicknessFactor({ thickness_um: 1000 * ratio, spacings_mm, back: 'insulating' })
      expect(Math.abs((value * hankelSum(spacings_mm, ratio, 'insulating')) / thin - 1)).toBeLessThan(1e-9)
    }
  })

  it('plain image sum with its tail by Richardson', () => {
    const images = (ratio: number, terms: number) => {
      let sum = 0.5
      for (let n = 1; n <= terms; n++) {
        const square = (2 * n * ratio) ** 2
        sum += 2 * (1 / Math.sqrt(1 + square) - 1 / Math.sqrt(4 + square))
      }
      return sum
    }
    for (const ratio of [0.3, 1, 2.5, 30]) {
      // The tail is c/(N + 1/2)^2.
      const [few, many] = [2000, 4000]
      const weight = (few + 0.5) ** 2 / ((many + 0.5) ** 2 - (few + 0.5) ** 2)
      const sum = images(ratio, many) + weight * (images(ratio, many) - images(ratio, few))
      expect(Math.abs((at(ratio).value * ratio * sum) / Math.LN2 - 1)).toBeLessThan(1e-10)
    }
  })
})

describe('refusals', () => {
  it('refuses what is not positive, too thick, or too thin on a conducting back', () => {
    for (const bad of [0, -1, NaN, Infinity, 100_001]) {
      expect(() => thicknessFactor({ thickness_um: bad, spacing_mm: 1, back: 'insulating' })).toThrow(CoreError)
    }
    for (const bad of [0, -1, NaN, Infinity]) {
      expect(() => thicknessFactor({ thickness_um: 500, spacing_mm: bad, back: 'insulating' })).toThrow(CoreError)
    }
    expect(() => at(0.009, 'conducting')).toThrow(CoreError)
  })
})
