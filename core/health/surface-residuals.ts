/** What is left of each wafer once its own smooth surface is taken away: the noise, and what stands out of it. */
import { prepareTrendSurface, type TrendPattern } from '../map/trend-surface'
import { trendTerms, type TrendOrder } from '../map/trend-terms'
import { CoreError } from '../problems/problem'
import { robustDeviation, type HealthInput, type HealthWafer } from './finding'

export interface WaferResiduals {
  readonly wafer: HealthWafer
  /** An entry a row of the wafer; 0 mean. */
  readonly residual: Float64Array
  /** Root of 1 - leverage: how much of a site's own error its residual keeps. */
  readonly kept: Float64Array
  /** The surface fitted to anything else at the same sites: what of it no surface can follow. */
  readonly without: (values: Float64Array) => Float64Array
}

const LEAST_SITES = 9
/** A wafer of more sites is left to its map: the look would take longer than the analysis. */
export const MOST_SITES = 2000

/** Several checks look at the same residuals. */
const known = new WeakMap<HealthInput, readonly WaferResiduals[]>()

/** Wafers whose sites can't be fitted are left out. Empty without places. */
export function surfaceResiduals(input: HealthInput): readonly WaferResiduals[] {
  const earlier = known.get(input)
  if (earlier) return earlier
  const residuals = fitted(input)
  known.set(input, residuals)
  return residuals
}

function fitted({ x_mm, y_mm, value, wafers }: HealthInput): readonly WaferResiduals[] {
  if (!x_mm || !y_mm) return []
  const patterns: Fittable[] = []
  return wafers.flatMap((wafer) => {
    const { rows } = wafer
    if (rows.length < LEAST_SITES || rows.length > MOST_SITES) return []
    const [x, y] = [picked(x_mm, rows), picked(y_mm, rows)]
    let own = patterns.find((entry) => isSame(entry.x, x) && isSame(entry.y, y))
    if (!own) {
      const pattern = patternAt(x, y)
      own = { x, y, pattern, without: rememberingLast((column) => pattern!.fit(column).residuals) }
      patterns.unshift(own)
      patterns.splice(8)
    }
    if (!own.pattern) return []
    return [{ wafer, ...withoutStrays(own.pattern, picked(value, rows)), without: own.without }]
  })
}

interface Fittable {
  readonly x: Float64Array
  readonly y: Float64Array
  readonly pattern: TrendPattern | null
  readonly without: WaferResiduals['without']
}

/** Wafer after wafer is read in the same order. */
function rememberingLast(without: WaferResiduals['without']): WaferResiduals['without'] {
  let last: { readonly values: Float64Array; readonly residuals: Float64Array } | null = null
  return (values) => {
    if (!last || !isSame(last.values, values)) last = { values, residuals: without(values) }
    return last.residuals
  }
}

/** Robust standard deviations beyond which a site no longer shapes the surface. */
const STRAY = 8
const MOST_STRAYS = 5

/**
 * A stray site bends the surface, and its neighbours look off; so the worst is replaced by what the others say of it,
 * again and again. Its residual is then what it misses that by.
 */
function withoutStrays(pattern: TrendPattern, values: Float64Array): Pick<WaferResiduals, 'residual' | 'kept'> {
  const shaped = values.slice()
  const strays = new Set<number>()
  for (;;) {
    const { residuals, leverage } = pattern.fit(shaped)
    const kept = leverage.map((share) => Math.sqrt(Math.max(1e-9, 1 - share)))
    const deviation = robustDeviation(residuals, 0)
    const z = residuals.map((left, k) => (strays.has(k) ? 0 : Math.abs(left) / (deviation * kept[k])))
    const worst = z.indexOf(Math.max(...z))
    if (!(z[worst] > STRAY) || strays.size >= MOST_STRAYS) {
      return {
        residual: residuals.map((left, k) => (strays.has(k) ? values[k] - (shaped[k] - left) : left)),
        kept: kept.map((share, k) => (strays.has(k) ? 1 : share)),
      }
    }
    shaped[worst] -= residuals[worst] / kept[worst] ** 2
    strays.add(worst)
  }
}

/** The highest order that leaves half of the sites to judge it by. */
function patternAt(x_mm: Float64Array, y_mm: Float64Array): TrendPattern | null {
  const order = (['zernike-4', 'zernike-3', 'bowl', 'plane'] as const satisfies readonly TrendOrder[]).find(
    (candidate) => 2 * trendTerms(candidate).length <= x_mm.length,
  )
  if (!order) return null
  const radius_mm = x_mm.reduce((most, x, i) => Math.max(most, Math.hypot(x, y_mm[i])), 0)
  try {
    return prepareTrendSurface({ x_mm, y_mm }, { radius_mm, order })
  } catch (error) {
    if (error instanceof CoreError) return null
    throw error
  }
}

function picked(column: Float64Array, rows: Uint32Array): Float64Array {
  return Float64Array.from(rows, (i) => column[i])
}

function isSame(a: Float64Array, b: Float64Array): boolean {
  return a.length === b.length && a.every((value, i) => value === b[i])
}
