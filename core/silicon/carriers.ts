import { requireRange } from '../problems/problem'

export interface Carriers {
  readonly electrons_cm3: number
  readonly holes_cm3: number
}

/**
 * Electron and hole densities at equilibrium, from charge neutrality and n p = ni^2.
 *
 * @param netDoping_cm3        donors less acceptors, negative in p-type, |N| <= 1e22 [cm^-3]
 * @param intrinsicDensity_cm3 0 to 1e20 [cm^-3]
 * @returns densities [cm^-3]: n = p = ni undoped; n = N, p = ni^2 / N when N >> ni
 * @throws CoreError out-of-range
 *
 * Assumes every dopant is ionised and Boltzmann statistics (no band gap narrowing).
 * Accuracy: rounding alone, for the minority carrier too: only sums of positive numbers, never a difference.
 */
export function carriers({
  netDoping_cm3,
  intrinsicDensity_cm3,
}: {
  readonly netDoping_cm3: number
  readonly intrinsicDensity_cm3: number
}): Carriers {
  requireRange('net doping', netDoping_cm3, 'cm^-3', -1e22, 1e22)
  requireRange('intrinsic density', intrinsicDensity_cm3, 'cm^-3', 0, 1e20)
  const half = Math.abs(netDoping_cm3) / 2
  const majority = half + Math.sqrt(half * half + intrinsicDensity_cm3 * intrinsicDensity_cm3)
  const minority = majority === 0 ? 0 : intrinsicDensity_cm3 * (intrinsicDensity_cm3 / majority)
  return netDoping_cm3 < 0
    ? { electrons_cm3: minority, holes_cm3: majority }
    : { electrons_cm3: majority, holes_cm3: minority }
}
