import { coefficient } from '../../units/formula'
import type { MobilityModel, MobilityQuery } from '../mobility-model'

const electronFit = { muMin: 65, muMax: 1330, reference: 8.5e16, alpha: 0.72 }
const holeFit = { muMin: 47.7, muMax: 495, reference: 6.3e16, alpha: 0.76 }

/**
 * Drift mobility at 300 K from impurity density, the same for every dopant of a type.
 *
 * @param carrier       electron or hole
 * @param impurity_cm3  total ionised impurity density, >= 0 [cm^-3]
 * @param temperature_K not used: the fit is at 300 K
 * @returns mobility [cm^2/(V s)]: muMax in pure silicon, muMin at very high doping
 *
 * Accuracy: older than the resistivity standards; its holes at 1e17 cm^-3 are 25 % slower than SEMI MF723 implies.
 * Minority carriers take the majority fit. The range of densities and the hole's 47.7 and 495 are from memory.
 * Source: D. M. Caughey, R. E. Thomas, Proc. IEEE 55 (1967) 2192-2193.
 */
export function caugheyThomasMobility_cm2_per_Vs({ carrier, impurity_cm3 }: MobilityQuery): number {
  const { muMin, muMax, reference, alpha } = carrier === 'electron' ? electronFit : holeFit
  return muMin + (muMax - muMin) / (1 + Math.pow(impurity_cm3 / reference, alpha))
}

function inWords({ muMin, muMax, reference, alpha }: typeof electronFit): string {
  return `μ_min ${muMin}, μ_max ${muMax}, N_ref ${coefficient(reference)}, α ${alpha}`
}

export const caugheyThomas = {
  id: 'caughey-thomas',
  title: 'Caughey and Thomas',
  formula: 'μ = μ_min + (μ_max − μ_min)/(1 + (N/N_ref)^α)',
  coefficients: [`electrons: ${inWords(electronFit)}`, `holes: ${inWords(holeFit)}`],
  source: 'D. M. Caughey, R. E. Thomas, Proc. IEEE 55 (1967) 2192',
  dopants: ['boron', 'phosphorus', 'arsenic'],
  range_cm3: { min: 1e14, max: 1e20 },
  temperature_K: { min: 300, max: 300 },
  mobility_cm2_per_Vs: caugheyThomasMobility_cm2_per_Vs,
} as const satisfies MobilityModel
