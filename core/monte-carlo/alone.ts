/** A lot reduced to one of its sites: all that a Monte Carlo calculation of it needs, and little to hand to a worker. */
import type { LotAnalysis, SiteColumns } from '../analysis/lot-analysis'
import { oneSite } from '../analysis/one-site'

/** The site is row 0 of it. */
export function siteAlone(analysis: LotAnalysis, site: number): LotAnalysis {
  const one = (column: Float64Array | null): Float64Array | null => column && column.slice(site, site + 1)
  const columns = Object.fromEntries(
    Object.entries(analysis.sites).map(([name, column]) => [name, column instanceof Float64Array ? one(column) : column]),
  ) as unknown as SiteColumns
  const readings = oneSite(analysis.readings, site)
  return {
    ...analysis,
    readings,
    sites: { ...columns, count: 1, verdict: analysis.sites.verdict.slice(site, site + 1), flags: analysis.sites.flags.slice(site, site + 1) },
    dies: null,
    wafers: [],
    health: [],
    check: null,
    problems: [],
  }
} // prettier-ignore
