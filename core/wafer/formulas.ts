/** Site plans as formulas. */
import type { Formula } from '../units/formula'

export const STANDARD_PLANS = {
  title: 'Site plans of the standard',
  formula:
    'concentric: centre and 8 k sites at k R_o/K, k = 1 … K; Cartesian: a lattice of step 2 R_o/N cut to the circle; along a diameter: step 2 R_o/(N − 1)',
  where: 'R_o half the diameter less the edge exclusion, less half the spot where it is given (method A)',
  range: 'K = 3 to 8, N odd; the text’s step R_o/N of the Cartesian plan does not reach its own site counts',
  source: 'SEMI MF1618-1104',
} as const satisfies Formula

export const EQUAL_AREA_PLAN = {
  title: 'Site plan of equal areas',
  formula: 'r_k = R √(4k² + 1)/(2K + 1), 8 k sites each',
  source: 'derived: each ring halved by area',
} as const satisfies Formula
