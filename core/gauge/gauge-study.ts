/** A gauge study: how much of a spread is the gauge's own, and how far its probes read apart. */
import { studentQuantile } from '../numeric/distributions'
import { CoreError } from '../problems/problem'
import { analysisOfVariance, type AnalysisOfVariance } from '../statistics/analysis-of-variance'
import { gaugeLevels, type GaugeLevels } from './levels'
import type { Occasions } from './occasions'
import { operatorEffect, probeBiases, type OperatorEffect, type ProbeBias } from './probe-biases'

export const GAUGE_SOURCE =
  'NIST/SEMATECH e-Handbook of Statistical Methods 2.4.4 (nested standard deviations), 2.6.1 (gauge study of resistivity probes), 2.6.3 (type A uncertainty)'

export interface Tolerance {
  readonly lower: number
  readonly upper: number
}

export interface GaugeStudyOptions {
  /** Of every interval. */
  readonly level?: number
  readonly tolerance?: Tolerance | null
  /** The probe whose measurements are spoken of; absent: all, pooled. */
  readonly probe?: string | null
}

export interface GaugeStudy {
  readonly occasions: Occasions
  readonly level: number
  /** null: all probes pooled. */
  readonly probe: string | null
  readonly wafers: readonly string[]
  readonly probes: readonly string[]
  readonly runs: readonly string[]
  readonly components: GaugeLevels
  readonly byProbe: readonly { readonly probe: string; readonly components: GaugeLevels }[]
  readonly biases: readonly ProbeBias[]
  readonly operator: OperatorEffect | null
  /** One-way, of single readings by probe; null where the file has averages, several wafers or a single probe. */
  readonly betweenProbes: AnalysisOfVariance | null
  /** Standard deviation of a single reading on any day of any run: the components together, negative ones as none. */
  readonly totalStandardDeviation: number
  readonly measurement: MeasurementUncertainty | null
  readonly tolerance: ToleranceShare | null
}

/** Of one day's average of as many readings as the study's occasions have, corrected for the probe's bias. */
export interface MeasurementUncertainty {
  readonly standardUncertainty: number
  readonly effectiveDegreesOfFreedom: number
  readonly coverageFactor: number
  readonly expandedUncertainty: number
}

export interface ToleranceShare extends Tolerance {
  /** 100 x 6 s / (upper - lower), s of a single reading. */
  readonly percent: number
}

/**
 * @throws CoreError not-applicable: nothing was repeated, or no such probe; the tolerance has no width
 */
export function gaugeStudy(occasions: Occasions, options: GaugeStudyOptions = {}): GaugeStudy {
  const { level = 0.95, tolerance = null, probe = null } = options
  const probes = [...new Set(occasions.probe)]
  if (probe !== null && !probes.includes(probe)) {
    throw refusal(`the study has no probe "${probe}"; it has ${probes.slice(0, 12).join(', ')}`)
  }
  const rowsOf = (wanted: string | null): number[] =>
    Array.from({ length: occasions.count }, (_, i) => i).filter((i) => wanted === null || occasions.probe[i] === wanted)
  const components = gaugeLevels(occasions, rowsOf(probe), level)
  if (!components.repeatability && !components.day && !components.run) {
    throw refusal('nothing in it was measured twice')
  }
  const biases = probeBiases(occasions, level)
  const totalStandardDeviation = totalOf(components)
  return {
    occasions,
    level,
    probe,
    wafers: [...new Set(occasions.wafer)],
    probes,
    runs: [...new Set(occasions.run)],
    components,
    byProbe: probes.map((name) => ({ probe: name, components: gaugeLevels(occasions, rowsOf(name), level) })),
    biases,
    operator: operatorEffect(occasions),
    betweenProbes: betweenProbes(occasions),
    totalStandardDeviation,
    measurement: measurementOf(components, biases.find((bias) => bias.probe === probe) ?? null, level),
    tolerance: tolerance && toleranceShare(totalStandardDeviation, tolerance),
  }
}

/** With several wafers their own differences would count as spread within a probe. */
function betweenProbes({ single, wafer }: Occasions): AnalysisOfVariance | null {
  const probes = [...new Set(single?.probe ?? [])]
  if (!single || probes.length < 2 || new Set(wafer).size > 1 || single.value.length <= probes.length) return null
  const rows = probes.map((probe) => Uint32Array.from(single.probe.flatMap((name, i) => (name === probe ? [i] : []))))
  return analysisOfVariance(single.value, rows)
}

function totalOf({ repeatability, day, run }: GaugeLevels): number {
  return Math.sqrt([repeatability, day, run].reduce((sum, part) => sum + Math.max(0, part?.ownVariance ?? 0), 0))
}

/**
 * u^2 = s_run^2 + (1 - 1/K) s_day^2 + u_bias^2, with K days a run: a one-day average has the whole spread of days, of
 * which the run's has 1/K already. Degrees of freedom by Welch-Satterthwaite.
 *
 * Source: e-Handbook 2.6.3; for K = 6 its factors 5/6 and 1, and 1/10 of the variance of ten differences.
 */
function measurementOf(
  { repeatability, day, run, daysPerRun, readingsPerOccasion }: GaugeLevels,
  bias: ProbeBias | null,
  level: number,
): MeasurementUncertainty | null {
  const parts: { readonly variance: number; readonly freedom: number }[] = []
  const add = (variance: number, freedom: number): void => void (variance > 0 && parts.push({ variance, freedom }))
  if (day) add((run ? 1 - 1 / daysPerRun : 1) * day.standardDeviation ** 2, day.degreesOfFreedom)
  else if (repeatability)
    add(repeatability.standardDeviation ** 2 / readingsPerOccasion, repeatability.degreesOfFreedom)
  if (run) add(run.standardDeviation ** 2, run.degreesOfFreedom)
  if (bias && bias.degreesOfFreedom > 0) add(bias.standardUncertainty ** 2, bias.degreesOfFreedom)
  const variance = parts.reduce((sum, part) => sum + part.variance, 0)
  if (!(variance > 0)) return null
  const effective = variance ** 2 / parts.reduce((sum, part) => sum + part.variance ** 2 / part.freedom, 0)
  const standardUncertainty = Math.sqrt(variance)
  // JCGM 100 G.4.1: the next lower whole number.
  const coverageFactor = studentQuantile((1 + level) / 2, Math.max(1, Math.floor(effective)))
  return {
    standardUncertainty,
    effectiveDegreesOfFreedom: effective,
    coverageFactor,
    expandedUncertainty: coverageFactor * standardUncertainty,
  }
}

function toleranceShare(standardDeviation: number, { lower, upper }: Tolerance): ToleranceShare {
  if (!(upper > lower)) throw refusal(`a tolerance from ${lower} to ${upper} has no width`)
  return { lower, upper, percent: (100 * 6 * standardDeviation) / (upper - lower) }
}

function refusal(why: string): CoreError {
  return new CoreError({ kind: 'not-applicable', what: 'the gauge study', why })
}
