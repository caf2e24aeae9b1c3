/** How the spread compares with the width of the limits. */
import { chiSquareQuantile } from '../numeric/distributions'
import { normalQuantile } from '../numeric/normal'
import { CoreError, requireRange } from '../problems/problem'
import { requireLevel, type ConfidenceInterval } from './intervals'

export interface CapabilityIndex {
  readonly value: number
  readonly interval: ConfidenceInterval
}

export interface Capability {
  /** (upper - lower) / (6 s); null with one limit. */
  readonly cp: CapabilityIndex | null
  /** (mean - lower) / (3 s); null without a lower limit. */
  readonly cpl: CapabilityIndex | null
  /** (upper - mean) / (3 s); null without an upper limit. */
  readonly cpu: CapabilityIndex | null
  /** The lesser of the two, or the one there is; negative where the mean lies outside. */
  readonly cpk: CapabilityIndex
}

/**
 * Capability indices of a normal sample, with one limit or two.
 *
 * @param standardDeviation  of the sample, divisor n - 1, > 0
 * @param count              2 to 1e9
 * @param limits             lower < upper where both are given
 * @throws CoreError out-of-range, or not-applicable without limits
 *
 * Assumes independent values of one normal distribution; says nothing of a process that isn't stable.
 * Accuracy: the interval of Cp is exact for normal values. Those of Cpl, Cpu and Cpk are Bissell's approximation,
 * Cpk +/- z sqrt(1 / (9 n) + Cpk^2 / (2 (n - 1))), fair from 30 values; narrower ones are in print for Cpl and Cpu.
 * Sources: A. F. Bissell, Appl. Stat. 39 (1990) 331 (from memory); NIST/SEMATECH e-Handbook 6.1.6 and 3.5.1.2.
 */
export function capability({
  mean,
  standardDeviation,
  count,
  limits,
  level = 0.95,
}: {
  readonly mean: number
  readonly standardDeviation: number
  readonly count: number
  readonly limits: { readonly lower?: number | undefined; readonly upper?: number | undefined }
  readonly level?: number
}): Capability {
  const { lower, upper } = limits
  requireLevel(level)
  requireRange('number of values', count, '', 2, 1e9)
  requireRange('mean', mean, '', -Number.MAX_VALUE, Number.MAX_VALUE)
  requireRange('standard deviation', standardDeviation, '', Number.MIN_VALUE, Number.MAX_VALUE)
  if (lower !== undefined) requireRange('lower limit', lower, '', -Number.MAX_VALUE, upper ?? Number.MAX_VALUE)
  if (upper !== undefined) requireRange('upper limit', upper, '', lower ?? -Number.MAX_VALUE, Number.MAX_VALUE)
  const oneSided = (room: number) => bissell(room / (3 * standardDeviation), count, level)
  const cpl = lower === undefined ? null : oneSided(mean - lower)
  const cpu = upper === undefined ? null : oneSided(upper - mean)
  const cpk = cpl && cpu ? (cpl.value < cpu.value ? cpl : cpu) : (cpl ?? cpu)
  if (!cpk) throw new CoreError({ kind: 'not-applicable', what: 'capability', why: 'there are no limits' })
  const isTwoSided = lower !== undefined && upper !== undefined
  return { cp: isTwoSided ? byChiSquare((upper - lower) / (6 * standardDeviation), count, level) : null, cpl, cpu, cpk }
}

function byChiSquare(value: number, count: number, level: number): CapabilityIndex {
  const limit = (p: number) => value * Math.sqrt(chiSquareQuantile(p, count - 1) / (count - 1))
  return { value, interval: { level, lower: limit((1 - level) / 2), upper: limit((1 + level) / 2) } }
}

function bissell(value: number, count: number, level: number): CapabilityIndex {
  const half = normalQuantile((1 + level) / 2) * Math.sqrt(1 / (9 * count) + value ** 2 / (2 * (count - 1)))
  return { value, interval: { level, lower: value - half, upper: value + half } }
}
