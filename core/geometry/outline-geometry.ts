import type { Outline } from '../wafer/outline'

/**
 * The generalised logarithm of the distance of two places i and j on a thin sheet with insulated edges:
 * L(i,j) = L(j,i), so that a current I fed in at j raises the potential at i by -(Rs I/2 pi) L(i,j), up to terms in i
 * alone and in j alone, which every four-terminal difference cancels. On the infinite sheet it is ln|zi - zj|.
 *
 * Writes L, dL/dxi, dL/dyi, dL/dxj, dL/dyj [-, 1/mm] into `out[0..4]`. Allocates nothing.
 */
export type LogDistance = (xi: number, yi: number, xj: number, yj: number, out: Float64Array) => void

/** The sheet's outline as seen by the electrical geometry: one file an outline, one line each in `registry.ts`. */
export interface OutlineGeometry<Shape extends Outline['shape'] = Outline['shape']> {
  /** The outline's `shape`. */
  readonly id: Shape
  readonly title: string
  /** Of the log distance. */
  readonly formula: string
  readonly source: string
  /** Where the factor is exact, in words. */
  readonly domain: string
  /** The length that `dSize_per_mm` differentiates by: the diameter, or the width with the aspect held. */
  size_mm(outline: Extract<Outline, { shape: Shape }>): number
  /** @throws CoreError out-of-range where the outline has no size */
  logDistance(outline: Extract<Outline, { shape: Shape }>): LogDistance
}
