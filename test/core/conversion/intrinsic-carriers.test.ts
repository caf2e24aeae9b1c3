import { describe, expect, it } from 'vitest'
import { intrinsicCarriers_cm3, isCarriedOn } from '../../../core/conversion/intrinsic-carriers'
import { CoreError } from '../../../core/problems/problem'
import { misiakosTsamakisDensity_cm3, sproulGreenDensity_cm3 } from '../../../core/silicon/intrinsic-density'
import { effectiveMassDensity_cm3 } from '../../reference/intrinsic-density-by-masses'

const at = (temperature_K: number) => intrinsicCarriers_cm3({ temperature_K })

it('is Misiakos and Tsamakis 1993 to 340 K, and says where it no longer is', () => {
  for (let t = 78; t <= 340; t += 2) expect(at(t)).toBe(misiakosTsamakisDensity_cm3({ temperature_K: t }))
  expect([isCarriedOn(340), isCarriedOn(340.1)]).toEqual([false, true])
})

describe('beyond', () => {
  it('Sproul and Green 1991: within 3 % to 375 K', () => {
    for (let t = 341; t <= 375; t++) expect(Math.abs(at(t) / sproulGreenDensity_cm3({ temperature_K: t }) - 1)).toBeLessThan(0.03)
  }) // prettier-ignore

  it('densities of states by effective masses: within 4 % to 500 K', () => {
    for (let t = 340; t <= 500; t += 5) expect(Math.abs(at(t) / effectiveMassDensity_cm3(t) - 1)).toBeLessThan(0.04)
  })

  it('goes on by the same law: no step, and the law is that of the relation itself', () => {
    expect(at(340 + 1e-9) / at(340) - 1).toBeLessThan(1e-9)
    // ln(ni / T^2.54) is a straight line in 1/T, above as below.
    const line = (t: number) => Math.log(at(t) / t ** 2.54)
    const slope = (a: number, b: number) => (line(a) - line(b)) / (1 / a - 1 / b)
    expect(Math.abs(slope(250, 340) / slope(350, 500) - 1)).toBeLessThan(1e-12)
  })
})

it.each([NaN, 0, 77, 501, Infinity])('refuses %d K', (temperature_K) => {
  expect(() => at(temperature_K)).toThrow(CoreError)
})
