/**
 * Conversion between resistivity and dopant density of uncompensated silicon at 23 C, as standardised by
 * ASTM F723-99, now SEMI MF723. Dopant density, not carrier density (section 1.4 of the standard).
 *
 * The standard publishes each direction as a fit of its own. They are kept here as published, but they are not
 * inverses of one another: boron returns within 3 % of its start, phosphorus within 7 %. The tool uses density to
 * resistivity alone and inverts it numerically, so that a displayed pair always agrees.
 *
 * Sources: ASTM F723-99 / SEMI MF723. W. R. Thurber, R. L. Mattis, Y. M. Liu, J. J. Filliben, J. Electrochem. Soc. 127
 * (1980) 1807 (phosphorus) and 2291 (boron).
 */
import { coefficient } from '../units/formula'
import { CoreError, requireRange } from '../problems/problem'
import type { Dopant } from './dopants'

export interface Range {
  readonly min: number
  readonly max: number
}

/** Where density to resistivity is published [cm^-3]. Arsenic has its own fit from `ARSENIC_FIT_FROM_CM3` up. */
export const MF723_DENSITY_RANGE_CM3: Readonly<Record<Dopant, Range>> = {
  boron: { min: 1e12, max: 1e21 },
  phosphorus: { min: 1e12, max: 5e20 },
  arsenic: { min: 1e12, max: 6e20 },
}

/** Where resistivity to density is published [ohm cm]. None for arsenic. */
export const MF723_RESISTIVITY_RANGE_OHM_CM: Readonly<Record<'boron' | 'phosphorus', Range>> = {
  boron: { min: 1e-4, max: 1e4 },
  phosphorus: { min: 2e-4, max: 4e3 },
}

/** Arsenic's polynomial starts here; below, the standard sends arsenic to the phosphorus curve. */
export const ARSENIC_FIT_FROM_CM3 = 1e19

/**
 * Eq. 10 re-expanded about 1e20 cm^-3: coefficients of (log10 N - 20)^i, from the printed ones of (log10 N)^i in exact decimal
 * arithmetic. As printed, terms of +-1e4 cancel and leave noise of some 1e-12 in resistivity; so written they don't.
 */
const arsenicCoefficients = [
  -3.016136, -0.6515096, 0.29894928, -0.168754764, -0.4001747048, -0.04398077422, -0.002279965328, -6.60295346e-5,
  -1.07748252e-6, -8.387739e-9, -1.31657e-11,
] as const

const boronFit = { first: 1.305e16, second: 1.133e17, scale: 2.58e-19, exponent: -0.737 }
const phosphorusFit = {
  factor: 6.242e18,
  above: [-3.0769, 2.2108, -0.62272, 0.057501],
  below: [1, -0.68157, 0.19833, -0.018376],
} as const

function boronResistivity(n: number): number {
  const { first, second, scale, exponent } = boronFit
  return first / n + second / (n * (1 + Math.pow(scale * n, exponent)))
}

function phosphorusResistivity(n: number): number {
  const y = Math.log10(n) - 16
  const { factor, above: a, below: b } = phosphorusFit
  const above = a[0] + y * (a[1] + y * (a[2] + y * a[3]))
  const below = b[0] + y * (b[1] + y * (b[2] + y * b[3]))
  return (factor / n) * Math.pow(10, above / below)
}

function arsenicResistivity(n: number): number {
  const z = Math.log10(n) - 20
  let sum = 0
  for (let i = arsenicCoefficients.length - 1; i >= 0; i--) sum = sum * z + arsenicCoefficients[i]
  return Math.pow(10, sum)
}

function polynomial(coefficients: readonly number[], symbol: string): string {
  return coefficients.map((c, i) => (i === 0 ? coefficient(c) : `${coefficient(c)} ${symbol}${i === 1 ? '' : `^${i}`}`)).join(' + ').replaceAll('+ -', '− ')
} // prettier-ignore

/** The curves as text, a line a dopant. */
export const MF723_IN_WORDS: readonly string[] = [
  `boron: ρ = ${coefficient(boronFit.first)}/N + ${coefficient(boronFit.second)}/{N [1 + (${coefficient(boronFit.scale)} N)^${boronFit.exponent}]}`,
  `phosphorus: ρ = (${coefficient(phosphorusFit.factor)}/N) 10^(a/b), y = log₁₀ N − 16, a = ${polynomial(phosphorusFit.above, 'y')}, b = ${polynomial(phosphorusFit.below, 'y')}`,
  `arsenic from ${coefficient(ARSENIC_FIT_FROM_CM3)} cm⁻³ (below, as phosphorus): log₁₀ ρ = ${polynomial(arsenicCoefficients, 'z')}, z = log₁₀ N − 20`,
]

