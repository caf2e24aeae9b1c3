/**
 * From the sites of a wafer to any places on it: dies, or the raster of a picture. Which method, how far it holds and
 * how sure it is are decided here, once for a site pattern.
 */
import { convexHull, insideHull } from './convex-hull'
import { distinctSites, meansAtDistinctSites, type DistinctSites } from './coincident-sites'
import { frameOf, requireSites } from './frame'
import { evaluateTriangles, triangleWeights } from './linear-interpolation'
import { thinPlateSpline, type Targets } from './thin-plate-spline'

export type InterpolationMethod = 'thin-plate-spline' | 'linear' | 'mean'
/** As a procedure may choose. */
export type SurfaceMethod = InterpolationMethod | 'gaussian-process'

/** More distinct sites than this are joined linearly: solving for the spline grows with the cube of their number. */
export const MAX_SPLINE_SITES = 700

export const METHOD_TITLES: Readonly<Record<SurfaceMethod, string>> = {
  'gaussian-process': 'Gaussian process about a trend surface',
  'thin-plate-spline': 'thin-plate spline through the sites',
  linear: 'linear between the sites (Delaunay triangles)',
  mean: 'mean of the sites: too few, or all on one line',
}

export interface Extrapolation {
  readonly count: number
  /** Of the targets counted; of the area where they are evenly spread. 0 for no targets. */
  readonly share: number
}

/** Linear in the values, so that one serves every wafer measured at the same sites. */
export interface Interpolator {
  readonly method: InterpolationMethod
  readonly siteCount: number
  readonly targetCount: number
  /** 1 for each target within the convex hull of the sites; the others are extrapolated, and not to be judged. */
  readonly inside: Uint8Array
  /** How many of the targets are extrapolated; `extrapolationOf` counts only some of them, e.g. those on the wafer. */
  readonly extrapolated: Extrapolation
  /** Values at the targets, from one value a site. */
  evaluate(values: Float64Array, out?: Float64Array): Float64Array
  /** Standard uncertainties at the targets from those at the sites, independent of each other. */
  propagate(u: Float64Array, out?: Float64Array): Float64Array
  /** value - value interpolated from the other sites, a site; null where the method gives none. */
  leaveOneOut(values: Float64Array): Float64Array | null
}

/**
 * Thin-plate spline up to MAX_SPLINE_SITES distinct sites, linear above; the mean of the sites where they are fewer
 * than three or lie on one line (then no target but those on the line is inside). Sites in one place count as one, at
 * their mean.
 *
 * A part of the uncertainty that all sites share isn't for `propagate`: the weights sum to 1, so `evaluate` carries it.
 *
 * @throws CoreError for no sites or coordinates that aren't finite
 */
export function prepareInterpolator(x_mm: Float64Array, y_mm: Float64Array, targets: Targets): Interpolator {
  requireSites(x_mm, y_mm)
  const distinct = distinctSites(x_mm, y_mm)
  const inside = insideHull(convexHull(distinct.x_mm, distinct.y_mm), targets.x_mm, targets.y_mm)
  const surface = surfaceThrough(distinct, targets)
  const targetCount = targets.x_mm.length
  return {
    method: surface.method,
    siteCount: x_mm.length,
    targetCount,
    inside,
    extrapolated: extrapolationOf(inside),
    evaluate: (values, out = new Float64Array(targetCount)) =>
      surface.evaluate(meansAtDistinctSites(distinct, values), out),
    propagate: (u, out = new Float64Array(targetCount)) => surface.propagate(uncertaintyOfMeans(distinct, u), out),
    leaveOneOut: (values) => {
      const residuals = surface.leaveOneOut(meansAtDistinctSites(distinct, values))
      return residuals && Float64Array.from(distinct.distinctOf, (site) => residuals[site]!)
    },
  }
}

/**
 * How many targets lie beyond the hull of the sites.
 *
 * @param inside   as an interpolator gives it
 * @param counted  1 for each target that counts, e.g. `onWafer` of a raster; absent: all
 */
export function extrapolationOf(inside: Uint8Array, counted?: Uint8Array): Extrapolation {
  let [count, all] = [0, 0]
  for (let t = 0; t < inside.length; t++) {
    if (counted && counted[t] !== 1) continue
    all++
    if (inside[t] === 0) count++
  }
  return { count, share: all > 0 ? count / all : 0 }
}

