/** How much of a lot's spread is sites within a wafer, how much wafers within the lot. */
import { analysisOfVariance } from './analysis-of-variance'
import { componentInterval, type MeanSquare } from './component-interval'
import { rootOfInterval, varianceInterval, type ConfidenceInterval } from './intervals'
import { gather, preciseMean, sumOf, sumOfSquares } from './mean-and-deviations'

/** One component: a variance estimate may come out negative; then it has no standard deviation (NaN). */
export interface VarianceComponent {
  readonly variance: number
  readonly standardDeviation: number
  readonly degreesOfFreedom: number
  /** Of the standard deviation; from 0 where the spread may be none at all. */
  readonly interval: ConfidenceInterval
}

/** One-way random-effects analysis: site in wafer, wafer in lot. The wafer component may come out negative and is left so. */
export interface VarianceComponents {
  readonly withinWafer: VarianceComponent
  readonly betweenWafers: VarianceComponent
  readonly source: string
}

/**
 * Components of variance by the analysis-of-variance method, for wafers of unequal numbers of sites: within = MSW,
 * between = (MSB - MSW) / n0, n0 = (N - sum n_i^2 / N) / (k - 1).
 *
 * A negative between-wafer variance is reported as it is: it says that the wafer means differ less than their sites'
 * spread alone would make them, which is a finding (an alternating pattern, a doubled file), not a zero.
 *
 * @param values  finite where they count
 * @param wafers  each wafer's rows of `values`
 * @param level   confidence of the intervals, 0.5 to 0.999999
 * @returns null where a lot can't say: fewer than two wafers with values, or one value a wafer
 * @throws CoreError out-of-range for a NaN that counts
 *
 * Accuracy: the interval within is exact for normal values, that between approximate (component-interval.ts); with
 * unequal numbers of sites the latter is of the unweighted wafer means, the harmonic mean standing for their number.
 * Sources: S. R. Searle, G. Casella, C. E. McCulloch, Variance Components (1992) ch. 3; unequal numbers: R. K. Burdick,
 * F. A. Graybill, Confidence Intervals on Variance Components (1992) ch. 4 (both from memory).
 */
export function componentsOfVariance(
  values: Float64Array,
  wafers: readonly Uint32Array[],
  level = 0.95,
): VarianceComponents | null {
  const measured = wafers.filter((sites) => sites.length > 0)
  if (measured.length < 2 || measured.every((sites) => sites.length === 1)) return null
  const { between, within, effectiveGroupSize } = analysisOfVariance(values, measured)
  const { divisor, ...larger } = unweightedMeanSquare(values, measured)
  const withinInterval = varianceInterval({
    variance: within.meanSquare,
    degreesOfFreedom: within.degreesOfFreedom,
    level,
  })
  const betweenInterval = componentInterval({ larger, smaller: within, divisor, level })
  const wafer = (between.meanSquare - within.meanSquare) / effectiveGroupSize
  return {
    withinWafer: component(within.meanSquare, within.degreesOfFreedom, withinInterval),
    betweenWafers: component(wafer, between.degreesOfFreedom, betweenInterval),
    source: 'one-way random effects, analysis-of-variance estimates',
  }
}

/** The mean square between of unweighted means: that of the analysis of variance where all wafers have as many sites. */
function unweightedMeanSquare(
  values: Float64Array,
  wafers: readonly Uint32Array[],
): MeanSquare & { readonly divisor: number } {
  const means = Float64Array.from(wafers, (sites) => {
    const { high, low } = preciseMean(gather(values, sites))
    return high + low
  })
  const harmonicSize = wafers.length / sumOf(wafers.length, (i) => 1 / wafers[i].length)
  const degreesOfFreedom = wafers.length - 1
  const variance = sumOfSquares(means, preciseMean(means)) / degreesOfFreedom
  return { meanSquare: harmonicSize * variance, degreesOfFreedom, divisor: harmonicSize }
}

function component(variance: number, degreesOfFreedom: number, interval: ConfidenceInterval): VarianceComponent {
  return {
    variance,
    standardDeviation: variance < 0 ? NaN : Math.sqrt(variance),
    degreesOfFreedom,
    interval: rootOfInterval(interval),
  }
}
