/** How far each probe reads from the average of all, over the wafers and runs that every probe measured. */
import { fUpperProbability, studentProbability, studentQuantile } from '../numeric/distributions'
import type { ConfidenceInterval } from '../statistics/intervals'
import { groupedBy, meanOf } from './levels'
import type { Occasions } from './occasions'

export interface ProbeBias {
  readonly probe: string
  /** Mean over wafers and runs of (probe's mean - mean of all probes). */
  readonly bias: number
  /** What is added to the probe's readings to bring them to the average. */
  readonly correction: number
  /** Spread of the differences from wafer to wafer and run to run. */
  readonly standardDeviation: number
  /** Of the bias: that spread over the root of their number. */
  readonly standardUncertainty: number
  readonly degreesOfFreedom: number
  readonly interval: ConfidenceInterval
  /** Probability of so large a bias were there none (Student's t, two-sided). */
  readonly pValue: number
  /** Each difference: the cells that a picture shows. */
  readonly cells: readonly { readonly wafer: string; readonly run: string; readonly difference: number }[]
}

/**
 * Empty with fewer than two probes. A wafer and run that some probe did not measure is left out, so that the average is
 * of the same probes everywhere.
 *
 * Source: NIST/SEMATECH e-Handbook of Statistical Methods 2.6.1.4 and 2.6.3 (bias of a probe among probes; its mean over
 * 10 differences has their standard deviation over root 10, and 9 degrees of freedom).
 */
export function probeBiases(occasions: Occasions, level: number): readonly ProbeBias[] {
  const probes = [...new Set(occasions.probe)]
  if (probes.length < 2) return []
  const rows = Array.from({ length: occasions.count }, (_, i) => i)
  const places = groupedBy(rows, (i) => [occasions.wafer[i], occasions.run[i]]).flatMap((list) => {
    const means = probes.map((probe) => meanOf(list.filter((i) => occasions.probe[i] === probe).map((i) => occasions.mean[i]))) // prettier-ignore
    if (means.some(Number.isNaN)) return []
    const average = meanOf(means)
    return [{ wafer: occasions.wafer[list[0]], run: occasions.run[list[0]], differences: means.map((mean) => mean - average) }] // prettier-ignore
  })
  if (places.length === 0) return []
  return probes.map((probe, k) => {
    const cells = places.map(({ wafer, run, differences }) => ({ wafer, run, difference: differences[k] }))
    return biasOf(probe, cells, level)
  })
}

function biasOf(probe: string, cells: ProbeBias['cells'], level: number): ProbeBias {
  const count = cells.length
  const bias = meanOf(cells.map(({ difference }) => difference))
  const degreesOfFreedom = count - 1
  const variance = cells.reduce((sum, { difference }) => sum + (difference - bias) ** 2, 0) / degreesOfFreedom
  const standardDeviation = Math.sqrt(variance)
  const standardUncertainty = standardDeviation / Math.sqrt(count)
  const isKnown = degreesOfFreedom > 0
  const half = isKnown ? studentQuantile((1 + level) / 2, degreesOfFreedom) * standardUncertainty : NaN
  const t = Math.abs(bias) / standardUncertainty
  return {
    probe,
    bias,
    correction: -bias,
    standardDeviation,
    standardUncertainty,
    degreesOfFreedom,
    interval: { level, lower: bias - half, upper: bias + half },
    pValue: isKnown && !Number.isNaN(t) ? 2 * (1 - studentProbability(t, degreesOfFreedom)) : NaN,
    cells,
  }
}

export interface OperatorEffect {
  readonly operators: readonly { readonly operator: string; readonly occasions: number; readonly difference: number }[]
  readonly f: number
  readonly pValue: number
}

/**
 * Whether operators read differently: one-way analysis of variance of the occasions' differences from the mean of their
 * wafer, probe and run. null with fewer than two operators, or where nothing is left to compare them by.
 */
export function operatorEffect(occasions: Occasions): OperatorEffect | null {
  const rows = Array.from({ length: occasions.count }, (_, i) => i)
  const groups = groupedBy(rows, (i) => [occasions.wafer[i], occasions.probe[i], occasions.run[i]])
  const difference = new Float64Array(occasions.count)
  for (const list of groups) {
    const mean = meanOf(list.map((i) => occasions.mean[i]))
    for (const i of list) difference[i] = occasions.mean[i] - mean
  }
  const byOperator = groupedBy(rows, (i) => [occasions.operator[i]])
  const between = byOperator.length - 1
  const within = occasions.count - groups.length - between
  if (!occasions.has.operator || between < 1 || within < 1) return null
  const means = byOperator.map((list) => meanOf(list.map((i) => difference[i])))
  const whole = difference.reduce((sum, d) => sum + d * d, 0)
  const explained = byOperator.reduce((sum, list, k) => sum + list.length * means[k] ** 2, 0)
  const f = explained / between / (Math.max(0, whole - explained) / within)
  return {
    operators: byOperator.map((list, k) => ({ operator: occasions.operator[list[0]], occasions: list.length, difference: means[k] })),
    f,
    pValue: Number.isFinite(f) ? fUpperProbability(f, between, within) : NaN,
  }
} // prettier-ignore
