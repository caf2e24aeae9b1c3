/** A site's uncertainty worked out twice: by the first-order budget, and by Monte Carlo through the pipeline. */
import type { LotAnalysis } from '../analysis/lot-analysis'
import { siteContributions } from '../analysis/site-contributions'
import { coverageFactorOf } from '../analysis/uncertainty-budget'
import { agreement, monteCarlo, type Agreement, type FirstOrder, type MonteCarloResult } from './propagate'
import { siteModel } from './site-model'

export const DEFAULT_TRIALS = 100_000
export const DEFAULT_SEED = 20260316

export interface SiteCheckInput {
  readonly trials?: number
  readonly seed?: number
  readonly tell?: (share: number) => void
}

export interface SiteCheck {
  readonly wafer: string
  readonly site: string
  readonly unit: string
  /** With the normal distribution's coverage factor, as the draws are normal. */
  readonly firstOrder: FirstOrder
  readonly monteCarlo: MonteCarloResult
  readonly agreement: Agreement
}

/**
 * Every component is drawn from a normal distribution of its standard uncertainty; what the budget takes for correlated
 * among sites is of no matter to one site.
 *
 * @param site  row of the site columns
 * @throws CoreError not-applicable where the value is reported ready made, or nothing in it is uncertain
 */
export function checkSite(analysis: LotAnalysis, site: number, { trials = DEFAULT_TRIALS, seed = DEFAULT_SEED, tell }: SiteCheckInput = {}): SiteCheck {
  const { readings, procedure, quantity, sites } = analysis
  const level = procedure.statistics.confidence
  const { parts, relative } = siteContributions(analysis, site)
  const model = siteModel(analysis, site, parts)
  const found = monteCarlo({ draws: model.draws.length, evaluate: model.evaluate, trials, seed, level, ...(tell && { tell }) })
  const value = sites.value[site]
  const standardUncertainty = value * relative
  const firstOrder = { value, standardUncertainty, expandedUncertainty: coverageFactorOf(Infinity, level) * standardUncertainty }
  return {
    wafer: readings.wafers[readings.wafer[site]].id,
    site: readings.siteNames[readings.site[site]],
    unit: quantity.unit,
    firstOrder,
    monteCarlo: found,
    agreement: agreement(firstOrder, found),
  }
} // prettier-ignore
