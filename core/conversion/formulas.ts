/** Dimensions of a piece as formulas. */
import type { Formula } from '../units/formula'
import { RESISTANCE_SOURCE } from './dimensions'

export const BAR_RESISTANCE = {
  title: 'Resistance of a bar',
  formula: 'R = R_s L/W = ρ L/(W t)',
  where: 'L length, W width, t thickness',
  source: RESISTANCE_SOURCE,
} satisfies Formula
