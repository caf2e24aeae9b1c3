/**
 * ASTM F723-99 / SEMI MF723: resistivity and dopant density at 23 C. Coefficients from two public transcriptions of the standard with
 * equation numbers; the decades were computed from them by an implementation independent of the project's.
 */

/** Resistivity [ohm cm] from density, four digits printed. */
export const MF723_DECADES: readonly (readonly [concentration_cm3: number, phosphorus: number, boron: number])[] = [
  [1e12, 4264, 13050],
  [1e13, 425.0, 1306],
  [1e14, 42.87, 131.0],
  [1e15, 4.482, 13.31],
  [1e16, 0.5229, 1.443],
  [1e17, 0.08383, 0.2022],
  [1e18, 0.02356, 0.04355],
  [1e19, 5.775e-3, 8.872e-3],
  [1e20, 7.701e-4, 1.169e-3],
  [1e21, NaN, 1.245e-4],
]

/** Arsenic, eq. 10: coefficients of (log10 N)^i as printed, for log10 of the resistivity; 1e19 to 6e20 cm^-3. One transcription. */
export const MF723_ARSENIC_AS_PRINTED = [
  '-6633.667', '768.2531', '-25.77373', '0.9658177', '-0.05643443', '-8.008543e-4', '9.055838e-5', '-1.776701e-6', '1.953279e-7',
  '-5.754599e-9', '-1.31657e-11',
] as const // prettier-ignore
export const MF723_ARSENIC: readonly (readonly [concentration_cm3: number, resistivity_ohm_cm: number])[] = [
  [1e19, 5.5548e-3],
  [1e20, 9.6353e-4],
  [6e20, 2.6218e-4],
]

/**
 * Worst relative miss when the two published directions follow one another, as measured over the standard's ranges. The standard
 * claims 3 % for boron and 4.5 % for phosphorus.
 */
export const MF723_ROUND_TRIP = {
  boron: { densityAndBack: 0.0275, resistivityAndBack: 0.0295 },
  phosphorus: { densityAndBack: 0.0706, resistivityAndBack: 0.0474 },
}

/** Masetti at 300 K over MF723 at 23 C in resistivity, less one, in percent, 1e13 to 1e20 cm^-3. */
export const MASETTI_OVER_MF723_PERCENT = {
  phosphorus: [4.0, 3.7, 2.2, 0.8, 3.2, -4.3, -5.8, 10.7],
  boron: [1.7, 1.7, 1.7, 1.8, -3.2, -10.6, -3.8, 7.1],
}
