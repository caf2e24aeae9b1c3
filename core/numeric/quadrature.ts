/** Gauss-Legendre quadrature on panels. Splitting a range where its integrand bends is left to who knows the integrand. */

export interface QuadratureRule {
  /** On -1..1, ascending. */
  readonly nodes: Float64Array
  readonly weights: Float64Array
}

/**
 * The Gauss-Legendre rule of `order` points, exact for polynomials up to degree 2·order - 1.
 * Nodes by Newton's method on the Legendre polynomial from Tricomi's starting values.
 * Source: P. J. Davis, P. Rabinowitz, Methods of Numerical Integration, 2nd ed. (1984) section 2.7.
 */
export function gaussLegendre(order: number): QuadratureRule {
  const nodes = new Float64Array(order)
  const weights = new Float64Array(order)
  for (let i = 0; i < order; i++) {
    let x = -Math.cos((Math.PI * (i + 0.75)) / (order + 0.5))
    // Quadratic convergence from 3 digits: five steps are beyond rounding.
    for (let step = 0; step < 5; step++) {
      const { value, slope } = legendre(order, x)
      x -= value / slope
    }
    const { slope } = legendre(order, x)
    nodes[i] = x
    weights[i] = 2 / ((1 - x * x) * slope * slope)
  }
  return { nodes, weights }
}

function legendre(order: number, x: number): { value: number; slope: number } {
  let previous = 1
  let value = x
  for (let n = 2; n <= order; n++) {
    const next = ((2 * n - 1) * x * value - (n - 1) * previous) / n
    previous = value
    value = next
  }
  return { value, slope: (order * (x * value - previous)) / (x * x - 1) }
}

/** Integral of `integrand` over the panels between consecutive `edges`. */
export function integratePanels(
  integrand: (x: number) => number,
  edges: readonly number[],
  rule: QuadratureRule,
): number {
  const { nodes, weights } = rule
  let total = 0
  for (let panel = 1; panel < edges.length; panel++) {
    const half = (edges[panel] - edges[panel - 1]) / 2
    const middle = (edges[panel] + edges[panel - 1]) / 2
    let sum = 0
    for (let i = 0; i < nodes.length; i++) sum += weights[i] * integrand(middle + half * nodes[i])
    total += half * sum
  }
  return total
}
