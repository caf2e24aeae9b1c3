/** Layers as formulas; those of the layer kinds and profiles stand in their registers. */
import type { Formula } from '../units/formula'
import { JUNCTION_SOURCE } from './junction-depth'
import { layerProfiles } from './profiles/registry'
import { TABLE_SOURCE } from './tabulated-layer'

export const JUNCTION_DEPTH = {
  title: 'Junction depth from the diffusion length',
  formula: layerProfiles
    .flatMap(({ title, depthFormula }) => (depthFormula ? `${title}: ${depthFormula}` : []))
    .join('; '),
  where: 'N_s at the surface, N_B of the background; one constant diffusion coefficient',
  source: JUNCTION_SOURCE,
} satisfies Formula

export const TABULATED_PROFILE = {
  title: 'Tabulated profile',
  formula: 'N(x) = k N_table(x), k from 1/R_s = ∫ q μ(N + N_B) (N − N_B) dx where N > N_B',
  where: 'ln N straight between the points, the first value up to the surface',
  range: 'the integral of these lines to 1e-11',
  source: TABLE_SOURCE,
} as const satisfies Formula
