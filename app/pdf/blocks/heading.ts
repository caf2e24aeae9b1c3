import type { HeadingBlock } from '../../../core/report/document'
import { INK, QUIET_INK, RULE } from '../../../core/report/figures/ink'
import { SMALL_PT, TEXT_PT, TITLE_PT } from '../fonts'
import type { Paper } from '../paper'
import type { Place } from './place'

const QUIET = { font: 'regular', size: TEXT_PT, fill: QUIET_INK } as const

/** Above the text, the text itself, and below it. */
const SPACES = { 1: [0, TITLE_PT, 12], 2: [13, TEXT_PT, 9], 3: [9, SMALL_PT, 5] } as const

export function headingHeight(block: HeadingBlock, paper: Paper): number {
  const [above, size, below] = SPACES[block.level]
  return spaceAbove(block, paper, above) + size + below
}

/** At the top of a page nothing needs to be kept off. */
function spaceAbove({ level }: HeadingBlock, paper: Paper, above: number): number {
  if (paper.y <= paper.top) return 0
  return level === 1 ? 22 : above
}

export function drawHeading(block: HeadingBlock, paper: Paper, { x, width }: Place): void {
  const [above, size, below] = SPACES[block.level]
  paper.y += spaceAbove(block, paper, above)
  if (block.level === 1) paper.bookmark(block.bookmark ?? block.text)
  const baseline = paper.y + 0.8 * size
  const look = { font: 'bold', size, fill: block.level === 3 ? QUIET_INK : INK } as const
  paper.leaf(`H${block.level}`, () => paper.text(block.text, x, baseline, look))
  if (block.aside) paper.leaf('P', () => paper.textRight(block.aside!, x + width, baseline, QUIET))
  if (block.level < 3) paper.rule(x, baseline + 4.5, x + width, { colour: block.level === 1 ? INK : RULE, width: block.level === 1 ? 0.9 : 0.5 }) // prettier-ignore
  paper.y += size + below
}
