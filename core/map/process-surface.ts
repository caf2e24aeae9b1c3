/** Fits Gaussian processes to wafers, one site pattern prepared once, and gives values with standard errors anywhere. */
import { distinctSites, meansAtDistinctSites, type DistinctSites } from './coincident-sites'
import { frameOf } from './frame'
import {
  factored, leaveOneOut, predict, predictValue, solved, type Factored, type Hyperparameters, type ProcessSites, type Solved,
  type TrendDegree,
} from './gaussian-process' // prettier-ignore
import { trendDegreeFor } from './process-trend'
import type { Targets } from './thin-plate-spline'

export const LEAST_PROCESS_SITES = 9
/** A factorisation grows with the cube of the number of sites; above, the plain interpolation stands in. */
export const MAX_PROCESS_SITES = 1000
/** The likelihood is that of at most so many of the sites, evenly picked; the surface goes through all. */
const LIKELIHOOD_SITES = 160

export interface ProcessSurface {
  readonly degree: TrendDegree
  readonly lengthScale_mm: number
  /** Of the surface about its trend. */
  readonly standardDeviation: number
  /** Of a site about the surface: repeatability, and what is rougher than the sites can tell. */
  readonly nugget: number
  /** Of that, what the sites' own repeatability explains. */
  readonly repeatability: number
  readonly deviance: number
  /** At the targets: value and standard error of the surface there, roughness beyond repeatability included. */
  at(targets: Targets, out: { readonly value: Float64Array; readonly standardError: Float64Array }): void
  values(targets: Targets): Float64Array
  /** One entry a site as given: value less prediction from the others, and that over its standard error. */
  leaveOneOut(): {
    readonly residual: Float64Array
    readonly standardised: Float64Array
    readonly predicted: Float64Array
  }
}

/** null where the sites are too few, too many, or all on one line, or don't differ in value. */
export type FitProcess = (
  x_mm: Float64Array,
  y_mm: Float64Array,
  values: Float64Array,
  u: Float64Array,
) => ProcessSurface | null

/** Remembers the patterns that it has met: a lot mostly has one. */
export function processFitter(): FitProcess {
  const known: { readonly x_mm: Float64Array; readonly y_mm: Float64Array; readonly pattern: Pattern | null }[] = []
  return (x_mm, y_mm, values, u) => {
    let found = known.find((entry) => isSame(entry.x_mm, x_mm) && isSame(entry.y_mm, y_mm))
    if (!found) {
      found = { x_mm: x_mm.slice(), y_mm: y_mm.slice(), pattern: patternOf(x_mm, y_mm) }
      known.push(found)
      if (known.length > REMEMBERED_PATTERNS) known.shift()
    }
    return found.pattern && fitted(found.pattern, values, u)
  }
} // prettier-ignore

const REMEMBERED_PATTERNS = 4

interface Pattern {
  readonly distinct: DistinctSites
  readonly sites: ProcessSites
  readonly radius_mm: number
  readonly degree: TrendDegree
  /** Entries of the distinct sites that the likelihood is of. */
  readonly rows: Uint32Array
  /** Factored at every pair of a grid; null where it can't be. */
  readonly grid: readonly (Factored | null)[]
}

/** Over the radius of the sites. */
const LENGTHS = Array.from({ length: 13 }, (_, k) => 0.12 * 1.32 ** k)
const NOISE_RATIOS = [1e-6, 1e-4, 1e-3, 0.01, 0.05, 0.2, 1, 5]

function patternOf(x_mm: Float64Array, y_mm: Float64Array): Pattern | null {
  const distinct = distinctSites(x_mm, y_mm)
  const { count } = distinct
  if (whyNotThere(distinct)) return null
  const radius_mm = Math.max(...distinct.x_mm.map((x, i) => Math.hypot(x, distinct.y_mm[i])))
  const scaled = (column: Float64Array): Float64Array => column.map((value) => value / radius_mm)
  const sites = { x: scaled(distinct.x_mm), y: scaled(distinct.y_mm), count }
  const every = Math.ceil(count / LIKELIHOOD_SITES)
  const rows = Uint32Array.from({ length: Math.ceil(count / every) }, (_, k) => k * every)
  const some = every === 1 ? sites : picked(sites, rows)
  // What some of the sites can tell, all of them can.
  const degree = trendDegreeFor(some)
  const grid = LENGTHS.flatMap((length) => NOISE_RATIOS.map((noiseRatio) => factored(some, degree, { length, noiseRatio })))
  return { distinct, sites, radius_mm, degree, rows, grid }
} // prettier-ignore

/** Why no process can be fitted to these sites, as the beginning of a sentence; null where one can. */
export function whyNoProcess(x_mm: Float64Array, y_mm: Float64Array, values: Float64Array): string | null {
  const distinct = distinctSites(x_mm, y_mm)
  return whyNotThere(distinct) ?? (differ(meansAtDistinctSites(distinct, values)) ? null : 'all sites have one value')
}

function whyNotThere({ x_mm, y_mm, count }: DistinctSites): string | null {
  if (count < LEAST_PROCESS_SITES) return `it needs sites in ${LEAST_PROCESS_SITES} places, and they are in ${count}`
  if (count > MAX_PROCESS_SITES)
    return `it takes sites in ${MAX_PROCESS_SITES} places at most, and they are in ${count}`
  return frameOf(x_mm, y_mm).isCollinear ? 'all sites lie on one line' : null
}

function differ(means: Float64Array): boolean {
  const spread = means.reduce((most, value) => Math.max(most, Math.abs(value - means[0])), 0)
  return spread > 1e-10 * Math.abs(means[0])
}

function picked({ x, y }: ProcessSites, rows: Uint32Array): ProcessSites {
  return { x: Float64Array.from(rows, (i) => x[i]), y: Float64Array.from(rows, (i) => y[i]), count: rows.length }
}

