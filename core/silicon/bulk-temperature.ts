/**
 * The temperature factor of bulk silicon, whose coefficient depends on the resistivity that is sought: each is found from the
 * other by turns. Multiplies resistivity, and so sheet resistance, at the measured temperature.
 */
import { CoreError, requireRange } from '../problems/problem'
import type { Dopant } from './dopants'
import { coefficientAt, factorSlope_per_C, factorToStandard, isOutsideCoefficientRange } from './temperature'

/** Temperatures accepted, far wider than the 18 to 28 C over which the correction is established [degrees C]. */
export const ACCEPTED_RANGE_C = { min: -50, max: 100 } as const

/** A relative change of the factor below which the turns end, and how many are allowed; three are usual. */
const CONVERGED = 1e-13
const MOST_TURNS = 60

export interface BulkTemperatureQuery {
  /** Arsenic takes the phosphorus fit. */
  readonly dopant: Dopant
  /** As measured, at `measured_C`, > 0 [ohm cm]. */
  readonly resistivity_ohm_cm: number
  /** -50 to 100; established from 18 to 28 [degrees C]. */
  readonly measured_C: number
  /** As `measured_C`. */
  readonly reference_C: number
}

export interface BulkTemperatureFactor {
  /** Resistivity at the reference over resistivity as measured [-]. */
  readonly factor: number
  /** d ln(factor) / d(measured temperature), the coefficient held [1/C]. */
  readonly slope_per_C: number
  /** At the resistivity that the piece has at 23 C [%/C]. */
  readonly coefficient_percent_per_C: number
  readonly resistivityAt23C_ohm_cm: number
  /** Whether that resistivity lay outside 0.001 to 500 ohm cm, so that the coefficient at the end was taken. */
  readonly isClamped: boolean
}

/** The coefficient at the resistivity that the piece has at 23 C [%/C]; NaN where the turns don't settle. */
function settledCoefficient(dopant: Dopant, resistivity_ohm_cm: number, measured_C: number): number {
  let start = 1
  let image = factorToStandard(coefficientAt(dopant, resistivity_ohm_cm), measured_C)
  let factor = image
  for (let turn = 0; turn < MOST_TURNS; turn++) {
    const coefficient = coefficientAt(dopant, resistivity_ohm_cm * factor)
    const next = factorToStandard(coefficient, measured_C)
    if (Math.abs(next - factor) <= CONVERGED * next) return coefficient
    // What the turn takes off is a nearly fixed fraction of what the last took off: go at once to where that leads.
    const rate = (next - image) / (factor - start)
    start = factor
    image = next
    factor += (next - factor) / (1 - rate)
  }
  return NaN
}

/**
 * Temperature factor of bulk silicon from the resistivity as measured.
 *
 * @returns the factor, 1 when both temperatures are equal; its slope; the coefficient used
 * @throws CoreError out-of-range; not-applicable if the turns don't settle (never within the accepted range, tested)
 *
 * The coefficient is that of the resistivity at 23 C, which is not known beforehand: start from the measured resistivity, take its
 * coefficient, correct, take the coefficient of the corrected, until the factor changes by less than 1e-13.
 * Assumes bulk silicon, linear in temperature from 18 to 28 C.
 * Accuracy: +-0.02 %/C of the coefficient, 0.1 % over 5 C.
 * Source: SEMI MF1527-1104, eq. R2-12 and table R2-1; SEMI MF43 eq. 9.
 */
export function bulkTemperatureFactor(query: BulkTemperatureQuery): BulkTemperatureFactor {
  const { dopant, resistivity_ohm_cm, measured_C, reference_C } = query
  requireRange('resistivity', resistivity_ohm_cm, 'ohm cm', Number.MIN_VALUE, 1e300)
  requireRange('measured temperature', measured_C, 'C', ACCEPTED_RANGE_C.min, ACCEPTED_RANGE_C.max)
  requireRange('reference temperature', reference_C, 'C', ACCEPTED_RANGE_C.min, ACCEPTED_RANGE_C.max)
  const coefficient_percent_per_C = settledCoefficient(dopant, resistivity_ohm_cm, measured_C)
  if (Number.isNaN(coefficient_percent_per_C)) {
    throw new CoreError({ kind: 'not-applicable', what: 'temperature correction', why: 'it does not settle' })
  }
  const toStandard = factorToStandard(coefficient_percent_per_C, measured_C)
  const resistivityAt23C_ohm_cm = resistivity_ohm_cm * toStandard
  return {
    factor: measured_C === reference_C ? 1 : toStandard / factorToStandard(coefficient_percent_per_C, reference_C),
    slope_per_C: factorSlope_per_C(coefficient_percent_per_C, measured_C),
    coefficient_percent_per_C,
    resistivityAt23C_ohm_cm,
    isClamped: isOutsideCoefficientRange(resistivityAt23C_ohm_cm),
  }
}

export interface BulkTemperatureSettings {
  readonly dopant: Dopant
  readonly reference_C: number
}

export interface MeasuredColumns {
  readonly resistivity_ohm_cm: Float64Array
  readonly measured_C: Float64Array
}

export interface TemperatureColumns {
  readonly factor: Float64Array
  /** d ln(factor) / d(measured temperature) [1/C]. */
  readonly slope_per_C: Float64Array
  /** 1 where the coefficient at the end of its range was taken. */
  readonly isClamped: Uint8Array
}

/**
 * `bulkTemperatureFactor` down columns. A row whose resistivity is not a positive number, or whose temperature is not one from -50 to
 * 100 C, gets NaN in both numbers and 0 in `isClamped`.
 *
 * @throws CoreError out-of-range for the reference temperature
 */
export function bulkTemperatureFactors(
  { resistivity_ohm_cm, measured_C }: MeasuredColumns,
  { dopant, reference_C }: BulkTemperatureSettings,
  into: TemperatureColumns,
): void {
  const { min, max } = ACCEPTED_RANGE_C
  requireRange('reference temperature', reference_C, 'C', min, max)
  for (let row = 0; row < resistivity_ohm_cm.length; row++) {
    const rho = resistivity_ohm_cm[row]
    const t = measured_C[row]
    const isUsable = rho > 0 && rho <= 1e300 && t >= min && t <= max
    const coefficient = isUsable ? settledCoefficient(dopant, rho, t) : NaN
    const toStandard = factorToStandard(coefficient, t)
    into.factor[row] = isUsable && t === reference_C ? 1 : toStandard / factorToStandard(coefficient, reference_C)
    into.slope_per_C[row] = factorSlope_per_C(coefficient, t)
    into.isClamped[row] = isOutsideCoefficientRange(rho * toStandard) ? 1 : 0
  }
}
