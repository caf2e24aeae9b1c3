/** Values that a normal sample would hardly hold. They are named, never removed: whether one counts is a person's decision. */
import { studentQuantile } from '../numeric/distributions'
import { CoreError, requireRange } from '../problems/problem'
import { gather, preciseMean, sumOfSquares } from './mean-and-deviations'

export interface OutlierStep {
  /** Row of the values as given: the one farthest from the mean of those left. */
  readonly row: number
  /** Its distance from that mean, in standard deviations of those left. */
  readonly statistic: number
  /** What the statistic would exceed with probability alpha by chance. */
  readonly critical: number
}

export interface OutlierTest {
  readonly alpha: number
  /** Rows of the values as given, farthest first. */
  readonly rows: readonly number[]
  /** One a candidate, in the order in which they were set aside; fewer where those left are all equal. */
  readonly steps: readonly OutlierStep[]
}

/**
 * Rosner's generalized extreme studentized deviate test for up to `atMost` outliers. The number found is the largest i
 * whose i-th statistic exceeds its critical value, whatever those before it do: two outliers may hide each other.
 *
 * @param values   finite where they count
 * @param indices  rows of `values`; absent: all. At least three
 * @param atMost   whole, 1 to half the count
 * @param alpha    1e-6 to 0.5: chance of finding any in a normal sample
 * @param critical for many samples of about one size: those of this alpha, made once
 * @throws CoreError out-of-range, or not-applicable for fewer than three values
 *
 * Accuracy: critical values are good for 25 values or more, fair from 15; with atMost 1 it is Grubbs' test, any count.
 * Source: B. Rosner, Technometrics 25 (1983) 165; NIST/SEMATECH e-Handbook of Statistical Methods 1.3.5.17.3.
 */
export function generalizedEsd({
  values,
  indices,
  atMost,
  alpha = 0.05,
  critical = criticalDeviates(alpha),
}: {
  readonly values: Float64Array
  readonly indices?: Uint32Array | undefined
  readonly atMost: number
  readonly alpha?: number
  readonly critical?: CriticalDeviates
}): OutlierTest {
  const chosen = gather(values, indices)
  requireSample(chosen.length, alpha)
  requireRange('number of candidates', atMost, '', 1, Math.floor(chosen.length / 2))
  const steps = candidates(chosen, Math.floor(atMost)).map(({ position, left, statistic }) => ({
    row: indices ? indices[position] : position,
    statistic,
    critical: critical(left),
  }))
  const found = steps.reduce((last, { statistic, critical }, i) => (statistic > critical ? i + 1 : last), 0)
  return { alpha, rows: steps.slice(0, found).map(({ row }) => row), steps }
}

export type CriticalDeviates = (left: number) => number

/** The critical deviate of the farthest of `left` values on either side; each count is worked out once. */
export function criticalDeviates(alpha: number): CriticalDeviates {
  const known = new Map<number, number>()
  return (left) => {
    const found = known.get(left) ?? criticalDeviate(left, alpha / (2 * left))
    known.set(left, found)
    return found
  }
}

export interface GrubbsTest extends OutlierStep {
  readonly isOutlier: boolean
}

/**
 * Grubbs' test of the one value farthest from the mean, on either side, or of the largest alone.
 *
 * @param side  'either', or 'largest' where only a high value would be suspected beforehand
 * @throws CoreError as the generalized test, and not-applicable where all values are equal
 *
 * Source: F. E. Grubbs, Technometrics 11 (1969) 1; NIST/SEMATECH e-Handbook of Statistical Methods 1.3.5.17.1.
 */
export function grubbsTest({
  values,
  alpha = 0.05,
  side = 'either',
}: {
  readonly values: Float64Array
  readonly alpha?: number
  readonly side?: 'either' | 'largest'
}): GrubbsTest {
  const column = gather(values)
  const count = column.length
  requireSample(count, alpha)
  const precise = preciseMean(column)
  const standardDeviation = Math.sqrt(sumOfSquares(column, precise) / (count - 1))
  if (standardDeviation === 0) throw refusal('all values are equal')
  const deviation = (row: number) => column[row] - precise.high - precise.low
  const distance = (row: number) => (side === 'either' ? Math.abs(deviation(row)) : deviation(row))
  let row = 0
  for (let i = 1; i < count; i++) if (distance(i) > distance(row)) row = i
  const statistic = distance(row) / standardDeviation
  const critical = criticalDeviate(count, alpha / (side === 'either' ? 2 * count : count))
  return { row, statistic, critical, isOutlier: statistic > critical }
}

/** The deviate of one of `left` values that is exceeded with that probability. */
function criticalDeviate(left: number, probability: number): number {
  const t = studentQuantile(1 - probability, left - 2)
  return ((left - 1) * t) / Math.sqrt((left - 2 + t * t) * left)
}

interface Candidate {
  readonly position: number
  /** How many values were left, this one among them. */
  readonly left: number
  readonly statistic: number
}

/**
 * Each time the farthest from the mean of those left: always the lowest or the highest, so a window of the sorted values
 * that closes from its ends. Its sums are taken from the median outwards, so that no outlier's square is ever
 * subtracted again; at most half of them leave, so the median stays within.
 */
function candidates(values: Float64Array, atMost: number): Candidate[] {
  const count = values.length
  const sorted = values.slice().sort()
  const middle = count >> 1
  const deviation = sorted.map((value) => value - sorted[middle])
  const { sums, squares } = sumsOutwards(deviation, middle)
  const lowest = outermost(values, (value) => value <= sorted[atMost - 1], 1)
  const highest = outermost(values, (value) => value >= sorted[count - atMost], -1)
  const found: Candidate[] = []
  let [low, high] = [0, count - 1]
  while (found.length < atMost) {
    const left = high - low + 1
    const sum = sums[low] + sums[high]
    const mean = sum / left
    const variance = (squares[low] + squares[high] - sum * mean) / (left - 1)
    if (deviation[low] === deviation[high] || !(variance > 0)) break
    const isLow = mean - deviation[low] > deviation[high] - mean
    const position = isLow ? lowest[low] : highest[count - 1 - high]
    const at = isLow ? low++ : high--
    found.push({ position, left, statistic: Math.abs(deviation[at] - mean) / Math.sqrt(variance) })
  }
  return found
}

/** Where the values stand that are so far out, from the outermost inwards; of equal ones the lows as given, the highs from the last. */
function outermost(values: Float64Array, isOut: (value: number) => boolean, direction: 1 | -1): number[] {
  const places: number[] = []
  for (let i = 0; i < values.length; i++) if (isOut(values[i])) places.push(i)
  return places.sort((a, b) => direction * (values[a] - values[b] || a - b))
}

/** At each place the sum from the middle (whose deviation is 0) to it. */
function sumsOutwards(deviation: Float64Array, middle: number): { sums: Float64Array; squares: Float64Array } {
  const sums = new Float64Array(deviation.length)
  const squares = new Float64Array(deviation.length)
  for (const step of [-1, 1]) {
    for (let i = middle + step; i >= 0 && i < deviation.length; i += step) {
      sums[i] = sums[i - step] + deviation[i]
      squares[i] = squares[i - step] + deviation[i] ** 2
    }
  }
  return { sums, squares }
}

function requireSample(count: number, alpha: number): void {
  requireRange('alpha', alpha, '', 1e-6, 0.5)
  if (count < 3) throw refusal('it needs three values or more')
}

function refusal(why: string): CoreError {
  return new CoreError({ kind: 'not-applicable', what: 'outlier test', why })
}
