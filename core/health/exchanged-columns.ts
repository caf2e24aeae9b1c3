/** Current where the voltage should stand: a prober sets the current and reads the voltage, so the current is what repeats. */
import type { Readings } from '../ingest/readings'
import { formatSignificant } from '../units/format'
import { COMMON_PRACTICE, type HealthCheck, type HealthFinding, type HealthInput } from './finding'

const LEAST_SITES = 9
/** Relative spread of a set value. Common practice, no source. */
const SET = 1e-6
/** Of a value that was read. Common practice, no source. */
const READ = 1e-4

export const exchangedColumns: HealthCheck = { id: 'exchanged-columns', title: 'Current and voltage exchanged', look }

/** Every voltage the same while the currents vary. */
export function areExchanged({ voltage_V, current_A }: Readings): boolean {
  if (!voltage_V || !current_A || voltage_V.length < LEAST_SITES) return false
  return spreadOf(voltage_V) < SET && spreadOf(current_A) > READ
}

function look({ readings, wafers }: HealthInput): readonly HealthFinding[] {
  const { voltage_V, current_A } = readings
  if (!voltage_V || !current_A || !areExchanged(readings)) return []
  return [
    {
      check: 'exchanged-columns',
      // A prober that holds the voltage and reads the current writes the very same.
      severity: 'look',
      sentence: `The voltage is ${formatSignificant(1e3 * Math.abs(voltage_V[0]), 4)} mV at every site while the current varies: the columns of current and voltage look exchanged.`,
      nextStep: 'Unless the prober holds the voltage and reads the current: check the names of the two columns under Files, and what it exports.',
      wafers: [],
      site: wafers[0]?.rows[0] ?? null,
      evidence: { voltageSpread: spreadOf(voltage_V), currentSpread: spreadOf(current_A) },
      source: COMMON_PRACTICE,
    },
  ]
} // prettier-ignore

/** Largest less smallest, over the largest; signs apart. */
function spreadOf(column: Float64Array): number {
  let least = Infinity
  let most = 0
  for (const value of column) {
    const size = Math.abs(value)
    if (size < least) least = size
    if (size > most) most = size
  }
  return most > 0 ? (most - least) / most : 0
}
