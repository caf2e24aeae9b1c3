import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../core/problems/problem'
import {
  carrierProduct_cm6,
  intrinsicDensity_cm3,
  misiakosTsamakisDensity_cm3,
  sproulGreenDensity_cm3,
} from '../../../core/silicon/intrinsic-density'
import { MISIAKOS_TSAMAKIS, MISIAKOS_TSAMAKIS_POINTS, SPROUL_GREEN } from '../../reference/intrinsic-density'

describe('published values', () => {
  it.each(MISIAKOS_TSAMAKIS)('Misiakos and Tsamakis 1993 at %d K', (temperature_K, expected) => {
    expect(Math.abs(misiakosTsamakisDensity_cm3({ temperature_K }) / expected - 1)).toBeLessThan(1e-5)
  })

  it.each(MISIAKOS_TSAMAKIS_POINTS.slice(1, 5))('their own point at %d K', (temperature_K, expected) => {
    expect(Math.abs(misiakosTsamakisDensity_cm3({ temperature_K }) / expected - 1)).toBeLessThan(0.043)
  })

  it.each(SPROUL_GREEN)('Sproul and Green 1991 at %d K', (temperature_K, expected) => {
    expect(Math.abs(sproulGreenDensity_cm3({ temperature_K }) / expected - 1)).toBeLessThan(1e-5)
  })
})

it('takes Misiakos and Tsamakis for the default, and its square for n p', () => {
  expect(intrinsicDensity_cm3({ temperature_K: 296.15 })).toBe(misiakosTsamakisDensity_cm3({ temperature_K: 296.15 }))
  expect(carrierProduct_cm6({ temperature_K: 300 })).toBeCloseTo(9.4005e19, -16)
})

it('rises with temperature over its whole range, and the two fits stay within 5 % of each other where both hold', () => {
  for (let t = 78; t < 340; t++) {
    expect(intrinsicDensity_cm3({ temperature_K: t + 1 })).toBeGreaterThan(intrinsicDensity_cm3({ temperature_K: t }))
  }
  for (let t = 275; t <= 340; t += 5) {
    const ratio = sproulGreenDensity_cm3({ temperature_K: t }) / intrinsicDensity_cm3({ temperature_K: t })
    expect(Math.abs(ratio - 1)).toBeLessThan(0.05)
  }
})

it('refuses what was not measured', () => {
  for (const temperature_K of [77.9, 340.1, NaN, -1])
    expect(() => intrinsicDensity_cm3({ temperature_K })).toThrow(CoreError)
  for (const temperature_K of [274, 376]) expect(() => sproulGreenDensity_cm3({ temperature_K })).toThrow(CoreError)
})
