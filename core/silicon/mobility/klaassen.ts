import { coefficient } from '../../units/formula'
import { findRoot } from '../../numeric/find-root'
import { isAcceptor } from '../dopants'
import type { Dopant } from '../dopants'
import type { MobilityModel, MobilityQuery } from '../mobility-model'

interface MajorityFit {
  readonly muMax: number
  readonly muMin: number
  readonly reference: number
  readonly alpha: number
  readonly theta: number
}

const fits: Readonly<Record<Dopant, MajorityFit>> = {
  phosphorus: { muMax: 1414, muMin: 68.5, reference: 9.2e16, alpha: 0.711, theta: 2.285 },
  arsenic: { muMax: 1417, muMin: 52.2, reference: 9.68e16, alpha: 0.68, theta: 2.285 },
  boron: { muMax: 470.5, muMin: 44.9, reference: 2.23e17, alpha: 0.719, theta: 2.247 },
}

/** Effective masses over the electron's rest mass. */
const electronMass = 1
const holeMass = 1.258

/**
 * Fifth coefficient of F(P). Table 2 of the paper prints -0.01552; -0.8552 is what reproduces the paper's own figures 6
 * and 7, and is used here. It enters minority mobility alone: holes in 1e18 phosphorus 194.6 instead of 184.0.
 */
const r5 = -0.8552

/** Clustering of impurities at very high density: the factor by which they scatter more. */
function clusteredDensity_cm3(dopant: Dopant, density_cm3: number): number {
  const [c, reference] = isAcceptor(dopant) ? [0.5, 7.2e20] : [0.21, 4e20]
  return density_cm3 * (1 + 1 / (c + Math.pow(reference / density_cm3, 2)))
}

/** Scattering by impurities that repel the carrier, over that by impurities that attract it; before the floor. */
function repulsion(p: number, mass: number, tn: number): number {
  const first = 0.41372 + p * Math.pow(tn / mass, 0.28227)
  const second = p * Math.pow(mass / tn, 0.72169)
  return 1 - 0.89233 * Math.pow(first, -0.19778) + 0.005978 * Math.pow(second, -1.80618)
}

/** d/dP of `repulsion`, to find its minimum. */
function repulsionSlope(p: number, mass: number, tn: number): number {
  const inFirst = Math.pow(tn / mass, 0.28227)
  const inSecond = Math.pow(mass / tn, 0.72169)
  const first = 0.89233 * 0.19778 * inFirst * Math.pow(0.41372 + p * inFirst, -1.19778)
  return first - 0.005978 * 1.80618 * inSecond * Math.pow(p * inSecond, -2.80618)
}

/** The P below which `repulsion` would rise again, which the paper holds at its minimum: 0.3246 for electrons at 300 K. */
export function repulsionMinimumAt(mass: number, tn: number): number {
  const f = (logP: number) => repulsionSlope(Math.exp(logP), mass, tn)
  return Math.exp(findRoot({ f, low: Math.log(1e-3), high: Math.log(1e2), tolerance: 1e-9 }))
}

function screening(scatterers_cm3: number, carriers_cm3: number, mass: number, tn: number): number {
  const conwellWeisskopf = 3.97e13 * Math.pow(Math.pow(tn, 3) / scatterers_cm3, 2 / 3)
  const brooksHerring = (1.36e20 / carriers_cm3) * mass * tn * tn
  return 1 / (2.459 / conwellWeisskopf + 3.828 / brooksHerring)
}

/** Density with which the impurities and the majority carriers act on a minority carrier, over all scatterers. */
function minorityScatterers_cm3(clustered: number, majority: number, mass: number, otherMass: number, tn: number) {
  const p = screening(clustered + majority, majority, mass, tn)
  // Where the slope is already positive P is above the minimum, which needn't be sought.
  const g = repulsion(repulsionSlope(p, mass, tn) < 0 ? repulsionMinimumAt(mass, tn) : p, mass, tn)
  const pr = Math.pow(p, 0.6478)
  const massRatio = mass / otherMass
  const f = (0.7643 * pr + 2.2999 + 6.5502 * massRatio) / (pr + 2.367 + r5 * massRatio)
  return g * clustered + majority / f
}

