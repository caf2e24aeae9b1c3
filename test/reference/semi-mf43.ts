/**
 * SEMI MF43-0705, Test Methods for Resistivity of Semiconductor Materials, in-line four-point probe.
 * Read in the standard's text.
 */

/** Table 1: thickness factor F against w/S, insulating back, printed to three decimals. */
export const MF43_TABLE_1: readonly (readonly [thicknessRatio: number, factor: number])[] = [
  [1.0, 0.921],
  [1.2, 0.864],
  [1.4, 0.803],
  [1.6, 0.742],
  [1.8, 0.685],
  [2.0, 0.634],
  [2.2, 0.587],
  [2.4, 0.546],
  [2.6, 0.51],
  [2.8, 0.477],
  [3.0, 0.448],
  [3.2, 0.422],
  [3.4, 0.399],
  [3.6, 0.378],
  [3.8, 0.359],
  [4.0, 0.342],
]

/** Table 2: F2 against S/D at the centre of a disc, printed to three decimals; F2 = Rs/(V/I). */
export const MF43_TABLE_2: readonly (readonly [spacingOverDiameter: number, factor: number])[] = [
  [0.005, 4.531],
  [0.01, 4.528],
  [0.015, 4.524],
  [0.02, 4.517],
  [0.025, 4.508],
  [0.03, 4.497],
  [0.035, 4.485],
  [0.04, 4.47],
  [0.045, 4.454],
  [0.05, 4.436],
  [0.055, 4.417],
  [0.06, 4.395],
  [0.065, 4.372],
  [0.07, 4.348],
  [0.075, 4.322],
  [0.08, 4.294],
  [0.085, 4.265],
  [0.09, 4.235],
  [0.095, 4.204],
  [0.1, 4.171],
]
/** The first entry of Table 2, S/D = 0: the infinite sheet. */
export const MF43_INFINITE_SHEET = 4.532

/** Half a unit of the last printed digit, and a little for the table's own rounding (largest difference 5.5e-4). */
export const MF43_TOLERANCE = 6e-4
