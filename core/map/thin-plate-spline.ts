/** The thin-plate spline: of all surfaces through the sites, the one that bends least. */
import { LuDecomposition, Matrix } from 'ml-matrix'
import { CoreError } from '../problems/problem'
import { distinctSites } from './coincident-sites'
import { frameOf, requireSites, type Frame } from './frame'

/**
 * A site pattern made ready: one factorisation serves every wafer measured at the same sites, since the surface is
 * linear in the values.
 */
export interface ThinPlateSpline {
  readonly siteCount: number
  /** Bending coefficients (one a site), then constant, x and y of the plane, in the scaled frame. */
  coefficients(values: Float64Array): Float64Array
  /** Makes ready for many surfaces at the same places: (coefficients, out) fills `out` with the surface. */
  evaluatorAt(targets: Targets): (coefficients: Float64Array, out: Float64Array) => Float64Array
  /** How much each site's value counts at each target: rows targets, columns sites; every row sums to 1. */
  weights(targets: Targets): Float64Array
  /**
   * value - surface fitted without that site, at every site, exactly and without refitting. NaN where the others alone
   * make no surface.
   */
  leaveOneOut(values: Float64Array): Float64Array
}

export interface Targets {
  readonly x_mm: Float64Array
  readonly y_mm: Float64Array
}

/** 32 MB: 25 000 places of a plan of 169 sites. */
const KEPT_BASIS_ENTRIES = 4_000_000

/** A diagonal of the inverse this small against its largest entry means that the other sites lie on a line. */
const NO_SURFACE_WITHOUT = 1e-9

/**
 * Thin-plate spline with its affine part: s(p) = sum c_i U(|p - p_i|) + a + b x + c y, U(r) = r^2 ln r, exact at the
 * sites, with sum c_i = sum c_i x_i = sum c_i y_i = 0.
 *
 * @param x_mm, y_mm  the sites: at least 3, finite, distinct, not on one line
 * @throws CoreError not-applicable otherwise
 *
 * Assumes values without noise worth smoothing: it passes through every one of them.
 * Accuracy: reproduces planes and site values to about 1e-12 of the values for a few hundred sites. Doesn't depend on
 * the unit of length, nor on a turn or shift of the wafer.
 * Sources: J. Duchon, RAIRO Anal. Numer. 10 (1976) 5; F. L. Bookstein, IEEE Trans. PAMI 11 (1989) 567. Leave-one-out
 * from the inverse: S. Rippa, Adv. Comput. Math. 11 (1999) 193 (all from memory).
 */
export function thinPlateSpline(x_mm: Float64Array, y_mm: Float64Array): ThinPlateSpline {
  requireSites(x_mm, y_mm)
  const frame = frameOf(x_mm, y_mm)
  const siteCount = x_mm.length
  if (siteCount < 3 || frame.isCollinear) throw noSurface('its sites lie on one line')
  const sites = scaled({ x_mm, y_mm }, frame)
  const saddle = saddleMatrix(sites)
  const factors = new LuDecomposition(saddle)
  // Rounding can hide a doubled row from the factorisation.
  if (distinctSites(x_mm, y_mm).count < siteCount || factors.isSingular()) throw noSurface('two of its sites coincide')
  // Four times the work of the factorisation, and a plain map doesn't need it.
  let inverse: Float64Array | null = null
  const inverted = () => (inverse ??= symmetricInverse(factors, saddle.rows))
  const coefficients = (values: Float64Array) => solveRefined(factors, saddle, values)
  return {
    siteCount,
    coefficients,
    evaluatorAt: (targets) => evaluator({ sites, frame }, targets),
    weights: (targets) => weights({ sites, frame }, inverted(), targets),
    leaveOneOut: (values) => leaveOneOut(coefficients(values), inverted(), siteCount),
  }
}

interface ScaledSites {
  readonly x: Float64Array
  readonly y: Float64Array
}

function scaled({ x_mm, y_mm }: Targets, { centreX_mm, centreY_mm, scale_mm }: Frame): ScaledSites {
  return {
    x: x_mm.map((x) => (x - centreX_mm) / scale_mm),
    y: y_mm.map((y) => (y - centreY_mm) / scale_mm),
  }
}

/** U(r) = r^2 ln r, from r^2. */
function kernel(squared: number): number {
  return squared > 0 ? 0.5 * squared * Math.log(squared) : 0
}

