/** How the off-centre sites differ from the centre, in the manner of SEMI MF81. */
import { requireRange } from '../problems/problem'
import { gather } from './mean-and-deviations'

/** Sites at one distance from the centre. */
export interface RadialGroup {
  readonly sites: number
  readonly meanRadius_mm: number
  readonly mean: number
  /** 100 (mean - centre) / centre. */
  readonly variationPercent: number
}

export interface RadialVariation {
  /** Value at the centre, the mean where it was measured more than once. */
  readonly centre: number
  readonly halfRadius: RadialGroup | null
  readonly nearEdge: RadialGroup | null
  /** 100 (max - min) / min over the centre and the sites of both groups. */
  readonly maximumPercent: number
  readonly source: string
}

/** Farther out than this share of the radius a site is not the centre. */
const CENTRE_SHARE = 0.02
/** A site is at half radius, or on the outermost circle, within this share of the radius. */
const CIRCLE_SHARE = 0.05
/** Farther in than this share nothing is near the edge: 6 mm from the rim of a 50 mm wafer are at 0.76. */
const EDGE_SHARE = 0.75

/**
 * Radial variation from the sites at the centre, at half the radius, and on the outermost circle if it is near the edge.
 *
 * @param values     > 0 where they count
 * @param x_mm, y_mm places, rows as `values`; a site whose place isn't finite is in no group
 * @param radius_mm  of the wafer, > 0
 * @param indices    rows that count; absent: all
 * @returns null where there is no site at the centre or none in either group, or a value isn't above 0
 * @throws CoreError out-of-range for a value that counts and isn't finite
 *
 * Source: SEMI MF81, formula as from memory; standard's text not read. Its plans have four sites a circle; here all count.
 */
export function radialVariation({
  values,
  x_mm,
  y_mm,
  radius_mm,
  indices,
}: {
  readonly values: Float64Array
  readonly x_mm: Float64Array
  readonly y_mm: Float64Array
  readonly radius_mm: number
  readonly indices?: Uint32Array | undefined
}): RadialVariation | null {
  requireRange('radius', radius_mm, 'mm', 1e-3, 1e4)
  const rows = indices ?? Uint32Array.from(values.keys())
  const share = (i: number) => Math.hypot(x_mm[i], y_mm[i]) / radius_mm
  const outermost = rows.reduce((most, i) => (share(i) > most ? share(i) : most), 0)
  const centre = rows.filter((i) => share(i) <= CENTRE_SHARE)
  const half = rows.filter((i) => Math.abs(share(i) - 0.5) <= CIRCLE_SHARE)
  const edge = outermost >= EDGE_SHARE ? rows.filter((i) => outermost - share(i) <= CIRCLE_SHARE) : new Uint32Array(0)
  if (centre.length === 0 || half.length + edge.length === 0) return null
  const used = gather(values, Uint32Array.of(...centre, ...half, ...edge))
  const least = used.reduce((a, b) => Math.min(a, b), Infinity)
  if (!(least > 0)) return null
  const atCentre = meanOf(values, centre)
  const group = (sites: Uint32Array): RadialGroup | null => {
    if (sites.length === 0) return null
    const mean = meanOf(values, sites)
    const meanRadius_mm = sites.reduce((sum, i) => sum + share(i) * radius_mm, 0) / sites.length
    return { sites: sites.length, meanRadius_mm, mean, variationPercent: (100 * (mean - atCentre)) / atCentre }
  }
  return {
    centre: atCentre,
    halfRadius: group(half),
    nearEdge: group(edge),
    maximumPercent: (100 * (used.reduce((a, b) => Math.max(a, b), 0) - least)) / least,
    source: 'in the manner of SEMI MF81 (formula as from memory; standard’s text not read)',
  }
}

function meanOf(values: Float64Array, rows: Uint32Array): number {
  return rows.reduce((sum, i) => sum + values[i], 0) / rows.length
}
