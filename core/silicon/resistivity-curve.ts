/**
 * Resistivity of one material as a function of its net doping, in smooth pieces: what the conversions either way, for
 * one value or a million, share.
 */
import { CoreError, requireRange } from '../problems/problem'
import { ELEMENTARY_CHARGE_C } from '../units/constants'
import { carriers } from './carriers'
import { isAcceptor } from './dopants'
import type { Dopant } from './dopants'
import { intrinsicDensity_cm3 } from './intrinsic-density'
import type { CurvePiece } from './mf723'
import { isResistivityCurve } from './mobility/mf723'
import type { MobilityModel } from './mobility-model'

/** Everything of uniformly doped silicon but its concentration. */
export interface Material {
  readonly dopant: Dopant
  readonly mobility: MobilityModel
  /** 1 to 1000 [K]; a model made at one temperature is used as it stands. */
  readonly temperature_K: number
  /** Default: that of `intrinsicDensity_cm3` at the temperature, 78 to 340 K [cm^-3]. */
  readonly intrinsicDensity_cm3?: number
  /** Density of dopants of the other type, which compensate and scatter, 0 to 1e20 [cm^-3]. Default 0. */
  readonly otherImpurity_cm3?: number
}

/** Concentrations that are sought for a resistivity [cm^-3]. */
export const CONCENTRATION_RANGE_CM3 = { min: 1e12, max: 1e21 } as const

/** A smooth, falling stretch of resistivity over net doping (dopant less other impurity). */
export interface NetDopingPiece {
  readonly min_cm3: number
  readonly max_cm3: number
  resistivity_ohm_cm(netDoping_cm3: number): number
}

export function otherImpurityOf({ otherImpurity_cm3 = 0 }: Material): number {
  requireRange('density of other impurities', otherImpurity_cm3, 'cm^-3', 0, 1e20)
  return otherImpurity_cm3
}

/** Resistivity [ohm cm] by both carriers, over net doping [cm^-3]; the settings are checked once, here. */
export function resistivityByCarriers(material: Material): (netDoping_cm3: number) => number {
  const { dopant, mobility, temperature_K } = material
  requireRange('temperature', temperature_K, 'K', 1, 1000)
  const other = otherImpurityOf(material)
  const ni = material.intrinsicDensity_cm3 ?? intrinsicDensity_cm3({ temperature_K })
  const sign = isAcceptor(dopant) ? -1 : 1
  return (netDoping_cm3) => {
    const { electrons_cm3, holes_cm3 } = carriers({ netDoping_cm3: sign * netDoping_cm3, intrinsicDensity_cm3: ni })
    const impurity_cm3 = netDoping_cm3 + 2 * other
    const electron = mobility.mobility_cm2_per_Vs({ carrier: 'electron', dopant, impurity_cm3, temperature_K })
    const hole = mobility.mobility_cm2_per_Vs({ carrier: 'hole', dopant, impurity_cm3, temperature_K })
    return 1 / (ELEMENTARY_CHARGE_C * (electrons_cm3 * electron + holes_cm3 * hole))
  }
}

/** The standard's curve; with another impurity, its mobility at the total density and the net majority carriers. */
function piecesOfStandard(pieces: readonly CurvePiece[], other: number): readonly NetDopingPiece[] {
  return pieces
    .map(({ min_cm3, max_cm3, resistivity_ohm_cm }) => ({
      min_cm3: Math.max(CONCENTRATION_RANGE_CM3.min, min_cm3 - 2 * other),
      max_cm3: max_cm3 - 2 * other,
      resistivity_ohm_cm: (net: number) => ((net + 2 * other) / net) * resistivity_ohm_cm(net + 2 * other),
    }))
    .filter(({ min_cm3, max_cm3 }) => max_cm3 > min_cm3)
}

/**
 * The material's resistivity over net doping, from the least to the greatest concentration that is sought.
 *
 * One piece for a mobility model; two for arsenic by SEMI MF723, whose curve jumps down by 3.8 % at 1e19.
 * @throws CoreError out-of-range for a setting; not-applicable when resistivity rises with doping at 1e12 cm^-3, as it does
 * in p-type below about 1.2 ni (electrons, the faster carriers, are then driven out faster than holes come in)
 */
export function netDopingPieces(material: Material): readonly NetDopingPiece[] {
  const other = otherImpurityOf(material)
  if (isResistivityCurve(material.mobility)) {
    return piecesOfStandard(material.mobility.curvePieces(material.dopant), other)
  }
  const resistivity = resistivityByCarriers(material)
  const { min, max } = CONCENTRATION_RANGE_CM3
  if (!(resistivity(1.001 * min) < resistivity(min))) {
    throw new CoreError({
      kind: 'not-applicable',
      what: 'concentration from resistivity',
      why: 'at this intrinsic density two concentrations give the same resistivity',
    })
  }
  return [{ min_cm3: min, max_cm3: max - other, resistivity_ohm_cm: resistivity }]
}
