/** The map of one wafer: value bands, the wafer's outline, its sites with their values, and what is out of spec. */
import type { Drawing, Shape } from '../drawing'
import { group, line, polygon, rectangle, text } from '../drawing'
import { formatFixed } from '../../units/format'
import { bandOf, isDark, type BandScale } from './band-scale'
import { colourBar } from './colour-bar'
import { AXIS_PT, FAINT, INK, PAPER, QUIET_INK, RULE } from './ink'
import type { MapContour, MapDies, WaferMapInput, Plane } from './map-input'
import { mapLegend } from './map-legend'
import { mark, markOf, type MarkKind } from './marks'
import { drawnExtent, outlineRing } from './outline-path'
import { siteDecimals, siteValues, type MarkedSite } from './site-values'
import { niceTicks } from './ticks'

/** Beyond so many sites, dots would hide the map: only the marks that say something are drawn. */
const MOST_DOTS = 1500
const MOST_MARKS = 1500
const AXIS_SPACE_PT = 26
const BAR_SPACE_PT = 62
const LEGEND_SPACE_PT = 22

export function waferMap(input: WaferMapInput): Drawing {
  const { width_pt, height_pt } = input
  const extent = drawnExtent(input.outline, input.sites.x_mm, input.sites.y_mm)
  const field = {
    left: AXIS_SPACE_PT,
    top: 4,
    width: width_pt - AXIS_SPACE_PT - BAR_SPACE_PT,
    height: height_pt - 8 - AXIS_SPACE_PT - LEGEND_SPACE_PT,
  }
  const scale = Math.min(field.width / (2.04 * extent.halfWidth_mm), field.height / (2.04 * extent.halfHeight_mm))
  const centreX = field.left + field.width / 2
  const centreY = field.top + field.height / 2
  const plane: Plane = { scale_pt_per_mm: scale, x: (x) => centreX + x * scale, y: (y) => centreY - y * scale }
  const marks = Array.from({ length: input.sites.value.length }, (_, i) =>
    markOf(input.sites.verdict[i], input.sites.value[i], input.limits),
  )
  const bottom = centreY + extent.halfHeight_mm * scale
  return {
    width_pt,
    height_pt,
    title: input.title,
    description: mapDescription(input, marks),
    shapes: [
      ...surface(input, plane),
      ...axes(plane, extent, centreX - extent.halfWidth_mm * scale - 4, bottom + 5),
      ...edges(input, plane),
      ...diesOut(input.diesOut, plane),
      ...siteMarks(input, plane, marks),
      colourBar({
        x_pt: Math.min(width_pt - BAR_SPACE_PT + 14, centreX + extent.halfWidth_mm * scale + 26),
        y_pt: field.top + 16,
        height_pt: field.height - 22,
        scale: input.scale,
        limits: input.limits,
        quantity: input.quantity,
      }),
      mapLegend(drawnKinds(marks), input, field.left, Math.min(height_pt - 13, bottom + 28)),
    ],
  }
}

/** Bands from the lowest up, each covering the one before where the value is higher. */
export function bandShapes(contours: readonly MapContour[], scale: BandScale, plane: Plane): Shape[] {
  return contours
    .filter((contour) => contour.rings_mm.length > 0)
    .map((contour) => ({
      kind: 'rings',
      closed: true,
      rings: contour.rings_mm.map((ring) => ringToPoints(ring, plane)),
      fill: scale.colours[bandOf(scale, contour.threshold)],
    }))
}

export function ringToPoints(ring_mm: readonly number[], plane: Plane): number[] {
  return ring_mm.map((value, i) => (i % 2 === 0 ? plane.x(value) : plane.y(value)))
}

function surface(input: WaferMapInput, plane: Plane): Shape[] {
  const ring = ringToPoints(outlineRing(input.outline), plane)
  if (!input.contours) return ring.length > 0 ? [polygon(ring, { fill: FAINT })] : []
  const bands = bandShapes(input.contours, input.scale, plane)
  return ring.length > 0 ? [{ ...group(0, 0, bands), clip: [ring] }] : [group(0, 0, bands)]
}

function edges(input: WaferMapInput, plane: Plane): Shape[] {
  const shapes: Shape[] = []
  const exclusion = input.edgeExclusion_mm > 0 ? outlineRing(input.outline, input.edgeExclusion_mm) : []
  if (exclusion.length > 0) {
    const ring = ringToPoints(exclusion, plane)
    shapes.push(polygon(ring, { stroke: PAPER, lineWidth_pt: 0.5 }))
    shapes.push(polygon(ring, { stroke: INK, lineWidth_pt: 0.35, dash_pt: [1.2, 1.8] }))
  }
  const edge = ringToPoints(outlineRing(input.outline), plane)
  if (edge.length > 0) shapes.push(polygon(edge, { stroke: INK, lineWidth_pt: 0.8 }))
  return shapes
}