/** One smooth stretch of a published curve; both ends belong to it. */
export interface CurvePiece {
  readonly min_cm3: number
  readonly max_cm3: number
  /** No range check: runs on outside. */
  resistivity_ohm_cm(concentration_cm3: number): number
}

/** The published curves, from low density up. */
export const MF723_PIECES: Readonly<Record<Dopant, readonly CurvePiece[]>> = {
  boron: [{ min_cm3: 1e12, max_cm3: 1e21, resistivity_ohm_cm: boronResistivity }],
  phosphorus: [{ min_cm3: 1e12, max_cm3: 5e20, resistivity_ohm_cm: phosphorusResistivity }],
  arsenic: [
    { min_cm3: 1e12, max_cm3: ARSENIC_FIT_FROM_CM3, resistivity_ohm_cm: phosphorusResistivity },
    { min_cm3: ARSENIC_FIT_FROM_CM3, max_cm3: 6e20, resistivity_ohm_cm: arsenicResistivity },
  ],
}

/** The published curve without a range check, for loops whose caller keeps to `MF723_DENSITY_RANGE_CM3`. */
export function mf723Curve_ohm_cm(dopant: Dopant, concentration_cm3: number): number {
  if (dopant === 'boron') return boronResistivity(concentration_cm3)
  if (dopant === 'arsenic' && concentration_cm3 >= ARSENIC_FIT_FROM_CM3) return arsenicResistivity(concentration_cm3)
  return phosphorusResistivity(concentration_cm3)
}

/**
 * Resistivity at 23 C from dopant density.
 *
 * @param dopant            boron, phosphorus or arsenic
 * @param concentration_cm3 1e12 to 1e21 boron, 5e20 phosphorus, 6e20 arsenic [cm^-3]
 * @returns resistivity [ohm cm], falling with density; about 1.305e16 / N for dilute boron
 * @throws CoreError out-of-range: nothing is extrapolated
 *
 * Arsenic follows the phosphorus curve below 1e19 and its own polynomial from there; the two don't meet, and resistivity
 * drops by 3.8 % at 1e19. The rounding of the polynomial's printed coefficients alone allows 1.8 % in resistivity.
 * Source: SEMI MF723, equations for resistivity from density; arsenic eq. 10.
 */
export function mf723Resistivity_ohm_cm({
  dopant,
  concentration_cm3,
}: {
  readonly dopant: Dopant
  readonly concentration_cm3: number
}): number {
  const { min, max } = MF723_DENSITY_RANGE_CM3[dopant]
  requireRange('dopant density', concentration_cm3, 'cm^-3', min, max)
  return mf723Curve_ohm_cm(dopant, concentration_cm3)
}

function boronDensity(rho: number): number {
  return 1.33e16 / rho + 1.082e17 / (rho * (1 + Math.pow(54.56 * rho, 1.105)))
}

function phosphorusDensity(rho: number): number {
  const x = Math.log10(rho)
  const above = -3.1083 + x * (-3.2626 + x * (-1.2196 + x * -0.13923))
  const below = 1 + x * (1.0265 + x * (0.38755 + x * 0.041833))
  return (6.242e18 / rho) * Math.pow(10, above / below)
}

/**
 * Dopant density from resistivity at 23 C, by the standard's own fit for this direction.
 *
 * @param dopant            boron or phosphorus: none is published for arsenic
 * @param resistivity_ohm_cm 1e-4 to 1e4 boron, 2e-4 to 4000 phosphorus [ohm cm]
 * @returns dopant density [cm^-3]
 * @throws CoreError out-of-range; not-applicable for arsenic
 *
 * For comparison with other people's conversions. Not the inverse of `mf723Resistivity_ohm_cm`: going there and back
 * misses by up to 3 % (boron) or 7 % (phosphorus, near 2.1e18 cm^-3), so never show a pair made that way.
 * Source: SEMI MF723, equations for density from resistivity.
 */
export function mf723Density_cm3({
  dopant,
  resistivity_ohm_cm,
}: {
  readonly dopant: Dopant
  readonly resistivity_ohm_cm: number
}): number {
  if (dopant === 'arsenic') {
    throw new CoreError({
      kind: 'not-applicable',
      what: 'the published conversion from resistivity to density',
      why: 'SEMI MF723 gives none for arsenic; invert its density to resistivity instead',
    })
  }
  const { min, max } = MF723_RESISTIVITY_RANGE_OHM_CM[dopant]
  requireRange('resistivity', resistivity_ohm_cm, 'ohm cm', min, max)
  return dopant === 'boron' ? boronDensity(resistivity_ohm_cm) : phosphorusDensity(resistivity_ohm_cm)
}
