/**
 * Slope of a smooth function at x by the five-point central difference.
 *
 * @param step  > 0; the error is step^4 f'''''/30 by truncation and about 1e-16 |f| / step by rounding
 * Source: M. Abramowitz, I. A. Stegun, Handbook of Mathematical Functions (1964), table 25.2.
 */
export function derivative({ f, x, step }: { f: (x: number) => number; x: number; step: number }): number {
  return (f(x - 2 * step) - f(x + 2 * step) + 8 * (f(x + step) - f(x - step))) / (12 * step)
}
