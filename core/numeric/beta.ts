/** The incomplete beta function, without log-gammas: see gamma.ts. */
import { CoreError, requireRange } from '../problems/problem'
import { deviance, stirlingError } from './gamma'

const MAX_TERMS = 1_000_000
const TINY = 1e-300

/**
 * I_x(a, b), the share of the integral of t^(a-1) (1-t)^(b-1) from 0 to 1 that lies below x. Both x and its complement
 * are given, so that whoever knows 1 - x better than by subtraction keeps its digits.
 *
 * @param a, b  5e-4 to 1e9
 * @param x     0 to 1
 * @param y     1 - x
 * @returns 0 to 1
 * @throws CoreError out-of-range
 *
 * Accuracy: 2e-13 relative up to a, b = 1e6, where it isn't below 1e-300.
 * Sources: continued fraction, A. R. DiDonato, A. H. Morris, ACM Trans. Math. Softw. 18 (1992) 360, the even part of NIST
 * Digital Library of Mathematical Functions 8.17.22; the factor before it by
 * saddle-point deviances, C. Loader, Fast and accurate computation of binomial probabilities (2000).
 */
export function incompleteBeta(a: number, b: number, x: number, y = 1 - x): number {
  requireRange('a of the incomplete beta function', a, '', 5e-4, 1e9)
  requireRange('b of the incomplete beta function', b, '', 5e-4, 1e9)
  requireRange('x of the incomplete beta function', x, '', 0, 1)
  requireRange('1 - x of the incomplete beta function', y, '', 0, 1)
  if (x === 0) return 0
  if (y === 0) return 1
  // On this side the fraction converges fast; on the other its mirror image does.
  if (x < (a + 1) / (a + b + 2)) return Math.min(1, factor(a, b, x, y) * continuedFraction(a, b, x, y))
  return Math.max(0, 1 - factor(a, b, x, y) * continuedFraction(b, a, y, x))
}

/** x^a y^b / B(a, b). */
function factor(a: number, b: number, x: number, y: number): number {
  const n = a + b
  const exponent = stirlingError(n) - stirlingError(a) - stirlingError(b) - deviance(a, n * x) - deviance(b, n * y)
  return Math.sqrt(((a / n) * b) / (2 * Math.PI)) * Math.exp(exponent)
}

/** The even part of the fraction, which takes x and y apart and so has no 1 - x in it; by Lentz' method (see gamma.ts). */
function continuedFraction(a: number, b: number, x: number, y: number): number {
  const balance = a * y - b * x + 1
  let fraction = nonZero((a * balance) / (a + 1))
  let c = fraction
  let d = 0
  for (let m = 1; m <= MAX_TERMS; m++) {
    const before = a + 2 * m - 1
    const common = (m * (b - m) * x) / before
    const numerator = (common * (a + m - 1) * (a + b + m - 1) * x) / before
    const denominator = m + common + ((a + m) * (balance + m * (1 + y))) / (before + 2)
    d = 1 / nonZero(denominator + numerator * d)
    c = nonZero(denominator + numerator / c)
    fraction *= d * c
    if (Math.abs(d * c - 1) < 1e-16) return 1 / fraction
  }
  throw new CoreError({ kind: 'not-applicable', what: 'incomplete beta function', why: 'it has not converged' })
}

function nonZero(x: number): number {
  return Math.abs(x) < TINY ? TINY : x
}
