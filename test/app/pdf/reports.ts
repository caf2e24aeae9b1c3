/** Small reports for the tests, and PDF files built by hand in the way that this program writes them. */
import { createHash } from 'node:crypto'
import { deflateSync } from 'node:zlib'
import type { NamedBytes } from '../../../app/pdf/report-contents'
import { reportPdf, type ReportPdfOptions } from '../../../app/pdf/report-pdf'
import { renderReportPdf, type ReportAttachment } from '../../../app/pdf/write-report'
import type { Exclusion } from '../../../core/analysis/exclusions'
import { run } from '../../../core/analysis/run'
import type { Block } from '../../../core/report/document'

export const utf8 = (text: string): Uint8Array => new TextEncoder().encode(text)

export const CSV =
  'wafer,site,x_mm,y_mm,current_A,voltage_V\n1,1,0,0,5e-4,0.0101\n1,2,5,0,5e-4,0.0102\n2,1,0,0,5e-4,0.01\n'
export const PROCEDURE = JSON.stringify({
  format: 'persquare-procedure/1',
  limits: { sheetResistanceOhmSq: { lower: 87, upper: 97 } },
}) // prettier-ignore

export const OWN = { program: 'Persquare', version: '9.8.7' } as const

export interface NamedText {
  readonly name: string
  readonly text: string
}

export function optionsOf(
  readings: readonly NamedText[] = [{ name: 'TB-0417.csv', text: CSV }],
  procedure: NamedText = { name: 'procedure.json', text: PROCEDURE },
): ReportPdfOptions {
  const named = ({ name, text }: NamedText) => ({ name, bytes: utf8(text) })
  return { ...OWN, date: null, paper: 'A4', inputs: { readings: readings.map(named), procedure: named(procedure) } }
}

export function makeReport(
  options: ReportPdfOptions = optionsOf(),
  excluded: readonly Exclusion[] = [],
): Promise<Uint8Array> {
  const { readings, procedure, companions = [] } = options.inputs
  const withDigest = (file: NamedBytes) => ({ ...file, sha256: createHash('sha256').update(file.bytes).digest('hex') })
  const { analysis, problems } = run({
    readings: readings.map(withDigest),
    procedure,
    companions: companions.map(withDigest),
    excluded,
  })
  if (!analysis) throw new Error(`not analysed: ${JSON.stringify(problems)}`)
  return reportPdf(analysis, options)
} // prettier-ignore

/** Pages of one paragraph, with any attachments. */
export function renderPages(text: string, attachments: readonly ReportAttachment[]): Promise<Uint8Array> {
  const blocks: readonly Block[] = [{ kind: 'paragraph', text }]
  const date = '2026-03-16T00:00:00Z'
  const document = {
    title: 'T',
    subject: '',
    language: 'en',
    program: 'P',
    date,
    paper: 'A4',
    footer: '',
    blocks,
  } as const
  return renderReportPdf(document, { attachments })
}

export type BuiltObject = string | { readonly dictionary: string; readonly stream: Uint8Array }

export interface BuildOptions {
  readonly trailer?: string
  /** Instead of where the object stands. */
  readonly offsets?: Readonly<Record<number, string>>
}

/** Object 1 is the root. */
export function buildPdf(
  objects: readonly BuiltObject[],
  { trailer = '', offsets = {} }: BuildOptions = {},
): Uint8Array {
  const parts: Uint8Array[] = [latin1('%PDF-1.7\n%\xff\xff\xff\xff\n')]
  const entries: string[] = []
  let at = parts[0]!.length
  objects.forEach((object, index) => {
    const body =
      typeof object === 'string'
        ? [latin1(`${object}\n`)]
        : [latin1(`${object.dictionary}\nstream\n`), object.stream, latin1('\nendstream\n')]
    const whole = Buffer.concat([latin1(`${index + 1} 0 obj\n`), ...body, latin1('endobj\n')])
    entries.push(`${offsets[index + 1] ?? String(at).padStart(10, '0')} 00000 n \n`)
    at += whole.length
    parts.push(whole)
  })
  const count = objects.length + 1
  parts.push(
    latin1(`xref\n0 ${count}\n0000000000 65535 f \n${entries.join('')}trailer\n`),
    latin1(`<<\n/Size ${count}\n/Root 1 0 R\n/Info 1 0 R\n${trailer}>>\nstartxref\n${at}\n%%EOF\n`),
  )
  return Buffer.concat(parts)
}

export function latin1(text: string): Uint8Array {
  return Buffer.from(text, 'latin1')
}

export interface BuiltFile {
  readonly name: string
  readonly content: Uint8Array
  /** What the file says its size is, where it lies. */
  readonly size?: number
}

/** A file of our kind with these attached: the root, the names, then two objects a file. */
export function buildWithFiles(files: readonly BuiltFile[], level = 6): Uint8Array {
  const entry = (k: number): number => 3 + 2 * k
  const names = files.map((_, k) => `(${String(k).padStart(4, '0')}) ${entry(k)} 0 R`)
  const objects: BuiltObject[] = [
    '<<\n/Type /Catalog\n/Names 2 0 R\n>>',
    `<<\n/EmbeddedFiles <<\n/Names [\n${names.join('\n')}\n]\n>>\n>>`,
  ]
  files.forEach(({ name, content, size = content.length }, k) => {
    const stream = deflateSync(content, { level })
    const params = `/Params <<\n/Size ${size}\n>>\n`
    objects.push(`<<\n/Type /Filespec\n/UF (${name})\n/EF <<\n/F ${entry(k) + 1} 0 R\n>>\n>>`)
    objects.push({ dictionary: `<<\n${params}/Length ${stream.length}\n/Filter /FlateDecode\n>>`, stream })
  })
  return buildPdf(objects)
}
