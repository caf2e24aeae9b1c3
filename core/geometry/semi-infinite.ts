import { requireRange } from '../problems/problem'
import { requireSpacings } from './pin-line'
import type { PinSpacings } from './pin-line'

/**
 * Resistivity of a solid that is infinite below the probe and to all sides: rho = 2 pi (V/I)/(1/s1 + 1/s3 - 1/(s1+s2)
 * - 1/(s2+s3)), for equal pins 2 pi s V/I. The limit that the thickness factor tends to.
 *
 * @param spacings_mm pins 1-2, 2-3, 3-4, each > 0 [mm]
 * @param vOverI_ohm  current 1-4, voltage 2-3 [ohm]
 * @returns rho [ohm.cm]
 * @throws CoreError out-of-range
 *
 * Assumes thickness and every edge at least 4 pitches away (2 %).
 * Source: L. B. Valdes, Proc. IRE 42 (1954) 420; SEMI MF43-0705 eq. 5.
 */
export function semiInfiniteResistivity_ohm_cm({
  spacings_mm,
  vOverI_ohm,
}: {
  readonly spacings_mm: PinSpacings
  readonly vOverI_ohm: number
}): number {
  requireSpacings(spacings_mm)
  requireRange('V/I', vOverI_ohm, 'ohm', -Number.MAX_VALUE, Number.MAX_VALUE)
  const [s1, s2, s3] = spacings_mm
  const perMm = 1 / s1 + 1 / s3 - 1 / (s1 + s2) - 1 / (s2 + s3)
  const mmPerCm = 10
  return (2 * Math.PI * vOverI_ohm) / (perMm * mmPerCm)
}
