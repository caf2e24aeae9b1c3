import { describe, expect, it } from 'vitest'
import { dualSheetResistance } from '../../../core/geometry/dual'
import { dualThicknessFactor } from '../../../core/geometry/dual-thickness'
import { thicknessFactor } from '../../../core/geometry/thickness'
import { CoreError } from '../../../core/problems/problem'

const at = (ratio: number) => dualThicknessFactor({ thickness_um: 1000 * ratio, spacing_mm: 1 })

/** V/I of a slab of rho = 2 pi by plain images, tail by Richardson: signs and distances of one configuration. */
function byImages(terms: readonly (readonly [number, number])[], w: number): number {
  const sum = (count: number) => {
    let total = 0
    for (const [sign, r] of terms) {
      total += sign / r
      for (let n = 1; n <= count; n++) total += (2 * sign) / Math.sqrt(r * r + (2 * n * w) ** 2)
    }
    return total
  }
  const [few, many] = [1500, 3000]
  const weight = (few + 0.5) ** 2 / ((many + 0.5) ** 2 - (few + 0.5) ** 2)
  return sum(many) + weight * (sum(many) - sum(few))
}

describe('dualThicknessFactor', () => {
  it.each([
    [0.3, 1.0000482],
    [0.5, 1.0040705],
    [0.7, 1.0286419],
    [1, 1.1280196],
    [1.5, 1.4260012],
  ])('w/S = %f: the dual reading over rho/w, independently computed', (ratio, expected) => {
    expect(Math.abs(1 / at(ratio).value - expected)).toBeLessThan(5.1e-8)
  })

  it('is exactly 1 for a thin slab and falls faster than the single configuration', () => {
    expect(at(0.01).value).toBe(1)
    for (const ratio of [0.3, 0.5, 1, 3, 50]) {
      const single = thicknessFactor({ thickness_um: 1000 * ratio, spacing_mm: 1, back: 'insulating' }).value
      expect(at(ratio).value).toBeLessThan(single)
    }
  })

  it('the derivative agrees with central differences', () => {
    for (const ratio of [0.2, 0.5, 0.9, 1.7, 6, 60]) {
      const h = 1e-5
      const slope = Math.log(at(ratio * Math.exp(h)).value / at(ratio * Math.exp(-h)).value) / (2 * h)
      expect(at(ratio).dLnRatio).toBeCloseTo(slope, 8)
    }
  })

  it('a second route: plain images in both configurations', () => {
    for (const ratio of [0.4, 0.8, 1.5, 4]) {
      const a = byImages([[2, 1], [-2, 2]], ratio) // prettier-ignore
      const b = byImages([[2, 1], [-1, 1], [-1, 3]], ratio) // prettier-ignore
      const { sheetResistance_ohm_sq } = dualSheetResistance({ resistanceA_ohm: a, resistanceB_ohm: b })
      // rho/w = 2 pi/w.
      expect((at(ratio).value * sheetResistance_ohm_sq * ratio) / (2 * Math.PI)).toBeCloseTo(1, 9)
    }
  })

  it('refuses what is not positive or too thick', () => {
    for (const bad of [0, -1, NaN, 101]) expect(() => at(bad)).toThrow(CoreError)
    expect(() => dualThicknessFactor({ thickness_um: 500, spacing_mm: 0 })).toThrow(CoreError)
  })
})
