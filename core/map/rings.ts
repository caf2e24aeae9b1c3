/** A wafer's sites by circles: means ring by ring. */
import { requireRange } from '../problems/problem'
import { usableSites, type SiteColumnsOfWafer } from './profiles'

/** One entry a ring, from the centre out. */
export interface RingMeans {
  /** Mean distance from the centre. */
  readonly r_mm: Float64Array
  readonly mean: Float64Array
  /** Of the mean, from the spread round the ring; NaN for a single site. */
  readonly standardError: Float64Array
  readonly count: Uint32Array
}

/**
 * Rings are told apart from the centre out: one takes every site at most `ringWidth_mm` farther out than its innermost
 * one. Sites without circles (a lattice) fall into rings of about that width.
 *
 * @param ringWidth_mm  above 0; less than the step between the circles of the plan
 * @returns the sites of each ring, as rows of the columns; none for no site with a value
 */
export function ringsOf(columns: SiteColumnsOfWafer, ringWidth_mm: number): Uint32Array[] {
  requireRange('width of a ring', ringWidth_mm, 'mm', 1e-9, 1e4)
  const radius = radiusIn(columns)
  const order = usableSites(columns).sort((a, b) => radius(a) - radius(b) || a - b)
  const rings: Uint32Array[] = []
  for (let start = 0, end = 0; start < order.length; start = end) {
    while (end < order.length && radius(order[end]) - radius(order[start]) <= ringWidth_mm) end++
    rings.push(order.slice(start, end))
  }
  return rings
}

/** The radial profile with its noise: what a step in radius must exceed to be one. */
export function ringMeans(columns: SiteColumnsOfWafer, ringWidth_mm: number): RingMeans {
  const rings = ringsOf(columns, ringWidth_mm)
  const radius = radiusIn(columns)
  const moments = rings.map((ring) => meanAndError(ring, (site) => columns.value[site]))
  return {
    r_mm: Float64Array.from(rings, (ring) => meanAndError(ring, radius).mean),
    mean: Float64Array.from(moments, ({ mean }) => mean),
    standardError: Float64Array.from(moments, ({ standardError }) => standardError),
    count: Uint32Array.from(rings, (ring) => ring.length),
  }
}

function radiusIn({ x_mm, y_mm }: SiteColumnsOfWafer): (site: number) => number {
  return (site) => Math.hypot(x_mm[site], y_mm[site])
}

function meanAndError(ring: Uint32Array, valueOf: (site: number) => number): { mean: number; standardError: number } {
  const mean = ring.reduce((sum, site) => sum + valueOf(site), 0) / ring.length
  const squares = ring.reduce((sum, site) => sum + (valueOf(site) - mean) ** 2, 0)
  return { mean, standardError: ring.length > 1 ? Math.sqrt(squares / (ring.length - 1) / ring.length) : NaN }
}
