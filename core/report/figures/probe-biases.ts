/** Each probe's differences from the mean of all, by wafer and run, and its mean with the interval. */
import type { ProbeBias } from '../../gauge/probe-biases'
import type { Drawing, Shape } from '../drawing'
import { circle, line, text } from '../drawing'
import { chartFrame, frameShapes, padded } from './chart-frame'
import { AXIS_PT, INK, QUIET_INK } from './ink'

export interface ProbeBiasesInput {
  readonly title: string
  readonly unit: string
  readonly biases: readonly ProbeBias[]
  readonly width_pt: number
  readonly height_pt: number
}

export function probeBiasChart({ title, unit, biases, width_pt, height_pt }: ProbeBiasesInput): Drawing {
  const ends = biases.flatMap(({ cells, interval }) => [...cells.map(({ difference }) => difference), interval.lower, interval.upper, 0])
  const frame = chartFrame({
    width_pt, height_pt, x: { min: 0.4, max: biases.length + 0.6 }, y: padded(ends.filter(Number.isFinite)), xTickCount: 1, yTickCount: 5,
    right_pt: 8,
  }) // prettier-ignore
  const zero = frame.y(0)
  return {
    width_pt,
    height_pt,
    title,
    description: `Differences of ${biases.length} probes from the mean of all${unit && `, in ${unit}`}.`,
    shapes: [
      ...frameShapes(frame, { x: 'probe', y: `difference from the mean of all${unit && ` / ${unit}`}` }, false),
      line(frame.left, zero, frame.right, zero, { stroke: INK, lineWidth_pt: 0.6 }),
      ...biases.flatMap((bias, k) => probeShapes(bias, frame.x(k + 1), frame.y, frame.bottom)),
    ],
  }
} // prettier-ignore

function probeShapes({ probe, bias, interval, cells }: ProbeBias, x: number, y: (value: number) => number, bottom: number): Shape[] {
  const spread = cells.map(({ difference }, k) => {
    const aside = ((k % 5) - 2) * 1.8
    return circle(x + aside, y(difference), 1.5, { stroke: QUIET_INK, lineWidth_pt: 0.6 })
  })
  const name = text(x, bottom + 10, probe.length > 8 ? `…${probe.slice(-7)}` : probe, { size_pt: AXIS_PT, fill: QUIET_INK, anchor: 'middle' })
  return [
    ...spread,
    line(x - 8, y(bias), x + 8, y(bias), { stroke: INK, lineWidth_pt: 1.6 }),
    ...(Number.isFinite(interval.lower) ? [line(x + 8, y(interval.lower), x + 8, y(interval.upper), { stroke: INK, lineWidth_pt: 0.8 })] : []),
    name,
  ]
} // prettier-ignore
