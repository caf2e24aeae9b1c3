import { requireRange } from '../problems/problem'

/** The three distances of neighbouring pins, from pin 1 to pin 4 [mm]. */
export type PinSpacings = readonly [number, number, number]

/**
 * The direction of the pin line, from pin 1 to pin 4. `angleDeg` counts from +x towards +y. `radial` points away from
 * the centre, `tangential` is a quarter turn further. At the centre itself, where neither exists, radial is +x and
 * tangential +y.
 */
export type Orientation = { readonly angleDeg: number } | 'radial' | 'tangential'

export interface Placement {
  /** The site: the midpoint of the outer pins. */
  readonly x_mm: number
  readonly y_mm: number
  readonly orientation: Orientation
  readonly spacings_mm: PinSpacings
}

/** @throws CoreError out-of-range unless each spacing is positive */
export function requireSpacings(spacings_mm: PinSpacings): void {
  spacings_mm.forEach((spacing, index) => {
    requireRange(`pin spacing ${index + 1}`, spacing, 'mm', 1e-6, 1e6)
  })
}

/** Each pin's place on the line, counted from the midpoint of the outer pins [mm]. */
export function pinOffsets_mm([s1, s2, s3]: PinSpacings): Float64Array {
  const half = (s1 + s2 + s3) / 2
  return Float64Array.of(-half, s1 - half, half - s3, half)
}

/** Writes the unit vector of the line at a site into `out[0..1]`. Allocates nothing. */
export function writeDirection(orientation: Orientation, x_mm: number, y_mm: number, out: Float64Array): void {
  if (typeof orientation === 'object') {
    const angle = (orientation.angleDeg * Math.PI) / 180
    out[0] = Math.cos(angle)
    out[1] = Math.sin(angle)
    return
  }
  const radius = Math.sqrt(x_mm * x_mm + y_mm * y_mm)
  const ux = radius > 0 ? x_mm / radius : 1
  const uy = radius > 0 ? y_mm / radius : 0
  out[0] = orientation === 'radial' ? ux : -uy
  out[1] = orientation === 'radial' ? uy : ux
}

/**
 * The four pins of a placement, pin 1 first [mm].
 * @throws CoreError out-of-range for a spacing that is not positive
 */
export function pinPositions({ x_mm, y_mm, orientation, spacings_mm }: Placement): { x_mm: number; y_mm: number }[] {
  requireSpacings(spacings_mm)
  const direction = new Float64Array(2)
  writeDirection(orientation, x_mm, y_mm, direction)
  return Array.from(pinOffsets_mm(spacings_mm), (offset) => ({
    x_mm: x_mm + offset * direction[0],
    y_mm: y_mm + offset * direction[1],
  }))
}
