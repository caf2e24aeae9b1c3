/** The working of the steps that only dimensions decide. */
import { calculatedQuantity } from './calculated'
import type { ConversionStep, Resistor } from './conversion'
import { RESISTANCE_SOURCE, RESISTIVITY_SOURCE } from './dimensions'

const UM_TO_CM = '10⁻⁴ cm/µm'

export function givenStep(symbol: string, title: string, value: number, unit: string): ConversionStep {
  return { symbol, title, value, unit, formula: 'as given', source: 'given' }
}

/** A step that can't be taken, with the reason in place of its formula. */
export function missingStep(symbol: string, title: string, unit: string, why: string): ConversionStep {
  return { symbol, title, value: NaN, unit, formula: `not determined: ${why}`, source: '' }
}

export function resistivityStep(value: number, sheetResistance_ohm_sq: number, thickness_um: number): ConversionStep {
  return {
    symbol: 'ρ',
    title: 'Resistivity',
    value,
    unit: 'Ω·cm',
    formula: `${calculatedQuantity(sheetResistance_ohm_sq, 'Ω/sq')} × ${thickness_um} µm × ${UM_TO_CM}`,
    source: RESISTIVITY_SOURCE,
  }
}

/** The other way about the same definition. */
export function sheetResistanceStep(value: number, resistivity_ohm_cm: number, thickness_um: number): ConversionStep {
  return {
    symbol: 'R_s',
    title: 'Sheet resistance',
    value,
    unit: 'Ω/sq',
    formula: `${calculatedQuantity(resistivity_ohm_cm, 'Ω·cm')} / (${thickness_um} µm × ${UM_TO_CM})`,
    source: RESISTIVITY_SOURCE,
  }
}

export function reciprocalStep(symbol: 'σ' | 'ρ', value: number): ConversionStep {
  return symbol === 'σ'
    ? { symbol, title: 'Conductivity', value, unit: 'S/cm', formula: '1 / ρ', source: 'definition' }
    : { symbol, title: 'Resistivity', value, unit: 'Ω·cm', formula: '1 / σ', source: 'definition' }
}

export function resistanceStep(value: number, sheetResistance_ohm_sq: number, resistor: Resistor): ConversionStep {
  const { length_um, width_um } = resistor
  const squares = `${length_um} µm / ${width_um} µm`
  return {
    symbol: 'R',
    title: 'Resistance',
    value,
    unit: 'Ω',
    formula: `${calculatedQuantity(sheetResistance_ohm_sq, 'Ω/sq')} × ${squares}`,
    source: RESISTANCE_SOURCE,
  }
}

export function wantedSheetStep(value: number, resistance_ohm: number, resistor: Resistor): ConversionStep {
  const { length_um, width_um } = resistor
  const squares = `${width_um} µm / ${length_um} µm`
  return {
    symbol: 'R_s',
    title: 'Sheet resistance',
    value,
    unit: 'Ω/sq',
    formula: `${calculatedQuantity(resistance_ohm, 'Ω')} × ${squares}`,
    source: RESISTANCE_SOURCE,
  }
}
