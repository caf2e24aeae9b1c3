/** Axes of the small charts: thin rules at the left and the bottom, round ticks, titles with units. */
import type { Shape } from '../drawing'
import { labelWidth_pt, line, text } from '../drawing'
import { formatFixed } from '../../units/format'
import { AXIS_PT, FAINT, INK, LABEL_PT, QUIET_INK, RULE } from './ink'
import { formatLimit } from './map-legend'
import type { SiteLimits } from './marks'
import { niceTicks, type Ticks } from './ticks'

export interface Range {
  readonly min: number
  readonly max: number
}

export interface ChartFrame {
  readonly left: number
  readonly right: number
  readonly top: number
  readonly bottom: number
  readonly x: (value: number) => number
  readonly y: (value: number) => number
  readonly xTicks: Ticks
  readonly yTicks: Ticks
  readonly xRange: Range
  readonly yRange: Range
}

export interface ChartFrameInput {
  readonly width_pt: number
  readonly height_pt: number
  readonly x: Range
  readonly y: Range
  readonly xTickCount: number
  readonly yTickCount: number
  /** Room kept at the right for the names of limit lines. */
  readonly right_pt: number
}

const TOP_PT = 15
const BOTTOM_PT = 25

export function chartFrame(input: ChartFrameInput): ChartFrame {
  const xTicks = niceTicks(input.x.min, input.x.max, input.xTickCount)
  const yTicks = niceTicks(input.y.min, input.y.max, input.yTickCount)
  const widest = Math.max(
    0,
    ...yTicks.values.map((value) => labelWidth_pt(formatFixed(value, yTicks.decimals), AXIS_PT)),
  )
  const left = widest + 7
  const right = input.width_pt - input.right_pt
  const bottom = input.height_pt - BOTTOM_PT
  const x = (value: number) => left + ((value - input.x.min) / (input.x.max - input.x.min)) * (right - left)
  const y = (value: number) => bottom - ((value - input.y.min) / (input.y.max - input.y.min)) * (bottom - TOP_PT)
  return { left, right, top: TOP_PT, bottom, x, y, xTicks, yTicks, xRange: input.x, yRange: input.y }
}

export interface AxisTitles {
  readonly x: string
  readonly y: string
}

export function frameShapes(frame: ChartFrame, titles: AxisTitles, withXTicks = true): Shape[] {
  const { left, right, bottom } = frame
  const shapes: Shape[] = []
  for (const value of frame.yTicks.values) {
    const y = frame.y(value)
    shapes.push(line(left, y, right, y, { stroke: FAINT, lineWidth_pt: 0.4 }))
    shapes.push(text(left - 4, y + 2.4, formatFixed(value, frame.yTicks.decimals), { ...TICK_LOOK, anchor: 'end' }))
  }
  for (const value of withXTicks ? frame.xTicks.values : []) {
    const x = frame.x(value)
    shapes.push(line(x, bottom, x, bottom + 2.5, { stroke: QUIET_INK, lineWidth_pt: 0.5 }))
    shapes.push(text(x, bottom + 10, formatFixed(value, frame.xTicks.decimals), { ...TICK_LOOK, anchor: 'middle' }))
  }
  shapes.push(line(left, frame.top, left, bottom, { stroke: RULE, lineWidth_pt: 0.5 }))
  shapes.push(line(left, bottom, right, bottom, { stroke: RULE, lineWidth_pt: 0.5 }))
  shapes.push(text(0, 8, titles.y, { size_pt: AXIS_PT, fill: INK }))
  shapes.push(text(right, bottom + 20, titles.x, { size_pt: AXIS_PT, fill: INK, anchor: 'end' }))
  return shapes
}

const TICK_LOOK = { size_pt: AXIS_PT, fill: QUIET_INK } as const

/** What of the limits a scale for these values should show: limits far from them would squeeze the values flat. */
export function limitsInReach(limits: SiteLimits, min: number, max: number): number[] {
  const spread = Math.max(max - min, 1e-3 * Math.abs(max), 1e-300)
  const middle = (min + max) / 2
  return [limits.lower, limits.target, limits.upper].filter((limit) => Math.abs(limit - middle) <= 3 * spread)
}

/** A little air at both ends. */
export function padded(values: readonly number[], share = 0.06): Range {
  let min = Infinity
  let max = -Infinity
  for (const value of values) {
    if (value < min) min = value
    if (value > max) max = value
  }
  if (!(min <= max)) return { min: 0, max: 1 }
  const air = max > min ? (max - min) * share : Math.max(1e-3, Math.abs(max) * 1e-3)
  return { min: min - air, max: max + air }
}

/** Lines across at the limits and the target, each named at the right, apart from one another; those off the scale by arrow. */
export function limitLines(frame: ChartFrame, limits: SiteLimits): Shape[] {
  const shapes: Shape[] = []
  let free = frame.bottom + 6
  for (const { name, value, dash } of namedLimits(limits).sort((a, b) => a.value - b.value)) {
    const isBelow = value < frame.yRange.min
    const isAbove = value > frame.yRange.max
    const y = isBelow ? frame.bottom : isAbove ? frame.top - 2 : frame.y(value)
    if (!isBelow && !isAbove) {
      shapes.push(
        line(frame.left, y, frame.right, y, { stroke: INK, lineWidth_pt: 0.6, ...(dash && { dash_pt: dash }) }),
      )
    }
    const baseline = Math.min(y + 2.3, free)
    free = baseline - LABEL_PT - 1
    const arrow = isBelow ? ' ↓' : isAbove ? ' ↑' : ''
    const label = `${name} ${formatLimit(value)}${arrow}`
    shapes.push(text(frame.right + 3, baseline, label, { size_pt: LABEL_PT, fill: QUIET_INK }))
  }
  return shapes
}

export interface NamedLimit {
  readonly name: string
  readonly value: number
  readonly dash: readonly number[] | null
}

export function namedLimits(limits: SiteLimits): NamedLimit[] {
  const all: NamedLimit[] = [
    { name: 'lower', value: limits.lower, dash: [4, 2] },
    { name: 'target', value: limits.target, dash: null },
    { name: 'upper', value: limits.upper, dash: [4, 2] },
  ]
  return all.filter((limit) => Number.isFinite(limit.value))
}
