/** Linear interpolation on the Delaunay triangles of the sites: for patterns too dense to bend a surface through. */
import { Delaunay } from 'd3-delaunay'
import { interleaved } from './convex-hull'
import type { Targets } from './thin-plate-spline'

/** Three sites and their weights a target, at 3 t, 3 t + 1, 3 t + 2; the weights sum to 1. */
export interface TriangleWeights {
  readonly site: Uint32Array
  readonly weight: Float64Array
}

/**
 * Inside the hull of the sites linear on the triangle; outside it the value at the nearest place of the hull's edge
 * that the walk meets, so that nothing is extrapolated. The sites must not all lie on one line.
 */
export function triangleWeights(x_mm: Float64Array, y_mm: Float64Array, targets: Targets): TriangleWeights {
  const { triangles, halfedges } = new Delaunay(interleaved(x_mm, y_mm))
  const mesh = { triangles, halfedges, x_mm, y_mm }
  const count = targets.x_mm.length
  const site = new Uint32Array(3 * count)
  const weight = new Float64Array(3 * count)
  let triangle = 0
  for (let t = 0; t < count; t++) {
    // Targets come by rows, so the triangle of the last one is near.
    triangle = walk(mesh, triangle, targets.x_mm[t]!, targets.y_mm[t]!)
    const [a, b, c] = barycentric(mesh, triangle, targets.x_mm[t]!, targets.y_mm[t]!)
    site.set(triangles.subarray(3 * triangle, 3 * triangle + 3), 3 * t)
    weight.set(a >= 0 && b >= 0 && c >= 0 ? [a, b, c] : clamped(mesh, triangle, targets, t), 3 * t)
  }
  return { site, weight }
}

export function evaluateTriangles(
  { site, weight }: TriangleWeights,
  values: Float64Array,
  out: Float64Array,
): Float64Array {
  for (let t = 0; t < out.length; t++) {
    let sum = 0
    for (let k = 3 * t; k < 3 * t + 3; k++) sum += weight[k]! * values[site[k]!]!
    out[t] = sum
  }
  return out
}

interface Mesh {
  readonly triangles: Uint32Array
  readonly halfedges: Int32Array
  readonly x_mm: Float64Array
  readonly y_mm: Float64Array
}

type Three = readonly [number, number, number]

/**
 * From triangle to triangle across the edge that the target lies beyond most, to the one that holds it or has it
 * beyond the hull. Ends: in a Delaunay triangulation such a walk doesn't circle, and rounding can't make it outrun the cap.
 */
function walk(mesh: Mesh, start: number, x: number, y: number): number {
  let triangle = start
  for (let step = 0; step < mesh.triangles.length; step++) {
    const shares = barycentric(mesh, triangle, x, y)
    const exits = [0, 1, 2].filter((corner) => shares[corner]! < 0 && acrossFrom(mesh, triangle, corner) >= 0)
    if (exits.length === 0) return triangle
    const exit = exits.reduce((best, corner) => (shares[corner]! < shares[best]! ? corner : best))
    triangle = acrossFrom(mesh, triangle, exit)
  }
  return triangle
}

/** The triangle beyond the edge opposite a corner; -1 on the hull. */
function acrossFrom({ halfedges }: Mesh, triangle: number, corner: number): number {
  const twin = halfedges[3 * triangle + ((corner + 1) % 3)]!
  return twin < 0 ? -1 : Math.floor(twin / 3)
}

function barycentric({ triangles, x_mm, y_mm }: Mesh, triangle: number, x: number, y: number): Three {
  const a = triangles[3 * triangle]!
  const b = triangles[3 * triangle + 1]!
  const c = triangles[3 * triangle + 2]!
  const [abX, abY] = [x_mm[b]! - x_mm[a]!, y_mm[b]! - y_mm[a]!]
  const [acX, acY] = [x_mm[c]! - x_mm[a]!, y_mm[c]! - y_mm[a]!]
  const [apX, apY] = [x - x_mm[a]!, y - y_mm[a]!]
  const area = abX * acY - abY * acX
  const shareB = (apX * acY - apY * acX) / area
  const shareC = (abX * apY - abY * apX) / area
  return [1 - shareB - shareC, shareB, shareC]
}

/** Weights of the place of the triangle's rim nearest to the target. */
function clamped({ triangles, x_mm, y_mm }: Mesh, triangle: number, targets: Targets, t: number): Three {
  const [x, y] = [targets.x_mm[t]!, targets.y_mm[t]!]
  let nearest = Infinity
  let best: Three = [1, 0, 0]
  for (let corner = 0; corner < 3; corner++) {
    const [from, to] = [corner, (corner + 1) % 3]
    const [a, b] = [triangles[3 * triangle + from]!, triangles[3 * triangle + to]!]
    const [ex, ey] = [x_mm[b]! - x_mm[a]!, y_mm[b]! - y_mm[a]!]
    const along = ((x - x_mm[a]!) * ex + (y - y_mm[a]!) * ey) / (ex * ex + ey * ey)
    const share = Math.min(1, Math.max(0, along))
    const distance = Math.hypot(x - x_mm[a]! - share * ex, y - y_mm[a]! - share * ey)
    if (distance >= nearest) continue
    nearest = distance
    const weights: [number, number, number] = [0, 0, 0]
    weights[from] = 1 - share
    weights[to] = share
    best = weights
  }
  return best
}
