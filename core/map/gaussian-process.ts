/**
 * A wafer's surface as a Gaussian process about a trend: every place gets a value and how sure it is.
 *
 *   y_i = f(x_i) beta + Z(x_i) + e_i,  cov Z = s^2 k(r / l),  var e_i = nugget
 *
 * f is a polynomial trend, k the Matern function of smoothness 5/2: surfaces that a furnace or a beam leaves are smooth,
 * but not as infinitely so as the squared exponential says. Length, amplitude and nugget are those of the largest
 * restricted likelihood, the nugget never below the variance by which a site repeats.
 *
 * Sources: C. E. Rasmussen and C. K. I. Williams, Gaussian Processes for Machine Learning, MIT Press (2006), 2.7 (trend),
 * 4.2.1 (Matern), 5.4.2 (leave one out); M. L. Stein, Interpolation of Spatial Data, Springer (1999), 6.4 (restricted
 * likelihood); O. Dubrule, Math. Geol. 15 (1983) 687 (leave one out with a trend). Sections from memory.
 */
import { factorCholesky, logDeterminant, solveLower, solveUpper } from '../numeric/cholesky'

export const GAUSSIAN_PROCESS_SOURCE =
  'C. E. Rasmussen and C. K. I. Williams, Gaussian Processes for Machine Learning (2006), 2.7, 4.2.1, 5.4.2; M. L. Stein, Interpolation of Spatial Data (1999), 6.4; O. Dubrule, Math. Geol. 15 (1983) 687'

export interface ProcessSites {
  /** In units of `radius_mm`. */
  readonly x: Float64Array
  readonly y: Float64Array
  readonly count: number
}

export type TrendDegree = 0 | 1 | 2

/** Length in the units of the sites, amplitude and nugget as variances over s^2. */
export interface Hyperparameters {
  readonly length: number
  /** Of e over that of Z. */
  readonly noiseRatio: number
}

/** Matern, smoothness 5/2; 1 at 0. */
export function matern52(distance: number): number {
  const t = Math.sqrt(5) * distance
  return (1 + t + (t * t) / 3) * Math.exp(-t)
}

/** Correlation over distance / length: 1 at 0, positive definite in the plane. */
export type Kernel = (distance: number) => number

/** Terms 1, x, y, x^2, xy, y^2 up to the degree. */
export function trendTerms(degree: TrendDegree): number {
  return ((degree + 1) * (degree + 2)) / 2
}

export function fillTrend(degree: TrendDegree, x: number, y: number, out: Float64Array, at: number): void {
  out[at] = 1
  if (degree === 0) return
  out[at + 1] = x
  out[at + 2] = y
  if (degree === 1) return
  out[at + 3] = x * x
  out[at + 4] = x * y
  out[at + 5] = y * y
}

/** What of a fit hangs on the sites and hyperparameters alone: it serves every wafer measured at the same sites. */
export interface Factored {
  readonly sites: ProcessSites
  readonly degree: TrendDegree
  readonly terms: number
  readonly hyper: Hyperparameters
  readonly kernel: Kernel
  /** Cholesky factor of K = k + noiseRatio I. */
  readonly l: Float64Array
  /** L^-1 F, a column a term. */
  readonly w: readonly Float64Array[]
  /** Cholesky factor of F^T K^-1 F. */
  readonly g: Float64Array
  readonly logDeterminants: number
}

/** null where the matrix is singular to working precision. */
export function factored(
  sites: ProcessSites,
  degree: TrendDegree,
  hyper: Hyperparameters,
  kernel: Kernel = matern52,
): Factored | null {
  const n = sites.count
  const l = covariance(sites, hyper, kernel)
  if (!factorCholesky(l, n)) return null
  const terms = trendTerms(degree)
  const row = new Float64Array(terms)
  const w = Array.from({ length: terms }, () => new Float64Array(n))
  for (let i = 0; i < n; i++) {
    fillTrend(degree, sites.x[i], sites.y[i], row, 0)
    for (let t = 0; t < terms; t++) w[t][i] = row[t]
  }
  for (const column of w) solveLower(l, n, column)
  const g = new Float64Array(terms * terms)
  for (let a = 0; a < terms; a++) for (let b = 0; b <= a; b++) g[a * terms + b] = dot(w[a], w[b])
  if (!factorCholesky(g, terms)) return null
  return {
    sites,
    degree,
    terms,
    hyper,
    kernel,
    l,
    w,
    g,
    logDeterminants: logDeterminant(l, n) + logDeterminant(g, terms),
  }
}

