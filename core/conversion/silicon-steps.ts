/** The working of doped silicon: concentration, carriers, mobilities, conductivity. */
import { INTRINSIC_DENSITY_RANGE_K, INTRINSIC_DENSITY_SOURCE } from '../silicon/intrinsic-density'
import type { MobilityModel } from '../silicon/mobility-model'
import { isResistivityCurve } from '../silicon/mobility/mf723'
import { CELSIUS_ZERO_K, ELEMENTARY_CHARGE_C } from '../units/constants'
import { formatScientific } from '../units/format'
import { calculatedQuantity } from './calculated'
import type { ConversionStep } from './conversion'
import type { DopedPiece, DopedState } from './doped-state'
import { isCarriedOn } from './intrinsic-carriers'

const CARRIER_SOURCE = 'charge neutrality and n p = n_i², every dopant ionised'
const CONDUCTIVITY_SOURCE = 'σ = q (n μ_n + p μ_p); q exact, SI 2019'

/** The model by name, and all that must be known where it is used outside what it was made for. */
export function modelWords(mobility: MobilityModel, temperature_K: number, concentration_cm3: number): string {
  const { min, max } = mobility.temperature_K
  const madeAt = min === max && min !== temperature_K ? `, made at ${kelvin(min)} and used as it stands` : ''
  const { range_cm3 } = mobility
  const isFitted = isResistivityCurve(mobility) || concentration_cm3 === 0 || isWithin(range_cm3, concentration_cm3)
  const fitted = `${formatScientific(range_cm3.min, 1)} to ${formatScientific(range_cm3.max, 1)} cm⁻³`
  return `${mobility.title}${madeAt}${isFitted ? '' : `, beyond the ${fitted} it was fitted over`}`
}

function isWithin({ min, max }: { readonly min: number; readonly max: number }, value: number): boolean {
  return value >= min && value <= max
}

/** "300 K", or "23 °C" where that is the rounder number. */
function kelvin(temperature_K: number): string {
  return Number.isInteger(temperature_K) ? `${temperature_K} K` : celsius(temperature_K)
}

export function celsius(temperature_K: number): string {
  return `${Number((temperature_K - CELSIUS_ZERO_K).toFixed(6))} °C`
}

export function givenConcentration(piece: DopedPiece, concentration_cm3: number): ConversionStep {
  const model = `mobility model ${modelWords(piece.mobility, piece.temperature_K, concentration_cm3)}`
  const isIntrinsic = concentration_cm3 === 0
  return {
    symbol: 'N',
    title: isIntrinsic ? 'Intrinsic silicon' : 'Dopant concentration',
    value: concentration_cm3,
    unit: 'cm⁻³',
    formula: `as given; ${isIntrinsic ? 'no dopant' : piece.dopant}; ${model}`,
    source: 'given',
  }
}

export function foundConcentration(piece: DopedPiece, resistivity_ohm_cm: number, found_cm3: number): ConversionStep {
  const { dopant, mobility, temperature_K } = piece
  const model = modelWords(mobility, temperature_K, found_cm3)
  return {
    symbol: 'N',
    title: 'Dopant concentration',
    value: found_cm3,
    unit: 'cm⁻³',
    formula: `N for which ρ(N) = ${calculatedQuantity(resistivity_ohm_cm, 'Ω·cm')}, ${dopant}, mobility model ${model}`,
    source: mobility.source,
  }
}

/** Intrinsic density, both carriers, and the mobilities that the model gives. */
export function carrierSteps(piece: DopedPiece, state: DopedState): readonly ConversionStep[] {
  const { electrons_cm3, holes_cm3, concentration_cm3 } = state
  const n_i = calculatedQuantity(state.intrinsicDensity_cm3, 'cm⁻³')
  const isElectronMajority = state.majority === 'electron'
  const larger = `N/2 + √((N/2)² + n_i²), n_i = ${n_i}`
  const words = (carries: boolean, other: string) =>
    concentration_cm3 === 0 ? 'n_i' : carries ? larger : `n_i² / ${other}`
  return [
    intrinsicStep(piece, state),
    {
      symbol: 'n',
      title: 'Electrons',
      value: electrons_cm3,
      unit: 'cm⁻³',
      formula: words(isElectronMajority, 'p'),
      source: CARRIER_SOURCE,
    },
    {
      symbol: 'p',
      title: 'Holes',
      value: holes_cm3,
      unit: 'cm⁻³',
      formula: words(!isElectronMajority, 'n'),
      source: CARRIER_SOURCE,
    },
    ...mobilitySteps(piece, state),
  ]
}

function intrinsicStep({ intrinsicDensity_cm3, temperature_K }: DopedPiece, state: DopedState): ConversionStep {
  const isGiven = intrinsicDensity_cm3 !== undefined
  const beyond = `, carried on beyond the ${INTRINSIC_DENSITY_RANGE_K.max} K to which it was measured`
  return {
    symbol: 'n_i',
    title: 'Intrinsic density',
    value: state.intrinsicDensity_cm3,
    unit: 'cm⁻³',
    formula: isGiven ? 'as given' : `at ${celsius(temperature_K)}${isCarriedOn(temperature_K) ? beyond : ''}`,
    source: isGiven ? 'given' : INTRINSIC_DENSITY_SOURCE,
  }
}

function mobilitySteps({ mobility, temperature_K }: DopedPiece, state: DopedState): readonly ConversionStep[] {
  const steps = [
    ['μ_n', 'electron', state.electronMobility_cm2_per_Vs],
    ['μ_p', 'hole', state.holeMobility_cm2_per_Vs],
  ] as const
  const model = modelWords(mobility, temperature_K, state.concentration_cm3)
  const { min, max } = mobility.temperature_K
  const at = min < max ? `, at ${celsius(temperature_K)}` : ''
  return steps.flatMap(([symbol, carrier, value]) => {
    if (value === null) return []
    const role = state.majority === null ? '' : state.majority === carrier ? ', majority' : ', minority'
    return [
      {
        symbol,
        title: `Mobility of ${carrier}s${role}`,
        value,
        unit: 'cm²/(V·s)',
        formula: isResistivityCurve(mobility) ? `1 / (q N ρ(N)), ${model}` : `${model}${at}`,
        source: mobility.source,
      },
    ]
  })
}

/** From the carriers, as the end of the way forward. */
export function conductivityStep(piece: DopedPiece, state: DopedState): ConversionStep {
  const { electronMobility_cm2_per_Vs: electron, holeMobility_cm2_per_Vs: hole } = state
  const charge = `${formatScientific(ELEMENTARY_CHARGE_C, 4)} C`
  const term = (density_cm3: number, mobility: number) =>
    `${calculatedQuantity(density_cm3, 'cm⁻³')} × ${calculatedQuantity(mobility, 'cm²/(V·s)')}`
  const isBoth = electron !== null && hole !== null
  return {
    symbol: 'σ',
    title: 'Conductivity',
    value: 1 / state.resistivity_ohm_cm,
    unit: 'S/cm',
    formula: isBoth
      ? `${charge} × (${term(state.electrons_cm3, electron)} + ${term(state.holes_cm3, hole)})`
      : `1 / ρ(N), ${modelWords(piece.mobility, piece.temperature_K, state.concentration_cm3)}`,
    source: isBoth ? CONDUCTIVITY_SOURCE : piece.mobility.source,
  }
}
