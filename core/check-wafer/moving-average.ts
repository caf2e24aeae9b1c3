/**
 * Exponentially weighted moving average of a series, with the limits that widen from the first value on.
 *
 *   E_i = lambda y_i + (1 - lambda) E_(i-1), E_0 the centre line
 *   limits: centre +- width s root( lambda / (2 - lambda) (1 - (1 - lambda)^(2 i)) )
 *
 * Source: NIST/SEMATECH e-Handbook of Statistical Methods 6.3.2.4; the exact variance is of Lucas & Saccucci,
 * Technometrics 32, 1 (1990) (citation from memory). The page's example uses the steady-state limits, and truncates their
 * factor to 0.4201.
 */
export interface MovingAverage {
  readonly average: Float64Array
  readonly lower: Float64Array
  readonly upper: Float64Array
  /** What the limits come to in the end. */
  readonly steadyLower: number
  readonly steadyUpper: number
}

export function movingAverage({
  values,
  centre,
  standardDeviation,
  lambda,
  width,
}: {
  readonly values: readonly number[]
  readonly centre: number
  readonly standardDeviation: number
  /** Above 0, at most 1: 1 is the value itself. */
  readonly lambda: number
  readonly width: number
}): MovingAverage {
  const average = new Float64Array(values.length)
  const lower = new Float64Array(values.length)
  const upper = new Float64Array(values.length)
  const steady = width * standardDeviation * Math.sqrt(lambda / (2 - lambda))
  let last = centre
  values.forEach((value, i) => {
    last = average[i] = lambda * value + (1 - lambda) * last
    const half = steady * Math.sqrt(1 - (1 - lambda) ** (2 * (i + 1)))
    lower[i] = centre - half
    upper[i] = centre + half
  })
  return { average, lower, upper, steadyLower: centre - steady, steadyUpper: centre + steady }
}
