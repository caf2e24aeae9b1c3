/** What a site plan sees, as formulas. */
import type { Formula } from '../units/formula'
import { POWER_SOURCE } from './power'

export const PLAN_POWER = {
  title: 'Power of a site plan',
  formula: 'power = P(F′(1, n − 2; λ) > F_α), λ = δ² Σ (s_i − s̄)²/σ²',
  where:
    'δ the size of the effect of shape s, σ of a single site; of the shape’s directions or places the least sum counts',
  source: POWER_SOURCE,
} as const satisfies Formula
