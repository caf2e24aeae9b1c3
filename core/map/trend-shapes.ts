/** The lowest shapes of a trend surface in the terms people use: how much, and which way. */
import type { ZernikeIndex } from './zernike'

/** The best plane through the surface. */
export interface Tilt {
  /** Rise from the centre to the edge of the disc along the steepest way up, >= 0, in the unit of the values. */
  readonly perRadius: number
  /** The same in % of the mean; null where the mean isn't above 0. */
  readonly perRadius_pct: number | null
  /** Towards which it rises, 0 to below 360, anticlockwise from +x; null for no tilt at all. */
  readonly direction_deg: number | null
}

export interface Bowl {
  /** Edge minus centre of the bowl alone, below 0 for a dome. */
  readonly edgeMinusCentre: number
  readonly edgeMinusCentre_pct: number | null
  /** Edge minus centre of all shapes that go round evenly: the bowl and the rings beyond it. */
  readonly radialEdgeMinusCentre: number
  readonly radialEdgeMinusCentre_pct: number | null
}

/** The two-fold shape of degree 2. */
export interface Saddle {
  /** How far the edge rises above, and dips below, the mean, >= 0. */
  readonly amplitude: number
  readonly amplitude_pct: number | null
  /** Of the axis along which the edge is high, 0 to below 180; null for no saddle at all. */
  readonly axis_deg: number | null
}

export interface TrendShapes {
  /** Mean of the surface over the disc. */
  readonly mean: number
  readonly tilt: Tilt
  /** Null for a plane. */
  readonly bowl: Bowl | null
  /** Null for a plane or bowl. */
  readonly saddle: Saddle | null
}

/** A shape and how much of it there is. */
export interface ShapeAmount extends ZernikeIndex {
  /** In the unit of the values: the standard deviation over the disc that the shape alone would give. */
  readonly coefficient: number
}

export function shapesOf(terms: readonly ShapeAmount[]): TrendShapes {
  const find = (n: number, m: number) => terms.find((term) => term.n === n && term.m === m)?.coefficient
  const mean = find(0, 0) ?? NaN
  const percent = (amount: number) => (mean > 0 ? (100 * amount) / mean : null)
  return {
    mean,
    tilt: tiltOf(find(1, 1) ?? 0, find(1, -1) ?? 0, percent),
    bowl: bowlOf(find(2, 0), terms, percent),
    saddle: saddleOf(find(2, 2), find(2, -2), percent),
  }
}

type Percent = (amount: number) => number | null

/** The shape is 2 rho cos theta. */
function tiltOf(alongX: number, alongY: number, percent: Percent): Tilt {
  const perRadius = 2 * Math.hypot(alongX, alongY)
  return {
    perRadius,
    perRadius_pct: percent(perRadius),
    direction_deg: perRadius > 0 ? turn_deg(alongX, alongY) : null,
  }
}

/** An even shape of degree n is sqrt(n + 1) at the edge, at the centre the same, with the other sign for n = 2, 6. */
function bowlOf(bowl: number | undefined, terms: readonly ShapeAmount[], percent: Percent): Bowl | null {
  if (bowl === undefined) return null
  const rises = terms.filter(({ n, m }) => m === 0 && n % 4 === 2)
  const edgeMinusCentre = 2 * Math.sqrt(3) * bowl
  const radialEdgeMinusCentre = rises.reduce((sum, { n, coefficient }) => sum + 2 * Math.sqrt(n + 1) * coefficient, 0)
  return {
    edgeMinusCentre,
    edgeMinusCentre_pct: percent(edgeMinusCentre),
    radialEdgeMinusCentre,
    radialEdgeMinusCentre_pct: percent(radialEdgeMinusCentre),
  }
}

/** The shape is sqrt(6) rho^2 cos 2 theta. */
function saddleOf(cosine: number | undefined, sine: number | undefined, percent: Percent): Saddle | null {
  if (cosine === undefined || sine === undefined) return null
  const amplitude = Math.sqrt(6) * Math.hypot(cosine, sine)
  const axis_deg = amplitude > 0 ? turn_deg(cosine, sine) / 2 : null
  return { amplitude, amplitude_pct: percent(amplitude), axis_deg }
}

function turn_deg(x: number, y: number): number {
  const angle = (Math.atan2(y, x) * 180) / Math.PI
  // A hair below zero would round up to a full 360.
  return angle < 0 ? (angle + 360) % 360 : angle
}
