/** A wafer's surface along a diameter, with the sites that bear it out. */
import { requireRange } from '../problems/problem'
import { prepareInterpolator, METHOD_TITLES } from './interpolator'
import { usableSites, type SiteColumnsOfWafer } from './profiles'
import type { Targets } from './thin-plate-spline'

export interface LineProfile {
  /** Signed distance from the centre, ascending, positive in the direction asked for; evenly stepped. */
  readonly position_mm: Float64Array
  readonly x_mm: Float64Array
  readonly y_mm: Float64Array
  readonly value: Float64Array
  /** 1 where the value lies beyond the hull of the sites and is a guess. */
  readonly extrapolated: Uint8Array
  /** Where the values come from, in words. */
  readonly source: string
  readonly near: NearSites
}

/** Sites no farther from the line than asked for, by their place along it. */
export interface NearSites {
  readonly site: Uint32Array
  readonly position_mm: Float64Array
  /** To the left of the line as one looks along it. */
  readonly offset_mm: Float64Array
  readonly value: Float64Array
}

export interface DiameterLine {
  /** Anticlockwise from +x; 90 runs from the fiducial up. */
  readonly direction_deg: number
  /** Half of the line's length. */
  readonly radius_mm: number
  /** 2 to 100 000, the ends among them. */
  readonly points: number
  /** How far off the line a site is still marked, >= 0. */
  readonly nearness_mm: number
}

/** A surface that is known already, e.g. a trend surface. */
export interface NamedSurface {
  readonly title: string
  evaluate(targets: Targets): Float64Array
}

/**
 * Along a diameter of the wafer, from the sites (`prepareInterpolator`) or from a surface that is given.
 *
 * @throws CoreError out-of-range for a line outside its limits, not-applicable where no site has a value
 */
export function lineProfile(columns: SiteColumnsOfWafer, line: DiameterLine, surface?: NamedSurface): LineProfile {
  requireLine(line)
  const position_mm = positions(line)
  const [cos, sin] = direction(line)
  const targets = { x_mm: position_mm.map((p) => p * cos), y_mm: position_mm.map((p) => p * sin) }
  const sites = usableSites(columns)
  const pick = (column: Float64Array) => Float64Array.from(sites, (site) => column[site])
  const interpolator = prepareInterpolator(pick(columns.x_mm), pick(columns.y_mm), targets)
  return {
    position_mm,
    ...targets,
    value: surface ? surface.evaluate(targets) : interpolator.evaluate(pick(columns.value)),
    extrapolated: interpolator.inside.map((inside) => 1 - inside),
    source: surface ? surface.title : METHOD_TITLES[interpolator.method],
    near: nearSites(columns, sites, line),
  }
}

function positions({ radius_mm, points }: DiameterLine): Float64Array {
  const last = points - 1
  // Symmetric to the last bit, so that an odd number of points meets the centre.
  return Float64Array.from({ length: points }, (_, i) => (radius_mm * (2 * i - last)) / last)
}

function nearSites(columns: SiteColumnsOfWafer, sites: Uint32Array, line: DiameterLine): NearSites {
  const [cos, sin] = direction(line)
  const along = (site: number) => columns.x_mm[site] * cos + columns.y_mm[site] * sin
  const offset = (site: number) => columns.y_mm[site] * cos - columns.x_mm[site] * sin
  const site = sites.filter((i) => Math.abs(offset(i)) <= line.nearness_mm).sort((a, b) => along(a) - along(b) || a - b)
  return {
    site,
    position_mm: Float64Array.from(site, along),
    offset_mm: Float64Array.from(site, offset),
    value: Float64Array.from(site, (i) => columns.value[i]),
  }
}

function direction({ direction_deg }: DiameterLine): readonly [number, number] {
  const angle = (direction_deg * Math.PI) / 180
  return [Math.cos(angle), Math.sin(angle)]
}

function requireLine({ direction_deg, radius_mm, points, nearness_mm }: DiameterLine): void {
  requireRange('direction of the line', direction_deg, 'deg', -360, 360)
  requireRange('half of the line', radius_mm, 'mm', 1e-3, 1e4)
  requireRange('points of the line', Number.isInteger(points) ? points : NaN, '', 2, 100_000)
  requireRange('nearness to the line', nearness_mm, 'mm', 0, 1e4)
}
