import { requireRange } from '../problems/problem'
import { besselKSum } from './bessel-k-integral'

/**
 * Modified Bessel function of the second kind, order 0.
 * Enters the thickness factor: the potential of a slab is ln r plus terms in K0.
 *
 * @param x argument, > 0 [-]
 * @returns K0(x): -ln(x/2) - 0.5772 as x -> 0, sqrt(pi/2x) e^-x as x -> inf, 0 where that underflows (x > 745)
 * @throws CoreError out-of-range for x <= 0 or not finite
 *
 * Accuracy: relative 1e-14 up to x = 700.
 * Sources: NIST DLMF 10.32.9 (integral), 10.25 (definition); Trefethen & Weideman, SIAM Rev. 56 (2014) 385 (the
 * trapezoidal rule of such integrals).
 */
export function besselK0(x: number): number {
  requireRange('argument of K0', x, '', Number.MIN_VALUE, Number.MAX_VALUE)
  return besselKSum(x, 0)
}
