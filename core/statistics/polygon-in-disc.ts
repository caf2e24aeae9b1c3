/** Area that a polygon and a disc have in common, exactly. */

/**
 * @param corners    of a polygon without crossings, in order, the first repeated or not; mm from the disc's centre
 * @param radius_mm  of the disc, > 0
 * @returns mm^2, the same for both senses of going round
 *
 * Each edge, seen from the centre, cuts a triangle out of the disc, or a sector where it lies outside, or both; summed
 * with their signs they are the area.
 */
export function areaInDisc_mm2(corners: readonly (readonly [number, number])[], radius_mm: number): number {
  let area = 0
  for (let i = 0; i < corners.length; i++) area += fromCentre(corners[i], corners[(i + 1) % corners.length], radius_mm)
  return Math.abs(area)
}

type Point = readonly [number, number]

/** Signed area of the triangle centre, p, q within the disc. */
function fromCentre(p: Point, q: Point, radius: number): number {
  const [dx, dy] = [q[0] - p[0], q[1] - p[1]]
  const length2 = dx * dx + dy * dy
  if (length2 === 0) return 0
  // Where the edge's line meets the circle, as fractions of the edge.
  const along = -(p[0] * dx + p[1] * dy) / length2
  const reach2 = radius * radius - cross(p, q) ** 2 / length2
  if (reach2 <= 0) return sector(p, q, radius)
  const half = Math.sqrt(reach2 / length2)
  const [enter, leave] = [along - half, along + half]
  if (leave <= 0 || enter >= 1) return sector(p, q, radius)
  const at = (t: number): Point => [p[0] + t * dx, p[1] + t * dy]
  const first = enter > 0 ? at(enter) : p
  const last = leave < 1 ? at(leave) : q
  const outside = (enter > 0 ? sector(p, first, radius) : 0) + (leave < 1 ? sector(last, q, radius) : 0)
  return cross(first, last) / 2 + outside
}

function sector(p: Point, q: Point, radius: number): number {
  return (radius * radius * Math.atan2(cross(p, q), p[0] * q[0] + p[1] * q[1])) / 2
}

function cross(p: Point, q: Point): number {
  return p[0] * q[1] - p[1] * q[0]
}
