/** What each component does to the result, as bars from the largest down, and what they make together. */
import { formatSignificant } from '../../units/format'
import type { Drawing, Shape } from '../drawing'
import { labelWidth_pt, line, rectangle, text } from '../drawing'
import { AXIS_PT, INK, LABEL_PT, QUIET_INK, RULE } from './ink'

export interface BudgetBar {
  readonly title: string
  /** Relative effect on the result [-]. */
  readonly relative: number
  readonly shared: boolean
}

export interface BudgetBarsInput {
  readonly title: string
  /** Largest first. */
  readonly bars: readonly BudgetBar[]
  /** Root of the sum of squares. */
  readonly combined: number
  readonly width_pt: number
}

const ROW_PT = 14
const BAR_PT = 7
const SHARED_FILL = '#1f5d8a'
const OWN_FILL = '#8fb8d6'

export function budgetBars({ title, bars, combined, width_pt }: BudgetBarsInput): Drawing {
  const left = Math.max(...[...bars.map((bar) => bar.title), 'together'].map((name) => labelWidth_pt(name, LABEL_PT))) + 6
  const right = width_pt - 44
  const scale = (right - left) / Math.max(combined, 1e-300)
  const rows = [...bars, { title: 'together', relative: combined, shared: null }]
  const shapes = rows.flatMap((row, k): Shape[] => {
    const y = k * ROW_PT + 4
    const width = Math.max(0.4, row.relative * scale)
    const isWhole = row.shared === null
    const fill = isWhole ? INK : row.shared ? SHARED_FILL : OWN_FILL
    return [
      text(left - 6, y + BAR_PT - 0.5, row.title, { size_pt: LABEL_PT, fill: INK, anchor: 'end', ...(isWhole && { font: 'bold' }) }),
      rectangle(left, y, width, BAR_PT, { fill }),
      text(left + width + 4, y + BAR_PT - 0.5, `${formatSignificant(100 * row.relative, 2)} %`, { size_pt: LABEL_PT, fill: QUIET_INK }),
    ]
  })
  const height = rows.length * ROW_PT
  const key = `dark: the same at every site; light: new at every site; bars add in quadrature`
  return {
    width_pt,
    height_pt: height + 18,
    title,
    description: `Relative effects on the result: ${rows.map((row) => `${row.title} ${formatSignificant(100 * row.relative, 2)} %`).join(', ')}.`,
    shapes: [
      ...shapes,
      line(left, 0, left, height, { stroke: RULE, lineWidth_pt: 0.5 }),
      text(left, height + 12, key, { size_pt: AXIS_PT, fill: QUIET_INK }),
    ],
  }
} // prettier-ignore
