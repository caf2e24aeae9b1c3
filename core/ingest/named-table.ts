/**
 * A small table with named columns, of which a caller knows the names: a gauge study, the history of a check wafer.
 * Order and further columns don't matter; rows that can't be read are collected, not dropped in silence.
 */
import type { TableProblem } from '../problems/problem'
import { quote, quotedList } from '../problems/quote'
import { toBase, type Unit } from '../units/unit-register'
import { LARGEST, OVERLOAD } from './check-reading'
import { decodeText } from './decode-text'
import { readHeader } from './header-name'
import { decimalCode, explainNumber, parseNumber, type DecimalMark } from './parse-number'
import {
  decimalMarkOf, isPassedOver, MAX_TABLE_PROBLEMS, SEARCHED_ROWS, TABLE_DELIMITERS, type RowFault,
} from './small-table' // prettier-ignore
import { splitRows, type Rows } from './split-rows'

export interface TableColumn {
  /** Its words as a header may have them, joined by spaces and in small letters. The first that fits is taken. */
  readonly names: readonly RegExp[]
  readonly kind: 'text' | 'number'
  /** Without it the table can't be used. */
  readonly needed: boolean
  /** How a person is told to name it. */
  readonly example: string
}

export interface NamedTable<Id extends string> {
  readonly file: string
  readonly bytes: number
  readonly sha256: string
  readonly count: number
  /** 1-based line of the file that each row began on. */
  readonly line: Uint32Array
  /** The file's own header of each column; null where it has none. */
  readonly headers: Readonly<Record<Id, string | null>>
  /** The unit that the header names. */
  readonly units: Readonly<Record<Id, Unit | null>>
  readonly numbers: Readonly<Record<Id, Float64Array>>
  readonly texts: Readonly<Record<Id, readonly string[]>>
}

export interface ReadTable<Id extends string> {
  /** null where the file can't be used at all. */
  readonly table: NamedTable<Id> | null
  readonly problems: readonly TableProblem[]
}

export interface TableFile {
  readonly name: string
  readonly bytes: Uint8Array
  readonly sha256: string
}

const MAX_BYTES = 20_000_000
const MAX_ROWS = 100_000

/**
 * Lines that begin with # or % are comments. A text column that a row leaves blank reads as ''; a number that is not
 * needed, as NaN. Nothing here throws for a bad file.
 */
export function readNamedTable<Id extends string>(
  { name, bytes, sha256 }: TableFile,
  columns: Readonly<Record<Id, TableColumn>>,
): ReadTable<Id> {
  const refused = (why: string): ReadTable<Id> => ({ table: null, problems: [{ kind: 'bad-table', file: name, why }] })
  if (bytes.length > MAX_BYTES) return refused(`it has ${bytes.length} bytes, more than ${MAX_BYTES}`)
  const decoded = decodeText(bytes)
  if ('looksLike' in decoded) return refused(`it is no text; it looks like ${decoded.looksLike}`)
  const found = findHeader(decoded.text(), columns)
  if (typeof found === 'string') return refused(found)
  if (found.rows.cells.length > MAX_ROWS) return refused(`it has more than ${MAX_ROWS} rows`)
  const read = readRows(found, columns)
  const problems = read.faults.map((fault): TableProblem => ({ kind: 'bad-table', file: name, ...fault }))
  if (read.lines.length === 0) {
    return { table: null, problems: [...problems, { kind: 'bad-table', file: name, why: 'no row of it can be used' }] }
  }
  const ids = Object.keys(columns) as Id[]
  const of = <Value>(make: (id: Id) => Value) => Object.fromEntries(ids.map((id) => [id, make(id)])) as Record<Id, Value>
  const table: NamedTable<Id> = {
    file: name,
    bytes: bytes.length,
    sha256,
    count: read.lines.length,
    line: Uint32Array.from(read.lines),
    headers: of((id) => found.at[id]?.header ?? null),
    units: of((id) => found.at[id]?.unit ?? null),
    numbers: of((id) => Float64Array.from(read.cells[id], (cell) => (typeof cell === 'number' ? cell : NaN))),
    texts: of((id) => read.cells[id].map((cell) => (typeof cell === 'string' ? cell : ''))),
  }
  return { table, problems }
} // prettier-ignore

