import { CoreError, requireRange } from '../../problems/problem'
import type { MobilityModel } from '../mobility-model'

export interface ConstantMobilities {
  readonly electrons_cm2_per_Vs: number
  readonly holes_cm2_per_Vs: number
}

/** The register's entry: it has no numbers of its own, so asked for a mobility it refuses. */
export const constant = {
  id: 'constant',
  title: 'Constant mobilities',
  formula: 'μ = the number given, at every density and temperature',
  coefficients: [],
  source: 'the two mobilities given in the procedure',
  dopants: ['boron', 'phosphorus', 'arsenic'],
  range_cm3: { min: 0, max: 1e22 },
  temperature_K: { min: 0, max: 1000 },
  mobility_cm2_per_Vs(): number {
    throw new CoreError({
      kind: 'not-applicable',
      what: 'constant mobility',
      why: 'it needs two numbers: the mobility of electrons and the mobility of holes, in cm^2/(V s)',
    })
  },
} as const satisfies MobilityModel

/**
 * The same mobility at every density and temperature, as in a calculation by hand.
 *
 * @param electrons_cm2_per_Vs > 0, <= 1e5 [cm^2/(V s)]
 * @param holes_cm2_per_Vs     > 0, <= 1e5 [cm^2/(V s)]
 * @throws CoreError out-of-range
 */
export function constantMobility({ electrons_cm2_per_Vs, holes_cm2_per_Vs }: ConstantMobilities): MobilityModel {
  requireRange('electron mobility', electrons_cm2_per_Vs, 'cm^2/(V s)', Number.MIN_VALUE, 1e5)
  requireRange('hole mobility', holes_cm2_per_Vs, 'cm^2/(V s)', Number.MIN_VALUE, 1e5)
  return {
    ...constant,
    mobility_cm2_per_Vs: ({ carrier }) => (carrier === 'electron' ? electrons_cm2_per_Vs : holes_cm2_per_Vs),
  }
}
