/** Monte Carlo as formulas. */
import type { Formula } from '../units/formula'

export const MONTE_CARLO = {
  title: 'Monte Carlo calculation of a site’s uncertainty',
  formula:
    'y_r = f(x + u z_r) through the whole chain, z normal; interval from the sorted y_r; agrees where both ends differ from y ± U by at most half a unit of the second significant digit of u',
  source: 'JCGM 101:2008, 5.9, 7 and 8',
} as const satisfies Formula
