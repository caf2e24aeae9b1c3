import { requireRange } from '../problems/problem'
import type { ProfileId } from './layer-kind'
import { layerProfile } from './profiles/registry'

export const JUNCTION_SOURCE = 'J. Crank, The Mathematics of Diffusion, 2nd ed. (1975) 2.2 and 3.3'

export interface JunctionQuestion {
  readonly profile: ProfileId
  readonly surface_cm3: number
  readonly background_cm3: number
  /** sqrt(D t) of a gaussian or erfc profile; the decay length of an exponential. */
  readonly length_um: number
}

/**
 * Depth at which a diffused profile has come down to the background. It is the `depth_um` of a doped layer.
 *
 * @param surface_cm3    N_s, above the background [cm^-3]
 * @param background_cm3 N_B > 0 [cm^-3]
 * @param length_um      > 0 [um]
 * @returns depth [um]: gaussian 2 sqrt(Dt ln(N_s/N_B)), erfc 2 sqrt(Dt) erfc^-1(N_B/N_s), exponential L ln(N_s/N_B);
 *          0 as N_s comes down to N_B
 * @throws CoreError out-of-range; not-applicable for a uniform profile
 *
 * Assumes one constant diffusion coefficient.
 * Source: J. Crank, The Mathematics of Diffusion, 2nd ed. (1975) sections 2.2 and 3.3 (from memory).
 */
export function junctionDepth_um({ profile, surface_cm3, background_cm3, length_um }: JunctionQuestion): number {
  requireRange('background concentration', background_cm3, 'cm^-3', Number.MIN_VALUE, Number.MAX_VALUE)
  requireRange('surface concentration', surface_cm3, 'cm^-3', background_cm3 * (1 + Number.EPSILON), Number.MAX_VALUE)
  requireRange('diffusion length', length_um, 'um', Number.MIN_VALUE, Number.MAX_VALUE)
  return length_um * layerProfile(profile).depthInLengths(background_cm3 / surface_cm3)
}
