/**
 * Reads the rows of one file, one after the other, into the growing columns. A good row costs no object; a row that
 * isn't one is looked at again, slowly: it may be blank, a units row, a preamble line, another header, or bad.
 */
import type { FileProblem } from '../problems/problem'
import { ReadingCheck, LARGEST } from './check-reading'
import { isUnitsRow, isWordRow, trimmed, widthOf } from './find-header'
import { makeLayout } from './layout'
import type { Layout } from './layout'
import type { LotDraft } from './lot-draft'
import { headerStrength } from './match-columns'
import { decimalCode, isBlank, parseNumber } from './parse-number'
import type { DecimalMark } from './parse-number'
import { TimeColumnReader } from './parse-time'
import { isPreambleRow, readPreambleRow } from './preamble'
import type { ReadOptions } from './read-options'
import { NUMBERED_BIT, readRole } from './read-role'
import type { ColumnMatch } from './readings'
import { shapeFault, valueFault } from './row-fault'
import { RowNaming } from './row-naming'
import { RowProblems } from './row-problems'
import { Section, joinDate } from './section'
import type { Rows } from './split-rows'
import { readTextCell } from './text-cell'

export class RowReader {
  readonly problems: RowProblems
  readonly section = new Section()
  readonly matches: ColumnMatch[] = []
  readonly ignoredHeaders: string[] = []
  /** Rows of readings, good and bad. */
  rows = 0
  hasLong = false
  /** Set by a second header that can't be used: the file is refused. */
  failure: FileProblem | null = null

  private layout: Layout | null = null
  /** As the row of names stands in the file, without what a row of units under it added. */
  private names: readonly string[] = []
  private check: ReadingCheck | null = null
  private targets: Float64Array[] = []
  private decimal = 46
  decimalMark: DecimalMark = '.'
  private isJustAfterHeader = false
  private readonly times = new TimeColumnReader()
  private readonly naming: RowNaming

  constructor(
    private readonly draft: LotDraft,
    private readonly file: string,
    private readonly fileIndex: number,
    private readonly delimiter: string,
    private readonly options: ReadOptions,
  ) {
    this.problems = new RowProblems(file)
    this.naming = new RowNaming(draft, file, this.section)
  }

  readPreamble(cells: readonly string[]): void {
    if (cells.every(isBlank) || /^sep=.?$/i.test(cells[0].trim())) return
    this.naming.forgetWafer()
    const isRead = this.section.take(readPreambleRow(cells, this.delimiter))
    if (!isRead) {
      this.note(`the temperature "${this.section.temperatureText}" of the preamble can't be read and is left out`)
    }
    if (this.section.lot !== '') this.draft.nameLot(this.section.lot, this.file)
  }

  /** Begins readings under this header; false if it can't be used, with `failure` set. */
  readHeader(cells: readonly string[]): boolean {
    const layout = makeLayout(this.file, cells, this.options)
    if ('kind' in layout) {
      this.failure = layout
      return false
    }
    this.layout = layout
    this.names = layout.headers
    this.hasLong ||= layout.isLong
    this.isJustAfterHeader = true
    this.naming.forgetWafer()
    this.draft.columns.reserve(1)
    this.draft.columns.clearNext()
    this.bind()
    if (layout.at.wafer < 0 && layout.at.slot < 0 && this.section.wafer === '' && this.section.slot === '') {
      this.note(`the wafer is named after the file: ${this.naming.fileWafer}`)
    }
    return true
  }

  get columns(): Layout['columns'] {
    return this.layout?.columns ?? []
  }

  setDecimalMark(mark: DecimalMark): void {
    this.decimalMark = mark
    this.decimal = decimalCode(mark)
  }

  expectRows(count: number): void {
    if (this.draft.columns.reserve(count)) this.bind()
  }

