import type { ColumnsBlock } from '../../../core/report/document'
import type { Paper } from '../paper'
import { drawBlock, startHeight, type Place } from './block'

const GAP_PT = 18

export function columnsHeight(block: ColumnsBlock, paper: Paper, width: number): number {
  const columnWidth = widthOf(block, width)
  const heights = block.columns.map((blocks) =>
    blocks.reduce((sum, each) => sum + startHeight(each, paper, columnWidth), 0),
  )
  return Math.max(0, ...heights)
}

/** Each stack from the same height; the cursor ends below the tallest. */
export function drawColumns(block: ColumnsBlock, paper: Paper, { x, width }: Place): void {
  const columnWidth = widthOf(block, width)
  const top = paper.y
  let lowest = top
  block.columns.forEach((blocks, i) => {
    paper.y = top
    for (const each of blocks) drawBlock(each, paper, { x: x + i * (columnWidth + GAP_PT), width: columnWidth })
    lowest = Math.max(lowest, paper.y)
  })
  paper.y = lowest
}

function widthOf({ columns }: ColumnsBlock, width: number): number {
  return (width - (columns.length - 1) * GAP_PT) / Math.max(1, columns.length)
}
