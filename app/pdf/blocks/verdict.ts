import type { VerdictBlock } from '../../../core/report/document'
import { ALERT, INK } from '../../../core/report/figures/ink'
import { mark } from '../../../core/report/figures/marks'
import { drawShapes } from '../draw-shapes'
import { LEADING, TEXT_PT, TITLE_PT } from '../fonts'
import type { Look, Paper } from '../paper'
import type { Place } from './place'
import { baselineOf, linesOf } from './paragraph'

const SENTENCE: Look = { font: 'regular', size: TEXT_PT, fill: INK }
const MARK_PT = 5

export function verdictHeight(block: VerdictBlock, paper: Paper, width: number): number {
  const lines = block.sentence === '' ? 0 : linesOf(block.sentence, paper, width, SENTENCE).length
  return TITLE_PT + 6 + lines * TEXT_PT * LEADING + 8
}

export function drawVerdict(block: VerdictBlock, paper: Paper, { x, width }: Place): void {
  const isAlarming = block.mark === 'above' || block.mark === 'below'
  const word: Look = { font: 'bold', size: TITLE_PT, fill: isAlarming ? ALERT : INK }
  const baseline = paper.y + 0.85 * TITLE_PT
  const shift = block.mark ? 2 * MARK_PT + 6 : 0
  if (block.mark) {
    const shape = mark(block.mark, x + MARK_PT, baseline - 0.36 * TITLE_PT, MARK_PT)
    paper.artifact(() => drawShapes([shape], paper))
  }
  paper.leaf('P', () => paper.text(block.word, x + shift, baseline, word))
  paper.y += TITLE_PT + 6
  if (block.sentence !== '') {
    const lines = linesOf(block.sentence, paper, width, SENTENCE)
    paper.leaf('P', () => lines.forEach((line, i) => paper.text(line, x, baselineOf(paper.y, i, SENTENCE), SENTENCE)))
    paper.y += lines.length * TEXT_PT * LEADING
  }
  paper.y += 8
}
