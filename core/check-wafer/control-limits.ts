/**
 * Limits of the charts of a check wafer, from the occasions that make the baseline.
 *
 * Source: NIST/SEMATECH e-Handbook of Statistical Methods 2.2.2, 2.2.3 and the case study 2.6.2 (check wafer 137 with
 * probe 2362: centre +- 2 standard deviations of the occasions' values; precision up to s1 root F of 0.95). The page
 * prints 0.09238 for the latter, the data and its own program's output give 0.09283.
 */
import { fQuantile } from '../numeric/distributions'
import { CoreError } from '../problems/problem'
import type { CheckHistory } from './history'

export interface ChartOptions {
  /** How many occasions, first in time, make the limits; absent: all. */
  readonly baseline?: number | null
  /** The value that is held to be true; absent: the mean of the baseline. */
  readonly accepted?: number | null
  /** How many standard deviations lie between the centre line and a limit. */
  readonly width?: number
  /** Chance that the precision of a sound occasion stays below its limit. */
  readonly precisionConfidence?: number
  /** Weight of the newest occasion in the moving average. */
  readonly lambda?: number
  /** How many standard deviations lie between the centre line and a limit of the moving average. */
  readonly averageWidth?: number
}

/** As in the case study; the moving average as in 6.3.2.4. */
export const CHART_DEFAULTS = { width: 2, precisionConfidence: 0.95, lambda: 0.3, averageWidth: 3 } as const

export interface ControlLimits {
  readonly baseline: number
  /** Accepted value, or mean of the baseline. */
  readonly centerLine: number
  readonly isAccepted: boolean
  /** Of the occasions' values about their mean: s2. */
  readonly standardDeviation: number
  readonly degreesOfFreedom: number
  readonly lowerLimit: number
  readonly upperLimit: number
  /** Pooled over the occasions: s1; null where the file has no standard deviations. */
  readonly repeatability: number | null
  readonly repeatabilityDegreesOfFreedom: number
  /** Upper limit of the standard deviation of an occasion of the usual length; null likewise. */
  readonly precisionUpperLimit: number | null
  /** The same of each occasion's own length, by its row, the usual one where that isn't known; NaN for a single reading. */
  readonly precisionLimits: Float64Array
}

export const LEAST_OCCASIONS = 4

/** @throws CoreError not-applicable: fewer than four occasions make the baseline, or their values don't differ */
export function controlLimits(history: CheckHistory, options: ChartOptions): ControlLimits {
  const { width = CHART_DEFAULTS.width, precisionConfidence = CHART_DEFAULTS.precisionConfidence, accepted = null } = options
  const rows = [...history.order].slice(0, options.baseline ?? history.count)
  const count = rows.length
  if (count < LEAST_OCCASIONS) {
    throw refusal(`${count === 1 ? 'one occasion makes' : `${count} occasions make`} no limits; it takes at least ${LEAST_OCCASIONS}`)
  }
  const mean = rows.reduce((sum, i) => sum + history.value[i], 0) / count
  const variance = rows.reduce((sum, i) => sum + (history.value[i] - mean) ** 2, 0) / (count - 1)
  const standardDeviation = Math.sqrt(variance)
  // Compared value by value: the mean of equal values need not be that value to the last bit.
  if (rows.every((i) => history.value[i] === history.value[rows[0]])) throw refusal('its values are all the same, so that nothing tells how far a sound one may lie off')
  const centerLine = accepted ?? mean
  return {
    baseline: count,
    centerLine,
    isAccepted: accepted !== null,
    standardDeviation,
    degreesOfFreedom: count - 1,
    lowerLimit: centerLine - width * standardDeviation,
    upperLimit: centerLine + width * standardDeviation,
    ...precision(history, rows, precisionConfidence),
  }
} // prettier-ignore

function precision({ standardDeviation, degreesOfFreedom }: CheckHistory, rows: readonly number[], confidence: number) {
  let sum = 0
  let freedom = 0
  let known = 0
  for (const i of rows) {
    if (!(standardDeviation[i] >= 0) || !(degreesOfFreedom[i] > 0)) continue
    sum += degreesOfFreedom[i] * standardDeviation[i] ** 2
    freedom += degreesOfFreedom[i]
    known++
  }
  const unknown = new Float64Array(degreesOfFreedom.length).fill(NaN)
  if (!(sum > 0)) return { repeatability: null, repeatabilityDegreesOfFreedom: freedom, precisionUpperLimit: null, precisionLimits: unknown }
  const repeatability = Math.sqrt(sum / freedom)
  const limitOf = (own: number): number => repeatability * Math.sqrt(fQuantile(confidence, own, freedom))
  const usual = limitOf(freedom / known)
  const limits = new Map([...new Set(degreesOfFreedom)].map((own) => [own, Number.isNaN(own) ? usual : own > 0 ? limitOf(own) : NaN]))
  return {
    repeatability,
    repeatabilityDegreesOfFreedom: freedom,
    precisionUpperLimit: usual,
    precisionLimits: degreesOfFreedom.map((own) => limits.get(own)!),
  }
} // prettier-ignore

function refusal(why: string): CoreError {
  return new CoreError({ kind: 'not-applicable', what: 'the control chart of the check wafer', why })
}
