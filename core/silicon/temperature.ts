/**
 * Resistivity of bulk silicon referred to 23 C, or another reference, by the temperature coefficients of SEMI MF1527.
 *
 * Convention: rho(23 C) = rho(T) (1 - C_T (T - 23)), C_T in 1/C at the resistivity that the piece has at 23 C.
 */
import { coefficient } from '../units/formula'
import { requireRange } from '../problems/problem'
import { STANDARD_TEMPERATURE_C } from '../units/constants'
import type { Dopant } from './dopants'

/** Where the correction is established [degrees C]. */
export const CORRECTION_RANGE_C = { min: 18, max: 28 } as const
/** Where the coefficient was fitted [ohm cm]; outside, its value at the end is used and said so. */
export const COEFFICIENT_RANGE_OHM_CM = { min: 0.001, max: 500 } as const

export const TEMPERATURE_SOURCE =
  'SEMI MF1527-1104, table R2-1, after W. M. Bullis, F. H. Brewer, C. D. Kolstad, L. J. Swartzendruber, Solid-State Electron. 11 (1968) 639'

/** Coefficients of ln(rho)^n, C_T in percent per degree. */
const phosphorusCoefficients = Float64Array.of(
  7.364e-1, 6.56e-2, -3.075e-2, -2.427e-3, 7.5883e-3, 7.5541e-4, -1.3976e-3, -1.159e-6, 1.106882e-4, -4.56719e-6,
  -4.407686e-6, 2.601512e-7, 9.40856e-8, -6.1907e-9, -1.032377e-9, 6.890181e-11, 4.58514e-12, -2.94332e-13,
) // prettier-ignore
const boronCoefficients = Float64Array.of(
  7.068e-1,
  8.544e-2,
  -1.478e-2,
  1.635e-3,
  -2.003e-3,
  3.415e-4,
  2.0915e-4,
  -4.3237e-5,
  -7.0532e-6,
  1.60868e-6,
  1.0346e-7,
  -2.5201e-8,
  -5.6419e-10,
  1.4445e-10,
)

/** The standard tells n-type from p-type by phosphorus and boron; arsenic takes phosphorus's. */
const coefficients: Readonly<Record<Dopant, Float64Array>> = {
  boron: boronCoefficients,
  phosphorus: phosphorusCoefficients,
  arsenic: phosphorusCoefficients,
}

/** C_T [%/C] as text, a line a type. */
export const COEFFICIENTS_IN_WORDS: readonly string[] = [
  `n-type: c₀ … c₁₇ = ${Array.from(phosphorusCoefficients, coefficient).join(', ')}`,
  `p-type: c₀ … c₁₃ = ${Array.from(boronCoefficients, coefficient).join(', ')}`,
]

/** [%/C], held at its ends outside the fitted range; no check. */
export function coefficientAt(dopant: Dopant, resistivity_ohm_cm: number): number {
  const powers = coefficients[dopant]
  const { min, max } = COEFFICIENT_RANGE_OHM_CM
  const x = Math.log(Math.min(max, Math.max(min, resistivity_ohm_cm)))
  let sum = 0
  for (let n = powers.length - 1; n >= 0; n--) sum = sum * x + powers[n]
  return sum
}

export interface TemperatureCoefficient {
  readonly coefficient_percent_per_C: number
  /** Whether the resistivity lay outside the fitted range and the coefficient at its end was taken. */
  readonly isClamped: boolean
}

/**
 * Temperature coefficient of resistivity of bulk silicon at 23 C.
 *
 * @param dopant             boron, or phosphorus; arsenic takes the phosphorus fit
 * @param resistivity_ohm_cm at 23 C, > 0; fitted from 0.001 to 500 [ohm cm]
 * @returns C_T [%/C]: 0.83 to 0.90 in high resistivity, near zero at 0.01 ohm cm, and whether it was clamped
 * @throws CoreError out-of-range
 *
 * Assumes bulk: for a diffused or implanted layer the coefficient depends on the profile and must be measured (MF1529).
 * Accuracy: +-0.02 %/C of the curve through the measurements.
 * Sources: SEMI MF1527-1104, table R2-1. W. M. Bullis et al., Solid-State Electron. 11 (1968) 639-646.
 */
