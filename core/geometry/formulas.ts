/** Four-point probe geometry as formulas; the outlines' own stand in `registry.ts`. */
import type { Formula } from '../units/formula'
import { DUAL_QUADRATIC_RATIO, DUAL_SOURCE } from './dual'
import { MAX_THICKNESS_RATIO, THICKNESS_SOURCE } from './thickness'
import { DUAL_THICKNESS_SOURCE } from './dual-thickness'

export const FOUR_TERMINALS = {
  title: 'Sheet resistance from V/I',
  formula: 'R_s = C · V/I, C = 2π/T, T = L(h,k) + L(l,s) − L(h,s) − L(l,k)',
  where:
    'L(i,j): log distance of two pins on the outline (below); current in at s, out at k; voltage from h to l. Configuration A: current 1-4, voltage 2-3; B: current 1-3, voltage 2-4',
  range: 'point contacts on a thin uniform sheet with insulated edges; exact but for rounding',
  source: 'L. B. Valdes, Proc. IRE 42 (1954) 420; configurations: SEMI MF1529-1104',
} as const satisfies Formula

export const THICKNESS = {
  title: 'Thickness factor',
  formula:
    'F(w/S) = 2 ln 2 · (S/w) / {1 + 4 (S/w) Σ_n≥1 (±1)ⁿ [((S/w)² + 4n²)^−½ − (4(S/w)² + 4n²)^−½]}; ρ = C (V/I) w F',
  where:
    'w thickness, S pin spacing; signs alternate on a conducting back. For unequal pins the same images pin by pin',
  range: `w/S up to ${MAX_THICKNESS_RATIO}, no edge within several pitches; 1e-12`,
  source: THICKNESS_SOURCE,
} as const satisfies Formula

export const DUAL = {
  title: 'Dual configuration',
  formula: 'exp(2π R_A/R_s) − exp(2π R_B/R_s) = 1',
  where: 'R_A, R_B: V/I in configurations A and B',
  range: `exact for pins in line at any spacings, on an infinite sheet or along a diameter; R_A/R_B is flagged outside ${DUAL_QUADRATIC_RATIO.min} to ${DUAL_QUADRATIC_RATIO.max}`,
  source: DUAL_SOURCE,
} as const satisfies Formula

export const DUAL_THICKNESS = {
  title: 'Thickness factor of the dual configuration',
  formula: 'F = R_s,thin/R_s,slab, both by the dual relation from R_A, R_B of the slab’s images',
  range: 'insulating back, equal pins, no edge within several pitches; 1e-12',
  source: DUAL_THICKNESS_SOURCE,
} as const satisfies Formula

export const EDGE_AND_THICKNESS = {
  title: 'Edge factor and thickness factor together',
  formula:
    'error of the product = C_edge F/C_exact − 1, C_exact from pins and mirror images with the slab’s own log distance',
  range: 'a site is flagged where it exceeds 0.1 %',
  source:
    'derived: images as L. B. Valdes, Proc. IRE 42 (1954) 420; slab as A. Uhlir, Bell Syst. Tech. J. 34 (1955) 105',
} as const satisfies Formula
