/** Standard deviations in the unit of the values that stand beside them. */
import { toBase } from '../units/unit-register'
import type { NamedTable } from './named-table'

type SpreadTable = NamedTable<'spread' | 'value'>

/** A spread without a unit is in that of the values; the other way round nobody knows what the values are in. */
export function spreadMismatch({ units: { spread, value } }: SpreadTable): string | null {
  if (spread === null) return null
  if (value === null) return toBase(1, spread) === 1 ? null : `its standard deviations are in ${spread.id}, and its values name no unit`
  return spread.quantity === value.quantity ? null : `its standard deviations are in ${spread.id}, its values in ${value.id}`
} // prettier-ignore

/** A column with a unit of its own has been scaled by it already. */
export function spreadOf({ numbers, units: { spread, value } }: SpreadTable): Float64Array {
  return spread === null && value !== null ? numbers.spread.map((s) => toBase(s, value)) : numbers.spread
}
