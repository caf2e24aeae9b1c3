/** How the sites' values are spread, with the limits. */
import type { Drawing, Shape } from '../drawing'
import { labelWidth_pt, line, rectangle, text } from '../drawing'
import { chartFrame, frameShapes, limitsInReach, namedLimits, padded, type ChartFrame } from './chart-frame'
import { AXIS_PT, INK, LABEL_PT, QUIET_INK } from './ink'
import { formatLimit } from './map-legend'
import type { SiteLimits } from './marks'
import { axisTitle } from './radial-profile'
import { fromStep, niceStep } from './ticks'
import type { MapQuantity } from './map-input'

export interface HistogramInput {
  readonly title: string
  readonly quantity: MapQuantity
  readonly values: ArrayLike<number>
  readonly limits: SiteLimits
  readonly width_pt: number
  readonly height_pt: number
}

export interface Bins {
  readonly first: number
  readonly width: number
  readonly counts: readonly number[]
}

const COUNT_TITLE = 'sites'
const BAR_FILL = '#a9a59c'

export function histogram(input: HistogramInput): Drawing {
  const values = Array.from(input.values).filter(Number.isFinite)
  const bins = binned(values)
  const last = bins.first + bins.width * bins.counts.length
  const most = Math.max(1, ...bins.counts)
  const reach = limitsInReach(input.limits, bins.first, last)
  const frame = chartFrame({
    width_pt: input.width_pt,
    height_pt: input.height_pt,
    x: padded([bins.first, last, ...reach], 0.04),
    y: { min: 0, max: most * 1.08 },
    xTickCount: 5,
    yTickCount: Math.min(5, most),
    right_pt: 8,
  })
  const shapes: Shape[] = frameShapes(frame, { x: axisTitle(input.quantity), y: COUNT_TITLE })
  bins.counts.forEach((count, i) => {
    if (count === 0) return
    const left = frame.x(bins.first + i * bins.width)
    const right = frame.x(bins.first + (i + 1) * bins.width)
    shapes.push(
      rectangle(left + 0.4, frame.y(count), Math.max(0.4, right - left - 0.8), frame.bottom - frame.y(count), {
        fill: BAR_FILL,
      }),
    )
  })
  return {
    width_pt: input.width_pt,
    height_pt: input.height_pt,
    title: input.title,
    description: `Histogram of ${values.length} sites in ${bins.counts.length} classes; the fullest holds ${most}.`,
    shapes: [...shapes, ...limitsUpright(frame, input.limits)],
  }
}

/** Classes of round width, about 2 n^(1/3) of them (Rice's rule, common practice). */
export function binned(values: readonly number[]): Bins {
  if (values.length === 0) return { first: 0, width: 1, counts: [0] }
  const min = values.reduce((least, value) => Math.min(least, value), Infinity)
  const max = values.reduce((most, value) => Math.max(most, value), -Infinity)
  const wanted = Math.min(40, Math.max(5, Math.round(2 * Math.cbrt(values.length))))
  const width = niceStep((max - min) / wanted || Math.max(1e-3, Math.abs(max) * 1e-3))
  const start = Math.floor(min / width + 1e-9)
  const counts = new Array<number>(Math.max(1, Math.floor(max / width + 1e-9) - start + 1)).fill(0)
  for (const value of values) {
    const at = Math.min(counts.length - 1, Math.max(0, Math.floor(value / width + 1e-9) - start))
    counts[at]++
  }
  return { first: fromStep(start, width), width, counts }
}

/** Limits as upright lines, named above; a name that would lie on the one before it, or on the axis title, moves right. */
function limitsUpright(frame: ChartFrame, limits: SiteLimits): Shape[] {
  const shapes: Shape[] = []
  let free = labelWidth_pt(COUNT_TITLE, AXIS_PT) + 4
  for (const { name, value, dash } of namedLimits(limits).sort((a, b) => a.value - b.value)) {
    if (!(value >= frame.xRange.min && value <= frame.xRange.max)) continue
    const x = frame.x(value)
    const label = `${name} ${formatLimit(value)}`
    const half = labelWidth_pt(label, LABEL_PT) / 2
    const middle = Math.max(free + half, Math.min(x, frame.right + 6 - half))
    free = middle + half + 3
    shapes.push(line(x, frame.top, x, frame.bottom, { stroke: INK, lineWidth_pt: 0.6, ...(dash && { dash_pt: dash }) }))
    shapes.push(text(middle, frame.top - 4, label, { size_pt: LABEL_PT, fill: QUIET_INK, anchor: 'middle' }))
  }
  return shapes
}
