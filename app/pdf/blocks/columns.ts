import { COLUMN_GAP_PT, columnWidths_pt, type ColumnsBlock } from '../../../core/report/document'
import type { Paper } from '../paper'
import { drawBlock, startHeight, type Place } from './block'

export function columnsHeight(block: ColumnsBlock, paper: Paper, width: number): number {
  const widths = columnWidths_pt(block, width)
  const heights = block.columns.map((blocks, i) =>
    blocks.reduce((sum, each) => sum + startHeight(each, paper, widths[i]), 0),
  )
  return Math.max(0, ...heights)
}

/** Each stack from the same height; the cursor ends below the tallest. */
export function drawColumns(block: ColumnsBlock, paper: Paper, { x, width }: Place): void {
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
