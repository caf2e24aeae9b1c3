/**
 * Propagation of distributions by Monte Carlo, and whether the first-order budget agrees with it.
 *
 * Sources: JCGM 101:2008 (5.9 and 7, propagation; 7.7 coverage intervals; 8, comparison with the law of propagation of
 * uncertainty and its numerical tolerance). Clauses from memory.
 */
import { normalDensity, normalQuantile } from '../numeric/normal'
import { seededRandom } from '../numeric/random'
import { requireRange } from '../problems/problem'

export interface MonteCarloInput {
  /** How many standard normal draws the model takes. */
  readonly draws: number
  /** NaN for a draw that the model can't be evaluated at. */
  readonly evaluate: (z: Float64Array) => number
  /** 1000 to 2e6. */
  readonly trials: number
  readonly seed: number
  /** Coverage probability. */
  readonly level: number
  /** Is told the share done. */
  readonly tell?: (share: number) => void
}

export interface MonteCarloResult {
  readonly trials: number
  readonly seed: number
  /** Trials that gave no value. */
  readonly failed: number
  readonly mean: number
  readonly standardUncertainty: number
  readonly level: number
  /** Probabilistically symmetric. */
  readonly interval: { readonly lower: number; readonly upper: number }
  /** The narrowest that covers as much. */
  readonly shortest: { readonly lower: number; readonly upper: number }
  /** In rising order: for a picture. */
  readonly sorted: Float64Array
}

const TELL_EVERY = 1000

/** @throws CoreError out-of-range for the number of trials or the level */
export function monteCarlo({ draws, evaluate, trials, seed, level, tell }: MonteCarloInput): MonteCarloResult {
  requireRange('number of trials', trials, '', 1000, 2e6)
  requireRange('coverage probability', level, '', 0.5, 0.9999)
  const random = seededRandom(seed)
  const z = new Float64Array(draws)
  const values = new Float64Array(trials)
  let count = 0
  for (let trial = 0; trial < trials; trial++) {
    for (let k = 0; k < draws; k++) z[k] = random.normal()
    const value = evaluate(z)
    if (Number.isFinite(value)) values[count++] = value
    if (tell && trial % TELL_EVERY === 0) tell(trial / trials)
  }
  const sorted = values.slice(0, count).sort()
  const { mean, standardUncertainty } = moments(sorted)
  return {
    trials, seed, failed: trials - count, mean, standardUncertainty, level,
    interval: symmetric(sorted, level), shortest: shortest(sorted, level), sorted,
  } // prettier-ignore
}

function moments(values: Float64Array): { mean: number; standardUncertainty: number } {
  let mean = 0
  for (const value of values) mean += value / values.length
  let sum = 0
  for (const value of values) sum += (value - mean) ** 2
  return { mean, standardUncertainty: Math.sqrt(sum / (values.length - 1)) }
}

/** JCGM 101 7.7: q of M sorted values span the level, as many left out below as above. */
function symmetric(sorted: Float64Array, level: number) {
  const { spanned, last } = spanOf(sorted, level)
  const from = Math.floor((last - spanned) / 2)
  return { lower: sorted[from] ?? NaN, upper: sorted[from + spanned] ?? NaN }
}

function shortest(sorted: Float64Array, level: number) {
  const { spanned, last } = spanOf(sorted, level)
  let best = 0
  for (let from = 0; from + spanned <= last; from++) {
    if (sorted[from + spanned] - sorted[from] < sorted[best + spanned] - sorted[best]) best = from
  }
  return { lower: sorted[best] ?? NaN, upper: sorted[best + spanned] ?? NaN }
}

function spanOf(sorted: Float64Array, level: number): { spanned: number; last: number } {
  return { spanned: Math.min(sorted.length - 1, Math.round(level * sorted.length)), last: sorted.length - 1 }
}

export interface FirstOrder {
  readonly value: number
  readonly standardUncertainty: number
  readonly expandedUncertainty: number
}

export interface Agreement {
  /** Half a unit of the last of two significant digits of the standard uncertainty. */
  readonly tolerance: number
  /** Between the ends of the two coverage intervals. */
  readonly lowerDifference: number
  readonly upperDifference: number
  /** What the ends of the Monte Carlo interval may be off by chance alone, two standard deviations. */
  readonly noise: number
  /** Both differences within the tolerance, chance allowed for. */
  readonly isFirstOrderEnough: boolean
  readonly sentence: string
}

const DIGITS = 2

/**
 * d_low = |y - U - y_low|, d_high = |y + U - y_high|, each to be at most delta = 0.5 10^l where u = c 10^l with c of two
 * digits. A finite number of trials leaves the ends uncertain themselves; where that is not well below delta it is added,
 * so that luck is not taken for a failure of the first order.
 */
export function agreement({ value, expandedUncertainty, standardUncertainty }: FirstOrder, found: MonteCarloResult): Agreement {
  const tolerance = numericalTolerance(standardUncertainty, DIGITS)
  const lowerDifference = Math.abs(value - expandedUncertainty - found.interval.lower)
  const upperDifference = Math.abs(value + expandedUncertainty - found.interval.upper)
  const noise = 2 * endDeviation(found)
  const difference = Math.max(lowerDifference, upperDifference)
  const hasFailed = found.failed >= 0.001 * found.trials
  const isFirstOrderEnough = difference <= tolerance + noise && !hasFailed
  const sentence = hasFailed
    ? `${found.failed} of ${found.trials} draws gave no result (a pin off the wafer, or no such layer): the first-order budget does not tell of that.`
    : !isFirstOrderEnough
      ? 'The first-order budget does not agree with the Monte Carlo calculation within its numerical tolerance: take the interval of the latter.'
      : difference <= tolerance
        ? 'The first-order budget agrees with the Monte Carlo calculation within its numerical tolerance: it is enough here.'
        : 'The first-order budget and the Monte Carlo calculation differ by no more than the numerical tolerance and the chance of so many draws: nothing speaks against the first order; more draws would tell it closer.'
  return { tolerance, lowerDifference, upperDifference, noise, isFirstOrderEnough, sentence }
} // prettier-ignore

/** Half a unit of the last of so many significant digits of u. */
export function numericalTolerance(u: number, digits: number): number {
  if (!(u > 0)) return 0
  return 0.5 * 10 ** (Math.floor(Math.log10(u)) - digits + 1)
}

/** Of an end of the interval: root(p (1 - p) / M) over the density there, taken for normal. */
function endDeviation({ level, standardUncertainty, sorted }: MonteCarloResult): number {
  const tail = (1 - level) / 2
  const spread = Math.sqrt((tail * (1 - tail)) / sorted.length)
  return (spread * standardUncertainty) / normalDensity(normalQuantile(tail))
}
