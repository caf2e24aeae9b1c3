/** The site plan that a lot was measured by, with the spread of its sites: what it can be asked about. */
import { quantile } from '../statistics/quantiles'
import type { SitePlan } from '../wafer/site-patterns'
import type { LotAnalysis, WaferAnalysis } from './lot-analysis'
import { sitePositions } from './site-positions'
import type { WaferDetails } from './wafer-details'
import { countingSites } from './wafers'

export interface PlanSight {
  readonly plan: SitePlan
  readonly usableRadius_mm: number
  /** Of a single site about its wafer's surface, relative: the median over the wafers. */
  readonly repeatability: number
}

/** null without places, on anything but a disc, or where no wafer has a surface to tell the spread by. */
export function planSight(
  analysis: LotAnalysis,
  detailsOf: (wafer: WaferAnalysis) => Pick<WaferDetails, 'patterns'>,
): PlanSight | null {
  const { outline, procedure, readings, sites, wafers } = analysis
  const positions = sitePositions(readings, procedure)
  if (!positions || outline.shape !== 'disc' || wafers.length === 0) return null
  const spreads = wafers.flatMap((wafer) => {
    const { patterns } = detailsOf(wafer)
    const share = patterns ? patterns.trend.residualStandardDeviation / wafer.statistics.mean : NaN
    return share > 0 ? [share] : []
  })
  if (spreads.length === 0) return null
  const most = wafers.reduce((best, wafer) => (wafer.statistics.count > best.statistics.count ? wafer : best))
  const rows = countingSites(most.sites, sites.flags)
  const pick = (column: Float64Array): Float64Array => Float64Array.from(rows, (i) => column[i])
  return {
    plan: { count: rows.length, x_mm: pick(positions.x_mm), y_mm: pick(positions.y_mm) },
    usableRadius_mm: outline.diameter_mm / 2 - procedure.wafer.edgeExclusionMm,
    repeatability: quantile(Float64Array.from(spreads), 0.5),
  }
}
