/** Readings that repeat to the last digit: a display that hangs, a range that ends, a file that was filled in or copied. */
import { formatFixed, formatSignificant } from '../units/format'
import { COMMON_PRACTICE, medianOf, type HealthCheck, type HealthFinding, type HealthInput } from './finding'
import { readColumn, relativeStep, sampledValues, stepAt } from './resolution'

/** So many in a row are no chance, unless the display has so few steps that neighbours often agree. Common practice, no source. */
const IN_A_ROW = 5
const AT_THE_TOP = 4
/** A clipped value stands so many times as often as the next below it. Common practice, no source. */
const OVER_THE_NEXT = 4
/** Neighbours that differ by fewer steps of the display often agree by chance. Common practice, no source. */
const TELLING_STEPS = 3
/** A step this large is as much as a good prober repeats by. Common practice, no source. */
const COARSE = 0.002
const LEAST_COPIED = 9

export const stuckReadings: HealthCheck = { id: 'stuck-readings', title: 'Readings that repeat', look }

function look(input: HealthInput): readonly HealthFinding[] {
  const { voltage_V, voltageReverse_V } = input.readings
  return [
    ...inARow(input),
    ...atTheTop(input, voltage_V, 'forward'),
    ...atTheTop(input, voltageReverse_V, 'reverse'),
    ...copied(input),
    ...coarse(input),
  ]
}

interface Repeats {
  readonly worst: { readonly length: number; readonly wafer: string; readonly row: number }
  readonly pairs: number
  readonly same: number
  /** Of neighbours that differ, in steps of the display. */
  readonly typicalSteps: number
}

function repeatsIn(column: Float64Array, { wafers }: HealthInput): Repeats {
  let worst = { length: 0, wafer: '', row: -1 }
  let pairs = 0
  let same = 0
  const differences: number[] = []
  for (const { id, rows } of wafers) {
    let length = 1
    for (let k = 1; k < rows.length; k++) {
      const difference = Math.abs(column[rows[k]] - column[rows[k - 1]])
      pairs++
      if (difference === 0) same++
      else if (differences.length < 20_000) differences.push(difference)
      length = difference === 0 ? length + 1 : 1
      if (length > worst.length) worst = { length, wafer: id, row: rows[k] }
    }
  }
  return {
    worst,
    pairs,
    same,
    typicalSteps: medianOf(differences) / stepAt(sampledValues(column, wafers), column[worst.row]),
  }
}

function inARow(input: HealthInput): readonly HealthFinding[] {
  const column = readColumn(input)
  const { worst, pairs, same, typicalSteps } = repeatsIn(column, input)
  if (worst.length < IN_A_ROW) return []
  // Neighbours on a coarse display agree far more often than by chance, as they lie beside each other on the wafer.
  if (same < pairs && !(typicalSteps >= TELLING_STEPS)) return []
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

/** The largest voltage again and again, while the next below it hardly ever: the end of a range. */
function atTheTop({ wafers }: HealthInput, voltage_V: Float64Array | null | undefined, polarity: string): readonly HealthFinding[] {
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
  if (count < OVER_THE_NEXT * countOfNext(voltage_V, wafers, most)) return []
  return [
    {
      check: 'stuck-readings',
      severity: 'look',
      sentence: `The largest ${polarity} voltage, ${formatSignificant(1e3 * most, 5)} mV, stands at ${count} sites: the meter may have been at the end of its range there.`,
      nextStep: 'Measure these sites again on the next range or at less current.',
      wafers: wafers.filter(({ rows }) => rows.some((i) => Math.abs(voltage_V[i]) === most)).map(({ id }) => id),
      site: row,
      evidence: { voltage_mV: 1e3 * most, sites: count },
      source: COMMON_PRACTICE,
    },
  ]
} // prettier-ignore

/** How often the value just below the largest stands: on a coarse display nearly as often. */
function countOfNext(voltage_V: Float64Array, wafers: HealthInput['wafers'], most: number): number {
  let next = 0
  let count = 0
  for (const { rows } of wafers) {
    for (const i of rows) {
      const voltage = Math.abs(voltage_V[i])
      if (!(voltage < most)) continue
      if (voltage > next) [next, count] = [voltage, 1]
      else if (voltage === next) count++
    }
  }
  return count
}

/** Two wafers whose readings are the same one by one: one was copied, or measured twice under two names. */
function copied(input: HealthInput): readonly HealthFinding[] {
  const column = readColumn(input)
  const seen = new Map<string, { readonly id: string; readonly values: Float64Array }[]>()
  const pairs: { a: string; b: string; row: number; count: number }[] = []
  for (const { id, rows } of input.wafers) {
    if (rows.length < LEAST_COPIED) continue
    const values = Float64Array.from(rows, (i) => column[i])
    const begin = values.subarray(0, LEAST_COPIED).join()
    const alike = seen.get(begin) ?? []
    const earlier = alike.find((other) => areSame(other.values, values))
    if (earlier) pairs.push({ a: earlier.id, b: id, row: rows[0], count: rows.length })
    else if (new Set(values).size >= rows.length / 2) seen.set(begin, [...alike, { id, values }])
  }
  return pairs.map(({ a, b, row, count }): HealthFinding => ({
    check: 'stuck-readings',
    severity: 'stops',
    sentence: `Wafers ${a} and ${b} read the same to the last digit at all ${count} sites: no two wafers do.`,
    nextStep: 'Find out which of the two was measured, and measure the other.',
    wafers: [a, b],
    site: row,
    evidence: { sites: count },
    source: COMMON_PRACTICE,
  }))
} // prettier-ignore

function areSame(a: Float64Array, b: Float64Array): boolean {
  return a.length === b.length && a.every((value, k) => Object.is(value, b[k]))
}

/** The step of the display against what a prober repeats by. */
function coarse(input: HealthInput): readonly HealthFinding[] {
  const column = readColumn(input)
  const values = sampledValues(column, input.wafers)
  const share = relativeStep(input)
  // Few values are far apart without any display.
  if (!(share > COARSE) || new Set(values).size > values.length / 3) return []
  return [
    {
      check: 'stuck-readings',
      severity: 'note',
      sentence: `The readings come in steps of ${formatFixed(100 * share, 2)} % of their size: finer differences on the wafers can’t be seen.`,
      nextStep: 'Export more digits, or measure on a finer range.',
      wafers: [],
      site: null,
      evidence: { relativeStep: share, readings: values.length },
      source: COMMON_PRACTICE,
    },
  ]
} // prettier-ignore
