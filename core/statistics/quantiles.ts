/** Order statistics. Selection, not sorting: a lot may be a single wafer of a million sites. */
import { CoreError, requireRange } from '../problems/problem'
import { gather } from './mean-and-deviations'

/** Makes a normal sample's median absolute deviation an estimate of its standard deviation: 1 / Phi^-1(3/4). */
export const MAD_TO_SIGMA = 1.482602218505602

/**
 * The quantile at 0 <= p <= 1 by linear interpolation of the order statistics: definition 7 of R. J. Hyndman and
 * Y. Fan, Am. Stat. 50 (1996) 361. At p = 1/2 the median, the mean of the middle two of an even count.
 * Throws CoreError for no values, one that isn't finite, or p outside 0 to 1.
 */
export function quantile(values: Float64Array, p: number, indices?: Uint32Array): number {
  requireRange('p', p, '', 0, 1)
  const chosen = gather(values, indices)
  if (chosen.length === 0) throw noValues('quantile')
  return quantileInPlace(chosen, p)
}

/** As `quantile`, of at least one finite value; reorders them. */
export function quantileInPlace(values: Float64Array, p: number): number {
  const position = (values.length - 1) * p
  const below = Math.floor(position)
  const lower = select(values, below)
  if (position === below) return lower
  // All that lies right of `below` is not smaller, so its least is the next order statistic.
  let upper = Infinity
  for (let i = below + 1; i < values.length; i++) upper = Math.min(upper, values[i]!)
  return lower + (position - below) * (upper - lower)
}

export interface MedianAndMad {
  readonly median: number
  /** Median absolute deviation from the median, unscaled; times MAD_TO_SIGMA for a robust standard deviation. */
  readonly mad: number
}

/** Throws CoreError for no values or one that isn't finite. */
export function medianAndMad(values: Float64Array, indices?: Uint32Array): MedianAndMad {
  const chosen = gather(values, indices)
  if (chosen.length === 0) throw noValues('median')
  const median = quantileInPlace(chosen, 0.5)
  for (let i = 0; i < chosen.length; i++) chosen[i] = Math.abs(chosen[i]! - median)
  return { median, mad: quantileInPlace(chosen, 0.5) }
}

/** C. A. R. Hoare's selection: afterwards values[rank] is in its sorted place, smaller ones left, larger right. */
function select(values: Float64Array, rank: number): number {
  let left = 0
  let right = values.length - 1
  while (left < right) {
    const pivot = middleOfThree(values[left]!, values[(left + right) >> 1]!, values[right]!)
    let i = left
    let j = right
    while (i <= j) {
      while (values[i]! < pivot) i++
      while (values[j]! > pivot) j--
      if (i > j) break
      const swapped = values[i]!
      values[i++] = values[j]!
      values[j--] = swapped
    }
    if (rank <= j) right = j
    else if (rank >= i) left = i
    else break
  }
  return values[rank]!
}

function middleOfThree(a: number, b: number, c: number): number {
  return Math.max(Math.min(a, b), Math.min(Math.max(a, b), c))
}

function noValues(what: string): CoreError {
  return new CoreError({ kind: 'not-applicable', what, why: 'there are no values' })
}
