import type { SignatureBlock } from '../../../core/report/document'
import { INK, QUIET_INK } from '../../../core/report/figures/ink'
import { LEADING, SMALL_PT, TEXT_PT } from '../fonts'
import type { Look, Paper } from '../paper'
import type { Place } from './place'
import { baselineOf, linesOf } from './paragraph'

const TEXT: Look = { font: 'regular', size: TEXT_PT, fill: INK }
const LABEL: Look = { font: 'regular', size: SMALL_PT, fill: QUIET_INK }
const BOX_PT = 8
const GAP_PT = 18

export function signatureHeight(block: SignatureBlock, paper: Paper, width: number): number {
  return 14 + linesOf(block.statement, paper, width, TEXT).length * TEXT_PT * LEADING + 24 + 46
}

export function drawSignature(block: SignatureBlock, paper: Paper, { x, width }: Place): void {
  paper.y += 10
  paper.rule(x, paper.y, x + width, { colour: INK, width: 0.5 })
  paper.y += 6
  const lines = linesOf(block.statement, paper, width, TEXT)
  paper.leaf('P', () => lines.forEach((line, i) => paper.text(line, x, baselineOf(paper.y, i, TEXT), TEXT)))
  paper.y += lines.length * TEXT_PT * LEADING + 8
  drawChoices(block.choices, paper, x)
  paper.y += 44
  drawFields(block.fields, paper, x, width)
  paper.y += 12
}

function drawChoices(choices: readonly string[], paper: Paper, x: number): void {
  let at = x
  for (const choice of choices) {
    const left = at
    paper.artifact(() => paper.doc.lineWidth(0.6).strokeColor(INK).rect(left, paper.y, BOX_PT, BOX_PT).stroke())
    paper.leaf('P', () => paper.text(choice, left + BOX_PT + 4, paper.y + BOX_PT - 0.8, TEXT))
    at += BOX_PT + 4 + paper.measure(choice, TEXT) + GAP_PT
  }
}

function drawFields(fields: readonly string[], paper: Paper, x: number, width: number): void {
  const each = (width - (fields.length - 1) * GAP_PT) / Math.max(1, fields.length)
  fields.forEach((field, i) => {
    const left = x + i * (each + GAP_PT)
    paper.rule(left, paper.y, left + each, { colour: QUIET_INK, width: 0.5 })
    paper.leaf('P', () => paper.text(field, left, paper.y + SMALL_PT + 2, LABEL))
  })
}
