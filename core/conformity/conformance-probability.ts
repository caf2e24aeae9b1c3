/** How probably a measured quantity truly lies within its limits. */
import { normalProbabilityBetween } from '../numeric/normal'
import { CoreError, requireRange } from '../problems/problem'
import { hasLimits, sideOf, type Limits } from './limits'

export interface MeasuredValue extends Limits {
  readonly value: number
  readonly u: number
}

/**
 * Conformance probability of a value with a normal uncertainty and no prior knowledge.
 *
 * @param value  the measured value, finite
 * @param u      its standard uncertainty, >= 0, same unit
 * @param lower  lower limit, same unit; absent: none
 * @param upper  upper limit, same unit; absent: none
 * @returns 0 to 1. u = 0: 1 inside or on a limit, 0 outside. NaN without limits: there is nothing to conform to.
 * @throws CoreError out-of-range; not-applicable where the lower limit lies above the upper
 *
 * Sources: JCGM 106:2012 clause 7, p_c = Phi((T_U - y)/u) - Phi((T_L - y)/u).
 */
export function conformanceProbability({ value, u, lower, upper }: MeasuredValue): number {
  requireRange('value', value, '', -1e300, 1e300)
  requireRange('standard uncertainty', u, '', 0, 1e300)
  requireOrder({ lower, upper })
  return probability(value, u, { lower, upper })
}

/**
 * As `conformanceProbability`, a column at a time into `out`. A row whose value or uncertainty is NaN has no
 * probability and gets NaN. Throws CoreError where the limits are reversed.
 */
export function fillConformanceProbability(
  { value, u, limits }: { readonly value: Float64Array; readonly u: Float64Array; readonly limits: Limits },
  out: Float64Array,
): Float64Array {
  requireOrder(limits)
  for (let i = 0; i < value.length; i++) out[i] = probability(value[i], u[i], limits)
  return out
}

function probability(value: number, u: number, limits: Limits): number {
  if (!hasLimits(limits) || !(u >= 0) || Number.isNaN(value)) return NaN
  if (u === 0) return sideOf(value, limits) === 'inside' ? 1 : 0
  const { lower = -Infinity, upper = Infinity } = limits
  return normalProbabilityBetween((lower - value) / u, (upper - value) / u)
}

function requireOrder({ lower = -Infinity, upper = Infinity }: Limits): void {
  if (lower <= upper) return
  const why = `the lower limit ${lower} is not below the upper limit ${upper}`
  throw new CoreError({ kind: 'not-applicable', what: 'conformance probability', why })
}
