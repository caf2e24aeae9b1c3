/** The judged value against the distance from the wafer's centre, with the means of its rings and the limits. */
import { ringMeans, type RingMeans } from '../../map/rings'
import type { Drawing, Shape } from '../drawing'
import { line, polyline } from '../drawing'
import { formatMm } from '../../units/format'
import { chartFrame, frameShapes, limitLines, limitsInReach, padded, type ChartFrame } from './chart-frame'
import { INK, RULE } from './ink'
import { mark, markOf, type SiteLimits } from './marks'
import type { MapQuantity, MapSites } from './map-input'

export interface RadialProfileInput {
  readonly title: string
  readonly quantity: MapQuantity
  readonly sites: MapSites
  readonly limits: SiteLimits
  /** Half the diameter; NaN takes the farthest site. */
  readonly edgeRadius_mm: number
  readonly edgeExclusion_mm: number
  readonly width_pt: number
  readonly height_pt: number
}

const MOST_POINTS = 1500

export function radialProfile(input: RadialProfileInput): Drawing {
  const { sites, limits } = input
  const radius = Float64Array.from(sites.value, (_, i) => Math.hypot(sites.x_mm[i], sites.y_mm[i]))
  const values = Array.from(sites.value).filter(Number.isFinite)
  const min = values.reduce((least, value) => Math.min(least, value), Infinity)
  const max = values.reduce((most, value) => Math.max(most, value), -Infinity)
  const farthest = radius.reduce((most, r) => (r > most ? r : most), 0)
  const edge = Number.isFinite(input.edgeRadius_mm) ? input.edgeRadius_mm : farthest || 1
  const frame = chartFrame({
    width_pt: input.width_pt,
    height_pt: input.height_pt,
    x: { min: 0, max: Math.max(edge, farthest) },
    y: padded([min, max, ...limitsInReach(limits, min, max)].filter(Number.isFinite)),
    xTickCount: 5,
    yTickCount: 5,
    right_pt: 48,
  })
  return {
    width_pt: input.width_pt,
    height_pt: input.height_pt,
    title: input.title,
    description: `${input.quantity.title} of ${values.length} sites against their distance from the centre, 0 to ${formatMm(edge)}, and the mean of each ring with its standard error.`,
    shapes: [
      ...frameShapes(frame, { x: 'distance from the centre / mm', y: axisTitle(input.quantity) }),
      ...exclusionLine(frame, edge - input.edgeExclusion_mm, input.edgeExclusion_mm),
      ...limitLines(frame, limits),
      ...points(frame, radius, input),
      ...meansWithErrors(frame, ringsIn(sites)),
    ],
  }
}

export function axisTitle({ title, unit }: MapQuantity): string {
  return `${title} / ${unit}`
}

function exclusionLine(frame: ChartFrame, at_mm: number, exclusion_mm: number): Shape[] {
  if (!(exclusion_mm > 0) || at_mm <= 0) return []
  const x = frame.x(at_mm)
  return [line(x, frame.top, x, frame.bottom, { stroke: INK, lineWidth_pt: 0.35, dash_pt: [1.2, 1.8] })]
}

/** Means of the rings on a line, each with its standard error up and down; of many rings the line alone. */
function meansWithErrors(frame: ChartFrame, { r_mm, mean, standardError }: RingMeans): Shape[] {
  const shapes: Shape[] = []
  if (r_mm.length > 1) {
    const path = Array.from(r_mm).flatMap((r, ring) => [frame.x(r), frame.y(mean[ring])])
    shapes.push(polyline(path, { stroke: RULE, lineWidth_pt: 1.2 }))
  }
  if (r_mm.length > MOST_BARS) return shapes
  const clipped = (value: number) => frame.y(Math.max(frame.yRange.min, Math.min(frame.yRange.max, value)))
  r_mm.forEach((r, ring) => {
    if (!(standardError[ring] > 0)) return
    const x = frame.x(r)
    const [top, bottom] = [clipped(mean[ring] + standardError[ring]), clipped(mean[ring] - standardError[ring])]
    for (const y of [top, bottom]) shapes.push(line(x - CAP_PT, y, x + CAP_PT, y, BAR))
    shapes.push(line(x, top, x, bottom, BAR))
  })
  return shapes
}

const MOST_BARS = 60
const CAP_PT = 2.2
const BAR = { stroke: INK, lineWidth_pt: 0.7 } as const

function ringsIn({ x_mm, y_mm, value, excluded }: MapSites): RingMeans {
  const shown = Float64Array.from(value, (each, i) => (excluded?.[i] === 1 || !Number.isFinite(each) ? NaN : each))
  return ringMeans({ x_mm: Float64Array.from(x_mm), y_mm: Float64Array.from(y_mm), value: shown }, RING_WIDTH_MM)
}

/** Sites whose distances from the centre differ by less belong to one ring. */
const RING_WIDTH_MM = 1

function points(frame: ChartFrame, radius: Float64Array, input: RadialProfileInput): Shape[] {
  const { sites, limits } = input
  const every = Math.ceil(radius.length / MOST_POINTS)
  const shapes: Shape[] = []
  for (let i = 0; i < radius.length; i++) {
    const value = sites.value[i]
    if (!Number.isFinite(value) || !Number.isFinite(radius[i])) continue
    const kind = markOf(sites.verdict[i], value, limits)
    if (kind === 'in-spec' && i % every !== 0) continue
    const x = frame.x(radius[i])
    const y = frame.y(value)
    shapes.push(mark(kind, x, y, kind === 'in-spec' ? 3 : 2.4))
    if (shapes.length > 2 * MOST_POINTS) break
  }
  return shapes
}
