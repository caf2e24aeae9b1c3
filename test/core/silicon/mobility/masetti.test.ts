import { expect, it } from 'vitest'
import { masettiMobility_cm2_per_Vs } from '../../../../core/silicon/mobility/masetti'

const at = (carrier: 'electron' | 'hole', dopant: 'boron' | 'phosphorus' | 'arsenic', impurity_cm3: number) =>
  masettiMobility_cm2_per_Vs({ carrier, dopant, impurity_cm3, temperature_K: 300 })

it('takes phosphorus for electrons in p-type and boron for holes in n-type', () => {
  for (const density of [1e14, 1e17, 1e20]) {
    expect(at('electron', 'boron', density)).toBe(at('electron', 'phosphorus', density))
    expect(at('hole', 'arsenic', density)).toBe(at('hole', 'boron', density))
  }
})

it('makes electrons slower among arsenic than among phosphorus above 1e19, as the paper reports', () => {
  for (const density of [1e19, 1e20, 5e20])
    expect(at('electron', 'arsenic', density)).toBeLessThan(at('electron', 'phosphorus', density))
})
