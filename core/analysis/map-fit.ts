/** How well the surface between a wafer's sites is known. */
import { interpolatorsFor, MAX_SPLINE_SITES, type InterpolationMethod } from '../map/interpolator'
import { processFitter, type FitProcess, type ProcessSurface } from '../map/process-surface'
import type { LotAnalysis, WaferAnalysis } from './lot-analysis'
import { sitePositions } from './site-positions'
import { countingSites } from './wafers'

export interface MapFit {
  /** What the procedure's choice came to. */
  readonly interpolation: 'gaussian-process' | InterpolationMethod
  /** Root mean square of each site's value less what the others say of it: of the plain interpolation, NaN where it gives none. */
  readonly plainLeaveOneOut: number
  readonly process: ProcessFit | null
  /** Rows of the site columns, as the columns of `process.left` stand. */
  readonly rows: Uint32Array
}

export interface ProcessFit {
  readonly surface: ProcessSurface
  readonly leaveOneOut: number
  /** Share of the sites whose residual lies within 1.96 standard errors; 0.95 for a surface that knows how sure it is. */
  readonly coverage: number
  readonly left: ReturnType<ProcessSurface['leaveOneOut']>
}

interface Prepared {
  readonly fit: FitProcess
  readonly interpolatorOf: ReturnType<typeof interpolatorsFor>
}

/** What the wafers of a lot share, since a lot mostly has one pattern of sites. */
const prepared = new WeakMap<LotAnalysis, Prepared>()
const NOWHERE = { x_mm: new Float64Array(0), y_mm: new Float64Array(0) }

function preparedFor(analysis: LotAnalysis): Prepared {
  const known = prepared.get(analysis) ?? { fit: processFitter(), interpolatorOf: interpolatorsFor(NOWHERE) }
  prepared.set(analysis, known)
  return known
}

/**
 * null without places, or with fewer than three sites.
 *
 * @param withProcess  whether a Gaussian process is fitted; absent: where the procedure chooses it
 */
export function mapFit(
  analysis: LotAnalysis,
  wafer: WaferAnalysis,
  withProcess = analysis.procedure.map.interpolation === 'gaussian-process',
): MapFit | null {
  const { sites, readings, procedure } = analysis
  const positions = sitePositions(readings, procedure)
  const rows = countingSites(wafer.sites, sites.flags)
  if (!positions || rows.length < 3) return null
  const pick = (column: Float64Array): Float64Array => Float64Array.from(rows, (i) => column[i])
  const [x_mm, y_mm, value] = [pick(positions.x_mm), pick(positions.y_mm), pick(sites.value)]
  const process = withProcess ? processFit(analysis, x_mm, y_mm, value, pick(sites.uIndependent)) : null
  const plain = plainFit(analysis, x_mm, y_mm, value)
  const isProcess = procedure.map.interpolation === 'gaussian-process' && process !== null
  return { interpolation: isProcess ? 'gaussian-process' : plain.method, plainLeaveOneOut: plain.leaveOneOut, process, rows }
} // prettier-ignore

function processFit(
  analysis: LotAnalysis,
  x_mm: Float64Array,
  y_mm: Float64Array,
  value: Float64Array,
  u: Float64Array,
): ProcessFit | null {
  const surface = preparedFor(analysis).fit(x_mm, y_mm, value, u)
  if (!surface) return null
  const left = surface.leaveOneOut()
  const covered = left.standardised.filter((z) => Math.abs(z) <= 1.96).length
  return { surface, left, leaveOneOut: rootMeanSquare(left.residual), coverage: covered / left.residual.length }
}

function plainFit(analysis: LotAnalysis, x_mm: Float64Array, y_mm: Float64Array, value: Float64Array) {
  // Joined linearly, there is nothing to leave out, and much to join.
  if (value.length > MAX_SPLINE_SITES) return { method: 'linear' as const, leaveOneOut: NaN }
  const interpolator = preparedFor(analysis).interpolatorOf(x_mm, y_mm)
  const residual = interpolator.leaveOneOut(value)?.filter((left) => !Number.isNaN(left))
  return { method: interpolator.method, leaveOneOut: residual ? rootMeanSquare(residual) : NaN }
}

function rootMeanSquare(values: Float64Array): number {
  return Math.sqrt(values.reduce((sum, value) => sum + value * value, 0) / values.length)
}
