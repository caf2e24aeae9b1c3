import { coefficient } from '../../units/formula'
import type { MobilityModel, MobilityQuery } from '../mobility-model'

const electronFit = { floor: 88, lattice: 7.4e8, latticeExponent: -2.33, reference: 1.26e17 }
const holeFit = { floor: 54.3, lattice: 1.36e8, latticeExponent: -2.23, reference: 2.35e17 }

/**
 * Drift mobility from impurity density and temperature, the same for every dopant of a type.
 *
 * @param carrier       electron or hole
 * @param impurity_cm3  total ionised impurity density, >= 0 [cm^-3]; fitted up to about 1e20
 * @param temperature_K fitted from 250 to 500 [K]
 * @returns mobility [cm^2/(V s)]: at 300 K 1340 or 461 in pure silicon, 88 or 54.3 at very high doping
 *
 * Accuracy: within 13 % of measured mobilities over that range (abstract of the paper). Minority carriers take the majority fit.
 * Source: N. D. Arora, J. R. Hauser, D. J. Roulston, IEEE Trans. Electron Devices 29 (1982) 292-295.
 * Note: 0.88 Tn^-0.146 is an exponent; abstracts that lose the superscript print it as a factor.
 */
export function aroraMobility_cm2_per_Vs({ carrier, impurity_cm3, temperature_K }: MobilityQuery): number {
  const { floor, lattice, latticeExponent, reference } = carrier === 'electron' ? electronFit : holeFit
  const tn = temperature_K / 300
  const alpha = 0.88 * Math.pow(tn, -0.146)
  const ratio = impurity_cm3 / (reference * Math.pow(tn, 2.4))
  return (
    floor * Math.pow(tn, -0.57) + (lattice * Math.pow(temperature_K, latticeExponent)) / (1 + Math.pow(ratio, alpha))
  )
}

function inWords({ floor, lattice, latticeExponent, reference }: typeof electronFit): string {
  return `μ_f ${floor}, μ_L ${coefficient(lattice)}, b ${latticeExponent}, N_ref ${coefficient(reference)}`
}

export const arora = {
  id: 'arora',
  title: 'Arora, Hauser and Roulston',
  formula: 'μ = μ_f T_n^−0.57 + μ_L T^b/(1 + (N/(N_ref T_n^2.4))^α), α = 0.88 T_n^−0.146, T_n = T/300 K',
  coefficients: [`electrons: ${inWords(electronFit)}`, `holes: ${inWords(holeFit)}`],
  source: 'N. D. Arora, J. R. Hauser, D. J. Roulston, IEEE Trans. Electron Devices 29 (1982) 292',
  dopants: ['boron', 'phosphorus', 'arsenic'],
  range_cm3: { min: 1e13, max: 1e20 },
  temperature_K: { min: 250, max: 500 },
  mobility_cm2_per_Vs: aroraMobility_cm2_per_Vs,
} as const satisfies MobilityModel
