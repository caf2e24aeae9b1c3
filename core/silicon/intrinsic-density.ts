import { requireRange } from '../problems/problem'

/** Default of the tool, and its published range [K]. */
export const INTRINSIC_DENSITY_RANGE_K = { min: 78, max: 340 } as const
export const INTRINSIC_DENSITY_SOURCE = 'K. Misiakos, D. Tsamakis, J. Appl. Phys. 74 (1993) 3293'

/**
 * Intrinsic carrier density of silicon, from capacitance of p-i-n diodes. The tool's default.
 *
 * @param temperature_K 78 to 340 [K]
 * @returns density [cm^-3]: 9.70e9 at 300 K, 7.01e9 at 23 C
 * @throws CoreError out-of-range
 *
 * Accuracy: within 4.3 % of the paper's own points from 195 to 320 K.
 * Source: K. Misiakos, D. Tsamakis, J. Appl. Phys. 74 (1993) 3293-3297.
 */
export function misiakosTsamakisDensity_cm3({ temperature_K }: { readonly temperature_K: number }): number {
  requireRange('temperature', temperature_K, 'K', INTRINSIC_DENSITY_RANGE_K.min, INTRINSIC_DENSITY_RANGE_K.max)
  return misiakosTsamakisLaw_cm3(temperature_K)
}

/** The same without its range: beyond 340 K an extrapolation, and whoever uses it says so. */
export function misiakosTsamakisLaw_cm3(temperature_K: number): number {
  return 5.29e19 * Math.pow(temperature_K / 300, 2.54) * Math.exp(-6726 / temperature_K)
}

/**
 * Intrinsic carrier density of silicon, from minority carrier current in solar cells; beside the default, and above 340 K.
 *
 * @param temperature_K 275 to 375 [K]
 * @returns density [cm^-3]: 1.004e10 at 300 K, 7.26e9 at 23 C
 * @throws CoreError out-of-range
 *
 * Accuracy: 3.5 % above Misiakos and Tsamakis at 23 to 27 C.
 * Source: A. B. Sproul, M. A. Green, J. Appl. Phys. 70 (1991) 846-854.
 */
export function sproulGreenDensity_cm3({ temperature_K }: { readonly temperature_K: number }): number {
  requireRange('temperature', temperature_K, 'K', 275, 375)
  return 9.15e19 * Math.pow(temperature_K / 300, 2) * Math.exp(-6880 / temperature_K)
}

/** The tool's intrinsic density [cm^-3]: Misiakos and Tsamakis, 78 to 340 K. */
export const intrinsicDensity_cm3 = misiakosTsamakisDensity_cm3

/** The product of electron and hole densities in equilibrium [cm^-6], 78 to 340 K: the intrinsic density squared. */
export function carrierProduct_cm6({ temperature_K }: { readonly temperature_K: number }): number {
  return intrinsicDensity_cm3({ temperature_K }) ** 2
}
