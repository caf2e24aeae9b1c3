/** The surface of a wafer along a diameter, with the sites near it. */
import type { WaferAnalysis } from '../../../core/analysis/lot-analysis'
import { lineProfile } from '../../../core/map/line-profile'
import { polyline, type Drawing } from '../../../core/report/drawing'
import { chartFrame, frameShapes, limitLines, limitsInReach, padded } from '../../../core/report/figures/chart-frame'
import { INK, QUIET_INK } from '../../../core/report/figures/ink'
import { mark } from '../../../core/report/figures/marks'
import { axisTitle } from '../../../core/report/figures/radial-profile'
import { waferTitle } from '../../../core/report/report-context'
import { columnsOf } from './compared-maps'
import { extremes } from './map-layer'
import { siteMark, type LotPictures } from './lot-pictures'

const POINTS = 161
const NEAR_SHARE = 0.06

export function lineFigure(pictures: LotPictures, wafer: WaferAnalysis, angle_deg: number): Drawing | null {
  const { analysis, siteLimits } = pictures
  const columns = columnsOf(pictures, wafer)
  if (!columns) return null
  const radius_mm = reachOf(pictures, wafer)
  const line = { direction_deg: angle_deg, radius_mm, points: POINTS, nearness_mm: NEAR_SHARE * radius_mm }
  const { position_mm, value, extrapolated, near, source } = lineProfile(columns, line)
  const { min, max } = extremes([...value, ...near.value])
  const frame = chartFrame({
    width_pt: 264,
    height_pt: 190,
    x: { min: -radius_mm, max: radius_mm },
    y: padded([min, max, ...limitsInReach(siteLimits, min, max)]),
    xTickCount: 4,
    yTickCount: 5,
    right_pt: 48,
  })
  const course = (isGuess: 0 | 1): number[][] => runs(extrapolated, isGuess).map((run) => run.flatMap((i) => [frame.x(position_mm[i]), frame.y(value[i])])) // prettier-ignore
  return {
    width_pt: 264,
    height_pt: 190,
    title: `Line profile of ${waferTitle(wafer.id).toLowerCase()} along ${angle_deg}°`,
    description: `${analysis.quantity.title} along a diameter at ${angle_deg}° from +x: ${source}. Marked are the ${near.site.length} sites nearest to the line; dashed lies beyond the sites.`,
    shapes: [
      ...frameShapes(frame, { x: 'position along the line / mm', y: axisTitle(analysis.quantity) }),
      ...limitLines(frame, siteLimits),
      ...course(0).map((points) => polyline(points, { stroke: INK, lineWidth_pt: 1 })),
      ...course(1).map((points) => polyline(points, { stroke: QUIET_INK, lineWidth_pt: 0.8, dash_pt: [2, 2] })),
      ...Array.from(near.site, (site, i) => mark(siteMark(pictures, site), frame.x(near.position_mm[i]), frame.y(near.value[i]), 3)),
    ],
  } // prettier-ignore
}

function reachOf({ analysis, positions }: LotPictures, wafer: WaferAnalysis): number {
  const { outline } = analysis
  if (outline.shape === 'disc') return outline.diameter_mm / 2
  if (outline.shape === 'rectangle') return Math.min(outline.width_mm, outline.height_mm) / 2
  return extremes(Array.from(wafer.sites, (i) => Math.hypot(positions?.x_mm[i] ?? 0, positions?.y_mm[i] ?? 0))).max || 1
}

/** Stretches of equal marks, each with one entry more at the end so that they join. */
function runs(marks: Uint8Array, wanted: 0 | 1): number[][] {
  const found: number[][] = []
  for (let i = 0; i < marks.length; i++) {
    if (marks[i] !== wanted) continue
    if (i > 0 && marks[i - 1] === wanted) found[found.length - 1].push(i)
    else found.push(i > 0 ? [i - 1, i] : [i])
  }
  return found
}
