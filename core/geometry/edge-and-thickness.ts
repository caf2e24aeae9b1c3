import { requireRange } from '../problems/problem'
import { fourTerminalSum, TERMINALS } from './four-terminal'
import { slabTerm, thinShare } from './slab'
import type { Back } from './slab'
import { requireThicknessRatio } from './thickness'

/** Where a probe of equal pins stands against one straight edge of a slab; lengths in pitches. */
export interface EdgePlacement {
  /** w/S, as `thicknessFactor`. */
  readonly thicknessRatio: number
  /** Of the nearest pin, >= 0. */
  readonly edgeDistanceRatio: number
  /** Of the pin line against the edge: 0 parallel, 90 perpendicular. */
  readonly angleDeg: number
  readonly back: Back
}

/**
 * How far the product of edge factor and thickness factor is off: C_edge F/C_exact - 1, configuration A.
 * The edge factor is that of a thin sheet, and a thick wafer's field near an edge is not the thin sheet's.
 *
 * @param place thicknessRatio 0..100, edgeDistanceRatio >= 0, angleDeg 0..90
 * @returns relative error; 0 for a thin slab on an insulating back, far from the edge, and for a line lying on the edge
 * @throws CoreError out-of-range
 *
 * Exact: pins and their mirror images, each with the slab's own log distance (`slab.ts`).
 * Accuracy: 1e-12. Source: derived; images as L. B. Valdes, Proc. IRE 42 (1954) 420, A. Uhlir, BSTJ 34 (1955) 105.
 * Check: parallel at one pitch -0.07 % at w/S = 0.5, -0.46 % at 0.7, -1.9 % at 1.
 */
export function productError(place: EdgePlacement): number {
  requireThicknessRatio(place.thicknessRatio, place.back)
  requireRange('distance to the edge in pitches', place.edgeDistanceRatio, '', 0, 1e6)
  requireRange('angle of the pin line to the edge', place.angleDeg, 'deg', 0, 90)
  const free = slabSums(place, false)
  const edged = slabSums(place, true)
  // C_edge = 2 pi/edged.thin, F = free.thin/free.slab, C_exact = 2 pi/edged.slab.
  return ((free.thin / free.slab) * edged.slab) / edged.thin - 1
}

/** T of the thin sheet and of the slab, without or with the mirror images. */
function slabSums(place: EdgePlacement, mirrored: boolean): { thin: number; slab: number } {
  const { thicknessRatio, edgeDistanceRatio, back } = place
  const angle = (place.angleDeg * Math.PI) / 180
  const height = (pin: number) => edgeDistanceRatio + pin * Math.sin(angle)
  const overPins = (term: (distance: number) => number) =>
    fourTerminalSum(TERMINALS.A, (i, j) => {
      const direct = Math.abs(i - j)
      if (!mirrored) return term(direct)
      return term(direct) + term(Math.hypot((i - j) * Math.cos(angle), height(i) + height(j)))
    })
  const thin = overPins(Math.log)
  return {
    thin,
    slab: thinShare(back) * thin + overPins((distance) => slabTerm(distance / thicknessRatio, back).value),
  }
}

/** Directions tried for the worst; the error changes slowly between them. */
const ANGLES_DEG = [0, 15, 30, 45, 60, 75, 90]
/** Beyond this many pitches the edge itself changes C by less than 1e-5. */
const FARTHEST = 300

/**
 * Distance of the nearest pin to the edge inside which the product of edge and thickness factor may be off by more than
 * the tolerance, whatever the direction of the pin line. A site nearer than this is flagged.
 *
 * @param thickness_um w, > 0 [um]; w/S <= 100
 * @param spacing_mm   S, > 0 [mm]
 * @param tolerance    relative, 1e-4..0.5, e.g. 0.001
 * @param back         as in `thicknessFactor`
 * @returns [mm]; 0 where the product is good everywhere (at 0.1 % on an insulating back: w/S up to 0.5)
 * @throws CoreError out-of-range
 *
 * Conservative: the error has a sign change or a maximum inside, and is 0 on the edge itself, but all of the inside is
 * flagged. Assumes an edge straight over a few pitches (a disc of more than 50 pitches) and one edge near; at a corner
 * the errors of two edges add.
 * Accuracy: 1e-4 of the distance. Costs some 20 milliseconds: once a procedure, not once a site.
 */
export function criticalEdgeDistance_mm({
  thickness_um,
  spacing_mm,
  tolerance,
  back,
}: {
  readonly thickness_um: number
  readonly spacing_mm: number
  readonly tolerance: number
  readonly back: Back
}): number {
  requireRange('pin spacing', spacing_mm, 'mm', 1e-6, 1e6)
  requireRange('tolerance', tolerance, '', 1e-4, 0.5)
  const thicknessRatio = thickness_um / 1000 / spacing_mm
  requireThicknessRatio(thicknessRatio, back)
  const ratios = ANGLES_DEG.map((angleDeg) =>
    outermost(
      (edgeDistanceRatio) => Math.abs(productError({ thicknessRatio, edgeDistanceRatio, angleDeg, back })) > tolerance,
    ),
  )
  return Math.max(...ratios) * spacing_mm
}

/** The largest distance at which `exceeds` holds: steps inwards from afar, then halves the step that found it. */
function outermost(exceeds: (distance: number) => boolean): number {
  const inwards = 0.9
  let outside = FARTHEST
  while (outside > 0.02 && !exceeds(outside * inwards)) outside *= inwards
  if (outside <= 0.02) return 0
  let inside = outside * inwards
  while (outside - inside > 1e-4 * outside) {
    const middle = (inside + outside) / 2
    if (exceeds(middle)) inside = middle
    else outside = middle
  }
  return outside
}
