/** The one site that a smooth surface can't follow. */
import { fUpperProbability } from '../numeric/distributions'
import type { TrendSurface } from './trend-surface'

export interface OutlyingSite {
  /** Entry of the fitted columns. */
  readonly site: number
  /** Value less the surface fitted without this site. */
  readonly deviation: number
  /** Share of the variance that a free value for this site alone would explain. */
  readonly share: number
  /** Times the number of sites, since the worst of them was looked for (Bonferroni); at most 1. */
  readonly pValue: number
}

/** A site that pulls the surface wholly to itself has no residual to judge it by. */
const FULL_LEVERAGE = 1 - 1e-9

/**
 * The site whose removal lowers the residual sum of squares most, r^2 / (1 - h), tested as one more term: F with 1 and
 * one fewer degrees of freedom, the square of the externally studentised residual.
 *
 * Source: R. D. Cook, S. Weisberg, Residuals and Influence in Regression (1982), sect. 2.2 (from memory).
 *
 * @returns null where removing one leaves no degree of freedom, or where the values don't vary
 */
export function mostOutlyingSite(trend: TrendSurface): OutlyingSite | null {
  const { residuals, leverage, degreesOfFreedom, residualSumOfSquares, totalSumOfSquares } = trend
  if (degreesOfFreedom < 2 || totalSumOfSquares === 0) return null
  let [site, gain] = [-1, 0]
  for (let i = 0; i < residuals.length; i++) {
    const own = leverage[i] < FULL_LEVERAGE ? residuals[i] ** 2 / (1 - leverage[i]) : 0
    if (own > gain) [site, gain] = [i, own]
  }
  if (site < 0) return null
  // Rounding may leave less than nothing where this site was all there is.
  const left = Math.max(0, residualSumOfSquares - gain)
  const f = (gain * (degreesOfFreedom - 1)) / left
  return {
    site,
    deviation: residuals[site] / (1 - leverage[site]),
    share: gain / totalSumOfSquares,
    pValue: Math.min(1, residuals.length * fUpperProbability(f, 1, degreesOfFreedom - 1)),
  }
}
