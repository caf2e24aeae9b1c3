/** Whether values look drawn from a normal distribution, and where each would lie if they were. */
import { normalProbability, normalQuantile } from '../numeric/normal'
import { CoreError, requireRange } from '../problems/problem'
import { gather, preciseMean, sumOfSquares } from './mean-and-deviations'

/** The fit of p below holds from here on. */
export const NORMALITY_MIN_COUNT = 8

export interface Normality {
  readonly count: number
  /** Anderson-Darling's A squared. */
  readonly statistic: number
  /** A squared (1 + 0.75 / n + 2.25 / n^2): comparable over all n. */
  readonly adjusted: number
  /** Chance of so large a statistic from a normal sample; 0 where it is below 1e-20. */
  readonly p: number
}

/** Below any tail probability the values can have unless the statistic is beyond all doubt anyhow. */
const LEAST_PROBABILITY = 1e-300
/** The fit of p turns upwards far above this. */
const BEYOND_DOUBT = 10

/**
 * Anderson-Darling test of normality, mean and standard deviation estimated from the values.
 *
 * @param values   finite where they count
 * @param indices  rows of `values`; absent: all. At least 8
 * @throws CoreError not-applicable for fewer than 8 values or all equal; out-of-range for a NaN that counts
 *
 * Assumes independent values: the sites of one wafer, which follow its pattern, are found not normal sooner.
 * Accuracy: p within 2 % of its tabulated points between 0.005 and 0.1.
 * Sources: R. B. D'Agostino, M. A. Stephens, Goodness-of-Fit Techniques (1986) tables 4.7 and 4.9 (from memory).
 * Note: M. A. Stephens, J. Am. Stat. Assoc. 69 (1974) 730 adjusts by 1 + 4 / n - 25 / n^2, as some programs still do.
 */
export function andersonDarling(values: Float64Array, indices?: Uint32Array): Normality {
  const sorted = gather(values, indices).sort()
  const count = sorted.length
  if (count < NORMALITY_MIN_COUNT) throw refusal(`it needs ${NORMALITY_MIN_COUNT} values or more`)
  const precise = preciseMean(sorted)
  const standardDeviation = Math.sqrt(sumOfSquares(sorted, precise) / (count - 1))
  if (standardDeviation === 0) throw refusal('all values are equal')
  let sum = 0
  for (let i = 0; i < count; i++) {
    const low = (sorted[i] - precise.high - precise.low) / standardDeviation
    const high = (sorted[count - 1 - i] - precise.high - precise.low) / standardDeviation
    sum += (2 * i + 1) * (lnProbability(low) + lnProbability(-high))
  }
  const statistic = -count - sum / count
  const adjusted = statistic * (1 + 0.75 / count + 2.25 / count ** 2)
  return { count, statistic, adjusted, p: significance(adjusted) }
}

/** Medians of the order statistics of a standard normal sample, lowest first: the abscissae of a probability plot. */
export function normalScores(count: number): Float64Array {
  requireRange('number of values', count, '', 1, 1e9)
  return Float64Array.from({ length: count }, (_, i) => normalQuantile(medianRank(i + 1, count)))
}

/** J. J. Filliben, Technometrics 17 (1975) 111; NIST/SEMATECH e-Handbook 1.3.3.21. */
function medianRank(rank: number, count: number): number {
  if (rank === count) return 0.5 ** (1 / count)
  if (rank === 1) return 1 - 0.5 ** (1 / count)
  return (rank - 0.3175) / (count + 0.365)
}

function lnProbability(z: number): number {
  return Math.log(Math.max(LEAST_PROBABILITY, normalProbability(z)))
}

/** D'Agostino and Stephens, table 4.9. */
function significance(a: number): number {
  if (a > BEYOND_DOUBT) return 0
  if (a >= 0.6) return Math.exp(1.2937 - 5.709 * a + 0.0186 * a * a)
  if (a > 0.34) return Math.exp(0.9177 - 4.279 * a - 1.38 * a * a)
  if (a > 0.2) return 1 - Math.exp(-8.318 + 42.796 * a - 59.938 * a * a)
  return 1 - Math.exp(-13.436 + 101.14 * a - 223.73 * a * a)
}

function refusal(why: string): CoreError {
  return new CoreError({ kind: 'not-applicable', what: 'normality test', why })
}
