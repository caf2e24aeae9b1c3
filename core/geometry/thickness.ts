import { requireRange } from '../problems/problem'
import { requireSpacings } from './pin-line'
import type { PinSpacings } from './pin-line'
import type { Back } from './slab'
import { slabLine } from './slab-line'

export const THICKNESS_SOURCE =
  'A. Uhlir, Bell Syst. Tech. J. 34 (1955) 105; F. M. Smits, Bell Syst. Tech. J. 37 (1958) 711; SEMI MF43-0705 Table 1'

/** Largest thickness in pitches; beyond, the wafer is a semi-infinite solid to better than 1e-6. */
export const MAX_THICKNESS_RATIO = 100
/** On a conducting back a thinner slab leaves no voltage to measure: at 0.01 the factor is already 1e68. */
const MIN_CONDUCTING_RATIO = 0.01

export interface ThicknessFactor {
  readonly value: number
  /** d ln F/d ln(w/S): what a relative error of thickness, or minus that of spacing, does to F. */
  readonly dLnRatio: number
  readonly source: string
}

/**
 * Thickness factor F(w/S) of a slab, configuration A, pins equally spaced, far from every edge.
 * Multiplies the thin-sheet result: rho = (pi/ln 2) (V/I) w F.
 *
 * @param thickness_um w, > 0 [um]; w/S <= 100, and >= 0.01 on a conducting back
 * @param spacing_mm   S, > 0 [mm]; with unequal pins the mean of the three (the practice of SEMI MF1527), while the
 *   geometry factor carries the inequality; the exact joint value is `unequalThicknessFactor`
 * @param back         insulating, or conducting (a metallised back: all of it at one potential)
 * @returns F: exactly 1 for a thin slab on an insulating back, 2 ln 2 S/w for a thick one on either
 * @throws CoreError out-of-range
 *
 * Assumes a uniform slab and point contacts, the pins further than several pitches from every edge; near an edge see
 * `edge-and-thickness.ts`.
 * Accuracy: 1e-12 relative; agrees with SEMI MF43-0705 Table 1 in every printed digit.
 * Sources: Uhlir 1955; Smits 1958; Valdes 1954 (conducting back); series in `slab.ts`.
 * Note: the closed forms ln 2/ln(sinh(w/s)/sinh(w/2s)) and, with cosh, for a conducting back are approximations that
 * are right only in the limits, and are not used. At w/s = 1 the first gives 0.8523 for 0.9215 (-7.5 %), at 0.5 it is
 * -4.0 %; the second is -83 % at 0.3 and +10 % at 1.2.
 */
export function thicknessFactor({
  thickness_um,
  spacing_mm,
  back,
}: {
  readonly thickness_um: number
  readonly spacing_mm: number
  readonly back: Back
}): ThicknessFactor {
  return unequalThicknessFactor({ thickness_um, spacings_mm: [spacing_mm, spacing_mm, spacing_mm], back })
}

/**
 * `thicknessFactor` for pins of any spacing, exact: it multiplies C (V/I) of the thin sheet with those same spacings.
 * The ratio w/S is that to the mean spacing. For pins within 2 % of their mean it differs from F(w/mean) by less than
 * 0.2 % at w/S = 1, and by nothing for a thin slab.
 */
export function unequalThicknessFactor({
  thickness_um,
  spacings_mm,
  back,
}: {
  readonly thickness_um: number
  readonly spacings_mm: PinSpacings
  readonly back: Back
}): ThicknessFactor {
  requireSpacings(spacings_mm)
  const [s1, s2, s3] = spacings_mm
  const thickness_mm = thickness_um / 1000
  requireThicknessRatio(thickness_mm / ((s1 + s2 + s3) / 3), back)
  const { thin, slab, slope } = slabLine(spacings_mm, thickness_mm, back, 'A')
  return { value: thin / slab, dLnRatio: -slope / slab, source: THICKNESS_SOURCE }
}

/** @throws CoreError out-of-range */
export function requireThicknessRatio(ratio: number, back: Back): void {
  const min = back === 'conducting' ? MIN_CONDUCTING_RATIO : Number.MIN_VALUE
  requireRange('thickness over pin spacing', ratio, '', min, MAX_THICKNESS_RATIO)
}
