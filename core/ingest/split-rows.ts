/**
 * Text to rows of cells, by Papa Parse, a block of lines at a time: the rows of a block live only until they are read
 * into columns, so that a file of a million lines is never held as cells. Its Parser is called directly: the `parse`
 * around it keeps every block's rows alive until a full garbage collection, which makes it six times slower here.
 */
import Papa from 'papaparse/papaparse.js'
import type { DecodedText } from './decode-text'

/** A longer line is no reading. It also bounds what one block can hold. */
export const MAX_LINE_LENGTH = 1_000_000
const BLOCK_LENGTH = 1 << 16
/** A quoted cell may run over line breaks, but one that isn't closed after so many is a stray quote. */
const MAX_CELL_LINES = 20
const NEWLINE = 10
const QUOTE = 34

type Units = DecodedText['units']

export interface Rows {
  readonly cells: readonly (readonly string[])[]
  /** 1-based physical line each row began on. */
  readonly line: (row: number) => number
  /** Rows in which a quote is opened and not closed as it should be; empty for nearly every block. */
  readonly isBroken: (row: number) => boolean
  /** Line breaks in the block. */
  readonly lines: number
}

/** Ends of the blocks, each just after a line break outside quotes; or the line that is too long. */
export function blockEnds(units: Units): number[] | { readonly line: number; readonly length: number } {
  const ends: number[] = []
  const hasQuotes = units.includes(QUOTE)
  for (let begin = 0; begin < units.length;) {
    const last = begin + BLOCK_LENGTH
    let end = last >= units.length ? units.length : units.lastIndexOf(NEWLINE, last - 1) + 1
    if (end <= begin) end = nextLineEnd(units, begin)
    if (hasQuotes) end = quoteSafeEnd(units, begin, end)
    if (end - begin > BLOCK_LENGTH) {
      const long = longLine(units, begin, end)
      if (long) return long
    }
    ends.push(end)
    begin = end
  }
  return ends
}

function nextLineEnd(units: Units, from: number): number {
  const at = units.indexOf(NEWLINE, from)
  return at < 0 ? units.length : at + 1
}

/** An odd number of quotes means that the block would end inside a quoted cell: it goes on to where they are even. */
function quoteSafeEnd(units: Units, begin: number, end: number): number {
  let odd = countOf(QUOTE, units, begin, end) % 2 === 1
  let later = end
  for (let lines = 0; odd && later < units.length && lines < MAX_CELL_LINES; lines++) {
    const next = nextLineEnd(units, later)
    odd = odd !== (countOf(QUOTE, units, later, next) % 2 === 1)
    later = next
  }
  return odd ? end : later
}

function longLine(units: Units, begin: number, end: number): { line: number; length: number } | null {
  for (let at = begin; at < end;) {
    const next = nextLineEnd(units, at)
    if (next - at > MAX_LINE_LENGTH) return { line: countOf(NEWLINE, units, 0, at) + 1, length: next - at }
    at = next
  }
  return null
}

function countOf(unit: number, units: Units, begin: number, end: number): number {
  let count = 0
  for (let at = begin; at < end; at++) if (units[at] === unit) count++
  return count
}

/** The rows of one block that begins on `firstLine`. */
export function splitRows(block: string, delimiter: string, firstLine: number): Rows {
  if (!block.includes('"')) return splitPlain(block, delimiter, firstLine)
  const text = block.replace(/\r\n/g, '\n')
  const { data, errors } = split(text, delimiter, false)
  const lineOf = new Uint32Array(data.length)
  let line = firstLine
  let longest = 1
  for (let row = 0; row < data.length; row++) {
    lineOf[row] = line
    const height = 1 + lineBreaksIn(data[row])
    longest = Math.max(longest, height)
    line += height
  }
  if (errors.some((error) => error.type === 'Quotes') || longest > MAX_CELL_LINES) {
    return splitLineByLine(text, delimiter, firstLine)
  }
  if (text.endsWith('\n')) data.pop()
  return { cells: data, line: (row) => lineOf[row], isBroken: () => false, lines: line - 1 - firstLine }
}

function splitPlain(block: string, delimiter: string, firstLine: number): Rows {
  const cells = split(block, delimiter, true).data
  const lines = cells.length - 1
  if (block.endsWith('\n')) cells.pop()
  return { cells, line: (row) => firstLine + row, isBroken: () => false, lines }
}

/** `fastMode` splits at every delimiter and line break: right only where no quotes are. */
function split(text: string, delimiter: string, fastMode: boolean) {
  return new Papa.Parser({ delimiter, newline: '\n', fastMode }).parse(text)
}

function lineBreaksIn(cells: readonly string[]): number {
  let breaks = 0
  for (const cell of cells) if (cell.includes('\n')) breaks += cell.split('\n').length - 1
  return breaks
}

/** After a stray quote, each line for itself: the quote spoils its own line and swallows no other. */
function splitLineByLine(text: string, delimiter: string, firstLine: number): Rows {
  const lines = text.split('\n')
  const count = lines.length - 1
  if (text.endsWith('\n')) lines.pop()
  const broken = new Set<number>()
  const cells = lines.map((line, row) => {
    if (!line.includes('"')) return line.split(delimiter)
    const { data, errors } = split(line, delimiter, false)
    if (errors.some((error) => error.type === 'Quotes')) broken.add(row)
    return data[0] ?? ['']
  })
  return { cells, line: (row) => firstLine + row, isBroken: (row) => broken.has(row), lines: count }
}