interface PlacedColumn {
  readonly at: number
  readonly header: string
  readonly unit: Unit | null
}

interface FoundHeader<Id extends string> {
  readonly rows: Rows
  readonly row: number
  readonly decimalMark: DecimalMark
  readonly at: Readonly<Partial<Record<Id, PlacedColumn>>>
}

/** Or why there is none. */
function findHeader<Id extends string>(
  text: string,
  columns: Readonly<Record<Id, TableColumn>>,
): FoundHeader<Id> | string {
  const needed = (Object.keys(columns) as Id[]).filter((id) => columns[id].needed)
  const wanted = quotedList(needed.map((id) => columns[id].example))
  let nearest = `no line of it names the columns that are needed, such as ${wanted}`
  let most = 0
  for (const delimiter of TABLE_DELIMITERS) {
    const rows = splitRows(text, delimiter, 1)
    for (let row = 0; row < Math.min(rows.cells.length, SEARCHED_ROWS); row++) {
      if (isPassedOver(rows.cells[row])) continue
      const at = placeColumns(rows.cells[row], columns)
      const missing = needed.filter((id) => !at[id])
      if (missing.length === 0) return { rows, row, decimalMark: decimalMarkOf(rows, row, delimiter), at }
      const has = needed.length - missing.length
      if (has <= most) continue
      most = has
      nearest = `its header has no column for ${quotedList(missing.map((id) => columns[id].example))}`
    }
  }
  return nearest
}

function placeColumns<Id extends string>(
  cells: readonly string[],
  columns: Readonly<Record<Id, TableColumn>>,
): Partial<Record<Id, PlacedColumn>> {
  const readings = cells.map((cell) =>
    readHeader(cell.slice(0, 200)).map(({ words, unit }) => ({ words: words.join(' '), unit })),
  )
  const taken = new Set<number>()
  const at: Partial<Record<Id, PlacedColumn>> = {}
  for (const id of Object.keys(columns) as Id[]) {
    for (const name of columns[id].names) {
      const index = readings.findIndex((list, k) => !taken.has(k) && list.some(({ words }) => name.test(words)))
      if (index < 0) continue
      const { unit } = readings[index].find(({ words }) => name.test(words))!
      at[id] = { at: index, header: cells[index].trim(), unit }
      taken.add(index)
      break
    }
  }
  return at
}

function readRows<Id extends string>(
  { rows, row, decimalMark, at }: FoundHeader<Id>,
  columns: Readonly<Record<Id, TableColumn>>,
) {
  const ids = Object.keys(columns) as Id[]
  const cells = Object.fromEntries(ids.map((id) => [id, []])) as unknown as Record<Id, (string | number)[]>
  const lines: number[] = []
  const faults: RowFault[] = []
  for (let k = row + 1; k < rows.cells.length && faults.length < MAX_TABLE_PROBLEMS; k++) {
    if (isPassedOver(rows.cells[k])) continue
    const values = ids.map((id) => cellOf(rows.cells[k], columns[id], at[id], decimalMark))
    const fault = values.find((value) => typeof value === 'object')
    if (fault) {
      faults.push({ line: rows.line(k), why: fault.why })
      continue
    }
    ids.forEach((id, i) => cells[id].push(values[i] as string | number))
    lines.push(rows.line(k))
  }
  return { cells, lines, faults }
}

function cellOf(
  cells: readonly string[],
  { kind, needed }: TableColumn,
  place: PlacedColumn | undefined,
  mark: DecimalMark,
): string | number | { readonly why: string } {
  const cell = place ? (cells[place.at] ?? '').trim() : ''
  if (kind === 'text') {
    return needed && cell === '' ? { why: `its column ${quote(place?.header ?? '')} is empty` } : cell
  }
  if (cell === '' && !needed) return NaN
  const value = parseNumber(cell, decimalCode(mark), 0)
  if (Math.abs(value) < LARGEST) {
    const { unit } = place!
    return unit === null ? value : toBase(value, unit)
  }
  const why = Number.isNaN(value) ? explainNumber(cell, mark) : OVERLOAD
  return { why: `${quote(cell)} in column ${quotedList([place?.header ?? ''])} ${why}` }
}
