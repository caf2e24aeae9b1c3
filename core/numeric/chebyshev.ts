/** A smooth function kept as Chebyshev series on panels that are split until each is resolved to a given tolerance. */

const DEGREE = 15

export interface ChebyshevPanel {
  readonly from: number
  readonly to: number
  readonly coefficients: Float64Array
}

export interface ResolvedPanel extends ChebyshevPanel {
  /** Whether the last coefficients fell below the tolerance; false where the function is not smooth. */
  readonly isResolved: boolean
}

/** A value with its first two derivatives. */
export interface Jet {
  value: number
  slope: number
  curvature: number
}

export interface ChebyshevPlan {
  readonly from: number
  readonly to: number
  readonly widest: number
  /** Panels are not split below this width. */
  readonly narrowest: number
  /** Absolute; a panel is resolved when its last two coefficients are below it. */
  readonly tolerance: number
}

/**
 * Panels in ascending order that cover from..to, each with the series of degree 15 through its Chebyshev points, which
 * never include a panel's ends.
 *
 * Source: L. N. Trefethen, Approximation Theory and Approximation Practice (2013) chapters 3 and 8.
 */
export function chebyshevPanels(f: (x: number) => number, plan: ChebyshevPlan): readonly ResolvedPanel[] {
  const { from, to } = plan
  const count = Math.max(1, Math.ceil((to - from) / plan.widest))
  const edge = (i: number): number => (i === count ? to : from + ((to - from) * i) / count)
  return Array.from({ length: count }, (_, i) => splitPanels(f, edge(i), edge(i + 1), plan)).flat()
}

function splitPanels(f: (x: number) => number, from: number, to: number, plan: ChebyshevPlan): ResolvedPanel[] {
  const panel = chebyshevPanel(f, from, to)
  const tail = Math.max(Math.abs(panel.coefficients[DEGREE]), Math.abs(panel.coefficients[DEGREE - 1]))
  const isResolved = tail <= plan.tolerance
  if (isResolved || (to - from) / 2 < plan.narrowest) return [{ ...panel, isResolved }]
  const middle = (from + to) / 2
  return [...splitPanels(f, from, middle, plan), ...splitPanels(f, middle, to, plan)]
}

/** The series of degree 15 through the Chebyshev points of one panel. */
export function chebyshevPanel(f: (x: number) => number, from: number, to: number): ChebyshevPanel {
  const count = DEGREE + 1
  const samples = new Float64Array(count)
  for (let i = 0; i < count; i++) {
    samples[i] = f((from + to) / 2 + ((to - from) / 2) * Math.cos((Math.PI * (i + 0.5)) / count))
  }
  const coefficients = new Float64Array(count)
  for (let k = 0; k < count; k++) {
    let sum = 0
    for (let i = 0; i < count; i++) sum += samples[i] * Math.cos((Math.PI * k * (i + 0.5)) / count)
    coefficients[k] = ((k === 0 ? 1 : 2) * sum) / count
  }
  return { from, to, coefficients }
}

/** Value and first two derivatives at x, by Clenshaw's recurrence differentiated twice; `into` is filled and returned. */
export function chebyshevJet({ from, to, coefficients }: ChebyshevPanel, x: number, into: Jet): Jet {
  const scale = 2 / (to - from)
  const t = (x - (from + to) / 2) * scale
  // b, b', b'' of the two latest steps.
  let [b1, b2, d1, d2, e1, e2] = [0, 0, 0, 0, 0, 0]
  for (let k = coefficients.length - 1; k >= 1; k--) {
    const e = 2 * t * e1 - e2 + 4 * d1
    const d = 2 * t * d1 - d2 + 2 * b1
    const b = 2 * t * b1 - b2 + coefficients[k]
    e2 = e1
    e1 = e
    d2 = d1
    d1 = d
    b2 = b1
    b1 = b
  }
  into.value = coefficients[0] + t * b1 - b2
  into.slope = (b1 + t * d1 - d2) * scale
  into.curvature = (2 * d1 + t * e1 - e2) * scale * scale
  return into
}
