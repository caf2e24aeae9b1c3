/** The charts of a check wafer as formulas. */
import type { Formula } from '../units/formula'
import { CHECK_SOURCE } from './check'
import { CHART_DEFAULTS } from './control-limits'
import { RUN_RULES } from './run-rules'

export const CONTROL_LIMITS = {
  title: 'Control limits of a check wafer',
  formula: `centre ± w s₂; precision up to s₁ √F(${CHART_DEFAULTS.precisionConfidence}; n − 1, ν₁)`,
  where: `centre the accepted value or the mean of the baseline, s₂ of its values, s₁ pooled within its occasions; w = ${CHART_DEFAULTS.width} unless chosen`,
  source: CHECK_SOURCE,
} as const satisfies Formula

export const MOVING_AVERAGE = {
  title: 'Moving average of a check wafer',
  formula: 'E_i = λ y_i + (1 − λ) E_i−1; limits centre ± w s₂ √(λ/(2 − λ) (1 − (1 − λ)^2i))',
  where: `λ = ${CHART_DEFAULTS.lambda}, w = ${CHART_DEFAULTS.averageWidth} unless chosen`,
  source: CHECK_SOURCE,
} as const satisfies Formula

export const RUNS = {
  title: 'Run rules of a check wafer',
  formula: `a value breaks a rule that ${Object.values(RUN_RULES)
    .map(({ words }) => words)
    .join('; ')}`,
  source: CHECK_SOURCE,
} satisfies Formula