function axes(plane: Plane, extent: ReturnType<typeof drawnExtent>, left: number, bottom: number): Shape[] {
  const shapes: Shape[] = []
  const across = niceTicks(-extent.halfWidth_mm, extent.halfWidth_mm, 4)
  const up = niceTicks(-extent.halfHeight_mm, extent.halfHeight_mm, 4)
  const look = { size_pt: AXIS_PT, fill: QUIET_INK } as const
  shapes.push(
    line(plane.x(-extent.halfWidth_mm), bottom, plane.x(extent.halfWidth_mm), bottom, {
      stroke: RULE,
      lineWidth_pt: 0.5,
    }),
  )
  shapes.push(
    line(left, plane.y(-extent.halfHeight_mm), left, plane.y(extent.halfHeight_mm), {
      stroke: RULE,
      lineWidth_pt: 0.5,
    }),
  )
  for (const x of across.values) {
    shapes.push(line(plane.x(x), bottom, plane.x(x), bottom + 2.5, { stroke: QUIET_INK, lineWidth_pt: 0.5 }))
    shapes.push(text(plane.x(x), bottom + 10, formatFixed(x, across.decimals), { ...look, anchor: 'middle' }))
  }
  for (const y of up.values) {
    shapes.push(line(left - 2.5, plane.y(y), left, plane.y(y), { stroke: QUIET_INK, lineWidth_pt: 0.5 }))
    shapes.push(text(left - 4.5, plane.y(y) + 2.4, formatFixed(y, up.decimals), { ...look, anchor: 'end' }))
  }
  // The titles stand between two ticks, where no number is.
  const between = 1.5 * across.step
  shapes.push(text(plane.x(between), bottom + 10, 'x / mm', { ...look, anchor: 'middle' }))
  shapes.push(text(left - 4.5, plane.y(1.5 * up.step) + 2.4, 'y / mm', { ...look, anchor: 'end' }))
  return shapes
}

function diesOut(dies: MapDies | null, plane: Plane): Shape[] {
  if (!dies || dies.centreX_mm.length === 0) return []
  const rings = dies.centreX_mm.map((x_mm, i) => {
    const width = dies.pitchX_mm * plane.scale_pt_per_mm
    const height = dies.pitchY_mm * plane.scale_pt_per_mm
    const x = plane.x(x_mm) - width / 2
    const y = plane.y(dies.centreY_mm[i]) - height / 2
    return rectangle(x + 0.5, y + 0.5, width - 1, height - 1, {}).rings[0]
  })
  return [
    { kind: 'rings', rings, closed: true, stroke: PAPER, lineWidth_pt: 1.3 },
    { kind: 'rings', rings, closed: true, stroke: INK, lineWidth_pt: 0.6 },
  ]
}

/** The kinds that a reader will find in the map. */
function drawnKinds(marks: readonly MarkKind[]): readonly MarkKind[] {
  return marks.length > MOST_DOTS ? marks.filter((kind) => kind !== 'in-spec') : marks
}

function siteMarks(input: WaferMapInput, plane: Plane, marks: readonly MarkKind[]): Shape[] {
  const { sites, scale } = input
  const withDots = marks.length <= MOST_DOTS
  const size = Math.min(3.4, Math.max(1.4, (40 * plane.scale_pt_per_mm) / Math.sqrt(Math.max(1, marks.length))))
  const shapes: Shape[] = []
  const drawn: MarkedSite[] = []
  for (let i = 0; i < marks.length && drawn.length < MOST_MARKS; i++) {
    const kind = marks[i]
    if (kind === 'in-spec' && !withDots) continue
    if (!Number.isFinite(sites.x_mm[i]) || !Number.isFinite(sites.y_mm[i])) continue
    drawn.push({ key: i, kind })
    const onDark =
      input.contours !== null && kind !== 'not-assessed' && isDark(scale.colours[bandOf(scale, sites.value[i])])
    shapes.push(mark(kind, plane.x(sites.x_mm[i]), plane.y(sites.y_mm[i]), size, { onDark, rim: true }))
  }
  return [...shapes, ...siteValues(drawn, size, input, plane)]
}

function mapDescription(input: WaferMapInput, marks: readonly MarkKind[]): string {
  const { quantity, sites } = input
  let min = Infinity
  let max = -Infinity
  for (let i = 0; i < sites.value.length; i++) {
    if (sites.value[i] < min) min = sites.value[i]
    if (sites.value[i] > max) max = sites.value[i]
  }
  const range =
    min <= max
      ? `from ${formatFixed(min, siteDecimals(sites.value))} to ${formatFixed(max, siteDecimals(sites.value))} ${quantity.unit}`
      : 'without a value'
  const count = (kind: MarkKind) => marks.filter((each) => each === kind).length
  const dies = input.diesOut ? ` ${input.diesOut.centreX_mm.length} dies are out of spec.` : ''
  return (
    `${quantity.title} at ${marks.length} sites, ${range}. ${count('above')} sites above the upper limit, ` +
    `${count('below')} below the lower, ${count('undecided')} undecided, ${count('not-assessed')} not assessed.${dies}`
  )
}
