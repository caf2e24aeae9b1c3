/**
 * The integral of conductivity over ln N, from the background up. Where ln N falls along a straight line, the integral
 * of conductivity over depth is a difference of it divided by the line's slope: a profile of many points costs one
 * evaluation a point.
 */
import { chebyshevPanel } from '../numeric/chebyshev'
import type { ChebyshevPanel } from '../numeric/chebyshev'
import { gaussLegendre, integratePanels } from '../numeric/quadrature'
import { LARGEST_DENSITY_CM3, conductivityOf, joins_cm3 } from './doped-silicon'
import type { DopedSilicon } from './doped-silicon'

/**
 * Mean conductivity [S/cm] over a stretch along which ln N falls in a straight line from `upper` to `lower`; what lies
 * below the background counts as not conducting.
 */
export type MeanConductivity = (upper: number, lower: number) => number

/** Mobility models bend on the scale of one unit of ln N: degree 15 has twelve digits and more on half of that. */
const PANEL_WIDTH = 0.5
const RULE = gaussLegendre(16)
/** Just above the background the integral begins with the square of the distance; it keeps its digits on panels that grow. */
const FIRST_EDGES = [1e-4, 1e-3, 1e-2, 1e-1] as const
/** Half the distance of the two points of the Gauss-Legendre rule of order 2. */
const TWO_POINT = 0.5 / Math.sqrt(3)
/** Below it a difference of integrals would lose digits, and two points of the integrand have all of them. */
const NARROW = 1e-3
/** Below it even where the conductivity jumps inside. */
const POINT = 1e-9

/** Covers densities up to 1e21 cm^-3. Accuracy: 1e-11 relative, whatever the stretch. */
export function meanConductivity(silicon: DopedSilicon, background_cm3: number): MeanConductivity {
  const conductivity = conductivityOf(silicon)
  const bottom = Math.log(background_cm3)
  const at = (lnDensity: number): number => {
    const density_cm3 = Math.exp(lnDensity)
    return density_cm3 > background_cm3 ? conductivity(density_cm3 - background_cm3, density_cm3 + background_cm3) : 0
  }
  const jumps = [bottom, ...joins_cm3(silicon).flatMap((join) => (join > 2 * background_cm3 ? Math.log(join - background_cm3) : []))] // prettier-ignore
  const integral = integralFrom(bottom, jumps, at)
  return (upper, lower) => {
    if (upper <= bottom) return 0
    const width = upper - lower
    const middle = (upper + lower) / 2
    if (width < POINT) return at(middle)
    const isPlain = width < NARROW && !jumps.some((jump) => jump > lower && jump < upper)
    if (isPlain) return (at(middle - TWO_POINT * width) + at(middle + TWO_POINT * width)) / 2
    return (integral(upper) - integral(lower)) / width
  }
}

interface Stretch {
  readonly panel: ChebyshevPanel
  /** Of the integral up to the panel's start. */
  readonly before: number
}

/** 0 up to `bottom`. */
function integralFrom(bottom: number, jumps: readonly number[], f: (x: number) => number): (x: number) => number {
  const top = Math.log(LARGEST_DENSITY_CM3) + PANEL_WIDTH
  const count = Math.ceil((top - bottom) / PANEL_WIDTH)
  const edges = [
    ...Array.from({ length: count + 1 }, (_, i) => bottom + i * PANEL_WIDTH),
    ...FIRST_EDGES.map((edge) => bottom + edge),
    ...jumps.slice(1),
  ]
  edges.sort((a, b) => a - b)
  const stretches: Stretch[] = []
  let before = 0
  for (let i = 1; i < edges.length; i++) {
    const [from, to] = [edges[i - 1], edges[i]]
    const within = (x: number): number => integratePanels(f, [from, x], RULE)
    stretches.push({ panel: chebyshevPanel(within, from, to), before })
    before += within(to)
  }
  return (x) => {
    if (x <= bottom) return 0
    // Jumps and first edges add panels, so the one of x comes no earlier than its place among equal ones.
    let i = Math.min(stretches.length - 1, Math.floor((x - bottom) / PANEL_WIDTH))
    while (i < stretches.length - 1 && stretches[i].panel.to < x) i++
    return stretches[i].before + seriesAt(stretches[i].panel, x)
  }
}

function seriesAt({ from, to, coefficients }: ChebyshevPanel, x: number): number {
  const t = (2 * x - from - to) / (to - from)
  let [b1, b2] = [0, 0]
  for (let k = coefficients.length - 1; k >= 1; k--) [b1, b2] = [2 * t * b1 - b2 + coefficients[k], b1]
  return coefficients[0] + t * b1 - b2
}
