/**
 * The distributions of the sample mean and the sample variance: Student's t, chi-square and F, their probabilities and
 * quantiles. The small tail has its own digits in each; a quantile is found in the tail that is small.
 *
 * Degrees of freedom: 0.002 to 1e9 throughout, not necessarily whole. Every function throws CoreError out-of-range.
 * Accuracy: 2e-13 relative up to 1e6 degrees of freedom, probabilities and quantiles.
 * Sources: M. Abramowitz, I. A. Stegun, Handbook of Mathematical Functions (1964) 26.4.19, 26.5.27, 26.6.2.
 */
import { requireRange } from '../problems/problem'
import { incompleteBeta } from './beta'
import { findRoot } from './find-root'
import { lowerIncompleteGamma, upperIncompleteGamma } from './gamma'

/** A quantile below this is 0, one above its inverse infinite: beyond, squares leave the range of doubles. */
const SMALLEST = 1e-150

/** Probability below t. */
export function studentProbability(t: number, degreesOfFreedom: number): number {
  requireRange('t', t, '', -Infinity, Infinity)
  const tail = studentTail(Math.abs(t), degreesOfFreedom)
  return t < 0 ? tail : 1 - tail
}

/** The t below which the probability p lies: -Infinity at 0, Infinity at 1, 0 at 1/2. */
export function studentQuantile(p: number, degreesOfFreedom: number): number {
  requireProbability(p)
  requireFreedom(degreesOfFreedom)
  if (p === 0.5) return 0
  const target = Math.min(p, 1 - p)
  const t = target === 0 ? Infinity : solve((at) => studentTail(at, degreesOfFreedom), target, 1)
  return p < 0.5 ? -t : t
}

/** Probability above t, t >= 0. */
function studentTail(t: number, degreesOfFreedom: number): number {
  requireFreedom(degreesOfFreedom)
  const { share, rest } = shares(degreesOfFreedom, t * t)
  return 0.5 * incompleteBeta(degreesOfFreedom / 2, 0.5, share, rest)
}

/** Probability below x, x >= 0. */
export function chiSquareProbability(x: number, degreesOfFreedom: number): number {
  requireFreedom(degreesOfFreedom)
  return lowerIncompleteGamma(degreesOfFreedom / 2, x / 2)
}

/** Probability above x, x >= 0. */
export function chiSquareUpperProbability(x: number, degreesOfFreedom: number): number {
  requireFreedom(degreesOfFreedom)
  return upperIncompleteGamma(degreesOfFreedom / 2, x / 2)
}

/** The x below which the probability p lies: 0 at 0, Infinity at 1. */
export function chiSquareQuantile(p: number, degreesOfFreedom: number): number {
  requireProbability(p)
  requireFreedom(degreesOfFreedom)
  return quantileOf(p, degreesOfFreedom, {
    below: (x) => chiSquareProbability(x, degreesOfFreedom),
    above: (x) => chiSquareUpperProbability(x, degreesOfFreedom),
  })
}

/** Probability below f, f >= 0, of a ratio of mean squares with those degrees of freedom above and below the line. */
export function fProbability(f: number, numerator: number, denominator: number): number {
  const { share, rest } = fShares(f, numerator, denominator)
  return incompleteBeta(numerator / 2, denominator / 2, share, rest)
}

/** Probability above f, f >= 0: the significance of a ratio of mean squares. */
export function fUpperProbability(f: number, numerator: number, denominator: number): number {
  const { share, rest } = fShares(f, numerator, denominator)
  return incompleteBeta(denominator / 2, numerator / 2, rest, share)
}

/** The f below which the probability p lies: 0 at 0, Infinity at 1. */
export function fQuantile(p: number, numerator: number, denominator: number): number {
  requireProbability(p)
  requireFreedom(numerator)
  requireFreedom(denominator)
  return quantileOf(p, 1, {
    below: (f) => fProbability(f, numerator, denominator),
    above: (f) => fUpperProbability(f, numerator, denominator),
  })
}

function fShares(f: number, numerator: number, denominator: number): Shares {
  requireRange('F', f, '', 0, Infinity)
  requireFreedom(numerator)
  requireFreedom(denominator)
  return shares(numerator * f, denominator)
}

interface Shares {
  readonly share: number
  readonly rest: number
}

/** a / (a + b) and b / (a + b), of which one may be infinite. */
function shares(a: number, b: number): Shares {
  if (a === Infinity) return { share: 1, rest: 0 }
  if (b === Infinity) return { share: 0, rest: 1 }
  return { share: 1 / (1 + b / a), rest: 1 / (1 + a / b) }
}

interface Tails {
  readonly below: (x: number) => number
  readonly above: (x: number) => number
}

function quantileOf(p: number, start: number, { below, above }: Tails): number {
  if (p === 0) return 0
  if (p === 1) return Infinity
  return p <= 0.5 ? solve(below, p, start) : solve(above, 1 - p, start)
}

/** The x > 0 at which a monotone tail probability is `target`; 0 or Infinity where it lies beyond 1e-150 to 1e150. */
function solve(tail: (x: number) => number, target: number, start: number): number {
  const excess = (x: number) => Math.log(tail(x) / target)
  const sign = Math.sign(excess(start))
  if (sign === 0) return start
  const isAscending = tail(2 * start) > tail(start / 2)
  const factor = sign > 0 === isAscending ? 0.5 : 2
  let near = start
  let far = start * factor
  while (Math.sign(excess(far)) === sign) {
    if (far < SMALLEST) return 0
    if (far > 1 / SMALLEST) return Infinity
    near = far
    far *= factor
  }
  const [low, high] = factor < 1 ? [far, near] : [near, far]
  return findRoot({ f: excess, low, high, tolerance: 0, maxIterations: 400 })
}

function requireProbability(p: number): void {
  requireRange('probability', p, '', 0, 1)
}

function requireFreedom(degreesOfFreedom: number): void {
  requireRange('degrees of freedom', degreesOfFreedom, '', 0.002, 1e9)
}
