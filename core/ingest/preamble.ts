/** The lines before a header: `key: value`, `key,value`, `# key=value`, several on one line, or free text. */
import { findUnit, toBase } from '../units/unit-register'
import { matchHeader } from './match-header'
import { parseNumber, isBlank } from './parse-number'
import type { HeaderTarget } from './header-words'
import { readTextCell } from './text-cell'

export interface PreambleEntry {
  /** Empty for a line of free text. */
  readonly key: string
  readonly value: string
}

/** A longer line is free text: the patterns below would take too long over it. */
const MAX_LENGTH = 2000

const PAIR = /^\s*(?:[#%;*!]+|\/\/)?\s*([^:=,;\t]{1,60}?)\s*[:=,;\t]\s*(.*)$/

/** Keys beside those that name a column; they are kept, and show that a line inside the rows is no bad reading. */
const OTHER_KEYS = new Set(
  (
    'operator user recipe program tool equipment prober probe head product device process step operation layer technology ' +
    'comment comments remark remarks note notes title shift station instrument software version report file created wafers ' +
    'sites points diameter size thickness orientation dopant implant'
  ).split(' '),
)

/** What a key of the preamble gives the rows that follow, if anything. */
export function preambleTarget(key: string): HeaderTarget | null {
  const target = matchHeader(key)?.target ?? null
  return target === 'lot' ||
    target === 'wafer' ||
    target === 'slot' ||
    target === 'temperature_C' ||
    target === 'time' ||
    target === 'date'
    ? target
    : null
}

/** A row of cells as preamble; free text comes back under an empty key. */
export function readPreambleRow(cells: readonly string[], delimiter: string): readonly PreambleEntry[] {
  if (isTooLong(cells)) return [{ key: '', value: cells.join(delimiter).slice(0, MAX_LENGTH) }]
  const filled = cells.map((cell) => cell.trim()).filter((cell) => cell !== '')
  const separate = filled.map(readPair)
  if (filled.length > 1 && separate.every((entry) => entry !== null && /[:=]/.test(entry.mark))) {
    return separate.map((entry) => ({ key: entry!.key, value: entry!.value }))
  }
  if (
    filled.length > 2 &&
    filled.length % 2 === 0 &&
    filled.every((cell, at) => at % 2 === 1 || preambleTarget(bareKey(cell)) !== null)
  ) {
    return filled.flatMap((cell, at) =>
      at % 2 === 0 ? [{ key: bareKey(cell), value: readTextCell(filled[at + 1]) }] : [],
    )
  }
  const pair = readPair(cells.join(delimiter).replace(/[\s,;]+$/, ''))
  return [pair ? { key: pair.key, value: pair.value } : { key: '', value: filled.join(delimiter) }]
}

/** Whether a row among the readings is of a preamble: its key is one we know. */
export function isPreambleRow(cells: readonly string[], delimiter: string): boolean {
  if (isTooLong(cells)) return false
  const filled = cells.filter((cell) => !isBlank(cell)).length
  const entries = filled > 8 ? [] : readPreambleRow(cells, delimiter)
  return (
    entries.length > 0 &&
    entries.every(({ key, value }) => isKnownKey(key) && value !== '') &&
    filled <= Math.max(2, 2 * entries.length)
  )
}

function isTooLong(cells: readonly string[]): boolean {
  let length = cells.length
  for (const cell of cells) length += cell.length
  return length > MAX_LENGTH
}

function isKnownKey(key: string): boolean {
  if (key === '') return false
  return preambleTarget(key) !== null || OTHER_KEYS.has(key.toLowerCase().split(/[\s_/(-]+/)[0])
}

function bareKey(cell: string): string {
  return cell.replace(/^[#%*!\s]+/, '').replace(/[:=\s]+$/, '')
}

function readPair(text: string): (PreambleEntry & { readonly mark: string }) | null {
  const match = PAIR.exec(text)
  if (!match || match[1] === '') return null
  const value = match[2].trim().replace(/^[:=]\s*/, '')
  const unquoted = /^"(.*)"$/.exec(value)?.[1] ?? value
  return {
    key: match[1].trim(),
    value: readTextCell(unquoted),
    mark: text.charAt(text.indexOf(match[1]) + match[1].length).trim() || text.slice(match[1].length),
  }
}

/** A temperature of the preamble in °C: `23.1`, `23.1 °C`, `73,4 F`, the unit perhaps in the key; NaN if it can't be read. */
export function preambleTemperature_C(entry: PreambleEntry): number {
  const match = /^([+-]?[\d.,]+(?:e[+-]?\d+)?)\s*(.*)$/i.exec(entry.value)
  if (!match) return NaN
  const number = parseNumber(match[1].replace(',', '.'), 46, 0)
  const unit = match[2] === '' ? matchHeader(entry.key)?.unit : findUnit(match[2])
  if (unit === undefined || (unit === null && match[2] !== '')) return NaN
  if (unit === null) return number
  return unit.quantity === 'temperature' ? toBase(number, unit) : NaN
}
