/** Readings that repeat to the last digit: a display that hangs, a range that ends, a file that was filled in. */
import { formatSignificant } from '../units/format'
import { COMMON_PRACTICE, type HealthCheck, type HealthFinding, type HealthInput } from './finding'

/** So many in a row are no chance, unless the display has so few steps that neighbours often agree. Common practice, no source. */
const IN_A_ROW = 5
const AT_THE_TOP = 4

export const stuckReadings: HealthCheck = { id: 'stuck-readings', title: 'Readings that repeat', look }

function look(input: HealthInput): readonly HealthFinding[] {
  return [...inARow(input), ...atTheTop(input)]
}

function inARow({ readings, wafers, vOverIA_ohm, sheetResistance_ohm_sq, value }: HealthInput): readonly HealthFinding[] {
  const column = vOverIA_ohm.some(Number.isFinite) ? (readings.voltage_V ?? vOverIA_ohm) : sheetResistance_ohm_sq.some(Number.isFinite) ? sheetResistance_ohm_sq : value
  let worst = { length: 0, wafer: '', row: -1 }
  let pairs = 0
  let same = 0
  for (const { id, rows } of wafers) {
    let length = 1
    for (let k = 1; k < rows.length; k++) {
      const isSame = column[rows[k]] === column[rows[k - 1]]
      pairs++
      if (isSame) same++
      length = isSame ? length + 1 : 1
      if (length > worst.length) worst = { length, wafer: id, row: rows[k] }
    }
  }
  // With coarse steps neighbours agree by chance with a share p, and n in a row with p^(n-1) at each of the places.
  const expected = pairs * (same / Math.max(1, pairs)) ** (worst.length - 1)
  if (worst.length < IN_A_ROW || (same / pairs < 0.5 && expected > 0.01)) return []
  return [
    {
      check: 'stuck-readings',
      severity: 'look',
      sentence: `On wafer ${worst.wafer} ${worst.length} readings in a row are the same to the last digit: ${formatSignificant(column[worst.row], 6)}.`,
      nextStep: 'A meter that hung, or rows that were filled in: measure these sites again.',
      wafers: [worst.wafer],
      site: worst.row,
      evidence: { readings: worst.length, value: column[worst.row] },
      source: COMMON_PRACTICE,
    },
  ]
} // prettier-ignore

/** The largest voltage again and again, while others differ: the end of a range. */
function atTheTop({ readings, wafers }: HealthInput): readonly HealthFinding[] {
  const { voltage_V } = readings
  if (!voltage_V) return []
  let most = 0
  let count = 0
  let all = 0
  let row = -1
  for (const { rows } of wafers) {
    for (const i of rows) {
      const voltage = Math.abs(voltage_V[i])
      if (!(voltage > 0)) continue
      all++
      if (voltage > most) [most, count, row] = [voltage, 1, i]
      else if (voltage === most) count++
    }
  }
  if (count < AT_THE_TOP || count === all || count < 0.01 * all) return []
  return [
    {
      check: 'stuck-readings',
      severity: 'look',
      sentence: `The largest voltage, ${formatSignificant(1e3 * most, 5)} mV, stands at ${count} sites: the meter may have been at the end of its range there.`,
      nextStep: 'Measure these sites again on the next range or at less current.',
      wafers: [...new Set(wafers.filter(({ rows }) => rows.some((i) => Math.abs(voltage_V[i]) === most)).map(({ id }) => id))],
      site: row,
      evidence: { voltage_mV: 1e3 * most, sites: count },
      source: COMMON_PRACTICE,
    },
  ]
} // prettier-ignore
