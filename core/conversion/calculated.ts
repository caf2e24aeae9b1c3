import { formatScientific, formatSignificant } from '../units/format'

/** Digits of a calculation: one or two more than a result is shown with, so that each line follows from those above it. */
const DIGITS = 5
const CONCENTRATION_DIGITS = 4

/** A number in a calculation, without its unit. */
export function calculated(value: number, unit: string): string {
  if (unit === 'cm⁻³') return formatScientific(value, CONCENTRATION_DIGITS)
  const magnitude = Math.abs(value)
  const isLong = magnitude !== 0 && (magnitude < 1e-3 || magnitude >= 1e6)
  return isLong ? formatScientific(value, DIGITS) : formatSignificant(value, DIGITS)
}

/** With its unit. */
export function calculatedQuantity(value: number, unit: string): string {
  return unit === '' ? calculated(value, unit) : `${calculated(value, unit)} ${unit}`
}
