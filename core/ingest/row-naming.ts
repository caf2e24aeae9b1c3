/** Which lot, wafer and site a row belongs to. The usual answer is quick: the same as of the row before. */
import { isStatisticsWord, namesFromFile } from './labels'
import type { Layout } from './layout'
import type { LotDraft } from './lot-draft'
import { isBlank } from './parse-number'
import type { Section } from './section'
import { readTextCell } from './text-cell'

type Places = Layout['at']

export class RowNaming {
  /** What a wafer is called where nothing in the file names it. */
  readonly fileWafer: string
  /** Of the last row that named one; -1 after a preamble or a header. */
  wafer = -1
  private waferCell = ''
  private slotCell = ''
  private lotCell: string | null = null
  private word = ''

  constructor(
    private readonly draft: LotDraft,
    private readonly file: string,
    private readonly section: Section,
  ) {
    this.fileWafer = namesFromFile(file).wafer
  }

  /** What a preamble or a header says may be about another wafer. */
  forgetWafer(): void {
    this.wafer = -1
  }

  /** Whether a first cell, or a site's, marks a row of statistics; a number does not, nor the same word as before. */
  isStatistics(cell: string): boolean {
    if (isLikeNumber(cell) || cell === this.word) return false
    if (isStatisticsWord(cell)) return true
    this.word = cell
    return false
  }

  /** -1 where the row leaves it empty. */
  waferOf(cells: readonly string[], at: Places): number {
    const waferCell = at.wafer >= 0 ? cells[at.wafer] : ''
    const slotCell = at.slot >= 0 ? cells[at.slot] : ''
    if (this.wafer >= 0 && waferCell === this.waferCell && slotCell === this.slotCell) return this.wafer
    let id = readTextCell(waferCell)
    let slot = readTextCell(slotCell)
    if (at.wafer < 0 && at.slot < 0) {
      slot = this.section.slot
      id = this.section.wafer || slot || this.fileWafer
    } else if (at.wafer < 0) id = slot
    else if (id === '') id = slot
    if (id === '' || isStatisticsWord(waferCell)) return -1
    this.waferCell = waferCell
    this.slotCell = slotCell
    return (this.wafer = this.draft.wafers.of(id, slot))
  }

  siteOf(cells: readonly string[], at: Places, wafer: number, line: number): number {
    const { sites, wafers } = this.draft
    if (at.site < 0) return sites.ofNumber(wafers.nextSite(wafer))
    const cell = cells[at.site]
    return cell.trim() === '' ? sites.ofText(`line ${line}`) : sites.ofCell(cell)
  }

  readLot(cell: string): void {
    if (cell === this.lotCell || isBlank(cell)) return
    this.lotCell = cell
    this.draft.nameLot(readTextCell(cell), this.file)
  }
}

/** Begins and ends as a number does; nothing surer is needed to pass over the many. */
function isLikeNumber(cell: string): boolean {
  let at = 0
  while (cell.charCodeAt(at) === 32) at++
  return !(cell.charCodeAt(at) > 57) && !(cell.charCodeAt(cell.length - 1) > 57)
}
