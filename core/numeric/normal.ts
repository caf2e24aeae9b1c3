/** The standard normal distribution, through the complementary error function so that far tails keep their digits. */
import erfc from '@stdlib/math-base-special-erfc'
import erfcinv from '@stdlib/math-base-special-erfcinv'
import { requireRange } from '../problems/problem'

/** 1 - Phi(8.5) = 1e-17. */
const CERTAIN_Z = 8.5
const SQRT_TWO_PI = Math.sqrt(2 * Math.PI)

/** Density at z. 0 far out; NaN for NaN. */
export function normalDensity(z: number): number {
  return Math.exp(-0.5 * z * z) / SQRT_TWO_PI
}

/** Probability below z: 0 at -Infinity, 1 at Infinity. NaN for NaN. */
export function normalProbability(z: number): number {
  // What is left above is below half a unit of the last place of 1; most sites of a good lot end here.
  if (z > CERTAIN_Z) return 1
  return 0.5 * erfc(-z * Math.SQRT1_2)
}

/**
 * Probability between two bounds, lower <= upper, either of which may be infinite. Taken on the side where both
 * tails are small, so that a narrow interval far out isn't lost in 1 - 1.
 */
export function normalProbabilityBetween(lower: number, upper: number): number {
  return lower > 0
    ? normalProbability(-lower) - normalProbability(-upper)
    : normalProbability(upper) - normalProbability(lower)
}

/** The z below which the probability p lies, 0 <= p <= 1: -Infinity at 0, Infinity at 1. Throws outside. */
export function normalQuantile(p: number): number {
  requireRange('probability', p, '', 0, 1)
  // + 0 so that the median is 0, not -0.
  return -Math.SQRT2 * erfcinv(2 * p) + 0
}
