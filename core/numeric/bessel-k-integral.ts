/**
 * K_order(x) = integral over t from 0 to infinity of exp(-x cosh t) cosh(order t), by the trapezoidal rule.
 *
 * With step h the rule's error is 2 K_{i nu}(x), nu = 2 pi/h (Poisson summation): exp(-pi^2/h) while x < nu, and
 * exp(-2 pi^2/(x h^2)) of the value itself when x is large. The step keeps both below 1e-16 of the value.
 */
export function besselKSum(x: number, order: 0 | 1): number {
  const h = Math.min(Math.PI ** 2 / (38 + x), 0.7 / Math.sqrt(x))
  const ratio = Math.exp(h)
  let sum = 0.5
  let growth = 1
  for (;;) {
    growth *= ratio
    const decay = 1 / growth
    const coshT = (growth + decay) / 2
    // cosh t - 1 without cancellation: the factor exp(-x) is taken out of the sum.
    const exponent = (x * (1 - decay) * (growth - 1)) / 2
    const term = Math.exp(-exponent) * (order === 1 ? coshT : 1)
    sum += term
    if (term < 1e-17 * sum && exponent > 1) break
  }
  return h * sum * Math.exp(-x)
}
