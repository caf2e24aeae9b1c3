/**
 * How often a decision rule errs on a whole production: the consumer's risk that what is bad is accepted, the producer's
 * that what is good is not.
 *
 *   R_C = integral over what doesn't conform of P(measured in the acceptance interval | true value) g0
 *   R_P = integral over what conforms of P(measured outside the acceptance interval | true value) g0
 *
 * with g0 the normal distribution of the true values and a normal error of measurement.
 *
 * Source: JCGM 106:2012, 9.5 (equations for the global risks; clause from memory).
 */
import { normalDensity, normalProbability, normalProbabilityBetween } from '../numeric/normal'
import { gaussLegendre, integratePanels } from '../numeric/quadrature'
import { requireRange } from '../problems/problem'
import { acceptanceLimits, type Acceptance } from './acceptance'
import type { Limits } from './limits'

export interface Process {
  readonly mean: number
  /** Of the true values, without the error of measurement. */
  readonly standardDeviation: number
}

export interface GlobalRisks {
  readonly consumer: number
  readonly producer: number
  /** Share of what is made that doesn't conform, whatever is measured. */
  readonly nonconforming: number
  /** Share that is accepted. */
  readonly accepted: number
}

const RULE = gaussLegendre(16)
/** Standard deviations on either side that count. */
const REACH = 9
const PANELS = 60

/**
 * @param u  standard uncertainty of measurement, > 0
 * @throws CoreError out-of-range unless u and the process's standard deviation are positive
 */
export function globalRisks(limits: Limits, u: number, production: Process, acceptance: Acceptance): GlobalRisks {
  requireRange('standard uncertainty', u, '', Number.MIN_VALUE, 1e300)
  requireRange('standard deviation of the process', production.standardDeviation, '', Number.MIN_VALUE, 1e300)
  const { mean, standardDeviation: s } = production
  const { lower = -Infinity, upper = Infinity } = limits
  const { lower: from = -Infinity, upper: to = Infinity } = acceptanceLimits(limits, u, acceptance)
  const isEmpty = !(from < to)
  const accepts = (truth: number): number => (isEmpty ? 0 : normalProbabilityBetween((from - truth) / u, (to - truth) / u))
  const density = (truth: number): number => normalDensity((truth - mean) / s) / s
  const over = (low: number, high: number, f: (truth: number) => number): number =>
    high > low ? integratePanels((truth) => f(truth) * density(truth), panels(low, high, [from, to], u), RULE) : 0
  const [least, most] = [mean - REACH * s, mean + REACH * s]
  const inside = [Math.max(lower, least), Math.min(upper, most)] as const
  const consumer = over(least, Math.min(lower, most), accepts) + over(Math.max(upper, least), most, accepts)
  const producer = over(inside[0], inside[1], (truth) => 1 - accepts(truth))
  const nonconforming = normalProbability((lower - mean) / s) + normalProbability((mean - upper) / s)
  return { consumer, producer, nonconforming, accepted: 1 - nonconforming - producer + consumer }
} // prettier-ignore

/** Even, and finer where the acceptance turns from yes to no. */
function panels(low: number, high: number, turns: readonly number[], u: number): number[] {
  const edges = new Set<number>([low, high])
  for (let k = 1; k < PANELS; k++) edges.add(low + ((high - low) * k) / PANELS)
  for (const turn of turns) {
    for (let k = -6; k <= 6; k++) {
      const edge = turn + k * u
      if (edge > low && edge < high) edges.add(edge)
    }
  }
  return [...edges].sort((a, b) => a - b)
}
