/** A conversion as a person reads it, and as a program does. */
import { calculated } from '../../core/conversion/calculated'
import type { Conversion, ConversionStep, TemperatureRow } from '../../core/conversion/conversion'
import { celsius } from '../../core/conversion/silicon-steps'
import { INTRINSIC_DENSITY_RANGE_K } from '../../core/silicon/intrinsic-density'
import { NO_VALUE } from '../../core/units/format'
import { aligned } from './text-table'

/** The object of `--json`; its keys stay, in this order. The resistance stands only where a resistor was described. */
export function conversionJson(conversion: Conversion, { isResistor }: { readonly isResistor: boolean }): string {
  const { steps, temperatures, resistance_ohm } = conversion
  const object = {
    sheet_resistance_ohm_sq: conversion.sheetResistance_ohm_sq,
    resistivity_ohm_cm: conversion.resistivity_ohm_cm,
    conductivity_S_per_cm: conversion.conductivity_S_per_cm,
    concentration_cm3: conversion.concentration_cm3,
    mobility_cm2_per_Vs: conversion.mobility_cm2_per_Vs,
    electrons_cm3: conversion.electrons_cm3,
    holes_cm3: conversion.holes_cm3,
    intrinsic_density_cm3: conversion.intrinsicDensity_cm3,
    temperature_K: conversion.temperature_K,
    model: conversion.model && conversion.model.id,
    // A value that is not determined is NaN, which JSON writes as null.
    working: steps.map(({ symbol, title, value, unit, formula, source }) => ({ symbol, title, value, unit, formula, source })),
    ...(isResistor ? { resistance_ohm } : {}),
    ...(temperatures ? { temperatures: temperatures.map(rowJson) } : {}),
  } // prettier-ignore
  return `${JSON.stringify(object, null, 2)}\n`
}

function rowJson(row: TemperatureRow) {
  return {
    temperature_K: row.temperature_K,
    sheet_resistance_ohm_sq: row.sheetResistance_ohm_sq,
    resistivity_ohm_cm: row.resistivity_ohm_cm,
    conductivity_S_per_cm: row.conductivity_S_per_cm,
    mobility_cm2_per_Vs: row.mobility_cm2_per_Vs,
    electrons_cm3: row.electrons_cm3,
    holes_cm3: row.holes_cm3,
    intrinsic_density_cm3: row.intrinsicDensity_cm3,
    intrinsic_density_extrapolated: row.isIntrinsicCarriedOn,
    resistance_ohm: row.resistance_ohm,
  }
}

/** A step a line, the sources numbered below. */
export function conversionText({ steps, temperature_K, temperatures, model }: Conversion): string {
  const sources = [
    ...new Set(steps.map(({ source }) => source).filter((source) => source !== '' && source !== 'given')),
  ]
  const lines = aligned(
    steps.map((step) => stepCells(step, sources)),
    [false, false, true, false, false],
  )
  return [
    `At ${celsius(temperature_K)}`,
    '',
    ...lines,
    ...(temperatures ? ['', ...temperatureLines(temperatures, model?.title ?? '')] : []),
    '',
    ...sources.map((source, at) => `[${at + 1}] ${source}`),
    '',
  ].join('\n') // prettier-ignore
}

function stepCells(step: ConversionStep, sources: readonly string[]): readonly string[] {
  const { symbol, title, value, unit, formula, source } = step
  const number = sources.indexOf(source) + 1
  const reference = number > 0 ? ` [${number}]` : ''
  return [title, `${symbol} =`, calculated(value, unit), Number.isNaN(value) ? '' : unit, `${formula}${reference}`]
}

function temperatureLines(rows: readonly TemperatureRow[], model: string): readonly string[] {
  const columns: readonly (readonly [title: string, unit: string, of: (row: TemperatureRow) => number | null])[] = [
    ['n_i', 'cm⁻³', (row) => row.intrinsicDensity_cm3],
    ['n', 'cm⁻³', (row) => row.electrons_cm3],
    ['p', 'cm⁻³', (row) => row.holes_cm3],
    ['μ', 'cm²/(V·s)', (row) => row.mobility_cm2_per_Vs],
    ['ρ', 'Ω·cm', (row) => row.resistivity_ohm_cm],
    ['R_s', 'Ω/sq', (row) => row.sheetResistance_ohm_sq],
    ['R', 'Ω', (row) => row.resistance_ohm],
  ]
  const shown = columns.filter(([, , of]) => rows.some((row) => of(row) !== null))
  const table = [
    ['T', ...shown.map(([title]) => title)],
    ['', ...shown.map(([, unit]) => unit)],
    ...rows.map((row) => [
      celsius(row.temperature_K),
      ...shown.map(([, unit, of]) => cellOf(of(row), unit)),
    ]),
  ] // prettier-ignore
  const everyRight = table[0].map(() => true)
  const beyond = `n_i is carried on beyond the ${INTRINSIC_DENSITY_RANGE_K.max} K to which it was measured`
  const isBeyond = rows.some(({ isIntrinsicCarriedOn }) => isIntrinsicCarriedOn)
  return [
    `The same piece over temperature, mobility model ${model}${isBeyond ? `; ${beyond}` : ''}`,
    '',
    ...aligned(table, everyRight),
  ]
}

function cellOf(value: number | null, unit: string): string {
  return value === null ? NO_VALUE : calculated(value, unit)
}
