import { gaussLegendre, integratePanels } from '../numeric/quadrature'
import { conductivityOf, joins_cm3 } from './doped-silicon'
import type { DopedSilicon } from './doped-silicon'
import type { LayerProfile } from './profiles/profile'

export const IRVIN = 'J. C. Irvin, Bell Syst. Tech. J. 41 (1962) 387'

export interface LayerDoping {
  readonly silicon: DopedSilicon
  readonly profile: LayerProfile
  readonly surface_cm3: number
  readonly background_cm3: number
}

/**
 * Sixteen points on panels over which ln N falls by no more than 2. Mobility models bend on that scale (their terms are
 * powers of N up to the second), so each panel is good to about 1e-13.
 */
const RULE = gaussLegendre(16)
const PANEL_FALL = 2

/**
 * Sheet resistance times junction depth of a layer whose dopant falls from its surface density to that of a background
 * of the other type. Divide by the depth to get sheet resistance; the product does not depend on it.
 *
 * @param surface_cm3    N_s > N_B [cm^-3]
 * @param background_cm3 N_B > 0 [cm^-3]
 * @returns product [ohm um]: 1e4 / Integral_0^1 q mu(N + N_B) (N - N_B) d eta, eta = x / x_j; without limit as N_s
 *          comes down to N_B
 *
 * Assumes full ionisation, carriers N - N_B without depletion at the junction, and the mobility of the total impurity
 * density N + N_B. With the mobility of N alone the product is up to 2 % smaller at N_s = 100 N_B, less above.
 * Accuracy: quadrature to 1e-12 relative; two sound mobility models differ by up to 11 %.
 * Source: J. C. Irvin, Bell Syst. Tech. J. 41 (1962) 387-410. His printed curves take mobilities of that time and can be
 * read to 10 to 20 %: here the same integral is taken with the mobility model of choice.
 */
export function sheetDepthProduct_ohm_um({ silicon, profile, surface_cm3, background_cm3 }: LayerDoping): number {
  const ratio = background_cm3 / surface_cm3
  const shape = profile.shape(ratio)
  const conductivity = conductivityOf(silicon)
  const integrand = (eta: number): number => {
    const dopant_cm3 = surface_cm3 * shape(eta)
    return conductivity(dopant_cm3 - background_cm3, dopant_cm3 + background_cm3)
  }
  const levels = joins_cm3(silicon).map((join) => (join - background_cm3) / surface_cm3)
  return 1e4 / integratePanels(integrand, panelEdges(profile, ratio, levels), RULE)
}

/** Equal falls of ln N from surface to junction, and the depths of `levels`, ascending. */
function panelEdges(profile: LayerProfile, ratio: number, levels: readonly number[]): readonly number[] {
  const fall = -Math.log(ratio)
  const panels = Math.max(1, Math.ceil(fall / PANEL_FALL))
  const edges = [0, 1]
  for (let i = 1; i < panels; i++) edges.push(profile.depthOf(Math.exp((-fall * i) / panels), ratio))
  for (const level of levels) if (level > ratio && level < 1) edges.push(profile.depthOf(level, ratio))
  edges.sort((a, b) => a - b)
  return edges.filter((edge, i) => i === 0 || edge > edges[i - 1])
}

/**
 * Mean over the layer's depth of its net density N - N_B; times the depth it is the active dose.
 *
 * @returns density [cm^-3], in closed form; 0 as N_s comes down to N_B
 */
export function meanNetDensity_cm3({
  profile,
  surface_cm3,
  background_cm3,
}: Pick<LayerDoping, 'profile' | 'surface_cm3' | 'background_cm3'>): number {
  return surface_cm3 * profile.mean(background_cm3 / surface_cm3) - background_cm3
}
