/** How any block is set: how high it will be, where it may start, and the setting itself. */
import { COLUMN_GAP_PT, columnWidths_pt, type Block, type ColumnsBlock } from '../../../core/report/document'
import type { Paper } from '../paper'
import { drawFigures, figuresHeight } from './figures'
import { drawHeading, headingHeight } from './heading'
import { drawKeyValues, keyValuesHeight } from './key-values'
import { drawList, drawParagraph, listHeight, paragraphHeight } from './paragraph'
import type { Place } from './place'
import { drawSignature, signatureHeight } from './signature'
import { drawTable, tableStartHeight } from './table'
import { drawVerdict, verdictHeight } from './verdict'

/** What must fit below the cursor for the block to begin there: all of it, or its first lines where it may break. */
export function startHeight(block: Block, paper: Paper, width: number): number {
  switch (block.kind) {
    case 'heading':
      return headingHeight(block, paper)
    case 'verdict':
      return verdictHeight(block, paper, width)
    case 'paragraph':
      return paragraphHeight(block, paper, width)
    case 'list':
      return Math.min(listHeight(block, paper, width), 40)
    case 'key-values':
      return keyValuesHeight(block, paper, width)
    case 'columns':
      return columnsHeight(block, paper, width)
    case 'table':
      return tableStartHeight(block, paper, width)
    case 'figures':
      return figuresHeight(block, width)
    case 'signature':
      return signatureHeight(block, paper, width)
    case 'page-break':
      return 0
  }
}

export function drawBlock(block: Block, paper: Paper, place: Place): void {
  switch (block.kind) {
    case 'heading':
      return drawHeading(block, paper, place)
    case 'verdict':
      return drawVerdict(block, paper, place)
    case 'paragraph':
      return drawParagraph(block, paper, place)
    case 'list':
      return drawList(block, paper, place)
    case 'key-values':
      return drawKeyValues(block, paper, place)
    case 'columns':
      return drawColumns(block, paper, place)
    case 'table':
      return drawTable(block, paper, place)
    case 'figures':
      return drawFigures(block, paper, place)
    case 'signature':
      return drawSignature(block, paper, place)
    case 'page-break':
      return paper.y > paper.top ? paper.newPage() : undefined
  }
}

/** Columns hold blocks themselves. */
function columnsHeight(block: ColumnsBlock, paper: Paper, width: number): number {
  const widths = columnWidths_pt(block, width)
  const heights = block.columns.map((blocks, i) =>
    blocks.reduce((sum, each) => sum + startHeight(each, paper, widths[i]), 0),
  )
  return Math.max(0, ...heights)
}

/** Each stack from the same height; the cursor ends below the tallest. */
function drawColumns(block: ColumnsBlock, paper: Paper, { x, width }: Place): void {
  const widths = columnWidths_pt(block, width)
  const top = paper.y
  let lowest = top
  let left = x
  block.columns.forEach((blocks, i) => {
    paper.y = top
    for (const each of blocks) drawBlock(each, paper, { x: left, width: widths[i] })
    lowest = Math.max(lowest, paper.y)
    left += widths[i] + COLUMN_GAP_PT
  })
  paper.y = lowest
}
