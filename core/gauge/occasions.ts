/**
 * What a gauge study measured: occasions, each a short series of readings of one wafer with one probe on one day of one
 * run. A file has them ready made, a row each, or reading by reading.
 */
import { readNamedTable, type NamedTable, type TableColumn, type TableFile } from '../ingest/named-table'
import { spreadMismatch, spreadOf } from '../ingest/spread-unit'
import type { TableProblem } from '../problems/problem'

export interface Occasions {
  readonly file: string
  readonly bytes: number
  readonly sha256: string
  /** Of the values, for people: "Ω·cm"; empty where the header names none. */
  readonly unit: string
  readonly count: number
  readonly wafer: readonly string[]
  readonly probe: readonly string[]
  /** '1' throughout where the file names no runs. */
  readonly run: readonly string[]
  readonly day: readonly string[]
  readonly operator: readonly string[]
  /** Mean of the occasion's readings. */
  readonly mean: Float64Array
  /** Their standard deviation; NaN where it isn't known. */
  readonly standardDeviation: Float64Array
  /** How many readings; NaN where that isn't known. */
  readonly readings: Float64Array
  /** Every single reading with its probe, where the file has them. */
  readonly single: { readonly value: Float64Array; readonly probe: readonly string[] } | null
  readonly has: { readonly run: boolean; readonly day: boolean; readonly operator: boolean; readonly probe: boolean }
}

export interface ReadOccasions {
  readonly occasions: Occasions | null
  readonly problems: readonly TableProblem[]
}

const SPREAD = /^((resistivity|sheet resistance|rs|value|reading) )?(sd|s|stdev|std|std dev|standard deviation)$/
const VALUE_NAMES = [
  /^(value|mean|average|reading|y)$/,
  /^(resistivity|sheet resistance|sheet rho|rs|rho|r s|voveri|value|reading)( (mean|average|value))?$/,
  /^(mean|average) (resistivity|sheet resistance|rs|rho|value)$/,
]

export const STUDY_COLUMNS = {
  wafer: { names: [/^(wafer|check standard|check wafer|artifact|specimen|sample)( (id|no))?$/], kind: 'text', needed: false, example: 'wafer' },
  probe: { names: [/^(probe|gauge|prober|instrument|head|treatment)( (id|no))?$/], kind: 'text', needed: false, example: 'probe' },
  run: { names: [/^(run|session|period)( (id|no))?$/], kind: 'text', needed: false, example: 'run' },
  year: { names: [/^year$/], kind: 'text', needed: false, example: 'year' },
  month: { names: [/^month$/], kind: 'text', needed: false, example: 'month' },
  day: { names: [/^(day|date)$/], kind: 'text', needed: false, example: 'day' },
  operator: { names: [/^(operator|technician|measured by)( (id|no))?$/], kind: 'text', needed: false, example: 'operator' },
  spread: { names: [SPREAD], kind: 'number', needed: false, example: 'standard_deviation' },
  readings: { names: [/^(count|readings|n|n rep|repeats|replicates|rep)$/], kind: 'number', needed: false, example: 'count' },
  freedom: { names: [/^(df|dof|degrees of freedom)$/], kind: 'number', needed: false, example: 'df' },
  value: { names: VALUE_NAMES, kind: 'number', needed: true, example: 'value' },
} as const satisfies Record<string, TableColumn> // prettier-ignore

type StudyColumn = keyof typeof STUDY_COLUMNS

export function readOccasions(file: TableFile): ReadOccasions {
  const { table, problems } = readNamedTable<StudyColumn>(file, STUDY_COLUMNS)
  if (!table) return { occasions: null, problems }
  const wrong = wrongRows(table)
  if (wrong.length > 0) return { occasions: null, problems: [...problems, ...wrong] }
  const mismatch = table.headers.spread === null ? null : spreadMismatch(table)
  if (mismatch !== null) {
    return { occasions: null, problems: [...problems, { kind: 'bad-table', file: file.name, why: mismatch }] }
  }
  const occasions = table.headers.spread === null ? gathered(table) : readyMade(table)
  return { occasions, problems }
}

const UNITS: Readonly<Record<string, string>> = { 'sheet-resistance': 'Ω/sq', resistivity: 'Ω·cm', resistance: 'Ω' }

function frame({ file, bytes, sha256, headers, units }: NamedTable<StudyColumn>) {
  return {
    file,
    bytes,
    sha256,
    unit: UNITS[units.value?.quantity ?? ''] ?? '',
    has: {
      run: headers.run !== null,
      day: headers.day !== null,
      operator: headers.operator !== null,
      probe: headers.probe !== null,
    },
  }
}

function wrongRows({ file, line, numbers }: NamedTable<StudyColumn>): TableProblem[] {
  const problems: TableProblem[] = []
  for (let i = 0; i < line.length && problems.length < 20; i++) {
    const why =
      numbers.spread[i] < 0
        ? `its standard deviation ${numbers.spread[i]} is negative`
        : numbers.readings[i] < 1 || numbers.freedom[i] < 0
          ? 'an occasion has at least one reading'
          : null
    if (why !== null) problems.push({ kind: 'bad-table', file, line: line[i], why })
  }
  return problems
}

function readyMade(table: NamedTable<StudyColumn>): Occasions {
  const { count, numbers, texts } = table
  const readings = numbers.readings.map((n, i) => (Number.isNaN(n) ? numbers.freedom[i] + 1 : n))
  return {
    ...frame(table),
    single: null,
    count,
    wafer: named(texts.wafer),
    probe: named(texts.probe),
    run: named(texts.run),
    day: dayOf(table),
    operator: texts.operator,
    mean: numbers.value,
    standardDeviation: spreadOf(table),
    readings,
  }
}

/** Readings of one wafer, probe, run and day are one occasion; without days a row is an occasion of its own. */
function gathered(table: NamedTable<StudyColumn>): Occasions {
  const { count, numbers, texts, headers } = table
  const days = dayOf(table)
  const [probe, run] = [named(texts.probe), named(texts.run)]
  const groups = new Map<string, number[]>()
  for (let i = 0; i < count; i++) {
    const key = JSON.stringify([texts.wafer[i], probe[i], run[i], headers.day === null ? '' : days[i]])
    const rows = groups.get(key)
    if (rows) rows.push(i)
    else groups.set(key, [i])
  }
  const rows = [...groups.values()]
  const first = (column: readonly string[]): string[] => rows.map(([i]) => column[i])
  const mean = Float64Array.from(rows, (list) => list.reduce((sum, i) => sum + numbers.value[i], 0) / list.length)
  return {
    ...frame(table),
    single: { value: numbers.value, probe },
    count: rows.length,
    wafer: first(named(texts.wafer)),
    probe: first(probe),
    run: first(run),
    day: first(days),
    operator: first(texts.operator),
    mean,
    standardDeviation: Float64Array.from(rows, (list, k) => spreadAbout(list.map((i) => numbers.value[i]), mean[k])),
    readings: Float64Array.from(rows, (list) => list.length),
  }
} // prettier-ignore

function spreadAbout(values: readonly number[], mean: number): number {
  if (values.length < 2) return NaN
  return Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (values.length - 1))
}

function named(column: readonly string[]): readonly string[] {
  return column.map((text) => text || '1')
}

/** A date, or a day with what month and year stand beside it. */
function dayOf({ count, texts }: NamedTable<StudyColumn>): readonly string[] {
  return Array.from({ length: count }, (_, i) => {
    const parts = [texts.year[i], texts.month[i], texts.day[i]].filter((part) => part !== '')
    return parts.map((part) => part.padStart(2, '0')).join('-')
  })
}
