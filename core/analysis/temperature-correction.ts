import type { Readings } from '../ingest/readings'
import type { Procedure } from '../procedure/schema'
import { ACCEPTED_RANGE_C, bulkTemperatureFactors } from '../silicon/bulk-temperature'
import { CORRECTION_RANGE_C, factorSlope_per_C, factorToStandard } from '../silicon/temperature'
import { SITE_FLAGS } from './flags'

export interface TemperatureCorrection {
  /** Multiplies sheet resistance and resistivity as measured; 1 where none is made, NaN where none can be. */
  readonly factor: Float64Array
  /** d ln(factor) per degree of the measured temperature. */
  readonly slope_per_C: Float64Array
  /** What was done, or why nothing was, as a sentence. */
  readonly note: string
  /** Where the coefficient came from; null when no correction is made. */
  readonly basis: 'given' | 'published' | null
}

/**
 * The temperature correction of every site to the procedure's reference temperature.
 *
 * @param resistivity_ohm_cm as measured and otherwise corrected; only bulk silicon without a given coefficient needs it
 */
export function temperatureCorrection(
  readings: Readings,
  procedure: Procedure,
  resistivity_ohm_cm: Float64Array | null,
  flags: Uint32Array,
): TemperatureCorrection {
  const { count } = readings
  const { referenceC, coefficientPercentPerC } = procedure.temperature
  const none = (note: string): TemperatureCorrection => ({
    factor: new Float64Array(count).fill(1),
    slope_per_C: new Float64Array(count),
    note,
    basis: null,
  })
  const measured = measuredTemperatures(readings, procedure)
  if (!measured) {
    return none('No temperature correction: neither the readings nor the procedure say how warm the wafers were.')
  }
  const to = `to ${referenceC} °C`
  if (coefficientPercentPerC !== undefined) {
    const factors = constantCoefficient(measured, coefficientPercentPerC, referenceC)
    flagTemperatures(measured, factors, flags)
    return {
      ...factors,
      note: `Corrected ${to} with the coefficient given, ${coefficientPercentPerC} %/°C.`,
      basis: 'given',
    }
  }
  if (procedure.layer.kind === 'bulk' && resistivity_ohm_cm) {
    const { dopant } = procedure.layer
    const factors = {
      factor: new Float64Array(count),
      slope_per_C: new Float64Array(count),
      isClamped: new Uint8Array(count),
    }
    bulkTemperatureFactors({ resistivity_ohm_cm, measured_C: measured }, { dopant, reference_C: referenceC }, factors)
    for (let i = 0; i < count; i++) if (factors.isClamped[i]) flags[i] |= SITE_FLAGS.temperatureCoefficientRange.bit
    leaveUnmeasured(measured, factors)
    flagTemperatures(measured, factors, flags)
    return {
      ...factors,
      note: `Corrected ${to} with the published coefficient of ${dopant}-doped silicon (SEMI MF1527).`,
      basis: 'published',
    }
  }
  return none(
    `No temperature correction ${to}: the coefficient of this layer depends on its profile or material and the procedure gives none (temperature.coefficientPercentPerC).`,
  )
}

function measuredTemperatures({ temperature_C, count }: Readings, { temperature }: Procedure): Float64Array | null {
  const fallback = temperature.measuredC
  if (!temperature_C) return fallback === undefined ? null : new Float64Array(count).fill(fallback)
  return fallback === undefined ? temperature_C : temperature_C.map((t) => (Number.isNaN(t) ? fallback : t))
}

function constantCoefficient(measured_C: Float64Array, coefficient_percent_per_C: number, reference_C: number) {
  const factor = new Float64Array(measured_C.length)
  const slope_per_C = new Float64Array(measured_C.length)
  const fromStandard = factorToStandard(coefficient_percent_per_C, reference_C)
  for (let i = 0; i < measured_C.length; i++) {
    const t = measured_C[i]
    const toStandard =
      t < ACCEPTED_RANGE_C.min || t > ACCEPTED_RANGE_C.max ? NaN : factorToStandard(coefficient_percent_per_C, t)
    factor[i] = toStandard > 0 ? toStandard / fromStandard : NaN
    slope_per_C[i] = factorSlope_per_C(coefficient_percent_per_C, t)
  }
  leaveUnmeasured(measured_C, { factor, slope_per_C })
  return { factor, slope_per_C }
}

/** A site without a temperature among others that have one is not corrected. */
function leaveUnmeasured(
  measured_C: Float64Array,
  { factor, slope_per_C }: { factor: Float64Array; slope_per_C: Float64Array },
): void {
  for (let i = 0; i < measured_C.length; i++) {
    if (!Number.isNaN(measured_C[i])) continue
    factor[i] = 1
    slope_per_C[i] = 0
  }
}

function flagTemperatures(measured_C: Float64Array, { factor }: { factor: Float64Array }, flags: Uint32Array): void {
  for (let i = 0; i < measured_C.length; i++) {
    const t = measured_C[i]
    if (Number.isNaN(t)) flags[i] |= SITE_FLAGS.temperatureMissing.bit
    else if (t < CORRECTION_RANGE_C.min || t > CORRECTION_RANGE_C.max || Number.isNaN(factor[i])) {
      flags[i] |= SITE_FLAGS.temperatureRange.bit
    }
  }
}
