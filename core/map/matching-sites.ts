/** Sites of two wafers that lie at the same places, whatever their order. */
import type { Targets } from './thin-plate-spline'

/** Places nearer than this are the same. */
export const SAME_PLACE_MM = 1e-6

/**
 * For every site of `a` the one of `b` at its place, each taken once; null unless all of both find a partner.
 * Coordinates must be finite.
 */
export function matchSites(a: Targets, b: Targets): Uint32Array | null {
  const count = a.x_mm.length
  if (count !== b.x_mm.length) return null
  const isSamePlace = (i: number, j: number) =>
    Math.hypot(a.x_mm[i] - b.x_mm[j], a.y_mm[i] - b.y_mm[j]) <= SAME_PLACE_MM
  const inOrder = Uint32Array.from({ length: count }, (_, i) => i)
  if (inOrder.every((i) => isSamePlace(i, i))) return inOrder
  return sweep(slanted(a), slanted(b), isSamePlace)
}

interface Slanted {
  readonly along: Float64Array
  readonly order: Uint32Array
}

/** Along a slanted line, where the sites of a lattice or a diameter don't fall together. */
function slanted({ x_mm, y_mm }: Targets): Slanted {
  const along = x_mm.map((x, i) => x * Math.cos(1) + y_mm[i] * Math.sin(1))
  return { along, order: Uint32Array.from(along.keys()).sort((i, j) => along[i] - along[j] || i - j) }
}

function sweep(a: Slanted, b: Slanted, isSamePlace: (i: number, j: number) => boolean): Uint32Array | null {
  const partner = new Uint32Array(a.order.length)
  const isTaken = new Uint8Array(b.order.length)
  let first = 0
  for (const i of a.order) {
    while (first < b.order.length && b.along[b.order[first]] < a.along[i] - SAME_PLACE_MM) first++
    let found = -1
    for (let k = first; k < b.order.length && b.along[b.order[k]] <= a.along[i] + SAME_PLACE_MM && found < 0; k++) {
      if (!isTaken[b.order[k]] && isSamePlace(i, b.order[k])) found = b.order[k]
    }
    if (found < 0) return null
    isTaken[found] = 1
    partner[i] = found
  }
  return partner
}
