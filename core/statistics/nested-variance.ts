/** Where a spread comes from when it is nested: wafer in zone in furnace run, or site in wafer in run. */
import { fUpperProbability } from '../numeric/distributions'
import { CoreError } from '../problems/problem'
import { componentInterval } from './component-interval'
import { rootOfInterval, varianceInterval, type ConfidenceInterval } from './intervals'
import { gather, preciseMean, sumOf, sumOfSquares, type PreciseMean } from './mean-and-deviations'

/** One level of the nesting: its line in the analysis of variance, and what it adds to the variance of one value. */
export interface NestedSource {
  readonly sumOfSquares: number
  readonly degreesOfFreedom: number
  readonly meanSquare: number
  /** Over the mean square of the next level in; null for the innermost, or where nothing varies within. */
  readonly f: number | null
  /** Probability of so large an f were there no such component. */
  readonly p: number | null
  /** The component. Left negative where it comes out so: its groups differ less than what they hold lets expect. */
  readonly variance: number
  /** null where the variance is negative. */
  readonly standardDeviation: number | null
  /** Share of the sum of the components, a negative one taken for 0; null where nothing varies at all. */
  readonly percent: number | null
  /** Of the standard deviation; from 0 where the component may be none at all. */
  readonly interval: ConfidenceInterval
}

export interface NestedVariance {
  readonly count: number
  readonly mean: number
  readonly total: { readonly sumOfSquares: number; readonly degreesOfFreedom: number }
  readonly outer: NestedSource
  readonly middle: NestedSource
  readonly inner: NestedSource
}

/**
 * Components of variance of a balanced nested design of three levels, all random: outer = (MSO - MSM) / (b n),
 * middle = (MSM - MSI) / n, inner = MSI, for a outer groups of b middle groups of n values.
 *
 * @param values  finite where they count
 * @param nested  rows of `values`: for each outer group its middle groups; a >= 2, b >= 2 and n >= 2 the same throughout
 * @param level   confidence of the intervals, 0.5 to 0.999999
 * @throws CoreError not-applicable where groups are too few or unequal; out-of-range for a NaN that counts
 *
 * Accuracy: the innermost interval is exact for normal values, the others approximate (component-interval.ts).
 * Sources: NIST/SEMATECH e-Handbook of Statistical Methods 3.2.3.3 and 3.5.1; S. R. Searle, Linear Models (1971) ch. 11
 * (the latter from memory).
 */
export function nestedVariance({
  values,
  nested,
  level = 0.95,
}: {
  readonly values: Float64Array
  readonly nested: readonly (readonly Uint32Array[])[]
  readonly level?: number
}): NestedVariance {
  const { a, b, n } = requireBalanced(nested)
  const columns = nested.flat().map((rows) => gather(values, rows))
  const outerColumns = nested.map((groups) => gather(values, joined(groups)))
  const all = gather(values, joined(nested.flat()))
  const grand = preciseMean(all)
  const middleMeans = columns.map(preciseMean)
  const outerMeans = outerColumns.map(preciseMean)
  const ss = {
    outer: b * n * sumOf(a, (i) => difference(outerMeans[i], grand) ** 2),
    middle: n * sumOf(a * b, (j) => difference(middleMeans[j], outerMeans[Math.floor(j / b)]) ** 2),
    inner: sumOf(a * b, (j) => sumOfSquares(columns[j], middleMeans[j])),
  }
  const lines = [line(ss.outer, a - 1, b * n), line(ss.middle, a * (b - 1), n), line(ss.inner, a * b * (n - 1), 1)]
  const [outer, middle, inner] = sourcesOf(lines, level)
  return {
    count: all.length,
    mean: grand.high + grand.low,
    total: { sumOfSquares: sumOfSquares(all, grand), degreesOfFreedom: all.length - 1 },
    outer,
    middle,
    inner,
  }
}

interface Line {
  readonly sumOfSquares: number
  readonly degreesOfFreedom: number
  readonly meanSquare: number
  /** Values a group of this level. */
  readonly size: number
}

function line(sumOfSquares: number, degreesOfFreedom: number, size: number): Line {
  return { sumOfSquares, degreesOfFreedom, meanSquare: sumOfSquares / degreesOfFreedom, size }
}

/** Outermost first. */
function sourcesOf(lines: readonly Line[], level: number): NestedSource[] {
  const variances = lines.map(({ meanSquare, size }, i) => (meanSquare - (lines[i + 1]?.meanSquare ?? 0)) / size)
  const whole = variances.reduce((sum, variance) => sum + Math.max(0, variance), 0)
  return lines.map((larger, i) => {
    const { sumOfSquares, degreesOfFreedom, meanSquare } = larger
    const smaller = lines[i + 1]
    const variance = variances[i]
    const f = smaller && smaller.meanSquare > 0 ? meanSquare / smaller.meanSquare : null
    const interval = smaller
      ? componentInterval({ larger, smaller, divisor: larger.size, level })
      : varianceInterval({ variance, degreesOfFreedom, level })
    return {
      sumOfSquares,
      degreesOfFreedom,
      meanSquare,
      f,
      p: f === null ? null : fUpperProbability(f, degreesOfFreedom, smaller.degreesOfFreedom),
      variance,
      standardDeviation: variance < 0 ? null : Math.sqrt(variance),
      percent: whole > 0 ? (100 * Math.max(0, variance)) / whole : null,
      interval: rootOfInterval(interval),
    }
  })
}

function difference(a: PreciseMean, b: PreciseMean): number {
  return a.high - b.high + (a.low - b.low)
}

function joined(groups: readonly Uint32Array[]): Uint32Array {
  return Uint32Array.from(groups.flatMap((rows) => [...rows]))
}

function requireBalanced(nested: readonly (readonly Uint32Array[])[]): { a: number; b: number; n: number } {
  const a = nested.length
  const b = nested[0]?.length ?? 0
  const n = nested[0]?.[0]?.length ?? 0
  if (a < 2 || b < 2 || n < 2) throw refusal('every level needs two or more')
  const isBalanced = nested.every((groups) => groups.length === b && groups.every((rows) => rows.length === n))
  if (!isBalanced) throw refusal('the groups are not all of one size')
  return { a, b, n }
}

function refusal(why: string): CoreError {
  return new CoreError({ kind: 'not-applicable', what: 'nested analysis of variance', why })
}
