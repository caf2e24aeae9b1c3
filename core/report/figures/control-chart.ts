/** A control chart: values in the order of time between their limits, alarms by shape. */
import { formatFixed } from '../../units/format'
import type { Drawing, Shape } from '../drawing'
import { circle, line, polyline, text } from '../drawing'
import { chartFrame, frameShapes, padded } from './chart-frame'
import { ALERT, INK, LABEL_PT, QUIET_INK } from './ink'
import { mark } from './marks'

export interface ControlChartInput {
  readonly title: string
  readonly yTitle: string
  /** In the order of time. */
  readonly values: readonly number[]
  readonly centre: number | null
  readonly lower: number | null
  readonly upper: number | null
  /** Limits that change from value to value, drawn as curves. */
  readonly curves?: readonly { readonly lower: ArrayLike<number>; readonly upper: ArrayLike<number> }[]
  /** Places, from 0, that raise an alarm. */
  readonly alarms: ReadonlySet<number>
  /** Values of the baseline come first; a rule stands where it ends. */
  readonly baseline: number
  /** Place, from 0, that is looked at; null for none. */
  readonly chosen?: number | null
  readonly width_pt: number
  readonly height_pt: number
}

export function controlChart(input: ControlChartInput): Drawing {
  const { values, centre, lower, upper, curves = [], alarms, baseline, chosen = null, width_pt, height_pt } = input
  const ends = [...values, centre, lower, upper, ...curves.flatMap((curve) => [...Array.from(curve.lower), ...Array.from(curve.upper)])]
  const known = ends.filter((end): end is number => end !== null && Number.isFinite(end))
  const frame = chartFrame({
    width_pt, height_pt, x: { min: 0.5, max: values.length + 0.5 }, y: padded(known), xTickCount: 8, yTickCount: 5, right_pt: 54,
  }) // prettier-ignore
  const across = (value: number | null, name: string, dash: readonly number[] | null): Shape[] => {
    if (value === null || !Number.isFinite(value)) return []
    const y = frame.y(value)
    const label = `${name} ${formatFixed(value, frame.yTicks.decimals + 1)}`
    return [
      line(frame.left, y, frame.right, y, { stroke: INK, lineWidth_pt: 0.6, ...(dash && { dash_pt: dash }) }),
      text(frame.right + 3, y + 2.3, label, { size_pt: LABEL_PT, fill: QUIET_INK }),
    ]
  }
  const end = frame.x(baseline + 0.5)
  const curve = (column: ArrayLike<number>): Shape =>
    polyline(Array.from(column).flatMap((value, k) => [frame.x(k + 1), frame.y(value)]), { stroke: INK, lineWidth_pt: 0.6, dash_pt: [4, 2] })
  return {
    width_pt,
    height_pt,
    title: input.title,
    description: `${values.length} values in the order of time, ${alarms.size} with an alarm.`,
    shapes: [
      ...frameShapes(frame, { x: 'occasion', y: input.yTitle }),
      ...(baseline < values.length ? [line(end, frame.top, end, frame.bottom, { stroke: QUIET_INK, lineWidth_pt: 0.5, dash_pt: [1, 2] }), text(end - 2, frame.top + 6, 'baseline', { size_pt: LABEL_PT, fill: QUIET_INK, anchor: 'end' })] : []),
      ...across(centre, 'centre', null),
      ...across(lower, 'lower', [4, 2]),
      ...across(upper, 'upper', [4, 2]),
      ...curves.flatMap(({ lower: low, upper: high }) => [curve(low), curve(high)]),
      polyline(values.flatMap((value, k) => (Number.isFinite(value) ? [frame.x(k + 1), frame.y(value)] : [])), { stroke: QUIET_INK, lineWidth_pt: 0.5 }),
      ...values.flatMap((value, k) => dot(frame.x(k + 1), frame.y(value), value, centre, alarms.has(k), k === chosen)),
    ],
  }
} // prettier-ignore

function dot(x: number, y: number, value: number, centre: number | null, isAlarm: boolean, isChosen: boolean): Shape[] {
  if (!Number.isFinite(value)) return []
  const shape = isAlarm ? mark(value < (centre ?? -Infinity) ? 'below' : 'above', x, y, 3.2) : mark('in-spec', x, y, 4)
  return isChosen ? [shape, circle(x, y, 5.5, { stroke: ALERT, lineWidth_pt: 0.9 })] : [shape]
}