function fitted(pattern: Pattern, values: Float64Array, u: Float64Array): ProcessSurface | null {
  const { distinct, sites, degree, rows } = pattern
  const means = meansAtDistinctSites(distinct, values)
  if (!differ(means)) return null
  const repeatability = repeatabilityOf(distinct, u)
  const tried = triedOnGrid(
    pattern,
    Float64Array.from(rows, (i) => means[i]),
  )
  const least = leastNugget(tried, repeatability)
  const best = bestOf(tried, least)
  if (!best) return null
  const hyper = refined(pattern, means, best, least)
  const whole = factored(sites, degree, hyper)
  return whole && surfaceOf(pattern, whole, solved(whole, means), repeatability)
}

/** Variance by which a site's mean repeats, averaged. */
function repeatabilityOf({ distinctOf, multiplicity }: DistinctSites, u: Float64Array): number {
  let sum = 0
  for (let i = 0; i < u.length; i++) sum += (Number.isFinite(u[i]) ? u[i] ** 2 : 0) / multiplicity[distinctOf[i]]
  return u.length > 0 ? sum / u.length : 0
}

interface Tried {
  readonly entry: Factored
  readonly deviance: number
  /** As a variance. */
  readonly nugget: number
}

function triedOnGrid({ grid }: Pattern, means: Float64Array): readonly Tried[] {
  return grid.flatMap((entry) => {
    if (!entry) return []
    const { amplitude, deviance } = solved(entry, means)
    return amplitude > 0 ? [{ entry, deviance, nugget: entry.hyper.noiseRatio * amplitude }] : []
  })
}

/**
 * A nugget below what the sites repeat by is none that could be. A quarter is let pass, as u itself is not known better.
 * Where the sites scatter less about every surface than they are said to repeat by, they have the word.
 */
function leastNugget(tried: readonly Tried[], repeatability: number): number {
  const most = tried.reduce((largest, { nugget }) => Math.max(largest, nugget), 0)
  return 0.25 * Math.min(repeatability, most)
}

function bestOf(tried: readonly Tried[], least: number): Factored | null {
  const allowed = tried.filter(({ nugget }) => nugget >= least)
  return (
    allowed.reduce<Tried | null>((best, one) => (best && best.deviance <= one.deviance ? best : one), null)?.entry ??
    null
  )
}

/** Up to so many sites the best of the grid is looked at again with all of them. */
const REFINED_SITES = 400

/** Steps of halving size about the best of the grid, a few dozen evaluations. */
function refined({ sites, degree }: Pattern, means: Float64Array, from: Factored, leastAllowed: number): Hyperparameters {
  if (sites.count > REFINED_SITES) return from.hyper
  const devianceAt = (hyper: Hyperparameters): number => {
    const entry = factored(sites, degree, hyper)
    if (!entry) return Infinity
    const { amplitude, deviance } = solved(entry, means)
    return amplitude > 0 && hyper.noiseRatio * amplitude >= leastAllowed ? deviance : Infinity
  }
  let here = from.hyper
  let least = devianceAt(here)
  for (let step = sites.count > LIKELIHOOD_SITES ? 2 : 0.5; step > 0.2; step /= 2) {
    for (const [length, noise] of [[1.32 ** step, 1], [1.32 ** -step, 1], [1, 4 ** step], [1, 4 ** -step]] as const) {
      const next = { length: here.length * length, noiseRatio: here.noiseRatio * noise }
      const deviance = devianceAt(next)
      if (deviance < least) [here, least] = [next, deviance]
    }
  }
  return here
} // prettier-ignore

function surfaceOf({ distinct, radius_mm, degree }: Pattern, whole: Factored, fit: Solved, repeatability: number): ProcessSurface {
  const { hyper } = whole
  const { amplitude, deviance } = fit
  const nugget = hyper.noiseRatio * amplitude
  const roughness = Math.max(0, nugget - repeatability)
  return {
    degree,
    lengthScale_mm: hyper.length * radius_mm,
    standardDeviation: Math.sqrt(amplitude),
    nugget: Math.sqrt(nugget),
    repeatability: Math.sqrt(repeatability),
    deviance,
    at: ({ x_mm, y_mm }, out) => {
      const work = new Float64Array(whole.sites.count)
      for (let t = 0; t < x_mm.length; t++) {
        const { value, variance } = predict(whole, fit, x_mm[t] / radius_mm, y_mm[t] / radius_mm, work)
        out.value[t] = value
        out.standardError[t] = Math.sqrt(variance * amplitude + roughness)
      }
    },
    values: ({ x_mm, y_mm }) => x_mm.map((x, t) => predictValue(whole, fit, x / radius_mm, y_mm[t] / radius_mm)),
    leaveOneOut: () => {
      const { residual, deviation } = leaveOneOut(whole, fit)
      const at = (column: Float64Array) => Float64Array.from(distinct.distinctOf, (site) => column[site])
      const s = Math.sqrt(amplitude)
      const standardised = residual.map((value, i) => value / (deviation[i] * s))
      return { residual: at(residual), standardised: at(standardised), predicted: at(predictedAt(whole, fit, residual)) }
    },
  }
} // prettier-ignore

/** What the others say of a site: its measured value less the residual. */
function predictedAt(whole: Factored, fit: Solved, residual: Float64Array): Float64Array {
  const { sites, hyper } = whole
  return residual.map((left, i) => {
    const measured = predictValue(whole, fit, sites.x[i], sites.y[i]) + hyper.noiseRatio * fit.alpha[i]
    return measured - left
  })
}

function isSame(a: Float64Array, b: Float64Array): boolean {
  return a.length === b.length && a.every((value, i) => value === b[i])
}
