import { prepareDiffusedLayer } from './diffused-layer'
import { requireDopedSilicon, requireJunction } from './doped-silicon'
import type { DopedLayerSettings } from './doped-silicon'
import type { LayerKind, PreparedLayer } from './layer-kind'
import { IRVIN } from './profile-integral'
import { prepareTabulatedLayer } from './tabulated-layer'

export type { DopedLayerSettings }

/**
 * A diffused or annealed layer that its junction isolates, after Irvin: from sheet resistance the surface concentration
 * N_s (of a tabulated profile the peak), the active dose Integral (N - N_B) dx, and the mean resistivity R_s x_j.
 *
 * Covers N_s from 1.01 N_B (or the mobility model's lower end) to 1e21 cm^-3; outside, concentration and dose are NaN.
 * The named profiles stand in `diffused-layer.ts`, the tabulated one in `tabulated-layer.ts`, the integral and its
 * assumptions in `profile-integral.ts`.
 * @throws CoreError from prepare: background of the layer's own type, unknown dopant, quantities out of range, settings
 * that the profile doesn't take or lacks
 */
export const dopedLayer = {
  id: 'doped-layer',
  title: 'Doped layer over a junction',
  gives: ['resistivity', 'concentration', 'dose'],
  concentrationMeans: 'surface concentration (peak concentration of a tabulated profile)',
  formula:
    '1/R_s = ∫ q μ(N + N_B) (N − N_B) dx where N > N_B, solved for the surface density N_s; dose ∫ (N − N_B) dx; mean resistivity R_s x_j',
  sources: [IRVIN],
  conductsThroughWafer: false,
  prepare: prepareDopedLayer,
} as const satisfies LayerKind<DopedLayerSettings>

function prepareDopedLayer(settings: DopedLayerSettings): PreparedLayer {
  requireDopedSilicon(settings)
  requireJunction(settings.dopant, settings.background)
  return settings.profile === 'tabulated' ? prepareTabulatedLayer(settings) : prepareDiffusedLayer(settings)
}
