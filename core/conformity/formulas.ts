/** Judgement against limits as formulas. */
import type { Formula } from '../units/formula'

export const CONFORMANCE_PROBABILITY = {
  title: 'Probability to conform',
  formula: 'p_c = Φ((T_U − y)/u) − Φ((T_L − y)/u)',
  where: 'y the measured value, u its standard uncertainty, T_L and T_U the limits',
  source: 'JCGM 106:2012, clause 7',
} as const satisfies Formula

export const DECISION_RULES = {
  title: 'Decision rules',
  formula:
    'accepted within [T_L + g, T_U − g]: simple g = 0; stringent g = r U; relaxed g = −r U; by risk g where 1 − p_c has come down to the risk allowed',
  where: 'U = 2u, r the guard factor',
  source: 'JCGM 106:2012, clauses 8 and 9',
} as const satisfies Formula

export const GLOBAL_RISKS = {
  title: 'Risks of a decision rule on a production',
  formula: 'R_C = ∫_nonconforming P(accepted | η) g₀(η) dη, R_P = ∫_conforming P(rejected | η) g₀(η) dη',
  where: 'g₀ the normal distribution of the true values, given or as the lot shows it; a normal error of measurement',
  source: DECISION_RULES.source,
} as const satisfies Formula
