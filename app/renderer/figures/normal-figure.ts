/** The sites' values against the scores they would have if they were normally distributed. */
import type { WaferAnalysis } from '../../../core/analysis/lot-analysis'
import { line, type Drawing } from '../../../core/report/drawing'
import { chartFrame, frameShapes, limitLines, limitsInReach, padded } from '../../../core/report/figures/chart-frame'
import { QUIET_INK } from '../../../core/report/figures/ink'
import { mark } from '../../../core/report/figures/marks'
import { axisTitle } from '../../../core/report/figures/radial-profile'
import { waferTitle } from '../../../core/report/report-context'
import { andersonDarling, NORMALITY_MIN_COUNT, normalScores } from '../../../core/statistics/normality'
import { formatSignificant } from '../../../core/units/format'
import { columnsOf } from './compared-maps'
import { siteMark, type LotPictures } from './lot-pictures'

const MOST_POINTS = 3000

export function normalFigure(pictures: LotPictures, wafer: WaferAnalysis): Drawing | null {
  const { analysis, siteLimits } = pictures
  const columns = columnsOf(pictures, wafer)
  const { mean, standardDeviation } = wafer.statistics
  if (!columns?.sites || columns.sites.length < NORMALITY_MIN_COUNT || !(standardDeviation > 0)) return null
  const { value } = columns
  const sites = columns.sites.slice().sort((a, b) => value[a] - value[b])
  const scores = normalScores(sites.length)
  const [min, max] = [value[sites[0]], value[sites[sites.length - 1]]]
  const end = scores[scores.length - 1] * 1.08
  const normalAt = (z: number): number => mean + z * standardDeviation
  const frame = chartFrame({
    width_pt: 264,
    height_pt: 190,
    x: { min: -end, max: end },
    y: padded([min, max, normalAt(-end), normalAt(end), ...limitsInReach(siteLimits, min, max)]),
    xTickCount: 4,
    yTickCount: 5,
    right_pt: 48,
  })
  const every = Math.ceil(sites.length / MOST_POINTS)
  const { p } = andersonDarling(value, columns.sites)
  return {
    width_pt: 264,
    height_pt: 190,
    title: `Normal plot of ${waferTitle(wafer.id).toLowerCase()}`,
    description: `${sites.length} sites by rank; on the line they would be normally distributed. Anderson–Darling: so uneven a sample has probability ${formatSignificant(p, 2)} if they were, sites taken as independent.`,
    shapes: [
      ...frameShapes(frame, { x: 'standard normal score', y: axisTitle(analysis.quantity) }),
      ...limitLines(frame, siteLimits),
      line(frame.x(-end), frame.y(normalAt(-end)), frame.x(end), frame.y(normalAt(end)), { stroke: QUIET_INK, lineWidth_pt: 0.8 }),
      ...Array.from(sites, (site, i) => ({ site, i })).filter(({ i }) => i % every === 0).map(({ site, i }) => mark(siteMark(pictures, site), frame.x(scores[i]), frame.y(value[site]), 3)),
    ],
  } // prettier-ignore
}
