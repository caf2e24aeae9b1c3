/** Uniformly doped silicon at one temperature: everything that its concentration decides. */
import { carriers } from '../silicon/carriers'
import type { Dopant } from '../silicon/dopants'
import type { Carrier, MobilityModel } from '../silicon/mobility-model'
import { isResistivityCurve } from '../silicon/mobility/mf723'
import { isAcceptor } from '../silicon/dopants'
import { resistivity_ohm_cm } from '../silicon/resistivity'
import { intrinsicCarriers_cm3 } from './intrinsic-carriers'

/** As `Material` of silicon/, with the dopant that intrinsic silicon may do without. */
export interface DopedPiece {
  /** Absent only at concentration 0, where phosphorus's fit stands for the electrons. */
  readonly dopant?: Dopant
  readonly mobility: MobilityModel
  readonly temperature_K: number
  readonly intrinsicDensity_cm3?: number
}

export interface DopedState {
  readonly concentration_cm3: number
  readonly intrinsicDensity_cm3: number
  readonly electrons_cm3: number
  readonly holes_cm3: number
  readonly majority: Carrier | null
  /** null for the minority carrier where the model says nothing of it. */
  readonly electronMobility_cm2_per_Vs: number | null
  readonly holeMobility_cm2_per_Vs: number | null
  /** Of the majority carriers; null in intrinsic silicon. */
  readonly mobility_cm2_per_Vs: number | null
  readonly resistivity_ohm_cm: number
}

/** The piece in the terms of silicon/, its intrinsic density decided. */
export function materialOf({ dopant = 'phosphorus', mobility, temperature_K, intrinsicDensity_cm3 }: DopedPiece) {
  const density_cm3 = intrinsicDensity_cm3 ?? intrinsicCarriers_cm3({ temperature_K })
  return { dopant, mobility, temperature_K, intrinsicDensity_cm3: density_cm3 }
}

/**
 * Carriers, mobilities and resistivity of a concentration.
 *
 * @param concentration_cm3 of the dopant, 0 (intrinsic) to 1e22; a published conversion over its own range only [cm^-3]
 * @returns densities and mobilities of both carriers, resistivity [ohm cm] by both
 * @throws CoreError out-of-range
 *
 * Assumes full ionisation; see `resistivity_ohm_cm` and `carriers`.
 */
export function dopedState(piece: DopedPiece, concentration_cm3: number): DopedState {
  const material = materialOf(piece)
  const { dopant, mobility, temperature_K, intrinsicDensity_cm3 } = material
  const resistivity = resistivity_ohm_cm({ ...material, concentration_cm3 })
  const netDoping_cm3 = isAcceptor(dopant) ? -concentration_cm3 : concentration_cm3
  const majority = concentration_cm3 === 0 ? null : isAcceptor(dopant) ? 'hole' : 'electron'
  const mobilityOf = (carrier: Carrier): number | null =>
    isResistivityCurve(mobility) && carrier !== majority
      ? null
      : mobility.mobility_cm2_per_Vs({ carrier, dopant, impurity_cm3: concentration_cm3, temperature_K })
  const electron = mobilityOf('electron')
  const hole = mobilityOf('hole')
  return {
    concentration_cm3,
    intrinsicDensity_cm3,
    ...carriers({ netDoping_cm3, intrinsicDensity_cm3 }),
    majority,
    electronMobility_cm2_per_Vs: electron,
    holeMobility_cm2_per_Vs: hole,
    mobility_cm2_per_Vs: majority === null ? null : majority === 'hole' ? hole : electron,
    resistivity_ohm_cm: resistivity,
  }
}
