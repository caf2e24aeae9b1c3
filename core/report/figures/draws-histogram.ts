/** The draws of a Monte Carlo calculation as a histogram, with the curve that the first-order budget expects. */
import { normalDensity } from '../../numeric/normal'
import type { Drawing, Shape } from '../drawing'
import { line, polyline, rectangle, text } from '../drawing'
import { chartFrame, frameShapes } from './chart-frame'
import { AXIS_PT, INK, LABEL_PT, QUIET_INK } from './ink'

export interface DrawsHistogramInput {
  readonly title: string
  readonly axis: string
  /** In rising order. */
  readonly sorted: Float64Array
  readonly interval: { readonly lower: number; readonly upper: number }
  readonly expected: {
    readonly value: number
    readonly standardUncertainty: number
    readonly expandedUncertainty: number
  }
  readonly width_pt: number
  readonly height_pt: number
}

const BINS = 60
const FILL = '#a9a59c'

export function drawsHistogram(input: DrawsHistogramInput): Drawing {
  const { title, axis, sorted, interval, expected, width_pt, height_pt } = input
  const { value, standardUncertainty: u, expandedUncertainty } = expected
  // Without the last thousandth at either end, which would squeeze the rest.
  const at = (share: number): number => sorted[Math.round(share * (sorted.length - 1))]
  const [low, high] = [Math.min(at(0.001), value - 3.3 * u), Math.max(at(0.999), value + 3.3 * u)]
  const width = (high - low) / BINS
  const counts = new Array<number>(BINS).fill(0)
  for (const draw of sorted) {
    const bin = Math.floor((draw - low) / width)
    if (bin >= 0 && bin < BINS) counts[bin]++
  }
  const density = counts.map((count) => count / (sorted.length * width))
  const peak = Math.max(...density, normalDensity(0) / u)
  const frame = chartFrame({ width_pt, height_pt, x: { min: low, max: high }, y: { min: 0, max: 1.12 * peak }, xTickCount: 6, yTickCount: 3, right_pt: 8 })
  const bars = density.flatMap((d, k): Shape[] => {
    if (d === 0) return []
    const left = frame.x(low + k * width)
    return [rectangle(left + 0.2, frame.y(d), Math.max(0.3, frame.x(low + (k + 1) * width) - left - 0.4), frame.bottom - frame.y(d), { fill: FILL })]
  })
  const curve = Array.from({ length: 121 }, (_, k) => low + ((high - low) * k) / 120).flatMap((x) => [frame.x(x), frame.y(normalDensity((x - value) / u) / u)])
  const upright = (x: number, dash: readonly number[]): Shape => line(frame.x(x), frame.top + 8, frame.x(x), frame.bottom, { stroke: INK, lineWidth_pt: 0.6, dash_pt: dash })
  return {
    width_pt,
    height_pt,
    title,
    description: `Histogram of ${sorted.length} draws with the normal curve of the first-order budget; both coverage intervals upright.`,
    shapes: [
      ...frameShapes(frame, { x: axis, y: 'density' }),
      ...bars,
      polyline(curve, { stroke: INK, lineWidth_pt: 1.2 }),
      ...[interval.lower, interval.upper].map((x) => upright(x, [1, 2])),
      ...[value - expandedUncertainty, value + expandedUncertainty].map((x) => upright(x, [5, 2])),
      text(frame.right, frame.top + 4, 'bars and dots: Monte Carlo; line and dashes: first order', { size_pt: Math.min(AXIS_PT, LABEL_PT), fill: QUIET_INK, anchor: 'end' }),
    ],
  }
} // prettier-ignore
