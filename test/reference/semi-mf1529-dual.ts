/**
 * SEMI MF1529-1104, sheet resistance by the dual-configuration procedure. Read in the standard's text.
 * Eq. 7-8: Rs = Ka RA, Ka = -14.696 + 25.173 (RA/RB) - 7.872 (RA/RB)^2. The printed page lacks the first minus sign.
 */
export const MF1529_COEFFICIENTS = [-14.696, 25.173, -7.872] as const
/** The claimed validity: pitches from the perimeter for 0.1 %, with the line along a radius and across it. */
export const MF1529_PITCHES_FROM_EDGE = { radial: 3, tangential: 5 } as const

/**
 * Not of the standard: its quadratic against the exact relation, Ka/exact - 1 in percent, computed independently (here
 * only to hold the implementation to two routes).
 */
export const QUADRATIC_AGAINST_EXACT_PERCENT: readonly (readonly [ratio: number, percent: string])[] = [
  [1.1, '2.72'],
  [1.15, '0.57'],
  [1.18, '0.17'],
  [1.2, '0.057'],
  [1.22, '0.021'],
  [1.261859507, '0.0425'],
  [1.3, '0.054'],
  [1.32, '0.025'],
  [1.35, '-0.084'],
  [1.38, '-0.29'],
]

/** Not of the standard: errors near the rim of a 200 mm disc, s = 1 mm, in percent, from the exact image model. */
export const RIM_ERRORS_PERCENT = {
  nearestPinFromRim_mm: [0.5, 1, 1.5, 2, 3, 4, 5, 7, 10],
  radialSingle: ['16.4', '9.85', '6.65', '4.81', '2.88', '1.93', '1.39', '.823', '.462'],
  radialQuadratic: ['.398', '.086', '.029', '.019', '.022', '.028', '.032', '.036', '.039'],
  tangentialSingle: ['65.8', '33.9', '19.1', '11.9', '5.77', '3.38', '2.21', '1.17', '.595'],
  tangentialDual: ['54.2', '18.5', '6.61', '2.72', '.669', '.230', '.098', '.027', '.0065'],
  tangentialQuadratic: ['54.3', '18.7', '6.76', '2.79', '.688', '.252', '.125', '.060', '.044'],
  diagonalDual: ['4.25', '1.57', '.697', '.352', '.117', '.049', '.024', '.008', '.002'],
} as const
