/** What a report carries to be made again: its inputs, its result, and a list of them that says how it was made. */
import type { Exclusion } from '../../core/analysis/exclusions'
import { parseTime } from '../../core/ingest/parse-time'
import { DECISIONS, type Decision } from '../../core/report/decision'
import { arithmeticMark, compressionMark } from './making-marks'
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
  /** Files that the procedure names. */
  readonly companions?: readonly NamedBytes[]
}

/** How the report was made, as far as that shows in it. */
export interface ReportMaking {
  readonly program: string
  readonly version: string
  readonly date: string | null
  readonly paper: 'A4' | 'Letter'
  /** Of the responsible person, where one is made. */
  readonly decision?: Decision | null
  /** What it says of the machine: by default the marks of this one; another's, where another's report is made again. */
  readonly compression?: string
  readonly arithmetic?: string
}

export interface ReportContents extends ReportMaking {
  readonly inputs: Required<ReportInputs>
  /** Sites that a person took out. */
  readonly excluded: readonly Exclusion[]
  /** Text of result.json. */
  readonly result: string
  readonly compression: string
  readonly arithmetic: string
}

/** What the analysis was made of and by, beside the files: `excluded` is the analysis's own. */
export interface ReportSubject {
  readonly inputs: ReportInputs
  readonly excluded: readonly Exclusion[]
  /** Text of result.json. */
  readonly result: string
}

interface ManifestFile {
  readonly attachment: string
  readonly name: string
}

export function reportAttachments(
  { inputs, excluded, result }: ReportSubject,
  making: ReportMaking,
): readonly ReportAttachment[] {
  const { program, version, date, paper, decision = null } = making
  const { compression = compressionMark(), arithmetic = arithmeticMark() } = making
  const { readings, procedure, companions = [] } = inputs
  const [procedureName, ...names] = attachmentNames([procedure, ...readings, ...companions].map(({ name }) => name))
  const listed = (files: readonly NamedBytes[], from: number): readonly ManifestFile[] =>
    files.map(({ name }, k) => ({ attachment: names[from + k], name }))
  const manifest = {
    format: REPORT_FORMAT,
    program: { name: program, version },
    options: { date, paper },
    excluded: excluded.map(({ wafer, site, reason }) => ({ wafer, site, reason })),
    decision: decision && { ...decision },
    compression,
    arithmetic,
    readings: listed(readings, 0),
    procedure: { attachment: procedureName, name: procedure.name } satisfies ManifestFile,
    companions: listed(companions, readings.length),
    result: RESULT_NAME,
  }
  const json = (value: string): Uint8Array => new TextEncoder().encode(value)
  return [
    ...readings.map(({ bytes }, k) => ({ name: names[k], bytes, mime: 'text/csv', description: 'Readings, as analysed' })),
    { name: procedureName, bytes: procedure.bytes, mime: 'application/json', description: 'Procedure, as used' },
    ...companions.map(({ bytes }, k) => ({
      name: names[readings.length + k], bytes, mime: 'text/csv', description: 'Named by the procedure',
    })),
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
  const { making, excluded, compression, arithmetic } = manifest
  const opened = ({ attachment, name }: ManifestFile): NamedBytes => ({ name, bytes: bytesOf(attachment) })
  const inputs = {
    readings: manifest.readings.map(opened),
    procedure: opened(manifest.procedure),
    companions: manifest.companions.map(opened),
  }
  const result = textOf(bytesOf(RESULT_NAME))
  if (used.size !== byName.size) throw new PdfFault('a file was added to it')
  return { ...making, inputs, excluded, result, compression, arithmetic }
}

const MAX_MANIFEST_BYTES = 16 * 2 ** 20

interface Manifest {
  readonly making: Omit<ReportMaking, 'compression' | 'arithmetic'>
  readonly excluded: readonly Exclusion[]
  readonly compression: string
  readonly arithmetic: string
  readonly readings: readonly ManifestFile[]
  readonly procedure: ManifestFile
  readonly companions: readonly ManifestFile[]
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
  const readings = list(written['readings']).map(manifestFile)
  if (readings.length === 0) throw manifestFault()
  const decision = decisionOf(written['decision'])
  return {
    making: { program: word(program['name']), version: word(program['version']), date: dateOf(date), paper, decision },
    excluded: list(written['excluded']).map(exclusionOf),
    compression: word(written['compression']),
    arithmetic: word(written['arithmetic']),
    readings,
    procedure: manifestFile(written['procedure']),
    companions: list(written['companions']).map(manifestFile),
  }
}

function exclusionOf(written: unknown): Exclusion {
  const { wafer, site, reason } = fields(written)
  return { wafer: text(wafer), site: text(site), reason: text(reason) }
}

function decisionOf(written: unknown): Decision | null {
  if (written === null) return null
  const { decision, name, comment, date } = fields(written)
  const made = Object.keys(DECISIONS).find((id) => id === decision)
  if (made === undefined) throw manifestFault()
  return { decision: made as Decision['decision'], name: text(name), comment: text(comment), date: text(date) }
}

function manifestFile(written: unknown): ManifestFile {
  const { attachment, name } = fields(written)
  return { attachment: word(attachment), name: word(name) }
}

function dateOf(date: unknown): string | null {
  if (date === null) return null
  const written = word(date)
  if (typeof parseTime(written) === 'string') throw manifestFault()
  return written
}

const MAX_TEXT = 10_000

function text(value: unknown): string {
  if (typeof value !== 'string' || value.length > MAX_TEXT) throw manifestFault()
  return value
}

function word(value: unknown): string {
  const found = text(value)
  if (found === '') throw manifestFault()
  return found
}

function list(value: unknown): readonly unknown[] {
  if (!Array.isArray(value)) throw manifestFault()
  return value
}

function fields(value: unknown): Readonly<Record<string, unknown>> {
  if (typeof value !== 'object' || value === null) throw manifestFault()
  return value as Record<string, unknown>
}

function jsonOf(written: string): unknown {
  try {
    return JSON.parse(written)
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
