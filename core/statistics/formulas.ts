/** Statistics as formulas; the non-uniformities' own stand in `nonuniformity.ts`. */
import type { Formula } from '../units/formula'

const HANDBOOK = 'NIST/SEMATECH e-Handbook of Statistical Methods'

export const INTERVALS = {
  title: 'Intervals of mean and s',
  formula: 'x̄ ± t s/√n, t of n − 1 degrees of freedom; s √((n − 1)/χ²) from both quantiles of χ²',
  range: 'independent values of a normal distribution',
  source: `${HANDBOOK}, 1.3.5.2 and 1.3.5.8`,
} as const satisfies Formula

export const AREA_WEIGHTED = {
  title: 'Area-weighted mean and s',
  formula: 'm = Σ w v/V₁, s² = Σ w (v − m)²/(V₁ − V₂/V₁), V₁ = Σ w, V₂ = Σ w²',
  where: 'w the area that a site stands for: its share of a ring, else its Voronoi cell, within the usable area',
  source: 'M. Galassi et al., GNU Scientific Library Reference Manual, weighted samples (from memory)',
} as const satisfies Formula

export const OUTLIERS = {
  title: 'Outliers: generalized ESD test',
  formula:
    'R_i = max|x − x̄|/s of the n_i values left; found are as many as the largest i with R_i > λ_i = (n_i − 1) t/√((n_i − 2 + t²) n_i)',
  where: 't of n_i − 2 degrees of freedom at 1 − α/(2 n_i)',
  range: 'good for 25 values or more, fair from 15',
  source: `B. Rosner, Technometrics 25 (1983) 165; ${HANDBOOK}, 1.3.5.17.3`,
} as const satisfies Formula

export const CAPABILITY = {
  title: 'Capability Cp, Cpk and their intervals',
  formula: 'C_p = (upper − lower)/6s; C_pk = min(mean − lower, upper − mean)/3s; C_pk ± z √(1/9n + C_pk²/(2(n − 1)))',
  range: 'independent values of one normal distribution; the interval of C_pk is fair from 30 values',
  source: `A. F. Bissell, Appl. Stat. 39 (1990) 331 (from memory); ${HANDBOOK}, 6.1.6`,
} as const satisfies Formula

export const NORMALITY = {
  title: 'Normality: Anderson–Darling test',
  formula:
    'A² = −n − Σ (2i − 1)/n [ln Φ(y_i) + ln(1 − Φ(y_n+1−i))], y = (x − x̄)/s sorted; A*² = A² (1 + 0.75/n + 2.25/n²)',
  range: '8 values or more',
  source: "R. B. D'Agostino, M. A. Stephens, Goodness-of-Fit Techniques (1986) tables 4.7 and 4.9 (from memory)",
} as const satisfies Formula

export const RADIAL_VARIATION = {
  title: 'Radial variation',
  formula: '100 (mean of the circle − centre)/centre; its largest 100 (max − min)/min',
  where: 'circles at half the radius and near the edge',
  source: 'SEMI MF81 (formula from memory; standard’s text not read)',
} as const satisfies Formula

export const VARIANCE_COMPONENTS = {
  title: 'Components of variance',
  formula: 'within = MS_w, between = (MS_b − MS_w)/n₀, n₀ = (N − Σ n_i²/N)/(k − 1)',
  where: 'k wafers of n_i sites, N in all; a negative estimate is left as it is',
  source: 'S. R. Searle, G. Casella, C. E. McCulloch, Variance Components (1992) ch. 3 (from memory)',
} as const satisfies Formula

export const VARIANCE_COMPONENT_INTERVAL = {
  title: 'Interval of a component of variance',
  formula: '(MS₁ − MS₂)/n₀ ± modified large-sample limits from the F and χ² quantiles of both mean squares',
  range: 'approximate: coverage to a point or so of percent',
  source:
    'N. Ting, R. K. Burdick, F. A. Graybill, S. Jeyaratnam, T.-F. C. Lu, J. Stat. Comput. Simul. 35 (1990) 135 (from memory)',
} as const satisfies Formula

export const QUANTILES = {
  title: 'Median and quantiles',
  formula:
    'linear between the sorted values x_k at (k − 1)/(n − 1); the median of an even count is the mean of the middle two',
  source: 'R. J. Hyndman, Y. Fan, Am. Stat. 50 (1996) 361, definition 7',
} as const satisfies Formula
