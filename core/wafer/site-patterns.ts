/** Where to measure: the site plans of SEMI MF1618-1104. The centre comes first, circles start at a common angle. */
import { CoreError, requireRange } from '../problems/problem'

export interface SitePlan {
  readonly count: number
  readonly x_mm: Float64Array
  readonly y_mm: Float64Array
}

/**
 * Radius of the outermost sites, from the fixed quality area: half the diameter less the edge exclusion.
 *
 * Method A of SEMI MF1618, where the diameter of the spot is given: the outermost spots touch the border of that area from
 * inside. Method B, without: the middles of the outermost sites lie on it.
 *
 * @param diameter_mm      of the wafer, 1 to 1000 [mm]
 * @param edgeExclusion_mm 0 to half the diameter [mm]
 * @param spot_mm          > 0 [mm]; for a four-point probe of unknown spot the standard takes 1.5 pin spacings
 * @throws CoreError out-of-range, also where nothing is left
 */
export function outerRadius_mm({
  diameter_mm,
  edgeExclusion_mm,
  spot_mm,
}: {
  readonly diameter_mm: number
  readonly edgeExclusion_mm: number
  readonly spot_mm?: number
}): number {
  requireRange('wafer diameter', diameter_mm, 'mm', 1, 1000)
  requireRange('edge exclusion', edgeExclusion_mm, 'mm', 0, diameter_mm / 2)
  if (spot_mm !== undefined) requireRange('spot diameter', spot_mm, 'mm', 1e-6, diameter_mm)
  const radius_mm = diameter_mm / 2 - edgeExclusion_mm - (spot_mm ?? 0) / 2
  requireRange('radius of the outermost sites', radius_mm, 'mm', 1e-3, 1e4)
  return radius_mm
}

/**
 * Centre and 8 k sites on circle k of K evenly spaced ones: 1 + 4 K (K + 1) sites, each for about the same area;
 * 49, 81, 121, 169, 225, 289 for K = 3 to 8.
 *
 * @param circles           1 to 200 (SEMI MF1618: 3 to 8)
 * @param outerRadius_mm    of the outermost circle, 0.001 to 10 000
 * @param startAngle_deg    of the first site of every circle, anticlockwise from +x
 */
export function concentricPlan({
  circles,
  outerRadius_mm,
  startAngle_deg = 0,
}: {
  readonly circles: number
  readonly outerRadius_mm: number
  readonly startAngle_deg?: number
}): SitePlan {
  requireWhole('circles', circles, 1, 200)
  requireRadius(outerRadius_mm)
  const sites: Site[] = [[0, 0]]
  for (let circle = 1; circle <= circles; circle++) {
    const radius_mm = (circle * outerRadius_mm) / circles
    for (let i = 0; i < 8 * circle; i++) sites.push(polar(radius_mm, startAngle_deg + (45 * i) / circle))
  }
  return asColumns(sites)
}

/**
 * A square lattice of as many rows as columns about the centre, step 2 Ro / N, cut to the circle: 37, 69, 97, 137,
 * 177, 225 sites for N = 7 to 17. By rows from the bottom, after the centre.
 *
 * The standard's text gives the step as Ro / N, which doesn't reach its own site counts; 2 Ro / N gives them exactly.
 *
 * @param rows            odd, 3 to 999
 * @param outerRadius_mm  0.001 to 10 000
 */
export function cartesianPlan({
  rows,
  outerRadius_mm,
}: {
  readonly rows: number
  readonly outerRadius_mm: number
}): SitePlan {
  requireWhole('rows', rows, 3, 999)
  if (rows % 2 === 0) throw new CoreError({ kind: 'not-applicable', what: 'Cartesian site plan', why: 'rows are odd' })
  requireRadius(outerRadius_mm)
  const step_mm = (2 * outerRadius_mm) / rows
  const half = (rows - 1) / 2
  const sites: Site[] = [[0, 0]]
  for (let row = -half; row <= half; row++) {
    for (let column = -half; column <= half; column++) {
      const isInside = 4 * (row * row + column * column) <= rows * rows
      if (isInside && (row !== 0 || column !== 0)) sites.push([column * step_mm, row * step_mm])
    }
  }
  return asColumns(sites)
}

/**
 * Evenly spaced sites along one diameter, from one end to the other, step 2 Ro / (N - 1).
 *
 * @param count           2 to 100000 (SEMI MF1618: at least 25)
 * @param outerRadius_mm  of the end sites, 0.001 to 10 000
 * @param angle_deg       of the last site, anticlockwise from +x
 */
export function diameterPlan({
  count,
  outerRadius_mm,
  angle_deg = 0,
}: {
  readonly count: number
  readonly outerRadius_mm: number
  readonly angle_deg?: number
}): SitePlan {
  requireWhole('sites', count, 2, 100_000)
  requireRadius(outerRadius_mm)
  const at = (i: number) => polar(outerRadius_mm * ((2 * i) / (count - 1) - 1), angle_deg)
  return asColumns(Array.from({ length: count }, (_, i) => at(i)))
}

/**
 * The same sites in polar form, the angle anticlockwise from +x, from 0 to below 360. Both forms are rounded, so that a site on an
 * axis lies on it and 360 is 0: 1e-6 mm is a nanometre.
 */
export function roundedSites({ count, x_mm, y_mm }: SitePlan): SitePlan & PolarColumns {
  const x = x_mm.map(rounded)
  const y = y_mm.map(rounded)
  const angle = (i: number) => rounded((Math.atan2(y[i], x[i]) * 180) / Math.PI)
  return {
    count,
    x_mm: x,
    y_mm: y,
    r_mm: x_mm.map((_, i) => rounded(Math.hypot(x_mm[i], y_mm[i]))),
    theta_deg: x.map((_, i) => (angle(i) < 0 ? rounded(angle(i) + 360) : angle(i))),
  }
}

export interface PolarColumns {
  readonly r_mm: Float64Array
  readonly theta_deg: Float64Array
}

/** To 1e-6, without negative zeros. */
function rounded(value: number): number {
  return Math.round(value * 1e6) / 1e6 + 0
}

type Site = readonly [x_mm: number, y_mm: number]

function polar(radius_mm: number, angle_deg: number): Site {
  const angle = (angle_deg * Math.PI) / 180
  return [radius_mm * Math.cos(angle), radius_mm * Math.sin(angle)]
}

function asColumns(sites: readonly Site[]): SitePlan {
  return {
    count: sites.length,
    x_mm: Float64Array.from(sites, ([x_mm]) => x_mm),
    y_mm: Float64Array.from(sites, ([, y_mm]) => y_mm),
  }
}

function requireRadius(radius_mm: number): void {
  requireRange('radius of the outermost sites', radius_mm, 'mm', 1e-3, 1e4)
}

function requireWhole(quantity: string, value: number, min: number, max: number): void {
  requireRange(quantity, value, '', min, max)
  if (!Number.isInteger(value)) {
    throw new CoreError({ kind: 'not-applicable', what: quantity, why: `${value} is not a whole number` })
  }
}
