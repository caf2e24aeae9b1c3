/** The smallest convex polygon round the sites: outside it a map is a guess, not an interpolation. */
import { Delaunay } from 'd3-delaunay'
import { frameOf, requireSites } from './frame'

export interface ConvexHull {
  /** Corners in order, the first not repeated; fewer than three where the sites lie on one line. */
  readonly x_mm: Float64Array
  readonly y_mm: Float64Array
}

/** A place outside the hull by less than this share of the pattern's scale is on its rim. */
const RIM_SHARE = 1e-9

export function convexHull(x_mm: Float64Array, y_mm: Float64Array): ConvexHull {
  requireSites(x_mm, y_mm)
  if (x_mm.length < 3 || frameOf(x_mm, y_mm).isCollinear) return ends(x_mm, y_mm)
  return hullOf(new Delaunay(interleaved(x_mm, y_mm)), x_mm, y_mm)
}

export function hullOf(delaunay: Delaunay<unknown>, x_mm: Float64Array, y_mm: Float64Array): ConvexHull {
  return {
    x_mm: Float64Array.from(delaunay.hull, (site) => x_mm[site]!),
    y_mm: Float64Array.from(delaunay.hull, (site) => y_mm[site]!),
  }
}

/** 1 for each place inside or on the hull, else 0. */
export function insideHull(hull: ConvexHull, x_mm: Float64Array, y_mm: Float64Array): Uint8Array {
  const rim_mm = RIM_SHARE * reach_mm(hull)
  const turn = Math.sign(signedArea(hull))
  const inside = new Uint8Array(x_mm.length)
  if (turn === 0) {
    for (let t = 0; t < x_mm.length; t++) inside[t] = isOnSegment(hull, x_mm[t], y_mm[t], rim_mm) ? 1 : 0
    return inside
  }
  const edges = inwardEdges(hull, turn)
  const corners = hull.x_mm.length
  // Of a wafer's many places few lie outside; those mostly fail at the edge at which the one before did.
  let first = 0
  for (let t = 0; t < x_mm.length; t++) {
    let passed = 0
    for (let edge = first; passed < corners; passed++, edge = (edge + 1) % corners) {
      if (edges.x[edge] * x_mm[t] + edges.y[edge] * y_mm[t] - edges.offset_mm[edge] >= -rim_mm) continue
      first = edge
      break
    }
    inside[t] = passed === corners ? 1 : 0
  }
  return inside
}

export function interleaved(x_mm: Float64Array, y_mm: Float64Array): Float64Array {
  const points = new Float64Array(2 * x_mm.length)
  for (let i = 0; i < x_mm.length; i++) {
    points[2 * i] = x_mm[i]!
    points[2 * i + 1] = y_mm[i]!
  }
  return points
}

/** Unit normals into the hull and how far along them each edge lies from the origin. */
interface Edges {
  readonly x: Float64Array
  readonly y: Float64Array
  readonly offset_mm: Float64Array
}

function inwardEdges({ x_mm, y_mm }: ConvexHull, turn: number): Edges {
  const corners = x_mm.length
  const edges = { x: new Float64Array(corners), y: new Float64Array(corners), offset_mm: new Float64Array(corners) }
  for (let i = 0; i < corners; i++) {
    const next = (i + 1) % corners
    const [ex, ey] = [x_mm[next] - x_mm[i], y_mm[next] - y_mm[i]]
    const scale = turn / Math.hypot(ex, ey)
    edges.x[i] = -ey * scale
    edges.y[i] = ex * scale
    edges.offset_mm[i] = edges.x[i] * x_mm[i] + edges.y[i] * y_mm[i]
  }
  return edges
}

function reach_mm({ x_mm, y_mm }: ConvexHull): number {
  return x_mm.reduce((reach, x, i) => Math.max(reach, Math.abs(x), Math.abs(y_mm[i]!)), 0)
}

function signedArea({ x_mm, y_mm }: ConvexHull): number {
  let area = 0
  for (let i = 0; i < x_mm.length; i++) {
    const next = (i + 1) % x_mm.length
    area += x_mm[i]! * y_mm[next]! - x_mm[next]! * y_mm[i]!
  }
  return x_mm.length < 3 ? 0 : area / 2
}

/** For sites on one line: the two outermost, or the one there is. */
function ends(x_mm: Float64Array, y_mm: Float64Array): ConvexHull {
  let [first, last] = [0, 0]
  const isBefore = (a: number, b: number) => x_mm[a]! < x_mm[b]! || (x_mm[a]! === x_mm[b]! && y_mm[a]! < y_mm[b]!)
  for (let i = 1; i < x_mm.length; i++) {
    if (isBefore(i, first)) first = i
    if (isBefore(last, i)) last = i
  }
  const corners = first === last ? [first] : [first, last]
  return { x_mm: Float64Array.from(corners, (i) => x_mm[i]!), y_mm: Float64Array.from(corners, (i) => y_mm[i]!) }
}

function isOnSegment({ x_mm, y_mm }: ConvexHull, x: number, y: number, rim_mm: number): boolean {
  const [ax, ay] = [x_mm[0]!, y_mm[0]!]
  const last = x_mm.length - 1
  const [ex, ey] = [x_mm[last]! - ax, y_mm[last]! - ay]
  const squared = ex * ex + ey * ey
  const along = squared === 0 ? 0 : Math.min(1, Math.max(0, ((x - ax) * ex + (y - ay) * ey) / squared))
  return Math.hypot(x - ax - along * ex, y - ay - along * ey) <= rim_mm
}
