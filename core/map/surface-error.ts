/** A wafer's surface fitted and tried: everything that a picture of its error shows, as plain columns. */
import { interpolatorsFor, MAX_SPLINE_SITES } from './interpolator'
import { processFitter } from './process-surface'
import type { Targets } from './thin-plate-spline'

export interface SurfaceErrorInput {
  readonly x_mm: Float64Array
  readonly y_mm: Float64Array
  readonly value: Float64Array
  /** Standard uncertainty that each site has to itself. */
  readonly u: Float64Array
  readonly targets: Targets
}

export interface SurfaceError {
  readonly degree: number
  readonly lengthScale_mm: number
  readonly standardDeviation: number
  readonly nugget: number
  readonly residual: Float64Array
  readonly standardised: Float64Array
  readonly predicted: Float64Array
  /** At the targets. */
  readonly standardError: Float64Array
  /** Of the spline, root mean square; NaN where there are too many sites for one. */
  readonly splineLeaveOneOut: number
}

/** null where no Gaussian process can be fitted. */
export function surfaceError({ x_mm, y_mm, value, u, targets }: SurfaceErrorInput): SurfaceError | null {
  const surface = processFitter()(x_mm, y_mm, value, u)
  if (!surface) return null
  const { degree, lengthScale_mm, standardDeviation, nugget } = surface
  const at = { value: new Float64Array(targets.x_mm.length), standardError: new Float64Array(targets.x_mm.length) }
  surface.at(targets, at)
  const nowhere = { x_mm: new Float64Array(0), y_mm: new Float64Array(0) }
  const left = value.length > MAX_SPLINE_SITES ? null : interpolatorsFor(nowhere)(x_mm, y_mm).leaveOneOut(value)
  const known = left?.filter((residual) => !Number.isNaN(residual))
  return {
    degree,
    lengthScale_mm,
    standardDeviation,
    nugget,
    ...surface.leaveOneOut(),
    standardError: at.standardError,
    splineLeaveOneOut: known ? Math.sqrt(known.reduce((sum, r) => sum + r * r, 0) / known.length) : NaN,
  }
}
