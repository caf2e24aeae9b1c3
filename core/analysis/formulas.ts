/** What the pipeline itself computes, as formulas. */
import type { Formula } from '../units/formula'

export const POLARITIES = {
  title: 'V/I of two polarities',
  formula: 'V/I = (V_f/I_f + V_r/I_r)/2; flagged where the two differ by more than 5 % of the larger',
  source: 'Mean of forward and reverse V/I: SEMI MF1527-1104 eq. R2-3',
} as const satisfies Formula

export const REPEATABILITY = {
  title: 'Repeatability from the readings',
  formula: 'u = s(d)/2, d = 2 (r_f − r_r)/(r_f + r_r)',
  where: 'r the ratios V/I of both polarities, s(d) over the lot without what lies beyond 5 median deviations',
  source: 'standard deviation of a mean of two from that of their difference',
} as const satisfies Formula

export const PROPAGATION = {
  title: 'Propagation of uncertainty',
  formula: 'u_c² = Σ (∂f/∂x_i)² u_i²; of a mean of n sites Σ shared + Σ independent/n',
  where: 'first derivatives of the whole chain at each site; components uncorrelated with each other',
  source: 'JCGM 100:2008, 5.1.2',
} as const satisfies Formula

export const COVERAGE = {
  title: 'Expanded uncertainty',
  formula: 'U = k u_c, k of Student’s t at ν_eff = u_c⁴/Σ(u_i⁴/ν_i)',
  source: 'JCGM 100:2008, G.4.1 (Welch-Satterthwaite) and G.3.2',
} as const satisfies Formula
