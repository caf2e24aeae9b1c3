/** What a report carries to be made again: its inputs, its result, and a list of them that says how it was made. */
import { createHash } from 'node:crypto'
import { deflateSync } from 'node:zlib'
import { parseTime } from '../../core/ingest/parse-time'
import { attachmentNames, MANIFEST_NAME, RESULT_NAME } from './attachment-names'
import { PdfFault } from './pdf-syntax'
import type { ReadAttachment } from './read-attachments'
import type { ReportAttachment } from './write-report'

export const REPORT_FORMAT = 'persquare-report/1'

export interface NamedBytes {
  readonly name: string
  readonly bytes: Uint8Array
}

export interface ReportInputs {
  readonly readings: readonly NamedBytes[]
  readonly procedure: NamedBytes
}

/** How the report was made, as far as that shows in it. */
export interface ReportMaking {
  readonly program: string
  readonly version: string
  readonly date: string | null
  readonly paper: 'A4' | 'Letter'
  /** What it says of its compressor: by default the mark of our own; another's, where another's report is made again. */
  readonly compression?: string
}

export interface ReportContents extends ReportMaking {
  readonly inputs: ReportInputs
  /** Text of result.json. */
  readonly result: string
  readonly compression: string
}

interface ManifestFile {
  readonly attachment: string
  readonly name: string
}

export function reportAttachments(
  inputs: ReportInputs,
  result: string,
  { program, version, date, paper, compression = compressionMark() }: ReportMaking,
): readonly ReportAttachment[] {
  const [procedureName, ...readingNames] = attachmentNames(
    [inputs.procedure, ...inputs.readings].map(({ name }) => name),
  )
  const manifest = {
    format: REPORT_FORMAT,
    program: { name: program, version },
    options: { date, paper },
    compression,
    readings: inputs.readings.map(({ name }, k): ManifestFile => ({ attachment: readingNames[k], name })),
    procedure: { attachment: procedureName, name: inputs.procedure.name } satisfies ManifestFile,
    result: RESULT_NAME,
  }
  const json = (value: string): Uint8Array => new TextEncoder().encode(value)
  return [
    ...inputs.readings.map(({ bytes }, k) => ({
      name: readingNames[k], bytes, mime: 'text/csv', description: 'Readings, as analysed',
    })),
    { name: procedureName, bytes: inputs.procedure.bytes, mime: 'application/json', description: 'Procedure, as used' },
    { name: RESULT_NAME, bytes: json(result), mime: 'application/json', description: 'Result' },
    {
      name: MANIFEST_NAME, bytes: json(`${JSON.stringify(manifest, null, 2)}\n`), mime: 'application/json',
      description: 'What this report was made of, for persquare verify',
    },
  ] // prettier-ignore
}

/** @throws PdfFault unless they are the attachments of a report, all of them and no more */
export function reportContents(attachments: readonly ReadAttachment[]): ReportContents {
  const byName = new Map(attachments.map(({ name, bytes }) => [name, bytes]))
  const manifest = parsedManifest(byName.get(MANIFEST_NAME))
  const used = new Set([MANIFEST_NAME])
  const bytesOf = (name: string): Uint8Array => {
    const bytes = byName.get(name)
    if (!bytes || used.has(name)) throw new PdfFault(`its list of files is wrong about ${name}`)
    used.add(name)
    return bytes
  }
  const { readings, procedure, making, compression } = manifest
  const inputs = {
    readings: readings.map(({ attachment, name }) => ({ name, bytes: bytesOf(attachment) })),
    procedure: { name: procedure.name, bytes: bytesOf(procedure.attachment) },
  }
  const result = textOf(bytesOf(RESULT_NAME))
  if (used.size !== byName.size) throw new PdfFault('a file was added to it')
  return { ...making, inputs, result, compression }
}

const MAX_MANIFEST_BYTES = 2 ** 20

interface Manifest {
  readonly making: Omit<ReportMaking, 'compression'>
  readonly compression: string
  readonly readings: readonly ManifestFile[]
  readonly procedure: ManifestFile
}

function parsedManifest(bytes: Uint8Array | undefined): Manifest {
  if (!bytes) throw new PdfFault('it is no report of this program')
  if (bytes.length > MAX_MANIFEST_BYTES) throw manifestFault()
  const written = fields(jsonOf(textOf(bytes)))
  if (written['format'] !== REPORT_FORMAT) {
    throw new PdfFault(`it is a report of another edition; this program reads ${REPORT_FORMAT}`)
  }
  const program = fields(written['program'])
  const { date, paper } = fields(written['options'])
  if (paper !== 'A4' && paper !== 'Letter') throw manifestFault()
  if (!Array.isArray(written['readings']) || written['readings'].length === 0) throw manifestFault()
  return {
    making: { program: word(program['name']), version: word(program['version']), date: dateOf(date), paper },
    compression: word(written['compression']),
    readings: written['readings'].map(manifestFile),
    procedure: manifestFile(written['procedure']),
  }
}

function manifestFile(written: unknown): ManifestFile {
  const { attachment, name } = fields(written)
  return { attachment: word(attachment), name: word(name) }
}

function dateOf(date: unknown): string | null {
  if (date === null) return null
  const text = word(date)
  if (typeof parseTime(text) === 'string') throw manifestFault()
  return text
}

const MAX_WORD = 1000

function word(value: unknown): string {
  if (typeof value !== 'string' || value === '' || value.length > MAX_WORD) throw manifestFault()
  return value
}

function fields(value: unknown): Readonly<Record<string, unknown>> {
  if (typeof value !== 'object' || value === null) throw manifestFault()
  return value as Record<string, unknown>
}

function jsonOf(text: string): unknown {
  try {
    return JSON.parse(text)
  } catch {
    throw manifestFault()
  }
}

function textOf(bytes: Uint8Array): string {
  try {
    return new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(bytes)
  } catch {
    throw new PdfFault('a text in it is damaged')
  }
}

function manifestFault(): PdfFault {
  return new PdfFault(`its ${MANIFEST_NAME} is damaged`)
}

let mark: string | null = null

/**
 * Tells compressors apart. Builds of zlib may pack the same content into different bytes; where the mark is the same, the
 * same report has the same bytes, and where it isn't, reports are compared by what their streams hold.
 */
export function compressionMark(): string {
  return (mark ??= createHash('sha256').update(deflateSync(sampleText())).digest('hex').slice(0, 12))
}

/** 64 kB like readings: numbers, some of them again and again. */
function sampleText(): Uint8Array {
  const bytes = new Uint8Array(65_536)
  let state = 1
  for (let k = 0; k < bytes.length; k++) {
    state = (state * 48_271) % 2_147_483_647
    bytes[k] = k % 9 === 8 ? 44 : k % 3 === 0 ? 48 + (k % 7) : 48 + (state % 10)
  }
  return bytes
}
