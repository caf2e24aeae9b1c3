/** The area that each site stands for: what of the usable area lies nearest to it. */
import { CoreError, requireRange } from '../problems/problem'
import { cellAreas_mm2 } from './site-cells'
import { halfSize, isInRegion, type UsableRegion } from './usable-region'

export interface SiteAreas {
  /** Circles of evenly spaced sites share rings between mid-radii; any other pattern has a Voronoi cell a site. */
  readonly method: 'rings' | 'cells'
  readonly area_mm2: Float64Array
}

/** A site is on a circle, or in its place along it, within this share of the radius: 0.2 mm on a 200 mm wafer. */
const PLACE_SHARE = 2e-3
/** Of circles so close that they would pass for one: sites a few micrometres from their places at most. */
const FINE_PLACE_SHARE = 1e-5
/**
 * On a disc, sites on concentric circles, on each evenly spaced (the centre is a circle of none or one place), share the
 * ring from half way to the circle within to half way to the circle without, the outermost to the edge of the region.
 * A scan along a diameter is such a pattern, of circles with two sites. Any other pattern, and every one on a rectangle,
 * has the Voronoi cells of its sites cut to the region. Sites in one place share its area.
 *
 * @param x_mm, y_mm  one or more places in the region, from the wafer's centre
 * @returns areas that add up to the region's
 * @throws CoreError not-applicable for no sites, or a place outside the region or not finite; out-of-range for no region
 *
 * Accuracy: rings to rounding; cells 1e-6 of the region.
 * Source: follows from the equal areas a site that SEMI MF1618-1104's concentric plan aims at.
 */
export function siteAreas({
  x_mm,
  y_mm,
  region,
}: {
  readonly x_mm: Float64Array
  readonly y_mm: Float64Array
  readonly region: UsableRegion
}): SiteAreas {
  if (x_mm.length === 0) throw refusal('there are no sites')
  for (const half_mm of halfSize(region)) requireRange('half the usable width', half_mm, 'mm', 1e-3, 1e4)
  for (let i = 0; i < x_mm.length; i++) if (!isInRegion(region, x_mm[i], y_mm[i])) throw refusal('a site lies outside')
  if (region.shape === 'disc') {
    const sites = byRadius(x_mm, y_mm)
    const circles =
      concentricCircles(sites, PLACE_SHARE * region.radius_mm) ??
      concentricCircles(sites, FINE_PLACE_SHARE * region.radius_mm)
    if (circles) return { method: 'rings', area_mm2: ringAreas(circles, x_mm.length, region.radius_mm) }
  }
  return { method: 'cells', area_mm2: cellAreas_mm2(x_mm, y_mm, region) }
}

/** Sites from the centre outwards. */
interface PolarSites {
  readonly site: Uint32Array
  readonly radius_mm: Float64Array
  readonly angle: Float64Array
}

function byRadius(x_mm: Float64Array, y_mm: Float64Array): PolarSites {
  const radius_mm = Float64Array.from(x_mm, (x, i) => Math.hypot(x, y_mm[i]))
  const site = Uint32Array.from(x_mm.keys()).sort((a, b) => radius_mm[a] - radius_mm[b])
  return {
    site,
    radius_mm: Float64Array.from(site, (i) => radius_mm[i]),
    angle: Float64Array.from(site, (i) => Math.atan2(y_mm[i], x_mm[i])),
  }
}

interface Circle {
  readonly radius_mm: number
  readonly sites: Uint32Array
}

/** From the centre outwards; null where some sites are on no circle of evenly spaced ones. */
function concentricCircles({ site, radius_mm, angle }: PolarSites, tolerance_mm: number): Circle[] | null {
  const circles: Circle[] = []
  for (let start = 0, end = 1; start < site.length; start = end++) {
    while (end < site.length && radius_mm[end] - radius_mm[end - 1] <= tolerance_mm) end++
    const [nearest, farthest] = [radius_mm[start], radius_mm[end - 1]]
    const isCentre = farthest <= tolerance_mm
    const isCircle = farthest - nearest <= 2 * tolerance_mm
    if (!isCentre && !(isCircle && isEvenlySpaced(angle.slice(start, end), (2 * tolerance_mm) / nearest))) return null
    circles.push({ radius_mm: (nearest + farthest) / 2, sites: site.slice(start, end) })
  }
  return circles
}

function isEvenlySpaced(angles: Float64Array, tolerance: number): boolean {
  const step = (2 * Math.PI) / angles.length
  // Where the tolerance comes near the step, evenly spaced can't be told from anything else.
  if (angles.length < 2 || tolerance > step / 4) return false
  angles.sort()
  return angles.every((angle, i) => Math.abs(angle - angles[0] - i * step) <= tolerance)
}

function ringAreas(circles: readonly Circle[], count: number, edge_mm: number): Float64Array {
  const area_mm2 = new Float64Array(count)
  let inner_mm = 0
  circles.forEach(({ radius_mm, sites }, k) => {
    const next = circles[k + 1]
    const outer_mm = next ? (radius_mm + next.radius_mm) / 2 : edge_mm
    const share = (Math.PI * (outer_mm - inner_mm) * (outer_mm + inner_mm)) / sites.length
    for (const i of sites) area_mm2[i] = share
    inner_mm = outer_mm
  })
  return area_mm2
}

function refusal(why: string): CoreError {
  return new CoreError({ kind: 'not-applicable', what: 'areas of sites', why })
}