function covariance(
  { x, y, count }: ProcessSites,
  { length, noiseRatio }: Hyperparameters,
  kernel: Kernel,
): Float64Array {
  const k = new Float64Array(count * count)
  for (let i = 0; i < count; i++) {
    for (let j = 0; j < i; j++) k[i * count + j] = kernel(Math.hypot(x[i] - x[j], y[i] - y[j]) / length)
    k[i * count + i] = 1 + noiseRatio
  }
  return k
}

/** One wafer's values on a factored pattern. */
export interface Solved {
  /** K^-1 (y - F beta). */
  readonly alpha: Float64Array
  readonly beta: Float64Array
  /** s^2 of the largest restricted likelihood. */
  readonly amplitude: number
  /** -2 ln of the restricted likelihood at that s^2, up to a constant. */
  readonly deviance: number
}

export function solved(pattern: Factored, values: Float64Array): Solved {
  const { l, w, g, terms, logDeterminants, sites } = pattern
  const n = sites.count
  const z = solveLower(l, n, values.slice())
  const beta = Float64Array.from(w, (column) => dot(column, z))
  solveUpper(g, terms, solveLower(g, terms, beta))
  const residual = z.slice()
  w.forEach((column, t) => {
    for (let i = 0; i < n; i++) residual[i] -= column[i] * beta[t]
  })
  const free = n - terms
  const amplitude = dot(residual, residual) / free
  return { alpha: solveUpper(l, n, residual), beta, amplitude, deviance: free * Math.log(amplitude) + logDeterminants }
}

export interface Prediction {
  readonly value: number
  /** Over s^2: of the smooth surface, without the nugget. */
  readonly variance: number
}

/** At a place in the units of the sites. `work` has n entries and is overwritten. */
export function predict(pattern: Factored, { alpha, beta }: Solved, x: number, y: number, work: Float64Array): Prediction {
  const { sites, hyper, kernel, degree, terms, l, w, g } = pattern
  const n = sites.count
  const trend = new Float64Array(terms)
  fillTrend(degree, x, y, trend, 0)
  let value = dot(trend, beta)
  for (let i = 0; i < n; i++) {
    work[i] = kernel(Math.hypot(x - sites.x[i], y - sites.y[i]) / hyper.length)
    value += work[i] * alpha[i]
  }
  solveLower(l, n, work)
  // What the trend doesn't know: f - F^T K^-1 k.
  for (let t = 0; t < terms; t++) trend[t] -= dot(w[t], work)
  solveLower(g, terms, trend)
  return { value, variance: Math.max(0, 1 - dot(work, work) + dot(trend, trend)) }
} // prettier-ignore

/** The value alone, which is quicker. */
export function predictValue({ sites, hyper, kernel, degree, terms }: Factored, { alpha, beta }: Solved, x: number, y: number): number {
  const trend = new Float64Array(terms)
  fillTrend(degree, x, y, trend, 0)
  let value = dot(trend, beta)
  for (let i = 0; i < sites.count; i++) value += alpha[i] * kernel(Math.hypot(x - sites.x[i], y - sites.y[i]) / hyper.length)
  return value
} // prettier-ignore

export interface LeftOut {
  /** value - value predicted from the others. */
  readonly residual: Float64Array
  /** Standard deviation that the prediction of the measured value had, the nugget in it; over s. */
  readonly deviation: Float64Array
}

/** With Q = K^-1 - K^-1 F (F^T K^-1 F)^-1 F^T K^-1: residual alpha_i / Q_ii, variance 1 / Q_ii. */
export function leaveOneOut({ sites, l, w, g, terms }: Factored, { alpha }: Solved): LeftOut {
  const n = sites.count
  const residual = new Float64Array(n)
  const deviation = new Float64Array(n)
  const unit = new Float64Array(n)
  const part = new Float64Array(terms)
  for (let i = 0; i < n; i++) {
    unit.fill(0)
    unit[i] = 1
    solveLower(l, n, unit)
    for (let t = 0; t < terms; t++) part[t] = dot(w[t], unit)
    solveLower(g, terms, part)
    const q = dot(unit, unit) - dot(part, part)
    residual[i] = alpha[i] / q
    deviation[i] = 1 / Math.sqrt(q)
  }
  return { residual, deviation }
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0
  for (let i = 0; i < a.length; i++) sum += a[i] * b[i]
  return sum
}
