/** The first-order budget held against a Monte Carlo calculation of the same site. */
import { checkSite, type SiteCheck } from '../../monte-carlo/check-site'
import { CoreError } from '../../problems/problem'
import { formatFixed, formatQuantity, formatSignificant } from '../../units/format'
import type { LotAnalysis } from '../../analysis/lot-analysis'
import type { Block, TableRow } from '../document'
import type { ReportContext } from '../report-context'

/** So many that two digits of the uncertainty stand, and so few that a report doesn't wait for them. */
const REPORT_TRIALS = 4000

export function monteCarloBlocks({ analysis, input: { working } }: ReportContext): Block[] {
  const site = working && rowOf(analysis, working.wafer, working.site)
  if (site === null) return []
  const check = checked(analysis, site)
  return check ? siteCheckBlocks(check) : []
} // prettier-ignore

export function siteCheckBlocks(check: SiteCheck): Block[] {
  const { firstOrder, monteCarlo: found, agreement, unit } = check
  const quantity = (value: number): string => formatQuantity(value, unit)
  const row = (name: string, mean: number, u: number, low: number, high: number): TableRow => ({
    cells: [name, quantity(mean), quantity(u), quantity(low), quantity(high)],
  })
  const { value, expandedUncertainty: expanded } = firstOrder
  return [
    { kind: 'heading', level: 2, text: 'Held against a Monte Carlo calculation' },
    {
      kind: 'table',
      summary: 'First-order budget and Monte Carlo calculation of one site',
      columns: [
        { title: '', align: 'left', share: 2 },
        { title: 'value', align: 'left', share: 1 },
        { title: 'u', align: 'left', share: 1 },
        { title: 'from', align: 'left', share: 1 },
        { title: 'to', align: 'left', share: 1 },
      ],
      rows: [
        row('first order', value, firstOrder.standardUncertainty, value - expanded, value + expanded),
        row(`Monte Carlo, ${formatFixed(found.trials, 0)} trials`, found.mean, found.standardUncertainty, found.interval.lower, found.interval.upper),
      ],
    },
    {
      kind: 'paragraph',
      text: `${agreement.sentence} Numerical tolerance ${quantity(agreement.tolerance)}, with ${quantity(agreement.noise)} left to chance; the ends differ by ${formatSignificant(agreement.lowerDifference, 2)} and ${formatSignificant(agreement.upperDifference, 2)} ${unit}. Coverage ${formatFixed(100 * found.level, 0)} %, seed ${found.seed}, normal distributions throughout (JCGM 101:2008, clause 8).`,
      quiet: true,
    },
  ]
} // prettier-ignore

function rowOf({ wafers, readings }: LotAnalysis, wafer: string, site: string): number | null {
  const sites = wafers.find(({ id }) => id === wafer)?.sites
  return sites?.find((i) => readings.siteNames[readings.site[i]] === site) ?? null
}

/** null where there is no model of the site, or nothing in it is uncertain. */
function checked(analysis: LotAnalysis, site: number): SiteCheck | null {
  try {
    return checkSite(analysis, site, { trials: REPORT_TRIALS })
  } catch (error) {
    if (error instanceof CoreError) return null
    throw error
  }
}
