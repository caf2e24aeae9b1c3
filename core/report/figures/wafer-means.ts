/** Each wafer's mean and the spread of its sites, in slot order, with the limits on the mean. */
import type { Drawing, Shape } from '../drawing'
import { line, text } from '../drawing'
import { chartFrame, frameShapes, limitLines, limitsInReach, padded } from './chart-frame'
import { AXIS_PT, QUIET_INK } from './ink'
import { mark, markOf, type MarkKind, type SiteLimits } from './marks'
import { axisTitle } from './radial-profile'
import type { MapQuantity } from './map-input'

export interface WaferMeansInput {
  readonly title: string
  readonly quantity: MapQuantity
  readonly names: readonly string[]
  readonly mean: ArrayLike<number>
  /** Standard deviation of the sites; NaN draws no bar. */
  readonly spread: ArrayLike<number>
  /** Of the wafer, codes in the order of VERDICTS. */
  readonly verdict: ArrayLike<number>
  /** On the wafer mean. */
  readonly limits: SiteLimits
  readonly width_pt: number
  readonly height_pt: number
}

export function waferMeans(input: WaferMeansInput): Drawing {
  const count = input.names.length
  const ends: number[] = []
  for (let i = 0; i < count; i++) {
    const spread = input.spread[i] > 0 ? input.spread[i] : 0
    if (Number.isFinite(input.mean[i])) ends.push(input.mean[i] - spread, input.mean[i] + spread)
  }
  const whole = padded(ends, 0)
  const frame = chartFrame({
    width_pt: input.width_pt,
    height_pt: input.height_pt,
    x: { min: 0.3, max: count + 0.7 },
    y: padded([...ends, ...limitsInReach(input.limits, whole.min, whole.max)]),
    xTickCount: 1,
    yTickCount: 5,
    right_pt: 48,
  })
  const shapes: Shape[] = frameShapes(frame, { x: 'wafer', y: `mean ± s of ${axisTitle(input.quantity)}` }, false)
  const every = Math.ceil(count / Math.max(1, Math.floor((frame.right - frame.left) / 15)))
  for (let i = 0; i < count; i++) {
    const x = frame.x(i + 1)
    if (i % every === 0) {
      shapes.push(line(x, frame.bottom, x, frame.bottom + 2.5, { stroke: QUIET_INK, lineWidth_pt: 0.5 }))
      shapes.push(
        text(x, frame.bottom + 10, shortName(input.names[i]), { size_pt: AXIS_PT, fill: QUIET_INK, anchor: 'middle' }),
      )
    }
  }
  return {
    width_pt: input.width_pt,
    height_pt: input.height_pt,
    title: input.title,
    description: `Mean and standard deviation of ${input.quantity.title} for ${count} wafers, in ${input.quantity.unit}.`,
    shapes: [...shapes, ...limitLines(frame, input.limits), ...meanMarks(input, frame.x, frame.y)],
  }
}

function meanMarks(input: WaferMeansInput, x: (i: number) => number, y: (value: number) => number): Shape[] {
  const shapes: Shape[] = []
  for (let i = 0; i < input.names.length; i++) {
    const mean = input.mean[i]
    if (!Number.isFinite(mean)) continue
    const spread = input.spread[i]
    if (spread > 0) {
      shapes.push(
        line(x(i + 1), y(mean - spread), x(i + 1), y(mean + spread), { stroke: QUIET_INK, lineWidth_pt: 0.8 }),
      )
    }
    shapes.push(mark(waferMark(input, i), x(i + 1), y(mean), 3.2))
  }
  return shapes
}

/** A triangle only where the mean itself is beyond its limit; a wafer may be out for another reason. */
function waferMark(input: WaferMeansInput, i: number): MarkKind {
  const { limits } = input
  const mean = input.mean[i]
  if (mean > limits.upper) return 'above'
  if (mean < limits.lower) return 'below'
  return input.verdict[i] === 2 ? markOf(2, mean, limits) : 'in-spec'
}

function shortName(name: string): string {
  return name.length > 5 ? `…${name.slice(-4)}` : name
}
