/** Curves of the layer as plain data, drawn by whoever draws: their axes, their points, and a table for a reader. */

export interface CurveFigure {
  readonly title: string
  readonly description: string
  readonly x: CurveAxis
  readonly y: CurveAxis
  readonly series: readonly CurveSeries[]
  /** Lines across or upright that say what they are. */
  readonly rules: readonly CurveRule[]
}

export interface CurveAxis {
  readonly title: string
  readonly isLogarithmic: boolean
}

export interface CurveSeries {
  readonly name: string
  readonly x: readonly number[]
  readonly y: readonly number[]
  readonly look: 'line' | 'points' | 'chosen'
  /** Of each point, for the pointer. */
  readonly labels?: readonly string[]
}

export interface CurveRule {
  readonly name: string
  readonly axis: 'x' | 'y'
  readonly at: number
}

/** From `low` to `high`, both above 0, evenly in the logarithm. */
export function decades(low: number, high: number, count: number): number[] {
  return Array.from({ length: count }, (_, i) => low * (high / low) ** (i / (count - 1)))
}
