/**
 * Decision rules: how far inside (or outside) its limits a measured value must lie to be accepted.
 *
 * Sources: JCGM 106:2012, 8.2 (simple acceptance), 8.3.2 (guarded acceptance), 8.3.3 (guarded rejection), 8.3.1 (guard
 * band w = r U with U = 2u), 9.4 (specific risk). Clauses from memory.
 */
import { normalProbabilityBetween, normalQuantile } from '../numeric/normal'
import { findRoot } from '../numeric/find-root'
import { hasLimits, type Limits } from './limits'
import type { Verdict } from './verdict'

export const ACCEPTANCE_RULES = ['simple', 'stringent', 'relaxed', 'risk'] as const
export type AcceptanceRule = (typeof ACCEPTANCE_RULES)[number]

export interface Acceptance {
  readonly rule: AcceptanceRule
  /** r of w = r U, U = 2u; of the stringent and the relaxed rule. */
  readonly guardFactor: number
  /** Of the rule "risk": how probable it may be at most that an accepted value truly lies outside its limits. */
  readonly maximumFalseAcceptRisk: number
}

export const SIMPLE: Acceptance = { rule: 'simple', guardFactor: 1, maximumFalseAcceptRisk: 0.05 }

/** U = 2u. */
const COVERAGE = 2

/**
 * The limits within which a value of this uncertainty is accepted. Their lower may lie above their upper: then the
 * uncertainty is too large for any value to be accepted.
 *
 * - simple: the limits themselves.
 * - stringent: a guard band w inside each limit.
 * - relaxed: a guard band w outside each limit.
 * - risk: inside, where the probability to conform has come down to 1 - p; both limits count.
 */
export function acceptanceLimits(limits: Limits, u: number, { rule, guardFactor, maximumFalseAcceptRisk }: Acceptance): Limits {
  const { lower, upper } = limits
  const shift = (by: number): Limits => ({
    lower: lower === undefined ? undefined : lower + by,
    upper: upper === undefined ? undefined : upper - by,
  })
  if (rule === 'simple' || !(u > 0)) return limits
  if (rule === 'stringent') return shift(guardFactor * COVERAGE * u)
  if (rule === 'relaxed') return shift(-guardFactor * COVERAGE * u)
  return shift(riskBand(limits, u, maximumFalseAcceptRisk))
} // prettier-ignore

/** How far inside a limit the risk has come down to p; as far as the middle and a bit where it never does. */
function riskBand({ lower, upper }: Limits, u: number, p: number): number {
  const oneSided = normalQuantile(1 - p) * u
  if (lower === undefined || upper === undefined) return oneSided
  const half = (upper - lower) / 2
  const risk = (inside: number): number => 1 - normalProbabilityBetween((inside - 2 * half) / u, inside / u)
  if (risk(half) > p) return half * (1 + 1e-9)
  return findRoot({ f: (inside) => risk(inside) - p, low: Math.min(0, oneSided), high: half, tolerance: 1e-12 * half })
}

/**
 * A value on a limit is inside. Accepted is in spec; outside the limits out of spec; what is neither, in the guard band
 * of a stringent rule, is undecided. A relaxed rule accepts its guard band and knows no undecided. Without a value or
 * limits not assessed; a value without a known uncertainty is judged simply.
 */
export function judgeBy(value: number, u: number, limits: Limits | undefined, acceptance: Acceptance): Verdict {
  if (!hasLimits(limits) || Number.isNaN(value)) return 'not-assessed'
  if (isInside(value, acceptanceLimits(limits, u, acceptance))) return 'in-spec'
  return isInside(value, limits) ? 'undecided' : 'out-of-spec'
}

function isInside(value: number, { lower = -Infinity, upper = Infinity }: Limits): boolean {
  return value >= lower && value <= upper
}

/** The rule as a person would say it. */
export function acceptanceWords({ rule, guardFactor, maximumFalseAcceptRisk }: Acceptance): string {
  switch (rule) {
    case 'simple':
      return 'Simple acceptance: a value inside its limits is in spec, however uncertain it is.'
    case 'stringent':
      return `Stringent: a value is in spec where it lies inside its limits by at least ${guardFactor} U (U = 2u); nearer to a limit it is undecided.`
    case 'relaxed':
      return `Relaxed: a value is out of spec only where it lies outside its limits by more than ${guardFactor} U (U = 2u).`
    case 'risk':
      return `By risk: a value is in spec where it truly lies outside its limits with a probability of at most ${percent(maximumFalseAcceptRisk)} %; nearer to a limit it is undecided.`
  }
}

function percent(share: number): number {
  return Number((100 * share).toPrecision(6))
}
