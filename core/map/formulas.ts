/** Surfaces between the sites as formulas. */
import type { Formula } from '../units/formula'
import { GAUSSIAN_PROCESS_SOURCE } from './gaussian-process'

export const THIN_PLATE_SPLINE = {
  title: 'Thin-plate spline through the sites',
  formula: 's(p) = Σ c_i U(|p − p_i|) + a + b x + c y, U(r) = r² ln r, Σ c_i = Σ c_i x_i = Σ c_i y_i = 0',
  range: 'inside the convex hull of the sites',
  source: 'J. Duchon, in: Constructive Theory of Functions of Several Variables, Springer (1977) 85 (from memory)',
} as const satisfies Formula

export const GAUSSIAN_PROCESS = {
  title: 'Gaussian process between the sites',
  formula: 'y = f β + Z + e, cov Z = s² (1 + d + d²/3) exp(−d), d = √5 r/l, var e = nugget',
  where:
    'f a polynomial trend; length l, s and nugget of the largest restricted likelihood, the nugget not below the repeatability',
  source: GAUSSIAN_PROCESS_SOURCE,
} as const satisfies Formula

export const TREND = {
  title: 'Trend surface of the patterns',
  formula:
    'value = Σ a_j Z_j(r/R, θ) by least squares, Z_j orthonormal Zernike polynomials to degree 4; share of a pattern = its sequential sum of squares over the total',
  where: 'tilt j = 1, 2; bowl j = 4; R the larger of the usable radius and that of the outermost site',
  source:
    'N. R. Draper, H. Smith, Applied Regression Analysis, 3rd ed. (1998) ch. 6 (from memory); Zernike polynomials',
} as const satisfies Formula

export const OUTLYING_SITE = {
  title: 'One site apart from the pattern',
  formula: 'F = g (ν − 1)/(SS_res − g), g = max r²/(1 − h); p times the number of sites',
  where: 'r the residual and h the leverage of a site in the trend surface, ν its residual degrees of freedom',
  source: 'R. D. Cook, S. Weisberg, Residuals and Influence in Regression (1982), 2.2 (from memory)',
} as const satisfies Formula
