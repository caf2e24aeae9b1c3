import { CoreError, requireRange } from '../problems/problem'
import type { Outline } from '../wafer/outline'
import { edgeDistance_mm } from '../wafer/outline'
import type { PinColumns } from './four-terminal'
import { pinOffsets_mm, requireSpacings, writeDirection } from './pin-line'
import type { Orientation, PinSpacings } from './pin-line'

/** A probe and the sites it was put down on. */
export interface ProbeSites {
  readonly outline: Outline
  readonly spacings_mm: PinSpacings
  readonly orientation: Orientation
  /** Sites, from the centre of the outline [mm]: midpoints of the outer pins. */
  readonly x_mm: Float64Array
  readonly y_mm: Float64Array
}

/** @throws CoreError out-of-range, not-applicable where the columns differ in length */
export function requireProbeSites({ spacings_mm, orientation, x_mm, y_mm }: ProbeSites): void {
  requireSpacings(spacings_mm)
  if (typeof orientation === 'object') requireRange('angle of the pin line', orientation.angleDeg, 'deg', -1e6, 1e6)
  if (x_mm.length === y_mm.length) return
  const why = `x has ${x_mm.length} entries, y has ${y_mm.length}`
  throw new CoreError({ kind: 'not-applicable', what: 'site columns', why })
}

/**
 * Puts the pins of one site after another into `pins` and `direction`, and returns the distance of the nearest pin to
 * the edge [mm], negative where a pin is off. Edges are convex, so the nearest pin is an outer one.
 */
export function pinPlacer(sites: ProbeSites, pins: PinColumns, direction: Float64Array): (site: number) => number {
  const offsets = pinOffsets_mm(sites.spacings_mm)
  const { outline, orientation, x_mm, y_mm } = sites
  const fixed = typeof orientation === 'object'
  writeDirection(orientation, 0, 0, direction)
  return (site) => {
    const x = x_mm[site]
    const y = y_mm[site]
    if (!fixed) writeDirection(orientation, x, y, direction)
    for (let pin = 0; pin < 4; pin++) {
      pins.x[pin] = x + offsets[pin] * direction[0]
      pins.y[pin] = y + offsets[pin] * direction[1]
    }
    return Math.min(edgeDistance_mm(outline, pins.x[0], pins.y[0]), edgeDistance_mm(outline, pins.x[3], pins.y[3]))
  }
}
