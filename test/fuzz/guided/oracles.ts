/** Second opinions on what a file says: a reader of a few lines for the plainest files, and the same file written otherwise. */
import type { Readings } from '../../../core/ingest/readings'
import { readReadings } from '../../../core/ingest/read-files'
import { require } from '../sound-result'

const HEADER = 'wafer,site,x_mm,y_mm,current_A,voltage_V'
const NUMBER = /^-?\d{1,6}(\.\d{1,6})?(e-?\d)?$/
const NAME = /^[A-Z]\d{1,3}$/

/** A file of this header alone with plain names and numbers is read by hand too: the same sites, the same numbers. */
export function agreesWithPlainReading(bytes: Uint8Array, readings: Readings | null): void {
  const lines = Buffer.from(bytes).toString('latin1').split('\n')
  if (lines[0] !== HEADER || lines.length < 3 || lines.at(-1) !== '') return
  const rows = lines.slice(1, -1).map((line) => line.split(','))
  const isPlain = (row: readonly string[]) =>
    row.length === 6 && NAME.test(row[0]) && /^[1-9]\d{0,2}$/.test(row[1]) && row.slice(2).every((cell) => NUMBER.test(cell))
  if (!rows.every(isPlain)) return
  const expected = rows.filter(([, , x, y, i, v]) => Math.hypot(Number(x), Number(y)) < 100 && Number(i) > 1e-6 && Number(v) > 1e-6)
  if (expected.length !== rows.length || new Set(rows.map(([wafer, site]) => `${wafer},${site}`)).size !== rows.length) return
  require(readings?.count === rows.length, () => `${readings?.count} sites of ${rows.length} plain ones`)
  rows.forEach((row, at) => {
    const found = [readings!.x_mm![at], readings!.y_mm![at], readings!.current_A![at], readings!.voltage_V![at]]
    require(found.every((value, k) => value === Number(row[k + 2])), () => `row ${at + 2}: ${found.join()} for ${row.join()}`)
    require(readings!.wafers[readings!.wafer[at]].id === row[0], () => `row ${at + 2}: wafer for ${row[0]}`)
  })
  readsTheSameTurned(rows, readings)
} // prettier-ignore

/** Columns in the other order, other delimiters, rows from the last to the first, decimal commas: the same sites. */
function readsTheSameTurned(rows: readonly (readonly string[])[], readings: Readings | null): void {
  const turned = (delimiter: string, cell: (text: string) => string) =>
    [HEADER.split(','), ...[...rows].reverse()].map((row) => [...row].reverse().map(cell).join(delimiter)).join('\n')
  const sorted = (found: Readings | null) => found && rowsOf(found).sort().join('\n')
  for (const text of [turned(';', (cell) => cell), turned('\t', (cell) => cell), turned(';', (cell) => cell.replace('.', ','))]) {
    const again = readReadings([{ name: 'input.csv', bytes: new TextEncoder().encode(text), sha256: '00' }]).readings
    require(sorted(again) === sorted(readings), () => `turned: ${sorted(again)} for ${sorted(readings)}`)
  }
} // prettier-ignore

function rowsOf({ count, wafers, wafer, siteNames, site, ...columns }: Readings): string[] {
  const { x_mm, y_mm, current_A, voltage_V } = columns
  return Array.from({ length: count }, (_, i) =>
    [wafers[wafer[i]].id, siteNames[site[i]], x_mm?.[i], y_mm?.[i], current_A?.[i], voltage_V?.[i]].join(),
  )
}

/** Other line ends and a byte order mark change nothing in what is read. */
export function readsTheSameOtherwise(bytes: Uint8Array, readings: Readings | null): void {
  const text = Buffer.from(bytes).toString('latin1')
  // Bytes beyond ASCII may be of another encoding once a mark is before them; quotes may hold line breaks.
  if (!/^[\n\x20-\x7e]*$/.test(text) || text.includes('"')) return
  const marked = Buffer.concat([Buffer.from([0xef, 0xbb, 0xbf]), bytes])
  for (const other of [Buffer.from(text.replaceAll('\n', '\r\n'), 'latin1'), marked]) {
    const again = readReadings([{ name: 'input.csv', bytes: other, sha256: '00' }]).readings
    require(numbersOf(again) === numbersOf(readings), () => `read otherwise: ${numbersOf(again)} for ${numbersOf(readings)}`)
  }
} // prettier-ignore

function numbersOf(readings: Readings | null): string {
  if (!readings) return 'nothing'
  const { count, wafers, wafer, siteNames, site } = readings
  const columns = [readings.x_mm, readings.y_mm, readings.current_A, readings.voltage_V, readings.vOverI_ohm, readings.sheetResistance_ohm_sq] // prettier-ignore
  const names = Array.from({ length: count }, (_, i) => `${wafers[wafer[i]].id}/${siteNames[site[i]]}`)
  return JSON.stringify([count, names, columns.map((column) => (column ? Array.from(column, String) : null))])
}
