import { requireRange } from '../problems/problem'
import { INTRINSIC_DENSITY_RANGE_K, misiakosTsamakisLaw_cm3 } from '../silicon/intrinsic-density'

/** As far as the mobility models go [K]. */
export const INTRINSIC_CARRIERS_RANGE_K = { min: INTRINSIC_DENSITY_RANGE_K.min, max: 500 } as const

/**
 * Intrinsic carrier density of silicon over the whole range of the mobility models: the tool's own to 340 K, and from there carried on
 * by the same temperature law, so that a table over temperature has no jump.
 *
 * @param temperature_K 78 to 500 [K]
 * @returns density [cm^-3], as `intrinsicDensity_cm3` to 340 K; 2.8e14 at 500 K
 * @throws CoreError out-of-range
 *
 * Accuracy: above 340 K it is an extrapolation, which `isCarriedOn` tells; within 3 % of Sproul and Green to 375 K, and within
 * 4 % at 500 K of sqrt(Nc Nv) exp(-Eg/2kT) with the effective masses of that temperature (tested).
 * Source: K. Misiakos, D. Tsamakis, J. Appl. Phys. 74 (1993) 3293-3297.
 */
export function intrinsicCarriers_cm3({ temperature_K }: { readonly temperature_K: number }): number {
  requireRange('temperature', temperature_K, 'K', INTRINSIC_CARRIERS_RANGE_K.min, INTRINSIC_CARRIERS_RANGE_K.max)
  return misiakosTsamakisLaw_cm3(temperature_K)
}

/** Whether the temperature is beyond what the relation was measured over. */
export function isCarriedOn(temperature_K: number): boolean {
  return temperature_K > INTRINSIC_DENSITY_RANGE_K.max
}
