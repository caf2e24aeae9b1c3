/** Where the numbers came from: the files, what their columns were taken for, and what was left out. */
import type { Block, TableRow } from '../document'
import type { ReportContext } from '../report-context'
import { NO_VALUE } from '../../units/format'

export function inputSection({ analysis }: ReportContext): Block[] {
  const { files } = analysis.readings
  const blocks: Block[] = [
    { kind: 'page-break' },
    { kind: 'heading', level: 1, text: 'Readings', aside: analysis.lot.name },
  ]
  for (const file of files) {
    const { encoding, delimiter, decimalMark } = file.dialect
    blocks.push(
      { kind: 'heading', level: 2, text: file.name },
      {
        kind: 'key-values',
        columns: 1,
        entries: [
          {
            key: 'Size',
            value: `${file.bytes} bytes`,
            note: `${file.rows} rows, ${file.rejectedRows} of them rejected`,
          },
          { key: 'SHA-256', value: file.sha256 || NO_VALUE },
          {
            key: 'Written as',
            value: `${encoding}, separated by ${delimiterWord(delimiter)}, decimal mark ${decimalMark}`,
          },
          { key: 'Not used', value: file.ignoredHeaders.length > 0 ? file.ignoredHeaders.join(', ') : NO_VALUE },
        ],
      },
      columnsTable(file.name, file.matches),
    )
  }
  return blocks
}

function columnsTable(name: string, matches: ReportContext['analysis']['readings']['files'][number]['matches']): Block {
  const rows = matches.map((match): TableRow => ({
    cells: [String(match.position), match.header, match.column, match.unit || NO_VALUE, match.why],
  }))
  return {
    kind: 'table',
    summary: `What the columns of ${name} were taken for`,
    columns: [
      { title: 'No.', align: 'right', share: 0.4 },
      { title: 'Header', align: 'left', share: 1.6, mono: true },
      { title: 'Taken for', align: 'left', share: 1.8, mono: true },
      { title: 'Unit', align: 'left', share: 0.8 },
      { title: 'Because', align: 'left', share: 3, quiet: true },
    ],
    rows,
  }
}

function delimiterWord(delimiter: string): string {
  return { ',': 'commas', ';': 'semicolons', '\t': 'tabs' }[delimiter] ?? delimiter
}
