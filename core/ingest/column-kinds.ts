/** What each documented column holds and where it goes in `Readings`. */
import type { Quantity } from '../units/unit-register'
import type { ColumnId, Readings } from './readings'

/** The number columns of `Readings`, in the order they are stored. */
export const NUMBER_COLUMNS = [
  'x_mm', 'y_mm', 'dieX', 'dieY',
  'current_A', 'voltage_V', 'currentReverse_A', 'voltageReverse_V',
  'currentB_A', 'voltageB_V', 'currentReverseB_A', 'voltageReverseB_V',
  'temperature_C', 'vOverI_ohm', 'vOverIB_ohm', 'sheetResistance_ohm_sq', 'resistivity_ohm_cm', 'time_ms',
] as const satisfies readonly (keyof Readings)[] // prettier-ignore
export type NumberColumn = (typeof NUMBER_COLUMNS)[number]

export interface NumberKind {
  readonly target: NumberColumn
  /** null: a bare count. */
  readonly quantity: Quantity | null
}

/** Columns of numbers; r and theta are read into x and y and turned there. The others hold text. */
export const NUMBER_KINDS: Readonly<Partial<Record<ColumnId, NumberKind>>> = {
  x_mm: { target: 'x_mm', quantity: 'length' },
  y_mm: { target: 'y_mm', quantity: 'length' },
  r_mm: { target: 'x_mm', quantity: 'length' },
  theta_deg: { target: 'y_mm', quantity: 'angle' },
  die_x: { target: 'dieX', quantity: null },
  die_y: { target: 'dieY', quantity: null },
  current_A: { target: 'current_A', quantity: 'current' },
  voltage_V: { target: 'voltage_V', quantity: 'voltage' },
  current_rev_A: { target: 'currentReverse_A', quantity: 'current' },
  voltage_rev_V: { target: 'voltageReverse_V', quantity: 'voltage' },
  current_b_A: { target: 'currentB_A', quantity: 'current' },
  voltage_b_V: { target: 'voltageB_V', quantity: 'voltage' },
  current_rev_b_A: { target: 'currentReverseB_A', quantity: 'current' },
  voltage_rev_b_V: { target: 'voltageReverseB_V', quantity: 'voltage' },
  temperature_C: { target: 'temperature_C', quantity: 'temperature' },
  v_over_i_ohm: { target: 'vOverI_ohm', quantity: 'resistance' },
  v_over_i_b_ohm: { target: 'vOverIB_ohm', quantity: 'resistance' },
  sheet_resistance_ohm_sq: { target: 'sheetResistance_ohm_sq', quantity: 'sheet-resistance' },
  resistivity_ohm_cm: { target: 'resistivity_ohm_cm', quantity: 'resistivity' },
}

/** Whether a header row with this column can be one of readings. */
export function isReadingColumn(column: ColumnId): boolean {
  const quantity = NUMBER_KINDS[column]?.quantity
  return quantity != null && !['length', 'angle', 'temperature'].includes(quantity)
}