  readRows(rows: Rows, from: number): void {
    const { cells } = rows
    if (this.draft.columns.reserve(cells.length)) this.bind()
    for (let row = from; row < cells.length && this.failure === null; row++) {
      if (rows.isBroken(row))
        this.reject(rows.line(row), cells[row], 'has a quotation mark that is not closed as it should be')
      else if (!this.readRow(cells[row], rows.line(row))) this.readOther(cells[row], rows.line(row))
    }
  }

  finish(): void {
    if (this.isJustAfterHeader) this.keepMatches()
    const { firstRefused, sawZoneless } = this.times
    if (firstRefused) {
      const why = firstRefused.why === 'ambiguous' ? 'may be day first or month first' : 'is no time we can read'
      this.note(
        `times such as "${firstRefused.text}" (line ${firstRefused.line}) are left out: it ${why}; write YYYY-MM-DD hh:mm:ss`,
      )
    }
    if (sawZoneless) this.note('times without a zone are taken as UTC')
    const unlisted = this.problems.count - this.problems.listed.length
    if (unlisted > 0) this.note(`${unlisted} more rejected rows are counted but not listed one by one`)
  }

  /** The arrays of the columns in use, again after they have grown. */
  private bind(): void {
    const { columns } = this.draft
    if (this.layout === null) return
    this.targets = this.layout.numbers.map((cell) => columns.number(cell.target))
    if (this.layout.at.time >= 0 || this.layout.at.date >= 0) columns.number('time_ms')
    this.check = new ReadingCheck(columns, this.layout)
  }

  /** True if the row was a good reading and is stored. */
  private readRow(cells: readonly string[], line: number): boolean {
    const layout = this.layout!
    const { columns } = this.draft
    const row = columns.count
    if (cells.length !== layout.width && !(cells.length > layout.width && widthOf(cells) <= layout.width)) return false
    if (layout.width < 3 && isPreambleRow(cells, this.delimiter)) return false
    if (!this.readNumbers(cells, row)) return false
    const role = layout.isLong ? readRole(cells, layout.at) : 0
    if (role < 0 || !this.check!.isGood(row, role)) return false
    const { at } = layout
    const { naming } = this
    if (naming.isStatistics(cells[0]) || (at.site > 0 && naming.isStatistics(cells[at.site]))) return false
    const wafer = naming.waferOf(cells, at)
    if (wafer < 0) return false
    if (at.lot >= 0) naming.readLot(cells[at.lot])
    if (layout.isPolar) turnPolar(columns.number('x_mm'), columns.number('y_mm'), row)
    columns.wafer[row] = wafer
    columns.site[row] = naming.siteOf(cells, at, wafer, line)
    columns.file[row] = this.fileIndex
    columns.line[row] = line
    columns.role[row] = at.site < 0 ? role | NUMBERED_BIT : role
    this.fillFromPreamble(cells, row, line)
    columns.count++
    this.rows++
    if (this.isJustAfterHeader) this.beginReadings()
    return true
  }

  private readNumbers(cells: readonly string[], row: number): boolean {
    const { numbers } = this.layout!
    for (let k = 0; k < numbers.length; k++) {
      const { at, shift, scale, offset } = numbers[k]
      const cell = cells[at]
      let value = parseNumber(cell, this.decimal, shift)
      if (!(value < LARGEST && value > -LARGEST) && !isBlank(cell)) return false
      if (scale !== 1 || offset !== 0) value = value * scale + offset
      this.targets[k][row] = value
    }
    return true
  }

  private beginReadings(): void {
    this.isJustAfterHeader = false
    this.section.close()
    this.keepMatches()
  }

  private fillFromPreamble(cells: readonly string[], row: number, line: number): void {
    const { at } = this.layout!
    const { columns } = this.draft
    const { section } = this
    if (section.temperature_C === section.temperature_C && !this.hasTemperature()) {
      columns.number('temperature_C')[row] = section.temperature_C
      if (this.isJustAfterHeader)
        this.note(`temperature ${section.temperatureText} of the preamble used for the rows under it`)
    }
    if (at.time >= 0 || at.date >= 0) {
      const time = at.time >= 0 ? readTextCell(cells[at.time]) : ''
      const date = at.date >= 0 ? readTextCell(cells[at.date]) : ''
      columns.number('time_ms')[row] = this.times.read(date === '' ? time : joinDate(date, time), line)
    } else if (section.time !== '') columns.number('time_ms')[row] = this.times.read(section.time, line)
  }

