import type { ListBlock, ParagraphBlock } from '../../../core/report/document'
import { INK, QUIET_INK } from '../../../core/report/figures/ink'
import { LEADING, SMALL_PT, TEXT_PT } from '../fonts'
import type { Look, Paper } from '../paper'
import { wrapped } from '../text-lines'
import type { Place } from './place'

const TEXT: Look = { font: 'regular', size: TEXT_PT, fill: INK }
const QUIET: Look = { font: 'regular', size: SMALL_PT, fill: QUIET_INK }
const AFTER_PT = 4
const INDENT_PT = 14

export function paragraphHeight(block: ParagraphBlock, paper: Paper, width: number): number {
  const look = block.quiet ? QUIET : TEXT
  return linesOf(block.text, paper, width, look).length * look.size * LEADING + AFTER_PT
}

export function drawParagraph(block: ParagraphBlock, paper: Paper, { x, width }: Place): void {
  const look = block.quiet ? QUIET : TEXT
  drawLines(linesOf(block.text, paper, width, look), paper, x, look)
  paper.y += AFTER_PT
}

export function linesOf(text: string, paper: Paper, width: number, look: Look): string[] {
  return wrapped(text, width, (part) => paper.measure(part, look))
}

/** Lines from the cursor on, over the end of the page where need be. */
function drawLines(lines: readonly string[], paper: Paper, x: number, look: Look): void {
  let at = 0
  while (at < lines.length) {
    const room = Math.max(1, Math.floor((paper.bottom - paper.y) / (look.size * LEADING)))
    const here = lines.slice(at, at + room)
    paper.leaf('P', () => here.forEach((line, i) => paper.text(line, x, baselineOf(paper.y, i, look), look)))
    paper.y += here.length * look.size * LEADING
    at += here.length
    if (at < lines.length) paper.newPage()
  }
}

export function baselineOf(top: number, lineNumber: number, { size }: Look): number {
  return top + size * (0.93 + lineNumber * LEADING)
}

export function listHeight(block: ListBlock, paper: Paper, width: number): number {
  return block.entries.reduce((sum, entry) => sum + entryHeight(entry, paper, width), AFTER_PT)
}

function entryHeight(entry: string, paper: Paper, width: number): number {
  return linesOf(entry, paper, width - INDENT_PT, TEXT).length * TEXT_PT * LEADING + 2
}

export function drawList(block: ListBlock, paper: Paper, { x, width }: Place): void {
  paper.branch('L', () => {
    block.entries.forEach((entry, i) => {
      paper.ensure(entryHeight(entry, paper, width))
      const label = block.numbered ? `${i + 1}.` : '–'
      const lines = linesOf(entry, paper, width - INDENT_PT, TEXT)
      paper.leaf('LI', () => {
        paper.text(label, x, baselineOf(paper.y, 0, TEXT), { ...TEXT, fill: QUIET_INK })
        lines.forEach((line, at) => paper.text(line, x + INDENT_PT, baselineOf(paper.y, at, TEXT), TEXT))
      })
      paper.y += entryHeight(entry, paper, width)
    })
  })
  paper.y += AFTER_PT
}
