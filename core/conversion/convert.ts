/** One value at a time: V/I -> sheet resistance -> resistivity -> concentration and carriers, and back. */
import { CoreError } from '../problems/problem'
import { concentration_cm3 } from '../silicon/resistivity'
import { netDopingPieces } from '../silicon/resistivity-curve'
import type { Material } from '../silicon/resistivity-curve'
import { calculated, calculatedQuantity } from './calculated'
import type { Conversion, ConversionQuery, ConversionStep, TemperatureRow } from './conversion'
import { missingStep, reciprocalStep, resistanceStep, sheetResistanceStep } from './dimension-steps'
import { resistanceOf, sheetResistanceOf } from './dimensions'
import { dopedState, materialOf } from './doped-state'
import type { DopedState } from './doped-state'
import { electrical, NO_THICKNESS } from './electrical'
import type { Electrical } from './electrical'
import { overTemperature } from './over-temperature'
import { requireConversion, requireSilicon } from './require-conversion'
import { carrierSteps, conductivityStep, foundConcentration, givenConcentration } from './silicon-steps'

/** What is known along the way; `state` where the way reaches the concentration. */
interface Chain extends Electrical {
  readonly state: DopedState | null
}

/**
 * Converts one value as far as what is given allows, with the working of every step.
 *
 * @param start                what is known: V/I, sheet resistance, resistivity, concentration (0: intrinsic silicon), or the
 *                             resistance of a resistor; > 0 but for concentration
 * @param thickness_um         of what conducts, 0.001 to 20 000 [um]; with V/I the thickness factor is applied
 * @param dopant               boron, phosphorus, arsenic; without it the way ends at resistivity
 * @param temperature_K        of the value given, 78 to 500, and in the range of a model that has one [K]
 * @param intrinsicDensity_cm3 in place of the published one [cm^-3]
 * @param resistor             length and width, 0.001 to 1e7 [um]
 * @param temperatures_K       where the same piece is tabulated besides
 * @returns every quantity that is determined, null for the rest, whose step says why
 * @throws CoreError out-of-range; not-applicable where what is given doesn't fit together
 *
 * Assumes uniform doping through the thickness, every dopant ionised, and the value given at the temperature given: nothing is
 * corrected to a reference temperature. A resistivity that none, or more than one, of the concentrations
 * from 1e12 to 1e21 has ends the way and says so.
 * Sources: named step by step.
 */
export function convert(query: ConversionQuery): Conversion {
  requireConversion(query)
  const chain = query.start.from === 'concentration' ? forwards(query, query.start.concentration_cm3) : backwards(query)
  const { sheetResistance_ohm_sq, resistivity_ohm_cm, state, steps } = chain
  const resistor = resistorOf(query, sheetResistance_ohm_sq)
  return {
    sheetResistance_ohm_sq,
    resistivity_ohm_cm,
    conductivity_S_per_cm: resistivity_ohm_cm === null ? null : 1 / resistivity_ohm_cm,
    concentration_cm3: state && state.concentration_cm3,
    mobility_cm2_per_Vs: state && state.mobility_cm2_per_Vs,
    electrons_cm3: state && state.electrons_cm3,
    holes_cm3: state && state.holes_cm3,
    intrinsicDensity_cm3: state && state.intrinsicDensity_cm3,
    temperature_K: query.temperature_K,
    model: state && query.mobility,
    steps: [...steps, ...resistor.steps],
    resistance_ohm: resistor.resistance_ohm,
    temperatures: tabulated(query, state),
  }
}

function forwards(query: ConversionQuery, given_cm3: number): Chain {
  requireSilicon(query)
  const { thickness_um } = query
  const state = dopedState(query, given_cm3)
  const rho = state.resistivity_ohm_cm
  const steps = [
    givenConcentration(query, given_cm3),
    ...carrierSteps(query, state),
    conductivityStep(query, state),
    reciprocalStep('ρ', rho),
  ]
  if (thickness_um === undefined) return { sheetResistance_ohm_sq: null, resistivity_ohm_cm: rho, state, steps }
  const sheet = sheetResistanceOf(rho, thickness_um)
  const last = sheetResistanceStep(sheet, rho, thickness_um)
  return { sheetResistance_ohm_sq: sheet, resistivity_ohm_cm: rho, state, steps: [...steps, last] }
}

