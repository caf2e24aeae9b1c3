/** From the bytes of a prober's files to one lot of readings. Nothing here throws for a bad file: what is wrong is data. */
import { DROPPED } from './columns'
import type { FileProblem, Problem, RowProblem } from '../problems/problem'
import { decodeText, type DecodedText } from './decode-text'
import { guessDecimalMark } from './dialect'
import { findHeader } from './find-header'
import { foldSites, renumberSites } from './fold-sites'
import { namesFromFile } from './labels'
import { LotDraft } from './lot-draft'
import type { ReadOptions } from './read-options'
import type { Readings, SourceFile } from './readings'
import { settleSigns } from './reverse-signs'
import { RowReader } from './row-reader'
import { MAX_LINE_LENGTH, blockEnds, splitRows } from './split-rows'

export interface InputFile {
  readonly name: string
  readonly bytes: Uint8Array
  readonly sha256: string
}

export interface ReadResult {
  /** null if no row of any file is usable, or the files are of different lots; `problems` says why. */
  readonly readings: Readings | null
  /** Of whole files, then row by row, in reading order. */
  readonly problems: readonly Problem[]
  /** What was assumed, in sentences that begin with the file's name. */
  readonly notes: readonly string[]
}

interface ReadFile {
  readonly input: InputFile
  readonly reader: RowReader
  readonly dialect: SourceFile['dialect']
  readonly begin: number
  readonly end: number
}

/** Is told after every block which share of the bytes is read, and how many rows so far. */
export type ReadWatch = (share: number, rows: number) => void

export function readReadings(inputs: readonly InputFile[], options: ReadOptions = {}, watch?: ReadWatch): ReadResult {
  const draft = new LotDraft()
  const total = inputs.reduce((sum, { bytes }) => sum + bytes.length, 0)
  let before = 0
  const files: ReadFile[] = []
  const fileProblems: FileProblem[] = []
  for (const input of inputs) {
    const file = readFile(draft, files.length, input, options, (share) =>
      watch?.((before + share * input.bytes.length) / total, draft.columns.count),
    )
    before += input.bytes.length
    if ('kind' in file) fileProblems.push(file)
    else files.push(file)
  }
  settleRows(draft, files)
  fileProblems.push(...draft.mixed, ...files.flatMap((file) => emptyProblem(draft, file, files.indexOf(file))))
  const rowProblems = files.flatMap(({ reader }) => inLineOrder(reader.problems.listed))
  const isUsable = draft.columns.count > 0 && draft.mixed.length === 0
  return {
    readings: isUsable ? finish(draft, files) : null,
    problems: [...fileProblems, ...rowProblems],
    notes: [...draft.notes],
  }
}

function readFile(
  draft: LotDraft,
  index: number,
  input: InputFile,
  options: ReadOptions,
  watch: (share: number) => void,
): ReadFile | FileProblem {
  const file = input.name
  if (input.bytes.length === 0) return { kind: 'empty-file', file }
  if (index > 0xffff) return { kind: 'cannot-read', file, why: 'there are more than 65536 files' }
  const decoded = decodeText(input.bytes)
  if ('looksLike' in decoded) return { kind: 'not-text', file, looksLike: decoded.looksLike }
  const ends = blockEnds(decoded.units)
  if ('line' in ends) return { kind: 'line-too-long', file, ...ends, max: MAX_LINE_LENGTH }
  if (isBlankText(decoded, ends)) return { kind: 'empty-file', file }
  const header = findHeader(file, decoded.text(0, ends[0]), options)
  if ('kind' in header) return header
  const undo = draft.mark()
  const reader = new RowReader(draft, file, index, header.delimiter, options)
  const begin = draft.columns.count
  const problem = readBlocks(reader, decoded, ends, header, options, watch)
  if (problem) {
    undo()
    return problem
  }
  const { decimalMark } = reader
  const dialect = { encoding: decoded.encoding, delimiter: header.delimiter, decimalMark }
  return { input, reader, dialect, begin, end: draft.columns.count }
}

function isBlankText({ text }: DecodedText, ends: readonly number[]): boolean {
  return ends.every((end, block) => !/\S/.test(text(block === 0 ? 0 : ends[block - 1], end)))
}

