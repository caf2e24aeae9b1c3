/** The history of a check wafer: on each occasion a short series of readings of the same wafer with the same probe. */
import { parseTime } from '../ingest/parse-time'
import { spreadMismatch, spreadOf } from '../ingest/spread-unit'
import { readNamedTable, type NamedTable, type TableColumn, type TableFile } from '../ingest/named-table'
import type { TableProblem } from '../problems/problem'
import { quote } from '../problems/quote'

export interface CheckHistory {
  readonly file: string
  readonly bytes: number
  readonly sha256: string
  /** Of the values, for people: "Ω·cm"; empty where the header names none. */
  readonly unit: string
  readonly count: number
  /** In the order of time, or of the file where it has no times: rows of the columns below. */
  readonly order: Uint32Array
  /** Mean of the occasion's readings. */
  readonly value: Float64Array
  /** Their standard deviation; NaN where it isn't known. */
  readonly standardDeviation: Float64Array
  /** Degrees of freedom of that; NaN where they aren't known. */
  readonly degreesOfFreedom: Float64Array
  /** Whether it names times and none of them can be read: the rows then stand as the file has them. */
  readonly hasUnreadTimes: boolean
  /** As the file has it; the number of the row where it has none. */
  readonly when: readonly string[]
  /** Milliseconds since 1970 UTC; NaN where the file has no date with a year. */
  readonly time_ms: Float64Array
  /** 1-based line of the file. */
  readonly line: Uint32Array
  readonly wafers: readonly string[]
  readonly probes: readonly string[]
}

export interface ReadHistory {
  readonly history: CheckHistory | null
  readonly problems: readonly TableProblem[]
}

const VALUE = [
  /^(value|mean|average|y)$/,
  /^(resistivity|sheet resistance|sheet rho|rs|rho|r s|voveri|value)( (mean|average|value))?$/,
  /^(mean|average) (resistivity|sheet resistance|rs|rho|value)$/,
]

export const HISTORY_COLUMNS = {
  time: { names: [/^(time|date time|timestamp|date)$/], kind: 'text', needed: false, example: 'time' },
  year: { names: [/^year$/], kind: 'text', needed: false, example: 'year' },
  month: { names: [/^month$/], kind: 'text', needed: false, example: 'month' },
  day: { names: [/^day$/], kind: 'text', needed: false, example: 'day' },
  hour: { names: [/^hour$/], kind: 'text', needed: false, example: 'hour' },
  minute: { names: [/^minute$/], kind: 'text', needed: false, example: 'minute' },
  wafer: { names: [/^(wafer|check standard|check wafer|artifact)( (id|no))?$/], kind: 'text', needed: false, example: 'wafer' },
  probe: { names: [/^(probe|gauge|prober|instrument|head)( (id|no))?$/], kind: 'text', needed: false, example: 'probe' },
  spread: {
    names: [/^((resistivity|sheet resistance|rs|value|reading) )?(sd|s|stdev|std|std dev|standard deviation)$/],
    kind: 'number', needed: false, example: 'standard_deviation',
  },
  readings: { names: [/^(count|readings|n|n rep|repeats|replicates)$/], kind: 'number', needed: false, example: 'count' },
  freedom: { names: [/^(df|dof|degrees of freedom)$/], kind: 'number', needed: false, example: 'df' },
  value: { names: VALUE, kind: 'number', needed: true, example: 'value' },
} as const satisfies Record<string, TableColumn> // prettier-ignore

type HistoryColumn = keyof typeof HISTORY_COLUMNS

/** A file of several wafers or probes is refused. Where some rows have a time, one without has no place and is left out. */
export function readHistory(file: TableFile): ReadHistory {
  const { table, problems } = readNamedTable<HistoryColumn>(file, HISTORY_COLUMNS)
  if (!table) return { history: null, problems }
  const wrong = wrongRows(table)
  if (wrong.length > 0) return { history: null, problems: [...problems, ...wrong] }
  const wafers = [...new Set(table.texts.wafer.filter(Boolean))]
  const probes = [...new Set(table.texts.probe.filter(Boolean))]
  if (wafers.length > 1 || probes.length > 1) {
    const what = wafers.length > 1 ? `wafers (${wafers.slice(0, 6).join(', ')})` : `probes (${probes.slice(0, 6).join(', ')})`
    const why = `it has several ${what}; a history is of one check wafer and one probe`
    return { history: null, problems: [...problems, { kind: 'bad-table', file: file.name, why }] }
  }
  const mismatch = spreadMismatch(table)
  if (mismatch !== null) return { history: null, problems: [...problems, { kind: 'bad-table', file: file.name, why: mismatch }] }
  const times = Array.from({ length: table.count }, (_, i) => momentOf(table, i))
  const placeless = placelessRows(times)
  const kept = times.flatMap((_, i) => (placeless.has(i) ? [] : [i]))
  const left = [...placeless].map(([i, why]): TableProblem => ({ kind: 'bad-table', file: file.name, line: table.line[i], why }))
  return { history: historyOf(table, times, kept), problems: [...problems, ...left] }
} // prettier-ignore