function backwards(query: ConversionQuery): Chain {
  const { sheetResistance_ohm_sq, resistivity_ohm_cm, steps } = electrical(query)
  if (resistivity_ohm_cm === null) return { sheetResistance_ohm_sq, resistivity_ohm_cm, state: null, steps }
  const silicon = siliconOf(query, resistivity_ohm_cm)
  return {
    sheetResistance_ohm_sq,
    resistivity_ohm_cm,
    state: silicon.state,
    steps: [...steps, reciprocalStep('σ', 1 / resistivity_ohm_cm), ...silicon.steps],
  }
}

interface Silicon {
  readonly state: DopedState | null
  readonly steps: readonly ConversionStep[]
}

/** The concentration that has this resistivity, and its carriers; or why there is none. */
function siliconOf(query: ConversionQuery, rho: number): Silicon {
  const none = (why: string) => ({ state: null, steps: [missingStep('N', 'Dopant concentration', 'cm⁻³', why)] })
  if (query.dopant === undefined) return none('no dopant is given, and the mobility depends on it')
  requireSilicon(query)
  const material = materialOf(query)
  const covered = coveredResistivities(material)
  if (typeof covered === 'string') return none(covered)
  const { min, max } = covered
  if (!(rho >= min && rho <= max)) {
    const range = `${calculated(min, 'Ω·cm')} to ${calculatedQuantity(max, 'Ω·cm')}`
    return none(`${query.mobility.title} with ${query.dopant} covers ${range}`)
  }
  const state = dopedState(query, concentration_cm3({ ...material, resistivity_ohm_cm: rho }))
  return { state, steps: [foundConcentration(query, rho, state.concentration_cm3), ...carrierSteps(query, state)] }
}

/** The resistivities that have one concentration [ohm cm], or why there are none. */
function coveredResistivities(material: Material): { readonly min: number; readonly max: number } | string {
  try {
    const pieces = netDopingPieces(material)
    const last = pieces[pieces.length - 1]
    return { min: last.resistivity_ohm_cm(last.max_cm3), max: pieces[0].resistivity_ohm_cm(pieces[0].min_cm3) }
  } catch (error) {
    if (error instanceof CoreError && error.problem.kind === 'not-applicable') return error.problem.why
    throw error
  }
}

interface Resistance {
  readonly resistance_ohm: number | null
  readonly steps: readonly ConversionStep[]
}

function resistorOf({ start, resistor }: ConversionQuery, sheet: number | null): Resistance {
  if (start.from === 'resistance') return { resistance_ohm: start.resistance_ohm, steps: [] }
  if (resistor === undefined) return { resistance_ohm: null, steps: [] }
  if (sheet === null) {
    return { resistance_ohm: null, steps: [missingStep('R', 'Resistance', 'Ω', NO_THICKNESS)] }
  }
  const resistance_ohm = resistanceOf(sheet, resistor)
  return { resistance_ohm, steps: [resistanceStep(resistance_ohm, sheet, resistor)] }
}

function tabulated(query: ConversionQuery, state: DopedState | null): readonly TemperatureRow[] | null {
  const { temperatures_K, thickness_um, resistor } = query
  if (temperatures_K === undefined) return null
  if (state === null) {
    const why = 'what is given determines no concentration, which is what stays the same at every temperature'
    throw new CoreError({ kind: 'not-applicable', what: 'a table over temperature', why })
  }
  const { concentration_cm3: held_cm3 } = state
  return overTemperature({ piece: query, concentration_cm3: held_cm3, thickness_um, resistor, temperatures_K })
}
