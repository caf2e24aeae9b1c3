/** Intrinsic carrier density of silicon [cm^-3]. */

/** K. Misiakos, D. Tsamakis, J. Appl. Phys. 74 (1993) 3293: the fit at two temperatures; the paper prints 9.7e9 at 300 K. */
export const MISIAKOS_TSAMAKIS = [
  [300, 9.6956e9],
  [296.15, 7.0104e9],
] as const

/** Points of the same paper, as carried by one public program; the fit lies within 4.3 % of each (worst at 195 K). */
export const MISIAKOS_TSAMAKIS_POINTS = [
  [77.8, 5.0e-20],
  [195, 1.78e4],
  [281, 1.79e9],
  [300, 9.7e9],
  [319.5, 4.51e10],
  [340.5, 1.89e11],
] as const

/** A. B. Sproul, M. A. Green, J. Appl. Phys. 70 (1991) 846. */
export const SPROUL_GREEN = [
  [300, 1.0037e10],
  [296.15, 7.2594e9],
] as const

/** Common practice, no source: round numbers used in hand calculation, mobilities 1300 and 500 cm^2/(V s), ni = 1.5e10 cm^-3. */
export const HAND_CALCULATION = {
  electrons_cm2_per_Vs: 1300,
  holes_cm2_per_Vs: 500,
  intrinsicDensity_cm3: 1.5e10,
  intrinsicResistivity_ohm_cm: 2.31e5,
  donors1e16_ohm_cm: 0.48,
  acceptors1e16_ohm_cm: 1.25,
}