  private hasTemperature(): boolean {
    return this.layout!.numbers.some((cell) => cell.target === 'temperature_C')
  }

  /** A row that is no good reading: what is it? */
  private readOther(cells: readonly string[], line: number): void {
    const filled = widthOf(cells)
    if (filled === 0) return
    if (this.isJustAfterHeader && isUnitsRow(cells)) {
      const { headers } = this.layout!
      const { names } = this
      this.readHeader(headers.map((header, at) => withUnit(header, cells[at] ?? '')))
      this.names = names
    } else if (this.isSameHeader(cells)) this.readHeader(cells)
    else if (isPreambleRow(cells, this.delimiter)) this.readPreamble(cells)
    else if (this.isHeader(cells)) this.readHeader(cells)
    else this.rejectReading(cells, line, filled)
  }

  /** The names of this header, for the record, once its units are known too. */
  private keepMatches(): void {
    for (const match of this.layout?.matches ?? []) {
      const same = (other: ColumnMatch) =>
        other.header === match.header && other.position === match.position && other.column === match.column
      if (!this.matches.some(same)) this.matches.push(match)
    }
    for (const header of this.layout?.ignoredHeaders ?? []) {
      if (!this.ignoredHeaders.includes(header)) this.ignoredHeaders.push(header)
    }
  }

  /** Asked first: "Temp,Rs" over the next wafer's rows reads as a preamble, too. */
  private isSameHeader(cells: readonly string[]): boolean {
    const { names } = this
    return widthOf(cells) === names.length && names.every((name, at) => name === cells[at].trim())
  }

  private isHeader(cells: readonly string[]): boolean {
    return isWordRow(cells) && headerStrength(trimmed(cells), this.options) > 1
  }

  private rejectReading(cells: readonly string[], line: number, filled: number): void {
    const layout = this.layout!
    const fault = shapeFault(cells, layout, filled)
    if (fault !== null) return this.reject(line, cells, fault)
    this.rows++
    const wafer = this.naming.waferOf(cells, layout.at)
    if (wafer >= 0) this.draft.wafers.reject(wafer)
    if (wafer >= 0 && layout.at.site < 0) this.draft.wafers.nextSite(wafer)
    const { header, cell, why } = valueFault(cells, layout, this.decimalMark, this.check!, this.draft.columns)
    if (cell === null) this.problems.row(line, header, cells.join(this.delimiter), why)
    else this.problems.cell(line, header, cell, why)
  }

  /** A row too broken to say which wafer it belongs to is laid to that of the row before. */
  private reject(line: number, cells: readonly string[], why: string): void {
    this.rows++
    if (this.naming.wafer >= 0) this.draft.wafers.reject(this.naming.wafer)
    this.problems.row(line, '', cells.join(this.delimiter), why)
  }

  private note(sentence: string): void {
    this.draft.notes.add(`${this.file}: ${sentence}`)
  }
}

function withUnit(header: string, cell: string): string {
  const unit = cell.trim().replace(/[()[\]]/g, '')
  return header === '' || unit === '' || /^-+$/.test(unit) ? header : `${header} [${unit}]`
}

/** r and theta [deg] stand in x and y; theta counts from +x towards +y. Quarter turns come out exact. */
function turnPolar(x: Float64Array, y: Float64Array, row: number): void {
  const r = x[row]
  const turn = (((y[row] % 360) + 360) % 360) / 90
  const angle = (turn * Math.PI) / 2
  x[row] = r * (turn === 1 || turn === 3 ? 0 : turn === 2 ? -1 : Math.cos(angle))
  y[row] = r * (turn === 0 || turn === 2 ? 0 : turn === 3 ? -1 : Math.sin(angle))
}
