/**
 * One reading a site. Rows of a long file that hold the parts of one site (A and B, forward and reverse) become one
 * row; a part that is there already is a doubled site: the first is kept, the later is left out and listed.
 */
import { DROPPED } from './columns'
import type { NumberColumn } from './column-kinds'
import type { LotDraft } from './lot-draft'
import { B_BIT, NUMBERED_BIT, REVERSE_BIT } from './read-role'
import type { RowProblems } from './row-problems'
import { RowTable, SAME_PLACE_MM, cellOf, highCellOf, lowCellOf, mix } from './site-table'

const CURRENTS = [
  'current_A',
  'currentReverse_A',
  'currentB_A',
  'currentReverseB_A',
] as const satisfies readonly NumberColumn[]
const VOLTAGES = [
  'voltage_V',
  'voltageReverse_V',
  'voltageB_V',
  'voltageReverseB_V',
] as const satisfies readonly NumberColumn[]

export function foldSites(draft: LotDraft, files: readonly RowProblems[], isLong: boolean, dropped: Uint8Array): void {
  const { columns } = draft
  const firstOf = new SiteFinder(draft).firstRows()
  const parts = isLong ? new Uint8Array(columns.count) : null
  for (let row = 0; row < columns.count; row++) {
    const first = firstOf[row]
    const part = columns.role[row] & (REVERSE_BIT | B_BIT)
    if (first === row) {
      if (parts) {
        parts[row] = 1 << part
        if (part !== 0) movePart(draft, row, row, part)
      }
    } else if (parts && !(parts[first] & (1 << part))) {
      parts[first] = parts[first] | (1 << part)
      movePart(draft, row, first, part)
      dropped[row] = DROPPED.folded
    } else {
      dropped[row] = DROPPED.rejected
      const problems = files[columns.file[row]]
      problems.add({
        kind: 'doubled-site',
        file: problems.file,
        line: columns.line[row],
        wafer: draft.wafers.labels[columns.wafer[row]]!.id,
        site: draft.sites.names[columns.site[row]]!,
        firstLine: columns.line[first],
      })
    }
  }
}

/** Sites that only we number are counted anew where rows were put together, lest they come out as 1, 3, 5. */
export function renumberSites({ columns, sites }: LotDraft): void {
  const counts = new Map<number, number>()
  for (let row = 0; row < columns.count; row++) {
    if (!(columns.role[row] & NUMBERED_BIT)) continue
    const wafer = columns.wafer[row]
    const number = (counts.get(wafer) ?? 0) + 1
    counts.set(wafer, number)
    columns.site[row] = sites.ofNumber(number)
  }
}

/** Takes the row's current, voltage and V/I to the columns of its part, in the row `to`. */
function movePart({ columns }: LotDraft, from: number, to: number, part: number): void {
  const move = (source: NumberColumn, target: NumberColumn) => {
    const value = columns.numbers.get(source)?.[from] ?? NaN
    if (value !== value || (source === target && from === to)) return
    columns.number(target)[to] = value
    columns.number(source)[from] = NaN
  }
  move('current_A', CURRENTS[part])
  move('voltage_V', VOLTAGES[part])
  // A ready-made V/I has a place for either configuration, none for the reverse direction.
  if (part === B_BIT) move('vOverI_ohm', 'vOverIB_ohm')
  else if (part === 0) for (const name of READY) move(name, name)
  else if (from === to) for (const name of READY) columns.numbers.get(name)?.fill(NaN, from, from + 1)
}
const READY = ['vOverI_ohm', 'sheetResistance_ohm_sq', 'resistivity_ohm_cm'] as const

/** Looks rows of one wafer up by site name (and die, where sites are counted within a die), and by place. */
class SiteFinder {
  private readonly x: Float64Array | undefined
  private readonly y: Float64Array | undefined
  private readonly dieX: Float64Array | undefined
  private readonly dieY: Float64Array | undefined
  private row = 0

  constructor(private readonly draft: LotDraft) {
    const { numbers } = draft.columns
    this.x = numbers.get('x_mm')
    this.y = numbers.get('y_mm')
    this.dieX = numbers.get('dieX')
    this.dieY = numbers.get('dieY')
  }