/** [K P; P' 0]: symmetric, not definite. */
function saddleMatrix({ x, y }: ScaledSites): Matrix {
  const count = x.length
  const saddle = Matrix.zeros(count + 3, count + 3)
  const set = (row: number, column: number, value: number) => saddle.set(row, column, value).set(column, row, value)
  for (let i = 0; i < count; i++) {
    for (let j = 0; j < i; j++) set(i, j, kernel((x[i]! - x[j]!) ** 2 + (y[i]! - y[j]!) ** 2))
    set(i, count, 1)
    set(i, count + 1, x[i]!)
    set(i, count + 2, y[i]!)
  }
  return saddle
}

/** With one step of refinement, which brings back the two or three digits that elimination loses on large patterns. */
function solveRefined(factors: LuDecomposition, saddle: Matrix, values: Float64Array): Float64Array {
  const right = Matrix.zeros(saddle.rows, 1)
  for (let i = 0; i < values.length; i++) right.set(i, 0, values[i]!)
  const solution = factors.solve(right)
  const left = Matrix.sub(right, saddle.mmul(solution))
  return Float64Array.from(solution.add(factors.solve(left)).to1DArray())
}

/** By rows in one column, for fast sums; made exactly symmetric, as the inverse of a symmetric matrix is. */
function symmetricInverse(factors: LuDecomposition, size: number): Float64Array {
  const solved = factors.solve(Matrix.eye(size, size))
  const inverse = new Float64Array(size * size)
  for (let i = 0; i < size; i++) {
    for (let j = 0; j < size; j++) inverse[i * size + j] = (solved.get(i, j) + solved.get(j, i)) / 2
  }
  return inverse
}

/** A bending coefficient over its diagonal is what leaving the site out does. */
function leaveOneOut(fitted: Float64Array, inverse: Float64Array, siteCount: number): Float64Array {
  const size = siteCount + 3
  let largest = 0
  for (let i = 0; i < siteCount; i++) largest = Math.max(largest, Math.abs(inverse[i * size + i]!))
  return Float64Array.from({ length: siteCount }, (_, i) => {
    const diagonal = inverse[i * size + i]!
    // Three sites alone bend nothing: the whole block is zero.
    return siteCount > 3 && Math.abs(diagonal) > NO_SURFACE_WITHOUT * largest ? fitted[i]! / diagonal : NaN
  })
}

interface Surface {
  readonly sites: ScaledSites
  readonly frame: Frame
}

/** What each coefficient is multiplied by at a target: U of the distance to each site, then 1, x, y. */
function fillBasis(
  { sites, frame }: Surface,
  targets: Targets,
  target: number,
  out: Float64Array,
  start: number,
): void {
  const count = sites.x.length
  const x = (targets.x_mm[target]! - frame.centreX_mm) / frame.scale_mm
  const y = (targets.y_mm[target]! - frame.centreY_mm) / frame.scale_mm
  for (let i = 0; i < count; i++) {
    const dx = x - sites.x[i]!
    const dy = y - sites.y[i]!
    out[start + i] = kernel(dx * dx + dy * dy)
  }
  out[start + count] = 1
  out[start + count + 1] = x
  out[start + count + 2] = y
}

/** Keeps the logarithms of one set of targets for all wafers, unless they would fill the memory. */
function evaluator(surface: Surface, targets: Targets): (fitted: Float64Array, out: Float64Array) => Float64Array {
  const size = surface.sites.x.length + 3
  const count = targets.x_mm.length
  const isKept = count * size <= KEPT_BASIS_ENTRIES
  const basis = new Float64Array(isKept ? count * size : size)
  if (isKept) for (let t = 0; t < count; t++) fillBasis(surface, targets, t, basis, t * size)
  return (fitted, out) => {
    for (let t = 0; t < count; t++) {
      const start = isKept ? t * size : 0
      if (!isKept) fillBasis(surface, targets, t, basis, 0)
      let sum = 0
      for (let k = 0; k < size; k++) sum += basis[start + k]! * fitted[k]!
      out[t] = sum
    }
    return out
  }
}

function weights(surface: Surface, inverse: Float64Array, targets: Targets): Float64Array {
  const count = surface.sites.x.length
  const size = count + 3
  const out = new Float64Array(targets.x_mm.length * count)
  const basis = new Float64Array(size)
  for (let t = 0; t < targets.x_mm.length; t++) {
    fillBasis(surface, targets, t, basis, 0)
    for (let site = 0; site < count; site++) {
      let sum = 0
      for (let k = 0; k < size; k++) sum += inverse[site * size + k]! * basis[k]!
      out[t * count + site] = sum
    }
  }
  return out
}

function noSurface(why: string): CoreError {
  return new CoreError({ kind: 'not-applicable', what: 'thin-plate spline', why })
}
