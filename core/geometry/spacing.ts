import { requireSpacings } from './pin-line'
import type { PinSpacings } from './pin-line'
import { thinSheetFactor } from './thin-sheet'

/**
 * What unequal pins do to the infinite thin sheet's factor, exact: C/(pi/ln 2) with C = 2 pi/ln[(s1+s2)(s2+s3)/(s1 s3)].
 * The geometry factor of `thin-sheet.ts` already holds it; this is that part alone, to set beside the published line.
 *
 * @param spacings_mm pins 1-2, 2-3, 3-4, each > 0 [mm]
 * @returns factor; 1 for equal pins
 * @throws CoreError out-of-range
 */
export function unequalSpacingFactor({ spacings_mm }: { readonly spacings_mm: PinSpacings }): number {
  const sheet = { outline: { shape: 'infinite' }, configuration: 'A', x_mm: 0, y_mm: 0 } as const
  return (thinSheetFactor({ ...sheet, orientation: { angleDeg: 0 }, spacings_mm }).value * Math.LN2) / Math.PI
}

/**
 * The published linear spacing factor, for comparison: Fsp = 1 + 1.082 (1 - s2/S), S the mean spacing.
 *
 * @param spacings_mm pins 1-2, 2-3, 3-4, each > 0 [mm]
 * @returns factor; within 1e-4 of `unequalSpacingFactor` for spacings within 1 % of their mean, 1.3e-3 within 5 %
 * @throws CoreError out-of-range
 *
 * Source: SEMI MF1527-1104 eq. R2-10. The number is 1.5/ln 4.
 */
export function linearSpacingFactor({ spacings_mm }: { readonly spacings_mm: PinSpacings }): {
  value: number
  source: string
} {
  requireSpacings(spacings_mm)
  const [s1, s2, s3] = spacings_mm
  const mean_mm = (s1 + s2 + s3) / 3
  return { value: 1 + 1.082 * (1 - s2 / mean_mm), source: 'SEMI MF1527-1104 eq. R2-10' }
}
