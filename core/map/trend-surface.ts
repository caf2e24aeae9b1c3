/** A smooth surface of few shapes fitted to a wafer's sites: how much of its spread is tilt, bowl, saddle, and how much is left. */
import { CoreError, requireRange } from '../problems/problem'
import { prepareLeastSquares, type LeastSquares, type LeastSquaresFit } from './least-squares'
import type { Targets } from './thin-plate-spline'
import { shapesOf, type ShapeAmount, type TrendShapes } from './trend-shapes'
import {
  TREND_GROUPS, TREND_ORDERS, trendGroupOf, trendTerms, type TrendGroupId, type TrendOrder,
} from './trend-terms' // prettier-ignore
import { osaIndex, zernikeColumn, zernikeName, type ZernikeIndex } from './zernike'

export interface TrendTerm extends ShapeAmount {
  /** OSA/ANSI single index. */
  readonly j: number
  readonly name: string
  readonly standardError: number
}

export interface TrendGroup {
  readonly id: TrendGroupId
  readonly degreesOfFreedom: number
  /** What the group takes from the residuals of the groups before it. */
  readonly sumOfSquares: number
  /** The same over the values' sum of squares about their mean; the shares sum to rSquared. */
  readonly share: number
  /** Its mean square over the residual one. Infinity where nothing is left. */
  readonly f: number
}

export interface TrendSurface extends TrendShapes {
  /** What was fitted, and what had been asked for. */
  readonly order: TrendOrder
  readonly requestedOrder: TrendOrder
  /** Why a lower order was fitted than asked for; null where it wasn't. */
  readonly loweredBecause: string | null
  readonly radius_mm: number
  /** The mean first, then in the order of TREND_GROUPS. */
  readonly terms: readonly TrendTerm[]
  /** Only groups that have terms in this order. */
  readonly groups: readonly TrendGroup[]
  readonly fitted: Float64Array
  readonly residuals: Float64Array
  readonly leverage: Float64Array
  readonly degreesOfFreedom: number
  readonly totalSumOfSquares: number
  readonly residualSumOfSquares: number
  readonly residualStandardDeviation: number
  /** 0 where the values don't vary. */
  readonly rSquared: number
  /** Below 0 where the surface explains less than as many random terms would. */
  readonly adjustedRSquared: number
  /** The surface anywhere; beyond the disc, or where no site is near, it is a guess. */
  evaluate(targets: Targets): Float64Array
}

/** The sites of a pattern made ready: one factorisation serves every wafer measured at them. */
export interface TrendPattern {
  readonly order: TrendOrder
  readonly requestedOrder: TrendOrder
  readonly loweredBecause: string | null
  /** Throws CoreError where there isn't one finite value a site. */
  fit(values: Float64Array): TrendSurface
}

/**
 * A shape that at the sites has less than this of its own (root mean square, 1 over evenly spread ones) is not told
 * from those before it: its standard error would be more than a hundred times as large. Also catches shapes that vanish
 * or coincide at the sites but for the rounding of places.
 */
const TELLING_SIZE = 0.01
/** A site this share beyond the radius is still on it. */
const RIM_SHARE = 1e-9
/** Spread below this share of the values is rounding. */
const NO_SPREAD = 1e-13

/**
 * Least squares of Zernike polynomials of the disc of that radius, all sites weighing the same.
 *
 * Where the sites can't tell a shape of that order from those before it (eight sites on every circle can't tell a
 * four-fold pattern turned by 22.5 degrees from nothing), the next lower order of TREND_ORDERS is fitted instead, and
 * `loweredBecause` says so.
 *
 * @param x_mm, y_mm  the sites, finite, no farther from the centre than the radius; more than the order has terms
 * @param radius_mm   of the disc over which the shapes don't contain each other: the outermost sites' or the wafer's
 * @throws CoreError not-applicable for too few sites, or for sites that not even a plane fits uniquely;
 *         out-of-range for a site beyond the radius
 *
 * Assumes noise that is independent and equally strong at all sites, for standard errors and F.
 * Sources: least squares as in `prepareLeastSquares`; sequential sums of squares N. R. Draper, H. Smith, Applied
 * Regression Analysis, 3rd ed. (1998), ch. 6 (from memory).
 */
export function prepareTrendSurface(
  { x_mm, y_mm }: Targets,
  { radius_mm, order }: { readonly radius_mm: number; readonly order: TrendOrder },
): TrendPattern {
  requirePlaces(x_mm, y_mm, radius_mm)
  requireEnough(x_mm.length, order)
  const x = x_mm.map((place) => place / radius_mm)
  const y = y_mm.map((place) => place / radius_mm)
  let loweredBecause: string | null = null
  for (let level = TREND_ORDERS.indexOf(order); level >= 0; level--) {
    const terms = trendTerms(TREND_ORDERS[level])
    const design = prepareLeastSquares(terms.map((index) => zernikeColumn(index, x, y)))
    const hidden = design.ownLengths.findIndex((length) => length < TELLING_SIZE * Math.sqrt(design.rows))
    const choice = { order: TREND_ORDERS[level], requestedOrder: order, loweredBecause, radius_mm }
    if (hidden < 0) return pattern(design, terms, choice)
    loweredBecause ??= `at these sites "${zernikeName(terms[hidden])}" can't be told from simpler shapes`
  }
  throw new CoreError({
    kind: 'not-applicable',
    what: 'trend surface',
    why: 'the sites lie on one line or too close together',
  })
}

