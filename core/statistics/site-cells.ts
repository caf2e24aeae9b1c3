/**
 * Voronoi cells of sites within the usable region. Each is cut from the region along the lines midway to its neighbours in
 * the triangulation, which holds for sites on one line too, and for sites so close that triangles have no centre.
 */
import { Delaunay } from 'd3-delaunay'
import { areaInDisc_mm2 } from './polygon-in-disc'
import { halfSize, type UsableRegion } from './usable-region'

/** Sites nearer than about this share of the region's half width are in one place: 10 nm on a 200 mm wafer. */
const SAME_PLACE_SHARE = 1e-7
/** Rows of a place are below half of it, and the product of both within the whole numbers. */
const KEY_FACTOR = 2 ** 26

/**
 * Area of each site's Voronoi cell, cut to the region; sites in one place share its cell.
 *
 * @param x_mm, y_mm  one or more finite places, in the region or not
 * @returns mm^2, in all that of the region
 *
 * Accuracy: 1e-6 of the region.
 */
export function cellAreas_mm2(x_mm: Float64Array, y_mm: Float64Array, region: UsableRegion): Float64Array {
  const [halfWidth, halfHeight] = halfSize(region)
  const step_mm = Math.max(halfWidth, halfHeight) * SAME_PLACE_SHARE
  const { points, placeOf, sites } = distinctPlaces(x_mm, y_mm, step_mm)
  const [right, top] = [halfWidth / step_mm, halfHeight / step_mm]
  const box: Polygon = [[-right, -top], [right, -top], [right, top], [-right, top]] // prettier-ignore
  const delaunay = new Delaunay(points)
  const cell_mm2 = Float64Array.from(sites, (_, place) => {
    // A triangulation of one place names that place its own neighbour.
    const cell = sites.length > 1 ? cellOf(place, points, delaunay.neighbors(place), box) : box
    return step_mm ** 2 * (region.shape === 'disc' ? areaInDisc_mm2(cell, right) : area(cell))
  })
  return Float64Array.from(placeOf, (place) => cell_mm2[place] / sites[place])
}

interface DistinctPlaces {
  /** x and y in turn, whole multiples of the step: whole numbers in which three places are on one line or clearly not. */
  readonly points: Float64Array
  readonly placeOf: Uint32Array
  /** How many sites each place has. */
  readonly sites: readonly number[]
}

function distinctPlaces(x_mm: Float64Array, y_mm: Float64Array, step_mm: number): DistinctPlaces {
  const labels = new Map<number, number>()
  const points: number[] = []
  const sites: number[] = []
  const placeOf = Uint32Array.from(x_mm, (x, i) => {
    const [column, row] = [Math.round(x / step_mm), Math.round(y_mm[i] / step_mm)]
    const key = column * KEY_FACTOR + row
    const place = labels.get(key) ?? labels.size
    if (place === labels.size) points.push(column, row)
    labels.set(key, place)
    sites[place] = (sites[place] ?? 0) + 1
    return place
  })
  return { points: Float64Array.from(points), placeOf, sites }
}

type Polygon = readonly (readonly [number, number])[]

/** What of the box is nearer to a place than to any of its neighbours: cut along the line midway to each. */
function cellOf(place: number, points: Float64Array, neighbours: Iterable<number>, box: Polygon): Polygon {
  const [x, y] = [points[2 * place], points[2 * place + 1]]
  let cell = box
  for (const neighbour of neighbours) {
    const [toX, toY] = [points[2 * neighbour], points[2 * neighbour + 1]]
    const [nx, ny] = [toX - x, toY - y]
    cell = cut(cell, nx, ny, (nx * (x + toX) + ny * (y + toY)) / 2)
  }
  return cell
}

/** The part of a convex polygon where nx x + ny y <= reach (I. E. Sutherland, G. W. Hodgman, CACM 17 (1974) 32). */
function cut(polygon: Polygon, nx: number, ny: number, reach: number): Polygon {
  if (polygon.every(([x, y]) => nx * x + ny * y <= reach)) return polygon
  const kept: (readonly [number, number])[] = []
  for (let i = 0; i < polygon.length; i++) {
    const [p, q] = [polygon[i], polygon[(i + 1) % polygon.length]]
    const [fromP, fromQ] = [reach - nx * p[0] - ny * p[1], reach - nx * q[0] - ny * q[1]]
    if (fromP >= 0) kept.push(p)
    if (fromP * fromQ >= 0) continue
    const t = fromP / (fromP - fromQ)
    kept.push([p[0] + t * (q[0] - p[0]), p[1] + t * (q[1] - p[1])])
  }
  return kept
}

function area(polygon: Polygon): number {
  const doubled = polygon.reduce((sum, p, i) => {
    const q = polygon[(i + 1) % polygon.length]
    return sum + p[0] * q[1] - p[1] * q[0]
  }, 0)
  return Math.abs(doubled) / 2
}