/** As `prepareInterpolator` at always the same targets, remembering the patterns it has met: a lot mostly has one. */
export function interpolatorsFor(targets: Targets): (x_mm: Float64Array, y_mm: Float64Array) => Interpolator {
  const known: { readonly x_mm: Float64Array; readonly y_mm: Float64Array; readonly interpolator: Interpolator }[] = []
  return (x_mm, y_mm) => {
    const found = known.find((pattern) => isSame(pattern.x_mm, x_mm) && isSame(pattern.y_mm, y_mm))
    if (found) return found.interpolator
    const interpolator = prepareInterpolator(x_mm, y_mm, targets)
    known.push({ x_mm: x_mm.slice(), y_mm: y_mm.slice(), interpolator })
    // Wafers that each have a pattern of their own must not keep a lot's worth of factorisations alive.
    if (known.length > REMEMBERED_PATTERNS) known.shift()
    return interpolator
  }
}

const REMEMBERED_PATTERNS = 8

/** What a method does with one value a distinct site. */
interface Surface {
  readonly method: InterpolationMethod
  evaluate(values: Float64Array, out: Float64Array): Float64Array
  propagate(u: Float64Array, out: Float64Array): Float64Array
  leaveOneOut(values: Float64Array): Float64Array | null
}

/** The method that `prepareInterpolator` takes for these sites. */
export function plainMethodFor(x_mm: Float64Array, y_mm: Float64Array): InterpolationMethod {
  return methodFor(distinctSites(x_mm, y_mm))
}

function methodFor({ x_mm, y_mm, count }: DistinctSites): InterpolationMethod {
  if (count < 3 || frameOf(x_mm, y_mm).isCollinear) return 'mean'
  return count <= MAX_SPLINE_SITES ? 'thin-plate-spline' : 'linear'
}

function surfaceThrough(sites: DistinctSites, targets: Targets): Surface {
  const method = methodFor(sites)
  if (method === 'mean') return meanSurface(sites)
  return method === 'thin-plate-spline' ? splineSurface(sites, targets) : linearSurface(sites, targets)
}

function splineSurface({ x_mm, y_mm, count }: DistinctSites, targets: Targets): Surface {
  const spline = thinPlateSpline(x_mm, y_mm)
  let fill: ReturnType<typeof spline.evaluatorAt> | null = null
  let weights: Float64Array | null = null
  return {
    method: 'thin-plate-spline',
    evaluate: (values, out) => {
      fill ??= spline.evaluatorAt(targets)
      return fill(spline.coefficients(values), out)
    },
    propagate: (u, out) => {
      weights ??= spline.weights(targets)
      for (let t = 0; t < out.length; t++) {
        let sum = 0
        for (let site = 0; site < count; site++) sum += (weights[t * count + site]! * u[site]!) ** 2
        out[t] = Math.sqrt(sum)
      }
      return out
    },
    leaveOneOut: (values) => spline.leaveOneOut(values),
  }
}

function linearSurface({ x_mm, y_mm }: DistinctSites, targets: Targets): Surface {
  const weights = triangleWeights(x_mm, y_mm, targets)
  const squared = { site: weights.site, weight: weights.weight.map((weight) => weight * weight) }
  return {
    method: 'linear',
    evaluate: (values, out) => evaluateTriangles(weights, values, out),
    propagate: (u, out) => {
      const variances = u.map((site) => site * site)
      evaluateTriangles(squared, variances, out)
      for (let t = 0; t < out.length; t++) out[t] = Math.sqrt(out[t]!)
      return out
    },
    leaveOneOut: () => null,
  }
}

/** The mean of the distinct sites everywhere. */
function meanSurface({ count }: DistinctSites): Surface {
  const meanOf = (values: Float64Array) => values.reduce((sum, value) => sum + value / count, 0)
  return {
    method: 'mean',
    evaluate: (values, out) => out.fill(meanOf(values)),
    propagate: (u, out) => out.fill(Math.sqrt(u.reduce((sum, site) => sum + site * site, 0)) / count),
    leaveOneOut: (values) =>
      count > 1 ? values.map((value) => ((value - meanOf(values)) * count) / (count - 1)) : null,
  }
}

/** Of the mean of n readings in one place: sqrt(sum u^2) / n. */
function uncertaintyOfMeans({ count, distinctOf, multiplicity }: DistinctSites, u: Float64Array): Float64Array {
  const variances = new Float64Array(count)
  for (let i = 0; i < u.length; i++) variances[distinctOf[i]!]! += (u[i]! / multiplicity[distinctOf[i]!]!) ** 2
  return variances.map(Math.sqrt)
}

function isSame(a: Float64Array, b: Float64Array): boolean {
  if (a.length !== b.length) return false
  for (let i = 0; i < a.length; i++) if (a[i] !== b[i]) return false
  return true
}
