/** Where every formula comes from, numbered as the working cites them. */
import type { Block } from '../document'
import type { ReportContext } from '../report-context'

export function sourcesSection({ sources }: ReportContext): Block[] {
  if (sources.entries.length === 0) return []
  return [
    { kind: 'heading', level: 1, text: 'Sources' },
    {
      kind: 'table',
      summary: 'Sources of the formulas used',
      columns: [
        { title: 'No.', align: 'right', share: 0.4 },
        { title: 'Reference', align: 'left', share: 4 },
        { title: 'Used for', align: 'left', share: 2, quiet: true },
      ],
      rows: sources.entries.map(({ number, reference, uses }) => ({
        cells: [`[${number}]`, reference, uses.join('; ')],
      })),
    },
  ]
}
