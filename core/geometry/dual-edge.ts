import { CoreError } from '../problems/problem'
import type { Outline } from '../wafer/outline'
import { solveDual } from './dual'
import { createPinColumns, fourTerminalGradient, TERMINALS } from './four-terminal'
import type { Placement } from './pin-line'
import { pinPlacer, requireProbeSites } from './probe-sites'
import type { ProbeSites } from './probe-sites'
import { logDistanceOf } from './registry'

/**
 * How far the dual relation is off at each site because of the edge: Rs(dual)/Rs - 1 of a thin uniform sheet.
 * Not a correction (the pin spacings must be known for it, which dual does without), but what a site is flagged by.
 *
 * @param sites outline, pins and places; see `thinSheetFactors`
 * @returns relative error a site; 0 on the infinite sheet, along a diameter, perpendicular to a straight edge; +1 for
 *   a line lying on a straight edge; infinite in a strip so narrow that A and B read the same; NaN where a pin is off the outline
 * @throws CoreError as `thinSheetFactors`
 *
 * Assumes a thin uniform sheet. The ratio RA/RB is no substitute: it returns to 1.2619 at the edge itself.
 * Accuracy: 1e-12. Source: exact geometry of `registry.ts` put into the exact relation of `dual.ts`.
 */
export function dualEdgeErrors(sites: ProbeSites): Float64Array {
  requireProbeSites(sites)
  const logDistance = logDistanceOf(sites.outline)
  const pins = createPinColumns()
  const place = pinPlacer(sites, pins, new Float64Array(2))
  const errors = new Float64Array(sites.x_mm.length).fill(NaN)
  for (let site = 0; site < errors.length; site++) {
    if (!(place(site) >= 0)) continue
    const a = fourTerminalGradient(TERMINALS.A, logDistance, pins)
    const b = fourTerminalGradient(TERMINALS.B, logDistance, pins)
    errors[site] = a > b ? solveDual(a, b) / (2 * Math.PI) - 1 : Infinity
  }
  return errors
}

/**
 * `dualEdgeErrors` of a single placement.
 * @throws CoreError as there, and not-applicable where a pin is off the outline
 */
export function dualEdgeError({
  outline,
  x_mm,
  y_mm,
  orientation,
  spacings_mm,
}: Placement & { readonly outline: Outline }): number {
  const site = { x_mm: Float64Array.of(x_mm), y_mm: Float64Array.of(y_mm) }
  const error = dualEdgeErrors({ outline, orientation, spacings_mm, ...site })[0]
  if (Number.isNaN(error)) {
    throw new CoreError({ kind: 'not-applicable', what: 'dual relation', why: 'a pin is off the outline' })
  }
  return error
}
