/** Zernike polynomials: the shapes of a disc, from the mean over tilt and bowl to ripples, none of which contains another. */
import { CoreError, requireRange } from '../problems/problem'

export interface ZernikeIndex {
  /** Degree in the radius, 0 to MAX_DEGREE. */
  readonly n: number
  /** How many times it repeats in a turn, |m| <= n, n - |m| even: cosines for m >= 0, sines for m < 0. */
  readonly m: number
}

export const MAX_DEGREE = 60

/** Trade-neutral names of the low ones, by OSA/ANSI index. */
const NAMES: readonly string[] = [
  'mean', 'tilt y', 'tilt x', 'saddle, diagonal', 'bowl', 'saddle',
  'three-fold, y', 'lopsided bowl, y', 'lopsided bowl, x', 'three-fold, x',
  'four-fold, diagonal', 'saddle at the edge, diagonal', 'ring', 'saddle at the edge', 'four-fold',
] // prettier-ignore

/**
 * Orthonormal Zernike polynomial at a place of the unit disc: N R(rho) cos(m theta), or N R(rho) sin(|m| theta) for
 * m < 0, with N = sqrt(2 (n + 1)), for m = 0 sqrt(n + 1). Over the disc the mean of its square is 1 and the mean of its
 * product with any other is 0, so that a coefficient is the standard deviation its shape alone gives the wafer.
 *
 * @param index  n 0 to 60
 * @param x, y   in radii of the disc, x to the right, theta anticlockwise from it; rho <= 1 is meant, beyond it the
 *               polynomial goes on
 * @throws CoreError out-of-range, or not-applicable where n - |m| is odd or negative
 *
 * Accuracy: the radial part is taken by the three-term recurrence of the Jacobi polynomials, which doesn't cancel as
 * the sum of powers does: about 1e-13 up to n = 60, where the sum has no digit left.
 * Sources: F. Zernike, Physica 1 (1934) 689; norm, order and signs as in ISO 24157:2008 and ANSI Z80.28, after
 * L. N. Thibos et al., J. Refract. Surg. 18 (2002) S652 (from memory).
 */
export function zernike(index: ZernikeIndex, x: number, y: number): number {
  requireIndex(index)
  return evaluate(index, x, y)
}

/** As `zernike`, a column of places at once. */
export function zernikeColumn(
  index: ZernikeIndex,
  x: Float64Array,
  y: Float64Array,
  out: Float64Array = new Float64Array(x.length),
): Float64Array {
  requireIndex(index)
  for (let i = 0; i < x.length; i++) out[i] = evaluate(index, x[i], y[i])
  return out
}

/** The single index of OSA and ANSI: j = (n (n + 2) + m) / 2, from 0. */
export function osaIndex(index: ZernikeIndex): number {
  requireIndex(index)
  return (index.n * (index.n + 2) + index.m) / 2
}

/** The inverse of `osaIndex`. */
export function zernikeAt(j: number): ZernikeIndex {
  const last = (MAX_DEGREE * (MAX_DEGREE + 2) + MAX_DEGREE) / 2
  requireRange('Zernike index', Number.isInteger(j) ? j : NaN, '', 0, last)
  // Degree n begins at j = n (n + 1) / 2.
  const n = Math.floor((Math.sqrt(8 * j + 1) - 1) / 2)
  return { n, m: 2 * j - n * (n + 2) }
}

export function zernikeName(index: ZernikeIndex): string {
  const folds = Math.abs(index.m)
  const direction = index.m < 0 ? ', sine' : ', cosine'
  return (
    NAMES[osaIndex(index)] ??
    (folds === 0 ? `ring of degree ${index.n}` : `${folds}-fold of degree ${index.n}${direction}`)
  )
}

function evaluate({ n, m }: ZernikeIndex, x: number, y: number): number {
  const folds = Math.abs(m)
  // (x + iy)^|m| is rho^|m| (cos + i sin): no angle is needed, which the centre doesn't have.
  let [real, imaginary] = [1, 0]
  for (let k = 0; k < folds; k++) {
    const next = real * x - imaginary * y
    imaginary = real * y + imaginary * x
    real = next
  }
  const norm = Math.sqrt(m === 0 ? n + 1 : 2 * (n + 1))
  return norm * jacobi((n - folds) / 2, folds, 2 * (x * x + y * y) - 1) * (m < 0 ? imaginary : real)
}

/** Jacobi polynomial P_k^(0,b): R_n^b(rho) = rho^b P_k^(0,b)(2 rho^2 - 1), k = (n - b) / 2 (Abramowitz & Stegun 22.7.1). */
function jacobi(k: number, b: number, t: number): number {
  let [before, current] = [0, 1]
  for (let i = 1; i <= k; i++) {
    const s = 2 * i + b
    // The first step has no two before it, and its general form divides by zero for b = 0.
    const next =
      i === 1
        ? ((b + 2) * t - b) / 2
        : ((s - 1) * (s * (s - 2) * t - b * b) * current - 2 * (i - 1) * (i + b - 1) * s * before) /
          (2 * i * (i + b) * (s - 2))
    before = current
    current = next
  }
  return current
}

function requireIndex({ n, m }: ZernikeIndex): void {
  requireRange('Zernike degree', Number.isInteger(n) ? n : NaN, '', 0, MAX_DEGREE)
  requireRange('Zernike repetition', Number.isInteger(m) ? m : NaN, '', -n, n)
  if ((n - m) % 2 !== 0) {
    throw new CoreError({ kind: 'not-applicable', what: `Zernike polynomial n = ${n}, m = ${m}`, why: 'n - m is odd' })
  }
}
