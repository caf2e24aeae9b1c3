/**
 * Puts the signs of reverse and configuration B readings right, a file at a time, since a file's convention shows only
 * over all its rows: currents may be given as magnitudes, or not given again at all.
 */
import type { NumberColumn } from './column-kinds'
import { DROPPED, type GrowingColumns } from './columns'
import { B_BIT, REVERSE_BIT } from './read-role'
import type { RowProblems } from './row-problems'

interface Side {
  readonly title: string
  readonly forwardCurrent: NumberColumn
  readonly forwardVoltage: NumberColumn
  readonly current: NumberColumn
  readonly voltage: NumberColumn
  readonly isReverse: boolean
}

const B: Side = {
  title: 'configuration B',
  forwardCurrent: 'current_A',
  forwardVoltage: 'voltage_V',
  current: 'currentB_A',
  voltage: 'voltageB_V',
  isReverse: false,
}
const SIDES: readonly Side[] = [
  { ...B, title: 'reverse', current: 'currentReverse_A', voltage: 'voltageReverse_V', isReverse: true },
  B,
  {
    title: 'reverse of configuration B',
    forwardCurrent: 'currentB_A',
    forwardVoltage: 'voltageB_V',
    current: 'currentReverseB_A',
    voltage: 'voltageReverseB_V',
    isReverse: true,
  },
]

/** The rows of one file: from `begin` to before `end`. `notes` gets what was assumed, in sentences without the file. */
export function settleSigns(
  columns: GrowingColumns,
  begin: number,
  end: number,
  problems: RowProblems,
  dropped: Uint8Array,
  notes: (sentence: string) => void,
): void {
  dropPartsWithoutForward(columns, begin, end, problems, dropped)
  for (const side of SIDES) {
    if (!columns.numbers.has(side.voltage)) continue
    const rows = new SideRows(columns, side, begin, end, dropped)
    if (rows.count === 0) continue
    fillCurrents(rows, side, notes)
    refuseOpposites(columns, rows, side, problems, dropped)
  }
}

/** The rows in which a side is given, and its columns. */
class SideRows {
  readonly i: Float64Array
  readonly v: Float64Array
  readonly forwardI: Float64Array
  readonly forwardV: Float64Array
  count = 0
  private ownCurrents = 0
  private againstForward = 0
  private magnitudes = 0

  constructor(
    columns: GrowingColumns,
    side: Side,
    readonly begin: number,
    readonly end: number,
    private readonly dropped: Uint8Array,
  ) {
    this.i = columns.number(side.current)
    this.v = columns.number(side.voltage)
    this.forwardI = columns.number(side.forwardCurrent)
    this.forwardV = columns.number(side.forwardVoltage)
    this.each((row) => {
      const i = this.i[row]
      const v = this.v[row]
      this.count++
      if (i === i) this.ownCurrents++
      if (v * this.forwardV[row] < 0) this.againstForward++
      if (i > 0 && v < 0 && this.forwardV[row] > 0) this.magnitudes++
    })
  }

  each(visit: (row: number) => void): void {
    for (let row = this.begin; row < this.end; row++) {
      if (!this.dropped[row] && this.v[row] === this.v[row]) visit(row)
    }
  }

  get hasOwnCurrent(): boolean {
    return this.ownCurrents > 0
  }

  get isNeverAgainstForward(): boolean {
    return this.againstForward === 0
  }

  get areCurrentsMagnitudes(): boolean {
    return this.magnitudes === this.count
  }
}

function fillCurrents(rows: SideRows, side: Side, notes: (sentence: string) => void): void {
  const { i, forwardI } = rows
  if (!rows.hasOwnCurrent) {
    const isTurned = side.isReverse && !rows.isNeverAgainstForward
    rows.each((row) => (i[row] = isTurned ? -forwardI[row] : forwardI[row]))
    if (isTurned) notes(`the ${side.title} voltage has no current of its own: the forward current reversed is used`)
    else if (side.isReverse)
      notes(
        `the ${side.title} voltage has no current of its own and never the opposite sign: both are taken as magnitudes`,
      )
    else notes(`the voltage of ${side.title} has no current of its own: that of configuration A is used`)
  } else if (side.isReverse && rows.areCurrentsMagnitudes) {
    rows.each((row) => (i[row] = -i[row]))
    notes(
      `the ${side.title} currents are all positive and the voltages all negative: the currents are taken as magnitudes and reversed`,
    )
  }
}

function refuseOpposites(
  columns: GrowingColumns,
  rows: SideRows,
  side: Side,
  problems: RowProblems,
  dropped: Uint8Array,
): void {
  rows.each((row) => {
    const i = rows.i[row]
    const v = rows.v[row]
    if ((i > 0 && v > 0) || (i < 0 && v < 0)) return
    dropped[row] = DROPPED.rejected
    const hasCurrent = i === i
    const found = hasCurrent ? `${v} V, ${i} A` : `${v} V`
    const why = hasCurrent ? 'voltage and current give no positive V/I' : 'voltage has no current'
    problems.row(columns.line[row], side.voltage, found, `${side.title} ${why}`)
  })
}

/** In a long file the forward row of a site may be missing or bad; the other parts alone are no reading. */
function dropPartsWithoutForward(
  columns: GrowingColumns,
  begin: number,
  end: number,
  problems: RowProblems,
  dropped: Uint8Array,
): void {
  const isLong = columns.role.subarray(begin, end).some((role) => (role & (REVERSE_BIT | B_BIT)) !== 0)
  if (!isLong && !PARTS.some((name) => columns.numbers.has(name))) return
  const given = (names: readonly NumberColumn[]) => names.flatMap((name) => columns.numbers.get(name) ?? [])
  const has = (list: readonly Float64Array[], row: number) => list.some((column) => column[row] === column[row])
  const forward = given(['voltage_V', 'vOverI_ohm', 'sheetResistance_ohm_sq', 'resistivity_ohm_cm'])
  const pairs = [
    given(['voltageReverse_V']),
    given(['voltage_V']),
    given(['voltageReverseB_V']),
    given(['voltageB_V']),
  ] as const
  for (let row = begin; row < end; row++) {
    if (dropped[row]) continue
    const isOrphan = (has(pairs[0], row) && !has(pairs[1], row)) || (has(pairs[2], row) && !has(pairs[3], row))
    if (has(forward, row) && !isOrphan) continue
    dropped[row] = DROPPED.rejected
    problems.row(
      columns.line[row],
      '',
      '',
      'only a reverse or a configuration B reading of this site is usable, no forward reading of A',
    )
  }
}

const PARTS = ['voltageReverse_V', 'voltageB_V', 'voltageReverseB_V', 'vOverIB_ohm'] as const