/** Why each row can't be put in the order of time; none where no row has a time that can be read. */
function placelessRows(times: readonly Moment[]): ReadonlyMap<number, string> {
  const without = times.flatMap(({ key }, i) => (Number.isNaN(key) ? [i] : []))
  if (without.length === times.length) return new Map()
  return new Map(without.map((i) => [i, timeFault(times[i].text)]))
}

function timeFault(text: string): string {
  if (text === '') return 'it has no time, and other rows have one'
  return parseTime(text) === 'ambiguous'
    ? `its time ${quote(text)} can be read day first or month first; write it as 2026-03-02`
    : `its time ${quote(text)} can't be read; write it as 2026-03-02 or 2026-03-02T14:05`
}

const UNITS: Readonly<Record<string, string>> = { 'sheet-resistance': 'Ω/sq', resistivity: 'Ω·cm', resistance: 'Ω' }

function historyOf(table: NamedTable<HistoryColumn>, times: readonly Moment[], kept: readonly number[]): CheckHistory {
  const { file, bytes, sha256, line, numbers, texts, units } = table
  const named = (column: readonly string[]): string[] => [...new Set(kept.map((i) => column[i]).filter(Boolean))]
  const ofKept = (cell: (row: number) => number): Float64Array => Float64Array.from(kept, cell)
  const key = kept.map((i) => times[i].key)
  const hasOrder = !key.some(Number.isNaN)
  const spread = spreadOf(table)
  return {
    file,
    bytes,
    sha256,
    unit: UNITS[units.value?.quantity ?? ''] ?? '',
    count: kept.length,
    order: Uint32Array.from(kept, (_, k) => k).sort((a, b) => (hasOrder ? key[a] - key[b] || a - b : a - b)),
    value: ofKept((i) => numbers.value[i]),
    standardDeviation: ofKept((i) => spread[i]),
    degreesOfFreedom: ofKept((i) => (Number.isNaN(numbers.freedom[i]) ? numbers.readings[i] - 1 : numbers.freedom[i])),
    hasUnreadTimes: !hasOrder && kept.some((i) => texts.time[i] !== ''),
    when: kept.map((i, k) => times[i].text || `row ${k + 1}`),
    time_ms: ofKept((i) => times[i].time_ms),
    line: Uint32Array.from(kept, (i) => line[i]),
    wafers: named(texts.wafer),
    probes: named(texts.probe),
  }
} // prettier-ignore

interface Moment {
  readonly text: string
  readonly time_ms: number
  /** What rows are ordered by: NaN for none. */
  readonly key: number
}

/** A time, or what stands of year, month, day, hour and minute; without a year only the order is known. */
function momentOf({ texts }: NamedTable<HistoryColumn>, row: number): Moment {
  if (texts.time[row] !== '') {
    const read = parseTime(texts.time[row])
    const time_ms = typeof read === 'string' ? NaN : read.time_ms
    return { text: texts.time[row].replace(/^(\d{4}-\d\d-\d\d)T(\d\d:\d\d)(:00)?Z?$/, '$1 $2'), time_ms, key: time_ms }
  }
  const [year, month, day, hour, minute] = (['year', 'month', 'day', 'hour', 'minute'] as const).map((id) => texts[id][row])
  if (day === '') return { text: '', time_ms: NaN, key: NaN }
  const two = (part: string): string => part.padStart(2, '0')
  const date = [year, month, day].filter(Boolean).map(two).join('-')
  const text = hour === '' ? date : `${date} ${two(hour)}:${two(minute || '0')}`
  const key = Date.UTC(Number(year || 2000), Number(month || 1) - 1, Number(day), Number(hour || 0), Number(minute || 0))
  return { text, time_ms: year === '' ? NaN : key, key }
} // prettier-ignore

function wrongRows({ file, line, numbers }: NamedTable<HistoryColumn>): TableProblem[] {
  return Array.from(line, (at, i): TableProblem | null =>
    numbers.spread[i] < 0
      ? { kind: 'bad-table', file, line: at, why: `its standard deviation ${numbers.spread[i]} is negative` }
      : null,
  ).flatMap((problem) => problem ?? [])
}
