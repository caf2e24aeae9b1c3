import { coefficient } from '../../units/formula'
import type { Dopant } from '../dopants'
import type { MobilityModel, MobilityQuery } from '../mobility-model'

/** Table I of the paper. Cs of arsenic is 3.43e20; the 3.34e20 met in some program defaults is a transposition. */
const electronFits = {
  arsenic: { mu0: 52.2, muMax: 1417, mu1: 43.4, cr: 9.68e16, alpha: 0.68, cs: 3.43e20, beta: 2 },
  phosphorus: { mu0: 68.5, muMax: 1414, mu1: 56.1, cr: 9.2e16, alpha: 0.711, cs: 3.41e20, beta: 1.98 },
} as const
const holeFit = { mu0: 44.9, muMax: 470.5, mu1: 29, cr: 2.23e17, alpha: 0.719, cs: 6.1e20, beta: 2, pc: 9.23e16 }

/** The paper fits majority carriers; a minority carrier takes the set of the other type's commonest dopant. */
function electronFitOf(dopant: Dopant) {
  return dopant === 'arsenic' ? electronFits.arsenic : electronFits.phosphorus
}

function electronMobility(dopant: Dopant, impurity_cm3: number): number {
  const { mu0, muMax, mu1, cr, alpha, cs, beta } = electronFitOf(dopant)
  const scattered = (muMax - mu0) / (1 + Math.pow(impurity_cm3 / cr, alpha))
  return mu0 + scattered - mu1 / (1 + Math.pow(cs / impurity_cm3, beta))
}

function holeMobility(impurity_cm3: number): number {
  const { mu0, muMax, mu1, cr, alpha, cs, beta, pc } = holeFit
  // muMax, not muMax - mu0: the first term of the hole formula vanishes in pure silicon.
  const scattered = muMax / (1 + Math.pow(impurity_cm3 / cr, alpha))
  return mu0 * Math.exp(-pc / impurity_cm3) + scattered - mu1 / (1 + Math.pow(cs / impurity_cm3, beta))
}

/**
 * Drift mobility at 300 K from the carrier density of As-, P- and B-doped silicon.
 *
 * @param carrier       electron or hole
 * @param dopant        arsenic and phosphorus differ for electrons; boron for holes
 * @param impurity_cm3  total ionised impurity density, >= 0 [cm^-3]
 * @param temperature_K not used: the fit is at 300 K
 * @returns mobility [cm^2/(V s)]: muMax in pure silicon; mu0 - mu1 at very high doping
 *
 * Assumes full ionisation: the paper's argument is the carrier density, here the impurity density.
 * Minority carriers: holes in n-type take the boron set, electrons in p-type the phosphorus set, though the paper
 * measured majority carriers alone.
 * Accuracy: within 11 % of the resistivities of SEMI MF723 from 1e13 to 1e20 cm^-3.
 * Source: G. Masetti, M. Severi, S. Solmi, IEEE Trans. Electron Devices 30 (1983) 764-769, Table I.
 */
export function masettiMobility_cm2_per_Vs({ carrier, dopant, impurity_cm3 }: MobilityQuery): number {
  return carrier === 'electron' ? electronMobility(dopant, impurity_cm3) : holeMobility(impurity_cm3)
}

/** The fitted numbers as text. */
function inWords({
  mu0,
  muMax,
  mu1,
  cr,
  alpha,
  cs,
  beta,
}: typeof holeFit | (typeof electronFits)[keyof typeof electronFits]): string {
  return `μ₀ ${mu0}, μ_max ${muMax}, μ₁ ${mu1}, C_r ${coefficient(cr)}, α ${alpha}, C_s ${coefficient(cs)}, β ${beta}`
}

export const masetti = {
  id: 'masetti',
  title: 'Masetti, Severi and Solmi',
  formula:
    'electrons: μ = μ₀ + (μ_max − μ₀)/(1 + (N/C_r)^α) − μ₁/(1 + (C_s/N)^β); holes: μ = μ₀ exp(−p_c/N) + μ_max/(1 + (N/C_r)^α) − μ₁/(1 + (C_s/N)^β)',
  coefficients: [
    `electrons, phosphorus: ${inWords(electronFits.phosphorus)}`,
    `electrons, arsenic: ${inWords(electronFits.arsenic)}`,
    `holes, boron: ${inWords(holeFit)}, p_c ${coefficient(holeFit.pc)}`,
  ],
  source: 'G. Masetti, M. Severi, S. Solmi, IEEE Trans. Electron Devices 30 (1983) 764',
  dopants: ['boron', 'phosphorus', 'arsenic'],
  range_cm3: { min: 1e13, max: 1e21 },
  temperature_K: { min: 300, max: 300 },
  mobility_cm2_per_Vs: masettiMobility_cm2_per_Vs,
} as const satisfies MobilityModel
