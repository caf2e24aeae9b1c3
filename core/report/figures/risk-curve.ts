/** What a wider guard band costs and saves: both risks of a lot against the guard factor of the stringent rule. */
import { globalRisks, type Process } from '../../conformity/global-risk'
import type { Limits } from '../../conformity/limits'
import type { Drawing } from '../drawing'
import { line, polyline, text } from '../drawing'
import { chartFrame, frameShapes } from './chart-frame'
import { INK, LABEL_PT, QUIET_INK } from './ink'

export interface RiskPoint {
  readonly guardFactor: number
  readonly consumer: number
  readonly producer: number
}

const MOST = 2
const STEPS = 20

/** From a relaxed band (below 0) to a stringent one. */
export function riskPoints(limits: Limits, u: number, production: Process): readonly RiskPoint[] {
  return Array.from({ length: 2 * STEPS + 1 }, (_, k) => {
    const guardFactor = (MOST * (k - STEPS)) / STEPS
    const rule = guardFactor < 0 ? 'relaxed' : 'stringent'
    const acceptance = { rule, guardFactor: Math.abs(guardFactor), maximumFalseAcceptRisk: 0.05 } as const
    const { consumer, producer } = globalRisks(limits, u, production, acceptance)
    return { guardFactor, consumer, producer }
  })
}

export interface RiskCurveInput {
  readonly points: readonly RiskPoint[]
  /** Of the rule in force, below 0 for a relaxed one. */
  readonly guardFactor: number
  readonly width_pt: number
  readonly height_pt: number
}

export function riskCurve({ points, guardFactor, width_pt, height_pt }: RiskCurveInput): Drawing {
  const percent = (share: number): number => 100 * share
  // The producer's risk soon leaves the scale on which the consumer's can be read.
  const most = Math.max(1e-6, ...points.map(({ consumer }) => percent(consumer)), ...points.filter(({ guardFactor: r }) => Math.abs(r) <= 1).map(({ producer }) => percent(producer)))
  const frame = chartFrame({ width_pt, height_pt, x: { min: -MOST, max: MOST }, y: { min: 0, max: 1.08 * most }, xTickCount: 8, yTickCount: 4, right_pt: 74 })
  const curve = (of: (point: RiskPoint) => number, dash?: readonly number[]) => {
    const kept = points.filter((point) => percent(of(point)) <= 1.08 * most)
    return polyline(kept.flatMap((point) => [frame.x(point.guardFactor), frame.y(percent(of(point)))]), { stroke: INK, lineWidth_pt: 1.2, ...(dash && { dash_pt: dash }) })
  }
  const here = frame.x(guardFactor)
  const key = (y: number, words: string, dash?: readonly number[]) => [
    line(frame.right + 6, y, frame.right + 20, y, { stroke: INK, lineWidth_pt: 1.2, ...(dash && { dash_pt: dash }) }),
    text(frame.right + 24, y + 2.3, words, { size_pt: LABEL_PT, fill: QUIET_INK }),
  ]
  return {
    width_pt,
    height_pt,
    title: 'Risks against the guard band',
    description: 'False acceptance and false rejection in percent of all sites, against the guard factor: below 0 relaxed, above 0 stringent.',
    shapes: [
      ...frameShapes(frame, { x: 'guard band over U: relaxed below 0, stringent above', y: '% of all sites' }),
      line(here, frame.top, here, frame.bottom, { stroke: QUIET_INK, lineWidth_pt: 0.6, dash_pt: [1, 2] }),
      curve(({ consumer }) => consumer),
      curve(({ producer }) => producer, [4, 2]),
      ...key(frame.top + 8, 'accepted, bad'),
      ...key(frame.top + 20, 'rejected, good', [4, 2]),
    ],
  }
} // prettier-ignore
