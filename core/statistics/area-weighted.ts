/** Mean and spread of the area rather than of the sites: a plan with many sites near the edge doesn't weigh it double. */
import { CoreError, requireRange } from '../problems/problem'
import { sumOf } from './mean-and-deviations'

export interface AreaWeighted {
  readonly mean: number
  /** null for a single site, or where all the weight is one site's. */
  readonly standardDeviation: number | null
  /** (sum w)^2 / sum w^2: as many sites of equal weight would fix the mean as well. */
  readonly effectiveCount: number
}

/**
 * Mean m = sum w v / sum w, and standard deviation by s^2 = sum w (v - m)^2 / (V1 - V2 / V1), V1 = sum w, V2 = sum w^2:
 * weights that say how much a site stands for, not how often it was measured; unbiased for values of one variance, and
 * the sample standard deviation where all weights are equal.
 *
 * @param values   finite, one or more
 * @param weights  >= 0, not all 0, one a value; only their ratios matter
 * @throws CoreError out-of-range, or not-applicable where there are no values or as many weights
 *
 * Source: M. Galassi et al., GNU Scientific Library Reference Manual, weighted samples (from memory; the unbiasedness
 * follows from E sum w (v - m)^2 = sigma^2 (V1 - V2 / V1)).
 */
export function areaWeighted({
  values,
  weights,
}: {
  readonly values: Float64Array
  readonly weights: Float64Array
}): AreaWeighted {
  const count = values.length
  requireWeights(values, weights)
  const whole = sumOf(count, (i) => weights[i])
  requireRange('sum of the weights', whole, '', Number.MIN_VALUE, Number.MAX_VALUE)
  const share = (i: number) => weights[i] / whole
  const rough = sumOf(count, (i) => share(i) * values[i])
  // A second pass takes back what the shares' rounding lost.
  const mean = rough + sumOf(count, (i) => share(i) * (values[i] - rough))
  const concentration = sumOf(count, (i) => share(i) ** 2)
  const heaviest = weights.reduce((most, weight) => Math.max(most, weight), 0)
  const squares = sumOf(count, (i) => share(i) * (values[i] - mean) ** 2)
  return {
    mean,
    standardDeviation: heaviest === whole ? null : Math.sqrt(squares / (1 - concentration)),
    effectiveCount: 1 / concentration,
  }
}

function requireWeights(values: Float64Array, weights: Float64Array): void {
  const what = 'area-weighted mean'
  if (values.length === 0) throw new CoreError({ kind: 'not-applicable', what, why: 'there are no values' })
  if (values.length !== weights.length) {
    throw new CoreError({ kind: 'not-applicable', what, why: `${weights.length} weights for ${values.length} values` })
  }
  for (const value of values) requireRange('value', value, '', -Number.MAX_VALUE, Number.MAX_VALUE)
  for (const weight of weights) requireRange('weight', weight, '', 0, Number.MAX_VALUE)
}
