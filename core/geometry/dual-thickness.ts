import { requireRange } from '../problems/problem'
import { dualSheetResistance } from './dual'
import { slabLine } from './slab-line'
import { requireThicknessRatio } from './thickness'
import type { ThicknessFactor } from './thickness'

/**
 * Thickness factor of the dual configuration: multiplies the sheet resistance of `dualSheetResistance` to give rho/w.
 *
 * @param thickness_um w, > 0 [um]; w/S <= 100
 * @param spacing_mm   S, pins equally spaced, > 0 [mm]
 * @returns exactly 1 for a thin slab; 0.995946 at w/S = 0.5, 0.886509 at 1: it falls faster than the single
 *   configuration's F (0.997362, 0.921457)
 * @throws CoreError out-of-range
 *
 * Assumes an insulating back, no edge within several pitches, equal pins.
 * Accuracy: 1e-12; both configurations by the exact slab series, then the exact dual relation.
 * Source: derived from Uhlir 1955 (slab) and Rymaszewski 1969 (dual); SEMI MF1529-1104 note 1 gives no correction.
 */
export function dualThicknessFactor({
  thickness_um,
  spacing_mm,
}: {
  readonly thickness_um: number
  readonly spacing_mm: number
}): ThicknessFactor {
  requireRange('pin spacing', spacing_mm, 'mm', 1e-6, 1e6)
  const ratio = thickness_um / 1000 / spacing_mm
  requireThicknessRatio(ratio, 'insulating')
  const a = slabLine([1, 1, 1], ratio, 'insulating', 'A')
  const b = slabLine([1, 1, 1], ratio, 'insulating', 'B')
  // Per rho/w = 1 ohm/sq the two resistances are T/2 pi. Divided by the same solved for w -> 0, rounding included.
  const solved = solve(a.slab, b.slab)
  const thin = solve(a.thin, b.thin)
  const dLnRatio = -(solved.dLnA * a.slope) / a.slab - (solved.dLnB * b.slope) / b.slab
  return { value: thin.sheetResistance_ohm_sq / solved.sheetResistance_ohm_sq, dLnRatio, source: DUAL_THICKNESS_SOURCE }
}

function solve(sumA: number, sumB: number) {
  return dualSheetResistance({ resistanceA_ohm: sumA / (2 * Math.PI), resistanceB_ohm: sumB / (2 * Math.PI) })
}

export const DUAL_THICKNESS_SOURCE =
  'Derived: exact slab series (A. Uhlir, Bell Syst. Tech. J. 34 (1955) 105) in both configurations, exact dual relation'
