/** Names of wafers and sites as numbers: each name is held once, the rows hold its index. */
import { parseNumber } from './parse-number'
import type { WaferLabel } from './readings'
import { readTextCell } from './text-cell'

const MAX_PLAIN_NUMBER = 1 << 22
const PAGE_BITS = 12

/** Site names. The usual ones are 1, 2, 3... and need no look-up by text. */
export class SiteNames {
  readonly names: string[] = []
  private readonly byText = new Map<string, number>()
  /** Pages of indices, made as they are needed: numbers may be few and large. */
  private readonly pages: (Int32Array | undefined)[] = []

  ofCell(cell: string): number {
    const number = plainNumber(cell)
    return number >= 0 ? this.ofNumber(number) : this.ofName(readTextCell(cell))
  }

  /** " 5" is site 5, whatever blanks the file sets about it. */
  private ofName(text: string): number {
    const number = plainNumber(text)
    return number >= 0 ? this.ofNumber(number) : this.ofText(text)
  }

  ofNumber(number: number): number {
    if (number > MAX_PLAIN_NUMBER) return this.ofText(String(number))
    const page = (this.pages[number >> PAGE_BITS] ??= new Int32Array(1 << PAGE_BITS).fill(-1))
    const at = number & ((1 << PAGE_BITS) - 1)
    if (page[at] < 0) page[at] = this.names.push(String(number)) - 1
    return page[at]
  }

  ofText(text: string): number {
    const known = this.byText.get(text)
    if (known !== undefined) return known
    const index = this.names.push(text) - 1
    this.byText.set(text, index)
    return index
  }
}

/** 0 to 9999999 written plainly, without sign or leading zeros; else -1. */
function plainNumber(cell: string): number {
  const length = cell.length
  if (length === 0 || length > 7 || (length > 1 && cell.charCodeAt(0) === 48)) return -1
  let number = 0
  for (let at = 0; at < length; at++) {
    const digit = cell.charCodeAt(at) - 48
    if (!(digit >= 0 && digit <= 9)) return -1
    number = number * 10 + digit
  }
  return number
}

export class WaferLabels {
  readonly labels: { id: string; slot: number; rejectedRows: number }[] = []
  private readonly byId = new Map<string, number>()
  /** For sites that the file doesn't name: how many each wafer has. */
  private readonly siteCounts: number[] = []

  /** `slot` is empty where none is given; then a wafer whose name is a plain number stands in the slot of that number. */
  of(id: string, slot: string): number {
    const known = this.byId.get(id)
    const number = slotNumber(slot === '' ? id : slot)
    if (known !== undefined) {
      if (slot !== '' && !Number.isNaN(number)) this.labels[known].slot = number
      return known
    }
    const index = this.labels.push({ id, slot: number, rejectedRows: 0 }) - 1
    this.byId.set(id, index)
    this.siteCounts.push(0)
    return index
  }

  nextSite(wafer: number): number {
    return (this.siteCounts[wafer] = this.siteCounts[wafer] + 1)
  }

  /** Undoes everything since. */
  mark(): () => void {
    const slots = Float64Array.from(this.labels, ({ slot }) => slot)
    const rejected = Uint32Array.from(this.labels, ({ rejectedRows }) => rejectedRows)
    const siteCounts = Uint32Array.from(this.siteCounts)
    return () => {
      for (const { id } of this.labels.splice(slots.length)) this.byId.delete(id)
      this.labels.forEach((label, at) => {
        label.slot = slots[at]
        label.rejectedRows = rejected[at]
      })
      this.siteCounts.length = siteCounts.length
      siteCounts.forEach((count, at) => (this.siteCounts[at] = count))
    }
  }

  reject(wafer: number): void {
    this.labels[wafer].rejectedRows++
  }

  /**
   * The wafers that have rows, in order of first appearance, then those of which every row was rejected: a wafer that
   * can't be judged must not vanish. `column` is rewritten to their new indices.
   */
  used(column: Uint32Array, count: number): WaferLabel[] {
    const newIndex = new Int32Array(this.labels.length).fill(-1)
    const used: WaferLabel[] = []
    for (let row = 0; row < count; row++) {
      const old = column[row]
      if (newIndex[old] < 0) newIndex[old] = used.push(this.labels[old]) - 1
      column[row] = newIndex[old]
    }
    const lost = this.labels.filter(({ rejectedRows }, index) => newIndex[index] < 0 && rejectedRows > 0)
    return [...used, ...lost]
  }
}

function slotNumber(text: string): number {
  return /^\d{1,6}$/.test(text) ? parseNumber(text, 46, 0) : NaN
}

const STATISTICS_WORDS = new Set(
  (
    'mean avg average median std stdev stdv std.dev std-dev st.dev stddev sd sigma 1sigma 3sigma 6sigma min minimum max maximum ' +
    'range total sum count uniformity unif nonuniformity non-uniformity summary end variance cv'
  ).split(' '),
)

/** "Mean", "Std. Dev." and the like at the beginning of a row: statistics under the readings, not a site. */
export function isStatisticsWord(cell: string): boolean {
  if (cell.length > 60) return false
  const [first] = cell
    .trim()
    .toLowerCase()
    .replace(/^(\d)[ -](?=sigma)/, '$1')
    .split(/[\s:=(%_[]+/)
  return STATISTICS_WORDS.has(first.replace(/\.+$/, ''))
}

/** `TB-0417_W04.csv`: the lot (or a name for it) is the stem, the wafer its part after W, wafer or slot. */
export function namesFromFile(file: string): { readonly stem: string; readonly wafer: string } {
  const stem = file.replace(/^.*[\\/]/, '').replace(/\.[^.]{1,5}$/, '') || file
  const part = /(?:^|[_\-. ])(?:wafer|wfr|w|slot)[_\-. #]?(\d{1,3})(?=$|[_\-. ])/i.exec(stem)
  return { stem, wafer: part ? part[1] : stem }
}
