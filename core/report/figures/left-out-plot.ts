/** Each site as the others predict it, against what was measured there. */
import type { Drawing } from '../drawing'
import { circle, line } from '../drawing'
import { chartFrame, frameShapes, padded } from './chart-frame'
import { ALERT, INK } from './ink'

export interface LeftOutInput {
  readonly title: string
  readonly unit: string
  readonly measured: ArrayLike<number>
  readonly predicted: ArrayLike<number>
  /** Residual over its standard error: beyond 3 a site is marked. */
  readonly standardised: ArrayLike<number>
  readonly width_pt: number
  readonly height_pt: number
}

export function leftOutPlot({ title, unit, measured, predicted, standardised, width_pt, height_pt }: LeftOutInput): Drawing {
  const both = [...Array.from(measured), ...Array.from(predicted)]
  const range = padded(both)
  const frame = chartFrame({ width_pt, height_pt, x: range, y: range, xTickCount: 5, yTickCount: 5, right_pt: 8 })
  const beyond = Array.from(standardised).filter((z) => Math.abs(z) > 3).length
  return {
    width_pt,
    height_pt,
    title,
    description: `${measured.length} sites, each left out and predicted from the others; ${beyond} beyond three standard errors.`,
    shapes: [
      ...frameShapes(frame, { x: `predicted from the others / ${unit}`, y: `measured / ${unit}` }),
      line(frame.x(range.min), frame.y(range.min), frame.x(range.max), frame.y(range.max), { stroke: INK, lineWidth_pt: 0.6 }),
      ...Array.from(measured, (value, i) =>
        circle(frame.x(predicted[i]), frame.y(value), 2, { stroke: Math.abs(standardised[i]) > 3 ? ALERT : INK, lineWidth_pt: 0.8 }),
      ),
    ],
  }
} // prettier-ignore
