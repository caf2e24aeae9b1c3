import { expect, it } from 'vitest'
import { CoreError } from '../../../../core/problems/problem'
import { isResistivityCurve, mf723, mf723Mobility_cm2_per_Vs } from '../../../../core/silicon/mobility/mf723'
import { mobilityModels } from '../../../../core/silicon/mobility/registry'
import { mf723Resistivity_ohm_cm } from '../../../../core/silicon/mf723'

it('is the mobility that gives the standard its resistivity back', () => {
  for (const [carrier, dopant] of [
    ['hole', 'boron'],
    ['electron', 'phosphorus'],
    ['electron', 'arsenic'],
  ] as const) {
    for (const impurity_cm3 of [1e12, 1e16, 1e19, 4e20]) {
      const mobility = mf723Mobility_cm2_per_Vs({ carrier, dopant, impurity_cm3, temperature_K: 300 })
      const charge = 1.602e-19 // enough digits for 2e-4
      const product =
        charge * impurity_cm3 * mobility * mf723Resistivity_ohm_cm({ dopant, concentration_cm3: impurity_cm3 })
      expect(Math.abs(product - 1)).toBeLessThan(2e-4)
    }
  }
})

it('knows nothing of minority carriers and says so', () => {
  for (const [carrier, dopant] of [
    ['electron', 'boron'],
    ['hole', 'phosphorus'],
  ] as const) {
    expect(() => mf723Mobility_cm2_per_Vs({ carrier, dopant, impurity_cm3: 1e16, temperature_K: 300 })).toThrow(
      CoreError,
    )
  }
})

it('is the one model of the register made from a resistivity curve', () => {
  expect(mobilityModels.filter((model) => isResistivityCurve(model)).map(({ id }) => id)).toEqual(['mf723'])
  expect(mf723.curvePieces('arsenic').map(({ min_cm3, max_cm3 }) => [min_cm3, max_cm3])).toEqual([
    [1e12, 1e19],
    [1e19, 6e20],
  ])
})