/** `prepareTrendSurface` and its `fit` for a single wafer. */
export function trendSurface(
  sites: Targets,
  values: Float64Array,
  options: { readonly radius_mm: number; readonly order: TrendOrder },
): TrendSurface {
  return prepareTrendSurface(sites, options).fit(values)
}

type Choice = Pick<TrendSurface, 'order' | 'requestedOrder' | 'loweredBecause' | 'radius_mm'>

function pattern(design: LeastSquares, indices: readonly ZernikeIndex[], choice: Choice): TrendPattern {
  const { order, requestedOrder, loweredBecause } = choice
  return { order, requestedOrder, loweredBecause, fit: (values) => surface(design, indices, choice, values) }
}

function surface(
  design: LeastSquares,
  indices: readonly ZernikeIndex[],
  choice: Choice,
  values: Float64Array,
): TrendSurface {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length
  // Without the mean, shapes of a thousandth of it keep their digits.
  const deviations = values.map((value) => value - mean)
  const fit = design.fit(deviations)
  const terms = indices.map((index, k): TrendTerm => ({
    ...index,
    j: osaIndex(index),
    name: zernikeName(index),
    coefficient: fit.coefficients[k] + (k === 0 ? mean : 0),
    standardError: fit.standardErrors[k],
  }))
  const { residuals, leverage, degreesOfFreedom, residualSumOfSquares, residualStandardDeviation } = fit
  return {
    ...choice,
    terms,
    ...variances(indices, fit, deviations, mean),
    fitted: fit.fitted.map((value) => value + mean),
    residuals,
    leverage,
    degreesOfFreedom,
    residualSumOfSquares,
    residualStandardDeviation,
    ...shapesOf(terms),
    evaluate: (targets) => evaluate(terms, choice.radius_mm, targets),
  }
}

function variances(
  indices: readonly ZernikeIndex[],
  fit: LeastSquaresFit,
  deviations: Float64Array,
  mean: number,
): Pick<TrendSurface, 'groups' | 'totalSumOfSquares' | 'rSquared' | 'adjustedRSquared'> {
  const spread = deviations.reduce((sum, deviation) => sum + deviation * deviation, 0)
  const total = spread > deviations.length * (NO_SPREAD * mean) ** 2 ? spread : 0
  const residualMeanSquare = fit.residualSumOfSquares / fit.degreesOfFreedom
  const groups = TREND_GROUPS.map((id): TrendGroup => {
    const members = indices.flatMap((index, k) => (k > 0 && trendGroupOf(index) === id ? [k] : []))
    const sumOfSquares = total > 0 ? members.reduce((sum, k) => sum + fit.sequentialSumsOfSquares[k], 0) : 0
    const f = sumOfSquares > 0 ? sumOfSquares / members.length / residualMeanSquare : 0
    return { id, degreesOfFreedom: members.length, sumOfSquares, share: total > 0 ? sumOfSquares / total : 0, f }
  })
  const rSquared = total > 0 ? 1 - fit.residualSumOfSquares / total : 0
  const adjustedRSquared = total > 0 ? 1 - (residualMeanSquare * (deviations.length - 1)) / total : 0
  return {
    groups: groups.filter((group) => group.degreesOfFreedom > 0),
    totalSumOfSquares: total,
    rSquared,
    adjustedRSquared,
  }
}

function evaluate(terms: readonly TrendTerm[], radius_mm: number, { x_mm, y_mm }: Targets): Float64Array {
  const [x, y] = [x_mm.map((place) => place / radius_mm), y_mm.map((place) => place / radius_mm)]
  const [surface, shape] = [new Float64Array(x.length), new Float64Array(x.length)]
  for (const term of terms) {
    zernikeColumn(term, x, y, shape)
    for (let t = 0; t < surface.length; t++) surface[t] += term.coefficient * shape[t]
  }
  return surface
}

function requirePlaces(x_mm: Float64Array, y_mm: Float64Array, radius_mm: number): void {
  requireRange('radius of the trend surface', radius_mm, 'mm', 1e-3, 1e4)
  if (x_mm.length !== y_mm.length) {
    throw new CoreError({ kind: 'not-applicable', what: 'trend surface', why: `${x_mm.length} x for ${y_mm.length} y` })
  }
  x_mm.forEach((x, i) => {
    const distance_mm = Math.hypot(x, y_mm[i])
    if (!(distance_mm <= radius_mm * (1 + RIM_SHARE)))
      requireRange('distance of a site from the centre', distance_mm, 'mm', 0, radius_mm)
  })
}

function requireEnough(siteCount: number, order: TrendOrder): void {
  const needed = trendTerms(order).length + 1
  if (siteCount >= needed) return
  const why = `${needed - 1} terms need at least ${needed} sites, and there are ${siteCount}`
  throw new CoreError({ kind: 'not-applicable', what: `trend surface of order ${order}`, why })
}
