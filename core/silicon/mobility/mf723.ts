import { CoreError } from '../../problems/problem'
import { ELEMENTARY_CHARGE_C, STANDARD_TEMPERATURE_K } from '../../units/constants'
import { isAcceptor } from '../dopants'
import type { Dopant } from '../dopants'
import { MF723_PIECES, mf723Curve_ohm_cm, MF723_IN_WORDS } from '../mf723'
import type { CurvePiece } from '../mf723'
import type { MobilityModel, MobilityQuery } from '../mobility-model'

/** A model made from a resistivity curve: uncompensated material takes the curve itself, not the mobility. */
export interface ResistivityCurveModel extends MobilityModel {
  /** The published curve of a dopant, as smooth pieces from low density up; their ends are its range. */
  curvePieces(dopant: Dopant): readonly CurvePiece[]
}

export function isResistivityCurve(model: MobilityModel): model is ResistivityCurveModel {
  return 'curvePieces' in model
}

/**
 * Mobility that the standard's resistivity implies: 1 / (q N rho(N)) at 23 C, for use where a layer is integrated.
 *
 * @param carrier       the majority carrier of the dopant
 * @param dopant        boron, phosphorus, arsenic (phosphorus's curve below 1e19, its own from there)
 * @param impurity_cm3  1e12 to 1e21 boron, 5e20 phosphorus, 6e20 arsenic [cm^-3]
 * @param temperature_K not used: the standard is at 23 C
 * @returns mobility [cm^2/(V s)] per dopant atom, so that incomplete ionisation is inside it
 * @throws CoreError not-applicable for a minority carrier: the standard says nothing of it
 *
 * No range check, as with every model: outside the published range the curve runs on, and callers flag it.
 * Source: SEMI MF723 (ASTM F723-99).
 */
export function mf723Mobility_cm2_per_Vs({ carrier, dopant, impurity_cm3 }: MobilityQuery): number {
  if ((carrier === 'hole') !== isAcceptor(dopant)) {
    throw new CoreError({
      kind: 'not-applicable',
      what: 'minority carrier mobility',
      why: 'SEMI MF723 converts resistivity of majority carriers alone',
    })
  }
  return 1 / (ELEMENTARY_CHARGE_C * impurity_cm3 * mf723Curve_ohm_cm(dopant, impurity_cm3))
}

export const mf723 = {
  id: 'mf723',
  title: 'SEMI MF723 resistivity and dopant density',
  formula: 'ρ(N) of the standard at 23 °C; where a mobility is wanted, μ = 1/(q N ρ(N))',
  coefficients: MF723_IN_WORDS,
  source: 'SEMI MF723 (ASTM F723-99), after W. R. Thurber et al., J. Electrochem. Soc. 127 (1980) 1807 and 2291',
  dopants: ['boron', 'phosphorus', 'arsenic'],
  /** Where all three dopants are published; one dopant's own range is that of `curvePieces`. */
  range_cm3: { min: 1e12, max: 5e20 },
  temperature_K: { min: STANDARD_TEMPERATURE_K, max: STANDARD_TEMPERATURE_K },
  mobility_cm2_per_Vs: mf723Mobility_cm2_per_Vs,
  curvePieces: (dopant: Dopant) => MF723_PIECES[dopant],
} as const satisfies ResistivityCurveModel
