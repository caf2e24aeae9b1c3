import { requireRange } from '../problems/problem'

/**
 * Thin sheet with one straight insulated edge, equal pins, configuration A: C = Rs/(V/I). One mirror image of each pin.
 *
 * @param edgeDistanceRatio of the nearest pin to the edge, in pitches, >= 0
 * @param direction         of the pin line against the edge
 * @returns pi/ln 2 far from the edge, half of that for a line lying on it
 * @throws CoreError out-of-range
 *
 * Accuracy: exact. Source: images, L. B. Valdes, Proc. IRE 42 (1954) 420.
 */
export function halfPlaneFactor({
  edgeDistanceRatio,
  direction,
}: {
  readonly edgeDistanceRatio: number
  readonly direction: 'parallel' | 'perpendicular'
}): number {
  requireRange('distance to the edge in pitches', edgeDistanceRatio, '', 0, Number.MAX_VALUE)
  const L = edgeDistanceRatio
  // Written as quotients of quotients, so that a distant edge does not overflow.
  const images = direction === 'perpendicular' ? ((L + 1) / (L + 0.5)) * ((L + 2) / (L + 2.5)) : 1 + 3 / (1 + 4 * L * L)
  return (2 * Math.PI) / (Math.log(4) + Math.log(images))
}
