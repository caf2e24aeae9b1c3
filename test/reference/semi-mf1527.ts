/** SEMI MF1527-1104, Related Information 2. Read in the standard's text; page images viewed where signs matter. */

/**
 * Eq. R2-8: thickness factor F(w/S), 0 <= w/S <= 1.5, claimed good to 0.04 %. The largest difference from the exact
 * series is 0.051 %, at 1.43.
 */
export function mf1527ThicknessPolynomial(thicknessRatio: number): number {
  const coefficients = [1.000107, 0.00113, -0.069677, 0.461693, -1.001842, 0.684549, -0.154327]
  return coefficients.reduceRight((sum, coefficient) => sum * thicknessRatio + coefficient, 0)
}

/**
 * Eq. R2-6: F(S/D) of the centre of a disc, y = S/D <= 0.04. The exponent of the last term is printed 5; that is a
 * misprint: the text calls it a fourth-order fit, and with 4 it follows eq. R2-5 to 1.6e-6, with 5 it is 1.7e-4 off.
 */
export function mf1527DiscPolynomial(spacingOverDiameter: number, lastExponent: 4 | 5 = 4): number {
  const y = spacingOverDiameter
  return 1 + 1.4887e-5 * y - 8.657959 * y ** 2 + 0.181781 * y ** 3 + 70.841714 * y ** lastExponent
}

/** Eq. R2-5: C = pi/(ln 2 + ln((D/s)^2 + 3) - ln((D/s)^2 - 3)). */
export function mf1527DiscFactor(diameterOverSpacing: number): number {
  const square = diameterOverSpacing ** 2
  return Math.PI / (Math.LN2 + Math.log((square + 3) / (square - 3)))
}
