/**
 * One reading a site. Rows of a long file that hold the parts of one site (A and B, forward and reverse) become one
 * row; a part that is there already is a doubled site: the first is kept, the later is left out and listed.
 */
import { DROPPED } from './columns'
import type { NumberColumn } from './column-kinds'
import type { LotDraft } from './lot-draft'
import { B_BIT, NUMBERED_BIT, REVERSE_BIT } from './read-role'
import type { RowProblems } from './row-problems'
import { RowTable, SAME_PLACE_MM, cellsOf, mix } from './site-table'

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
  const finder = new SiteFinder(draft)
  const parts = isLong ? new Uint8Array(columns.count) : null
  for (let row = 0; row < columns.count; row++) {
    const first = finder.find(row)
    const part = columns.role[row] & (REVERSE_BIT | B_BIT)
    if (first < 0) {
      finder.insert(row)
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

/** Looks rows up by wafer and site name (and die, where sites are counted within a die), and by wafer and place. */
class SiteFinder {
  private readonly byName: RowTable
  private readonly byPlace: RowTable | null
  private readonly x: Float64Array | undefined
  private readonly y: Float64Array | undefined
  private readonly dieX: Float64Array | undefined
  private readonly dieY: Float64Array | undefined
  private row = 0

  constructor(private readonly draft: LotDraft) {
    const { numbers, count } = draft.columns
    this.x = numbers.get('x_mm')
    this.y = numbers.get('y_mm')
    this.dieX = numbers.get('dieX')
    this.dieY = numbers.get('dieY')
    this.byName = new RowTable(count)
    this.byPlace = this.x && this.y ? new RowTable(count) : null
  }

  find(row: number): number {
    this.row = row
    if (!this.isNumbered(row)) {
      const named = this.byName.find(this.nameHash(row), this.isSameName)
      if (named >= 0) return named
    }
    return this.byPlace && this.hasPlace(row) ? this.findPlace(row, this.byPlace) : -1
  }

  insert(row: number): void {
    if (!this.isNumbered(row)) this.byName.insert(this.nameHash(row), row)
    if (this.byPlace && this.hasPlace(row))
      this.byPlace.insert(this.placeHash(row, cell(this.x![row]), cell(this.y![row])), row)
  }

  private findPlace(row: number, table: RowTable): number {
    for (const x of cellsOf(this.x![row])) {
      for (const y of cellsOf(this.y![row])) {
        const found = table.find(this.placeHash(row, x, y), this.isSamePlace)
        if (found >= 0) return found
      }
    }
    return -1
  }

  private readonly isSameName = (other: number): boolean => {
    const { wafer, site } = this.draft.columns
    const isSame = wafer[other] === wafer[this.row] && site[other] === site[this.row]
    return isSame && isEqual(this.dieX, other, this.row) && isEqual(this.dieY, other, this.row)
  }

  private readonly isSamePlace = (other: number): boolean =>
    this.draft.columns.wafer[other] === this.draft.columns.wafer[this.row] &&
    Math.abs(this.x![other] - this.x![this.row]) <= SAME_PLACE_MM &&
    Math.abs(this.y![other] - this.y![this.row]) <= SAME_PLACE_MM

  private nameHash(row: number): number {
    const { wafer, site } = this.draft.columns
    const die = this.dieX && this.dieY ? (this.dieX[row] * 8191 + this.dieY[row]) | 0 : 0
    return mix(wafer[row], site[row], die)
  }

  private placeHash(row: number, x: number, y: number): number {
    return mix(this.draft.columns.wafer[row], x, y)
  }

  private isNumbered(row: number): boolean {
    return (this.draft.columns.role[row] & NUMBERED_BIT) !== 0
  }

  private hasPlace(row: number): boolean {
    return this.x![row] === this.x![row] && this.y![row] === this.y![row]
  }
}

function cell(value: number): number {
  return Math.round(value / 1e-3)
}

function isEqual(column: Float64Array | undefined, a: number, b: number): boolean {
  if (!column) return true
  return column[a] === column[b] || (column[a] !== column[a] && column[b] !== column[b])
}