  /** Of every row the first that is of the same site: itself for most. */
  firstRows(): Uint32Array {
    const { wafer, count } = this.draft.columns
    const { rows, ends } = groupRows(wafer, count, this.draft.wafers.labels.length)
    const most = ends.reduce((size, end, k) => Math.max(size, end - (k > 0 ? ends[k - 1] : 0)), 0)
    const byName = new RowTable(most)
    const byPlace = this.x && this.y ? new RowTable(most) : null
    const firstOf = new Uint32Array(count)
    let begin = 0
    for (const end of ends) {
      byName.clearFor(end - begin)
      byPlace?.clearFor(end - begin)
      for (let k = begin; k < end; k++) firstOf[rows[k]] = this.findOrInsert(rows[k], byName, byPlace)
      begin = end
    }
    return firstOf
  }

  private findOrInsert(row: number, byName: RowTable, byPlace: RowTable | null): number {
    this.row = row
    const isNamed = !this.isNumbered(row)
    const nameHash = isNamed ? this.nameHash(row) : 0
    const named = isNamed ? byName.find(nameHash, this.isSameName) : -1
    if (named >= 0) return named
    const placed = byPlace && this.hasPlace(row) ? byPlace : null
    const there = placed ? this.findPlace(row, placed) : -1
    if (there >= 0) return there
    if (isNamed) byName.insert(nameHash, row)
    placed?.insert(mix(cellOf(this.x![row]), cellOf(this.y![row])), row)
    return row
  }

  private findPlace(row: number, table: RowTable): number {
    const x = this.x![row]
    const y = this.y![row]
    const lowX = lowCellOf(x)
    const lowY = lowCellOf(y)
    const highX = highCellOf(x)
    const highY = highCellOf(y)
    let found = table.find(mix(lowX, lowY), this.isSamePlace)
    if (found < 0 && highX !== lowX) found = table.find(mix(highX, lowY), this.isSamePlace)
    if (found < 0 && highY !== lowY) found = table.find(mix(lowX, highY), this.isSamePlace)
    if (found < 0 && highX !== lowX && highY !== lowY) found = table.find(mix(highX, highY), this.isSamePlace)
    return found
  }

  private readonly isSameName = (other: number): boolean => {
    const { site } = this.draft.columns
    return site[other] === site[this.row] && isEqual(this.dieX, other, this.row) && isEqual(this.dieY, other, this.row)
  }

  private readonly isSamePlace = (other: number): boolean =>
    Math.abs(this.x![other] - this.x![this.row]) <= SAME_PLACE_MM &&
    Math.abs(this.y![other] - this.y![this.row]) <= SAME_PLACE_MM

  private nameHash(row: number): number {
    const die = this.dieX && this.dieY ? (this.dieX[row] * 8191 + this.dieY[row]) | 0 : 0
    return mix(this.draft.columns.site[row], die)
  }

  private isNumbered(row: number): boolean {
    return (this.draft.columns.role[row] & NUMBERED_BIT) !== 0
  }

  private hasPlace(row: number): boolean {
    return this.x![row] === this.x![row] && this.y![row] === this.y![row]
  }
}

/** The rows wafer by wafer, each wafer's in reading order, and where each wafer's end. */
function groupRows(wafer: Uint32Array, count: number, wafers: number): { rows: Uint32Array; ends: Uint32Array } {
  const ends = new Uint32Array(wafers)
  for (let row = 0; row < count; row++) ends[wafer[row]]++
  for (let k = 1; k < wafers; k++) ends[k] += ends[k - 1]
  const next = Uint32Array.from(ends, (_, k) => (k > 0 ? ends[k - 1] : 0))
  const rows = new Uint32Array(count)
  for (let row = 0; row < count; row++) rows[next[wafer[row]]++] = row
  return { rows, ends }
}

function isEqual(column: Float64Array | undefined, a: number, b: number): boolean {
  if (!column) return true
  return column[a] === column[b] || (column[a] !== column[a] && column[b] !== column[b])
}