/** Reads every block; the file is refused if a header in it can't be used. */
function readBlocks(
  reader: RowReader,
  { text, units }: DecodedText,
  ends: readonly number[],
  header: { readonly delimiter: string; readonly row: number },
  options: ReadOptions,
  watch: (share: number) => void,
): FileProblem | null {
  let line = 1
  let begin = 0
  for (const end of ends) {
    const rows = splitRows(text(begin, end), header.delimiter, line)
    let from = 0
    if (begin === 0) {
      for (const cells of rows.cells.slice(0, header.row)) reader.readPreamble(cells)
      if (!reader.readHeader(rows.cells[header.row])) return reader.failure
      from = header.row + 1
      reader.setDecimalMark(options.decimalMark ?? guessDecimalMark(rows.cells.slice(from), reader.columns))
    }
    if (begin === 0) reader.expectRows(estimateRows(units.length, end, rows.cells.length))
    reader.readRows(rows, from)
    if (reader.failure) return reader.failure
    line += rows.lines
    begin = end
    watch(end / units.length)
  }
  reader.finish()
  return null
}

/** From the first block, so that the columns need not grow often: each growth is a copy of everything. */
function estimateRows(length: number, firstLength: number, firstRows: number): number {
  return Math.ceil((firstRows * length * 1.02) / firstLength) + 16
}

/** What can be judged only over all rows: one reading a site, and the signs of reverse readings. */
function settleRows(draft: LotDraft, files: readonly ReadFile[]): void {
  const { columns } = draft
  const dropped = new Uint8Array(columns.count)
  const isLong = files.some(({ reader }) => reader.hasLong)
  foldSites(
    draft,
    files.map(({ reader }) => reader.problems),
    isLong,
    dropped,
  )
  for (const { input, reader, begin, end } of files) {
    if (reader.hasLong)
      draft.notes.add(`${input.name}: the rows of one site are put together by configuration and direction`)
    const note = (sentence: string) => draft.notes.add(`${input.name}: ${sentence}`)
    settleSigns(columns, begin, end, reader.problems, dropped, note)
  }
  dropped.forEach((why, row) => {
    if (why === DROPPED.rejected) draft.wafers.reject(columns.wafer[row])
  })
  if (dropped.some((why) => why !== 0)) columns.compact(dropped)
  if (isLong) renumberSites(draft)
}

function emptyProblem(draft: LotDraft, { input, reader }: ReadFile, index: number): FileProblem[] {
  const { file, count } = draft.columns
  if (file.subarray(0, count).includes(index)) return []
  return [{ kind: 'no-readings', file: input.name, rows: reader.rows, rejected: reader.problems.count }]
}

function inLineOrder(problems: readonly RowProblem[]): RowProblem[] {
  return [...problems].sort((a, b) => a.line - b.line)
}

function finish(draft: LotDraft, files: readonly ReadFile[]): Readings {
  const { columns, sites, wafers } = draft
  const { count } = columns
  const usedWafers = wafers.used(columns.wafer, count)
  return {
    lot: draft.lot?.name ?? namesFromFile(files[0].input.name).stem,
    files: files.map(sourceFile),
    wafers: usedWafers,
    count,
    wafer: columns.trimmed(columns.wafer),
    site: columns.trimmed(columns.site),
    siteNames: sites.names,
    file: columns.trimmed(columns.file),
    line: columns.trimmed(columns.line),
    x_mm: columns.finished('x_mm'),
    y_mm: columns.finished('y_mm'),
    dieX: columns.finished('dieX'),
    dieY: columns.finished('dieY'),
    current_A: columns.finished('current_A'),
    voltage_V: columns.finished('voltage_V'),
    currentReverse_A: columns.finished('currentReverse_A'),
    voltageReverse_V: columns.finished('voltageReverse_V'),
    currentB_A: columns.finished('currentB_A'),
    voltageB_V: columns.finished('voltageB_V'),
    currentReverseB_A: columns.finished('currentReverseB_A'),
    voltageReverseB_V: columns.finished('voltageReverseB_V'),
    temperature_C: columns.finished('temperature_C'),
    vOverI_ohm: columns.finished('vOverI_ohm'),
    vOverIB_ohm: columns.finished('vOverIB_ohm'),
    sheetResistance_ohm_sq: columns.finished('sheetResistance_ohm_sq'),
    resistivity_ohm_cm: columns.finished('resistivity_ohm_cm'),
    time_ms: columns.finished('time_ms'),
  }
}

function sourceFile({ input, reader, dialect }: ReadFile): SourceFile {
  return {
    name: input.name,
    bytes: input.bytes.length,
    sha256: input.sha256,
    dialect,
    preamble: reader.section.entries,
    matches: reader.matches,
    ignoredHeaders: reader.ignoredHeaders,
    rows: reader.rows,
    rejectedRows: reader.problems.count,
  }
}
