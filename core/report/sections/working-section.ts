/** One site's result set out like a calculation by hand: a step a line, each with its formula, its number and its source. */
import { waferName } from '../../conformity/reasons'
import type { Working, WorkingStep } from '../../analysis/working'
import { formatMm, formatWithUncertainty } from '../../units/format'
import type { Block, TableRow } from '../document'
import { waferTitle, type ReportContext } from '../report-context'

export function workingSection(working: Working, { sources }: ReportContext): Block[] {
  const { wafer, site, x_mm, y_mm, steps } = working
  const place = Number.isFinite(x_mm) && Number.isFinite(y_mm) ? `, at x ${formatMm(x_mm)}, y ${formatMm(y_mm)}` : ''
  const last = steps.length - 1
  const rows = steps.map((step, i): TableRow => ({
    cells: [step.symbol, step.title, step.formula, resultOf(step), sourceNumber(step, sources.numberOf)],
    ...(i === last && { emphasis: 'result' as const }),
  }))
  return [
    { kind: 'page-break' },
    { kind: 'heading', level: 1, text: 'Working of one site', aside: `${waferTitle(wafer)}, site ${site}` },
    {
      kind: 'paragraph',
      text: `From the readings at site ${site} of ${waferName(wafer)}${place}, step by step. The number at the right names the source of the formula.`,
      quiet: true,
    },
    {
      kind: 'table',
      summary: 'Steps from the readings to the result',
      calculation: true,
      columns: [
        { title: 'Symbol', align: 'left', share: 0.8, mono: true },
        { title: 'Step', align: 'left', share: 1.7 },
        { title: 'Formula', align: 'left', share: 2.5, mono: true },
        { title: 'Value ± u', align: 'right', share: 2.2 },
        { title: 'Src', align: 'right', share: 0.4, quiet: true },
      ],
      rows,
    },
  ]
}

function resultOf({ value, u, unit }: WorkingStep): string {
  return formatWithUncertainty(value, u, unit)
}

function sourceNumber({ source }: WorkingStep, numberOf: (reference: string) => number | null): string {
  const number = numberOf(source)
  return number === null ? '' : `[${number}]`
}
