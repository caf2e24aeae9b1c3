import type { FiguresBlock } from '../../../core/report/document'
import { drawDrawing } from '../draw-shapes'
import type { Paper } from '../paper'
import type { Place } from './place'

const AFTER_PT = 6

export function figuresHeight({ figures }: FiguresBlock, width: number): number {
  return Math.max(0, ...figures.map((figure) => figure.height_pt)) * scaleOf(figures, width) + AFTER_PT
}

/** Side by side from the left margin to the right one. */
export function drawFigures({ figures }: FiguresBlock, paper: Paper, { x, width }: Place): void {
  const scale = scaleOf(figures, width)
  const total = figures.reduce((sum, figure) => sum + figure.width_pt * scale, 0)
  const gap = figures.length > 1 ? (width - total) / (figures.length - 1) : 0
  const top = paper.y
  let at = x
  for (const figure of figures) {
    const left = at
    const alt = `${figure.title}. ${figure.description}`
    paper.leaf('Figure', () => {
      paper.doc.save().translate(left, top).scale(scale)
      drawDrawing(figure, 0, 0, paper)
      paper.doc.restore()
    }, { alt }) // prettier-ignore
    at += figure.width_pt * scale + gap
  }
  paper.y = top + figuresHeight({ kind: 'figures', figures }, width)
}

/** Figures are made for the page; only those too wide for it are made smaller. */
function scaleOf(figures: FiguresBlock['figures'], width: number): number {
  const total = figures.reduce((sum, figure) => sum + figure.width_pt, 0)
  return total > width ? width / total : 1
}
