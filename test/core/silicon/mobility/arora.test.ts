import { expect, it } from 'vitest'
import { aroraMobility_cm2_per_Vs } from '../../../../core/silicon/mobility/arora'

it('has 0.88 Tn^-0.146 for its exponent, not for a factor', () => {
  // Normalised form, as simulators print it: 1252 and 407 at 300 K.
  for (const temperature_K of [250, 400, 500]) {
    const tn = temperature_K / 300
    for (const [carrier, floor, rise, exponent, reference] of [
      ['electron', 88, 1252, -2.33, 1.26e17],
      ['hole', 54.3, 407, -2.23, 2.35e17],
    ] as const) {
      for (const impurity_cm3 of [1e15, 1e17, 1e19]) {
        const expected =
          floor * tn ** -0.57 +
          (rise * tn ** exponent) / (1 + (impurity_cm3 / (reference * tn ** 2.4)) ** (0.88 * tn ** -0.146))
        const found = aroraMobility_cm2_per_Vs({ carrier, dopant: 'boron', impurity_cm3, temperature_K })
        // 1252 and 407 are rounded to 2e-4.
        expect(Math.abs(found / expected - 1)).toBeLessThan(2e-4)
      }
    }
  }
})

it('falls with temperature in dilute silicon', () => {
  const at = (temperature_K: number) =>
    aroraMobility_cm2_per_Vs({ carrier: 'electron', dopant: 'phosphorus', impurity_cm3: 1e15, temperature_K })
  expect(at(350)).toBeLessThan(at(300))
  expect(at(300)).toBeLessThan(at(250))
})