/**
 * Klaassen's unified mobility: majority and minority carriers from one formula, with temperature.
 *
 * @param carrier       electron or hole, majority or minority
 * @param dopant        majority electrons tell arsenic from phosphorus; minority electrons take phosphorus's lattice fit
 * @param impurity_cm3  > 0 [cm^-3]; 0 gives the lattice mobility
 * @param temperature_K about 200 to 500 [K]
 * @returns mobility [cm^2/(V s)]: the lattice mobility muMax (300 / T)^theta in pure silicon
 *
 * Enters as one term of conductivity. Assumes every impurity is of the dopant's type and ionised (majority carriers as
 * many as impurities, no minority carriers): exact for uncompensated silicon, an approximation in a compensated layer.
 * Accuracy: equal to Masetti's electrons below 1e18 cm^-3 by construction. The ranges of density and temperature are from memory.
 * Sources: D. B. M. Klaassen, Solid-State Electron. 35 (1992) 953-959 and 961-967.
 * Note: r5, the fifth coefficient of F(P), is -0.8552 here, not the -0.01552 of Table 2: see above.
 */
export function klaassenMobility_cm2_per_Vs(query: MobilityQuery): number {
  const { carrier, dopant, impurity_cm3, temperature_K } = query
  const tn = temperature_K / 300
  const isMajority = (carrier === 'hole') === isAcceptor(dopant)
  const { muMax, muMin, reference, alpha, theta } =
    fits[isMajority ? dopant : carrier === 'hole' ? 'boron' : 'phosphorus']
  const lattice = muMax * Math.pow(tn, -theta)
  if (impurity_cm3 === 0) return lattice
  const mass = carrier === 'electron' ? electronMass : holeMass
  const otherMass = carrier === 'electron' ? holeMass : electronMass
  const clustered = clusteredDensity_cm3(dopant, impurity_cm3)
  const all = isMajority ? clustered : clustered + impurity_cm3
  const effective = isMajority ? clustered : minorityScatterers_cm3(clustered, impurity_cm3, mass, otherMass, tn)
  const muN = ((muMax * muMax) / (muMax - muMin)) * Math.pow(tn, 3 * alpha - 1.5)
  const muC = ((muMax * muMin) / (muMax - muMin)) * Math.pow(tn, -0.5)
  const scattered = muN * (all / effective) * Math.pow(reference / all, alpha) + muC * (impurity_cm3 / effective)
  return 1 / (1 / lattice + 1 / scattered)
}

function inWords({ muMax, muMin, reference, alpha, theta }: MajorityFit): string {
  return `μ_max ${muMax}, μ_min ${muMin}, N_ref ${coefficient(reference)}, α ${alpha}, θ ${theta}`
}

export const klaassen = {
  id: 'klaassen',
  title: 'Klaassen, unified',
  formula:
    '1/μ = 1/μ_L + 1/μ_i; μ_L = μ_max T_n^−θ; μ_i = μ_N (N_sc/N_eff) (N_ref/N_sc)^α + μ_C (c/N_eff), c the majority carriers; μ_N = μ_max²/(μ_max − μ_min) T_n^(3α−1.5), μ_C = μ_max μ_min/(μ_max − μ_min) T_n^−½; T_n = T/300 K; majority carriers: N_sc = N_eff = N*, N* the clustered density; minority carriers: N_sc = N* + c, N_eff = G(P) N* + c/F(P), with the μ_max, μ_min, N_ref, α, θ of boron for holes and of phosphorus for electrons',
  coefficients: [
    `electrons, phosphorus: ${inWords(fits.phosphorus)}`,
    `electrons, arsenic: ${inWords(fits.arsenic)}`,
    `holes, boron: ${inWords(fits.boron)}`,
    `clustering: N* = N (1 + 1/(0.21 + (4e20/N)²)) of donors, N (1 + 1/(0.5 + (7.2e20/N)²)) of acceptors`,
    `P = 1/(2.459/P_CW + 3.828/P_BH), P_CW = 3.97e13 (T_n³/N_sc)^⅔, P_BH = (1.36e20/c) m T_n², m = ${electronMass} for electrons, ${holeMass} for holes`,
    `G = 1 − 0.89233/(0.41372 + P (T_n/m)^0.28227)^0.19778 + 0.005978/(P (m/T_n)^0.72169)^1.80618, held at its minimum below it`,
    `F = (0.7643 P^0.6478 + 2.2999 + 6.5502 m/m′)/(P^0.6478 + 2.367 + r₅ m/m′), m′ of the other carrier, r₅ = ${r5} (Table 2 prints −0.01552, which doesn’t give the paper’s figures)`,
  ],
  source: 'D. B. M. Klaassen, Solid-State Electron. 35 (1992) 953 and 961',
  dopants: ['boron', 'phosphorus', 'arsenic'],
  range_cm3: { min: 1e13, max: 1e21 },
  temperature_K: { min: 200, max: 500 },
  mobility_cm2_per_Vs: klaassenMobility_cm2_per_Vs,
} as const satisfies MobilityModel
