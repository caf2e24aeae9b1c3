/**
 * The incomplete gamma function, without log-gammas: x^a exp(-x) / Gamma(a + 1) is taken by the deviance of a from x, so
 * that it keeps its digits where a and x are both large and nearly equal, as they are for a lot of many sites.
 */
import { CoreError, requireRange } from '../problems/problem'

const HALF_LN_TWO_PI = 0.5 * Math.log(2 * Math.PI)
/** The series below has reached double precision from here on. */
const STIRLING_FROM = 15
/** More than any argument in range needs: both expansions take a few times the root of a. */
const MAX_TERMS = 1_000_000
const TINY = 1e-300

/**
 * What Stirling's formula leaves: ln Gamma(x + 1) - (x + 1/2) ln x + x - ln(2 pi) / 2, for x > 0. Falls to 1/(12 x).
 *
 * Accuracy: 1e-15 absolute. Sources: series, M. Abramowitz, I. A. Stegun, Handbook of Mathematical Functions (1964)
 * 6.1.41; below 15 by the recurrence of the gamma function.
 */
export function stirlingError(x: number): number {
  let stepped = 0
  let at = x
  for (; at < STIRLING_FROM; at++) stepped += (at + 0.5) * Math.log1p(1 / at) - 1
  const s = 1 / (at * at)
  return stepped + (1 / 12 - s * (1 / 360 - s * (1 / 1260 - s * (1 / 1680 - s * (1 / 1188 - (s * 691) / 360360))))) / at
}

/** a ln(a / x) + x - a for a, x > 0: 0 at a = x, and to all digits beside it. C. Loader (2000), see beta.ts. */
export function deviance(a: number, x: number): number {
  if (Math.abs(a - x) >= 0.1 * (a + x)) return a * Math.log(a / x) + x - a
  const v = (a - x) / (a + x)
  let power = 2 * a * v
  let sum = (a - x) * v
  for (let j = 3; ; j += 2) {
    power *= v * v
    const next = sum + power / j
    if (next === sum) return sum
    sum = next
  }
}

/**
 * P(a, x), the share of the integral of t^(a-1) exp(-t) that lies below x.
 *
 * @param a  1e-3 to 1e9
 * @param x  >= 0, may be infinite
 * @returns 0 to 1
 * @throws CoreError out-of-range
 *
 * Accuracy: 2e-13 relative up to a = 1e6 in either tail, where it isn't below 1e-300.
 * Sources: NIST Digital Library of Mathematical Functions 8.7.1 (series), 8.9.2 (continued fraction).
 */
export function lowerIncompleteGamma(a: number, x: number): number {
  requireArguments(a, x)
  return x < a + 1 ? series(a, x) : 1 - continuedFraction(a, x)
}

/** Q(a, x) = 1 - P(a, x), with its own digits where it is small. Range, accuracy and sources as P(a, x). */
export function upperIncompleteGamma(a: number, x: number): number {
  requireArguments(a, x)
  return x < a + 1 ? 1 - series(a, x) : continuedFraction(a, x)
}

/** x^a exp(-x) / Gamma(a + 1). */
function density(a: number, x: number): number {
  if (x === 0 || x === Infinity) return 0
  return Math.exp(-stirlingError(a) - deviance(a, x) - 0.5 * Math.log(a) - HALF_LN_TWO_PI)
}

function series(a: number, x: number): number {
  let term = 1
  let sum = 1
  for (let n = 1; n <= MAX_TERMS; n++) {
    term *= x / (a + n)
    sum += term
    if (term < sum * 1e-17) return Math.min(1, density(a, x) * sum)
  }
  throw notConverged()
}

/** By W. J. Lentz' method, Appl. Opt. 15 (1976) 668. */
function continuedFraction(a: number, x: number): number {
  if (x === Infinity) return 0
  let b = x + 1 - a
  let c = 1 / TINY
  let d = 1 / b
  let fraction = d
  for (let n = 1; n <= MAX_TERMS; n++) {
    const numerator = n * (a - n)
    b += 2
    d = 1 / nonZero(numerator * d + b)
    c = nonZero(b + numerator / c)
    fraction *= d * c
    if (Math.abs(d * c - 1) < 1e-16) return Math.min(1, a * density(a, x) * fraction)
  }
  throw notConverged()
}

function nonZero(x: number): number {
  return Math.abs(x) < TINY ? TINY : x
}

function requireArguments(a: number, x: number): void {
  requireRange('a of the incomplete gamma function', a, '', 1e-3, 1e9)
  requireRange('x of the incomplete gamma function', x, '', 0, Infinity)
}

function notConverged(): CoreError {
  return new CoreError({ kind: 'not-applicable', what: 'incomplete gamma function', why: 'it has not converged' })
}
