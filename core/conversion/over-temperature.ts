/** The same piece of silicon over temperature. */
import { CoreError, requireRange } from '../problems/problem'
import type { MobilityModel } from '../silicon/mobility-model'
import { mobilityModels } from '../silicon/mobility/registry'
import { CELSIUS_ZERO_K } from '../units/constants'
import type { Resistor, TemperatureRow } from './conversion'
import { resistanceOf, sheetResistanceOf } from './dimensions'
import { dopedState } from './doped-state'
import type { DopedPiece } from './doped-state'
import { isCarriedOn } from './intrinsic-carriers'

/** The models that tell one temperature from another. */
export const temperatureModels: readonly MobilityModel[] = mobilityModels.filter(
  ({ temperature_K: { min, max } }) => min > 0 && min < max,
)

const MOST_ROWS = 1000

/** Temperatures [K] from low to high, both counted, in equal steps given in degrees Celsius. @throws CoreError out-of-range */
export function temperatureSeries_K({
  low_C,
  high_C,
  step_C,
}: {
  readonly low_C: number
  readonly high_C: number
  readonly step_C: number
}): readonly number[] {
  requireRange('lowest temperature', low_C, '°C', -CELSIUS_ZERO_K, 1000)
  requireRange('highest temperature', high_C, '°C', low_C, 1000)
  requireRange('step of temperature', step_C, '°C', 1e-3, 1000)
  const count = Math.floor((high_C - low_C) / step_C + 1e-9) + 1
  requireRange('number of temperatures', count, '', 1, MOST_ROWS)
  return Array.from({ length: count }, (_, i) => kelvinOf(low_C + i * step_C))
}

/** Without the noise of the sum: -50 C is 223.15 K. */
export function kelvinOf(temperature_C: number): number {
  return Math.round((temperature_C + CELSIUS_ZERO_K) * 1e9) / 1e9
}

export interface PieceOverTemperature {
  /** Its own temperature is not used. */
  readonly piece: DopedPiece
  readonly concentration_cm3: number
  readonly thickness_um: number | undefined
  readonly resistor: Resistor | undefined
  readonly temperatures_K: readonly number[]
}

/**
 * Carriers, mobility, resistivity and what the dimensions make of it, a row a temperature.
 *
 * @param concentration_cm3 of the dopant, the same throughout: 0 (intrinsic) to 1e22 [cm^-3]
 * @param temperatures_K    each in the range of the mobility model and of `intrinsicCarriers_cm3` [K]
 * @returns a row a temperature: resistivity rises with temperature while mobility rules, and falls once intrinsic carriers do
 * @throws CoreError not-applicable for a model that doesn't know temperature, or an intrinsic density held fixed; out-of-range
 *
 * Assumes every dopant ionised (below some 200 K dopants freeze out) and dimensions that don't grow with temperature.
 * Sources: those of the mobility model and of `intrinsicCarriers_cm3`.
 */
export function overTemperature(query: PieceOverTemperature): readonly TemperatureRow[] {
  const { piece, temperatures_K } = query
  requireTemperatureModel(piece)
  const { min, max } = piece.mobility.temperature_K
  for (const temperature_K of temperatures_K) requireRange('temperature in the table', temperature_K, 'K', min, max)
  return temperatures_K.map((temperature_K) => rowAt(query, temperature_K))
}

function requireTemperatureModel({ mobility, intrinsicDensity_cm3 }: DopedPiece): void {
  const what = 'a table over temperature'
  if (!temperatureModels.some(({ id }) => id === mobility.id)) {
    const known = temperatureModels.map(({ id }) => id).join(', ')
    const why = `the mobility model ${mobility.id} doesn't depend on temperature; those that do are ${known}`
    throw new CoreError({ kind: 'not-applicable', what, why })
  }
  if (intrinsicDensity_cm3 !== undefined) {
    const why = 'intrinsic density changes with temperature, so that no single one can be given'
    throw new CoreError({ kind: 'not-applicable', what, why })
  }
}

function rowAt(query: PieceOverTemperature, temperature_K: number): TemperatureRow {
  const { piece, concentration_cm3, thickness_um, resistor } = query
  const state = dopedState({ ...piece, temperature_K }, concentration_cm3)
  const sheet = thickness_um === undefined ? null : sheetResistanceOf(state.resistivity_ohm_cm, thickness_um)
  return {
    temperature_K,
    intrinsicDensity_cm3: state.intrinsicDensity_cm3,
    isIntrinsicCarriedOn: isCarriedOn(temperature_K),
    electrons_cm3: state.electrons_cm3,
    holes_cm3: state.holes_cm3,
    mobility_cm2_per_Vs: state.mobility_cm2_per_Vs,
    conductivity_S_per_cm: 1 / state.resistivity_ohm_cm,
    resistivity_ohm_cm: state.resistivity_ohm_cm,
    sheetResistance_ohm_sq: sheet,
    resistance_ohm: sheet === null || resistor === undefined ? null : resistanceOf(sheet, resistor),
  }
}
