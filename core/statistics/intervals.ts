/**
 * Confidence intervals of a normal sample's mean, variance and standard deviation. They speak of independent values:
 * sites of one wafer follow its pattern, so that theirs say how well so many sites fix the mean, not how the pattern lies.
 */
import { chiSquareQuantile, studentQuantile } from '../numeric/distributions'
import { requireRange } from '../problems/problem'

export interface ConfidenceInterval {
  /** 0.95 for 95 %; what is left is split evenly between both sides. */
  readonly level: number
  readonly lower: number
  readonly upper: number
}

/** Throws CoreError unless 0.5 <= level <= 0.999999. */
export function requireLevel(level: number): void {
  requireRange('confidence level', level, '', 0.5, 0.999999)
}

/**
 * Interval of the mean: mean +/- t s / sqrt(n), t of n - 1 degrees of freedom.
 *
 * @param standardDeviation  of the sample, divisor n - 1, >= 0
 * @param count              2 to 1e9
 * @throws CoreError out-of-range
 *
 * Source: NIST/SEMATECH e-Handbook of Statistical Methods 1.3.5.2.
 */
export function meanInterval({
  mean,
  standardDeviation,
  count,
  level,
}: {
  readonly mean: number
  readonly standardDeviation: number
  readonly count: number
  readonly level: number
}): ConfidenceInterval {
  requireLevel(level)
  requireRange('number of values', count, '', 2, 1e9)
  requireRange('mean', mean, '', -Number.MAX_VALUE, Number.MAX_VALUE)
  requireRange('standard deviation', standardDeviation, '', 0, Number.MAX_VALUE)
  const half = (studentQuantile((1 + level) / 2, count - 1) * standardDeviation) / Math.sqrt(count)
  return { level, lower: mean - half, upper: mean + half }
}

/**
 * Interval of a variance: nu s^2 / chi-square, from the upper and the lower quantile of nu degrees of freedom.
 *
 * @param variance  the estimate s^2, >= 0
 * @throws CoreError out-of-range
 *
 * Source: NIST/SEMATECH e-Handbook of Statistical Methods 1.3.5.8.
 */
export function varianceInterval({
  variance,
  degreesOfFreedom,
  level,
}: {
  readonly variance: number
  readonly degreesOfFreedom: number
  readonly level: number
}): ConfidenceInterval {
  requireLevel(level)
  requireRange('variance', variance, '', 0, Number.MAX_VALUE)
  const limit = (p: number) => (degreesOfFreedom * variance) / chiSquareQuantile(p, degreesOfFreedom)
  return { level, lower: limit((1 + level) / 2), upper: limit((1 - level) / 2) }
}

/** Interval of the standard deviation whose square that variance is. */
export function standardDeviationInterval(sample: {
  readonly standardDeviation: number
  readonly degreesOfFreedom: number
  readonly level: number
}): ConfidenceInterval {
  const { standardDeviation, degreesOfFreedom, level } = sample
  requireRange('standard deviation', standardDeviation, '', 0, Number.MAX_VALUE)
  return rootOfInterval(varianceInterval({ variance: standardDeviation ** 2, degreesOfFreedom, level }))
}

/** From an interval of a variance, both limits >= 0, to that of its root. */
export function rootOfInterval({ level, lower, upper }: ConfidenceInterval): ConfidenceInterval {
  return { level, lower: Math.sqrt(lower), upper: Math.sqrt(upper) }
}
