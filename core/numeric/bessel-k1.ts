import { requireRange } from '../problems/problem'
import { besselKSum } from './bessel-k-integral'

/**
 * Modified Bessel function of the second kind, order 1. Enters derivatives: dK0/dx = -K1.
 *
 * @param x argument, > 1e-300 [-]
 * @returns K1(x): 1/x as x -> 0, sqrt(pi/2x) e^-x as x -> inf, 0 where that underflows
 * @throws CoreError out-of-range
 *
 * Accuracy and sources as `besselK0`.
 */
export function besselK1(x: number): number {
  requireRange('argument of K1', x, '', 1e-300, Number.MAX_VALUE)
  return besselKSum(x, 1)
}