export function temperatureCoefficient({
  dopant,
  resistivity_ohm_cm,
}: {
  readonly dopant: Dopant
  readonly resistivity_ohm_cm: number
}): TemperatureCoefficient {
  requireRange('resistivity', resistivity_ohm_cm, 'ohm cm', Number.MIN_VALUE, Number.MAX_VALUE)
  return {
    coefficient_percent_per_C: coefficientAt(dopant, resistivity_ohm_cm),
    isClamped: isOutsideCoefficientRange(resistivity_ohm_cm),
  }
}

export function isOutsideCoefficientRange(resistivity_ohm_cm: number): boolean {
  return resistivity_ohm_cm < COEFFICIENT_RANGE_OHM_CM.min || resistivity_ohm_cm > COEFFICIENT_RANGE_OHM_CM.max
}

/** 1 - C_T (T - 23): multiplies a resistivity at T to give the one at 23 C; no check. */
export function factorToStandard(coefficient_percent_per_C: number, temperature_C: number): number {
  return 1 - (coefficient_percent_per_C / 100) * (temperature_C - STANDARD_TEMPERATURE_C)
}

export interface TemperatureStep {
  /** -10 to 10, referred to 23 C [%/C]. */
  readonly coefficient_percent_per_C: number
  /** -50 to 200; established from 18 to 28 [degrees C]. */
  readonly measured_C: number
  /** As `measured_C`. */
  readonly reference_C: number
}

function requireStep({ coefficient_percent_per_C, measured_C, reference_C }: TemperatureStep): void {
  requireRange('temperature coefficient', coefficient_percent_per_C, '%/C', -10, 10)
  requireRange('measured temperature', measured_C, 'C', -50, 200)
  requireRange('reference temperature', reference_C, 'C', -50, 200)
  for (const temperature_C of [measured_C, reference_C]) {
    const factor = factorToStandard(coefficient_percent_per_C, temperature_C)
    requireRange('temperature factor to 23 C', factor, '', 0.01, 100)
  }
}

/**
 * Temperature factor: what a resistivity (or sheet resistance) at the measured temperature is multiplied by to give that at
 * the reference: (1 - C_T (T - 23)) / (1 - C_T (T_ref - 23)), that is from T to 23 C and from there to T_ref.
 *
 * @returns factor [-]: 1 when the temperatures are equal; 1 - C_T (T - 23) when the reference is 23 C
 * @throws CoreError out-of-range, also where the straight line would bring resistivity near zero
 *
 * Assumes resistivity linear in temperature: established for silicon from 18 to 28 C; the caller flags what lies outside.
 * Source: SEMI MF1527 eq. R2-12, SEMI MF43 eq. 9.
 */
export function temperatureFactor(step: TemperatureStep): number {
  requireStep(step)
  const { coefficient_percent_per_C: coefficient, measured_C, reference_C } = step
  return factorToStandard(coefficient, measured_C) / factorToStandard(coefficient, reference_C)
}

/**
 * d ln(temperature factor) / dT at the measured temperature [1/C], for the uncertainty: about -C_T.
 *
 * @throws CoreError as `temperatureFactor`
 */
export function temperatureFactorSlope_per_C(step: TemperatureStep): number {
  requireStep(step)
  return factorSlope_per_C(step.coefficient_percent_per_C, step.measured_C)
}

/** The same; no check. */
export function factorSlope_per_C(coefficient_percent_per_C: number, measured_C: number): number {
  return -coefficient_percent_per_C / 100 / factorToStandard(coefficient_percent_per_C, measured_C)
}
