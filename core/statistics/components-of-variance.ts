/** How much of a lot's spread is sites within a wafer, how much wafers within the lot. */
import { analysisOfVariance } from './analysis-of-variance'

/** One component: a variance estimate may come out negative; then it has no standard deviation (NaN). */
export interface VarianceComponent {
  readonly variance: number
  readonly standardDeviation: number
  readonly degreesOfFreedom: number
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
 * @returns null where a lot can't say: fewer than two wafers with values, or one value a wafer
 * @throws CoreError out-of-range for a NaN that counts
 *
 * Sources: S. R. Searle, G. Casella, C. E. McCulloch, Variance Components (1992) ch. 3 (from memory).
 */
export function componentsOfVariance(values: Float64Array, wafers: readonly Uint32Array[]): VarianceComponents | null {
  const measured = wafers.filter((sites) => sites.length > 0)
  if (measured.length < 2 || measured.every((sites) => sites.length === 1)) return null
  const { between, within, effectiveGroupSize } = analysisOfVariance(values, measured)
  const wafer = (between.meanSquare - within.meanSquare) / effectiveGroupSize
  return {
    withinWafer: component(within.meanSquare, within.degreesOfFreedom),
    betweenWafers: component(wafer, between.degreesOfFreedom),
    source: 'one-way random effects, analysis-of-variance estimates',
  }
}

function component(variance: number, degreesOfFreedom: number): VarianceComponent {
  return { variance, standardDeviation: variance < 0 ? NaN : Math.sqrt(variance), degreesOfFreedom }
}
