/** What every layer of doped silicon is made of, and the checks all of them share. */
import { CoreError, requireRange } from '../problems/problem'
import { isAcceptor } from '../silicon/dopants'
import type { Dopant } from '../silicon/dopants'
import type { MobilityModel } from '../silicon/mobility-model'
import { isResistivityCurve } from '../silicon/mobility/mf723'
import { ELEMENTARY_CHARGE_C } from '../units/constants'
import type { Background, DepthTable, ProfileId } from './layer-kind'

export interface DopedSilicon {
  readonly dopant: Dopant
  readonly mobility: MobilityModel
  readonly temperature_K: number
}

/** A named profile takes one of depth and diffusion length, a tabulated one its table and neither of them. */
export interface DopedLayerSettings extends DopedSilicon {
  readonly profile: ProfileId | 'tabulated'
  /** Junction depth: where the profile has come down to the background [um]. */
  readonly depth_um?: number | undefined
  /** sqrt(D t) of a gaussian or erfc profile, the decay length of an exponential one [um]; the depth follows from it. */
  readonly diffusionLength_um?: number | undefined
  readonly table?: DepthTable | undefined
  readonly background: Background
}

/** Densities a layer is looked for in [cm^-3]; a mobility model's own range may be narrower, and the caller flags that. */
export const LARGEST_DENSITY_CM3 = 1e21
export const BACKGROUND_RANGE_CM3 = { min: 1e10, max: 1e20 } as const
/** A layer must exceed its background by this much for a junction to be spoken of. */
const LEAST_EXCESS = 1.01

/** Throws unless the model knows the dopant and the temperature. A model at one temperature is used as it stands. */
export function requireDopedSilicon({ dopant, mobility, temperature_K }: DopedSilicon): void {
  if (!mobility.dopants.includes(dopant)) {
    throw new CoreError({
      kind: 'not-applicable',
      what: `mobility model ${mobility.id}`,
      why: `it has no values for ${dopant}; it knows ${mobility.dopants.join(', ')}`,
    })
  }
  const { min, max } = mobility.temperature_K
  if (min === max) requireRange('temperature', temperature_K, 'K', 1, 1000)
  else requireRange('temperature', temperature_K, 'K', min, max)
}

/** Throws unless the background has a density we can use and makes silicon of the other type. */
export function requireJunction(dopant: Dopant, background: Background): void {
  requireRange(
    'background concentration',
    background.concentration_cm3,
    'cm^-3',
    BACKGROUND_RANGE_CM3.min,
    BACKGROUND_RANGE_CM3.max,
  )
  if (isAcceptor(dopant) === isAcceptor(background.dopant)) {
    const type = isAcceptor(dopant) ? 'p' : 'n'
    throw new CoreError({
      kind: 'not-applicable',
      what: `${dopant} layer in ${background.dopant}-doped silicon`,
      why: `both make silicon ${type}-type, so no junction isolates the layer; the background must be of the other type`,
    })
  }
}

/** The least surface or peak density that is looked for [cm^-3]. */
export function leastDensity_cm3(mobility: MobilityModel, background_cm3: number): number {
  // A constant mobility has no lower end of its own.
  return Math.max(LEAST_EXCESS * background_cm3, mobility.range_cm3.min, BACKGROUND_RANGE_CM3.min)
}

/** Conductivity [S/cm] of silicon with so many majority carriers among so many ionised impurities. */
export function conductivityOf({ dopant, mobility, temperature_K }: DopedSilicon) {
  const carrier = isAcceptor(dopant) ? 'hole' : 'electron'
  return (carriers_cm3: number, impurity_cm3: number): number =>
    ELEMENTARY_CHARGE_C * carriers_cm3 * mobility.mobility_cm2_per_Vs({ carrier, dopant, impurity_cm3, temperature_K })
}

/**
 * Impurity densities at which the model passes from one fit to another and jumps. Integrals are split and tables are
 * cut there: across a jump neither would have its digits.
 */
export function joins_cm3({ dopant, mobility }: DopedSilicon): readonly number[] {
  if (!isResistivityCurve(mobility)) return []
  return mobility
    .curvePieces(dopant)
    .slice(1)
    .map((piece) => piece.min_cm3)
}
