/** From files to the analysis of a lot: the one place where the window calls core's pipeline. Loaded when first needed. */
import type { LotAnalysis } from '../../core/analysis/lot-analysis'
import type { Problem } from '../../core/problems/problem'
import type { OpenedFile } from '../contract/host'

export interface Outcome {
  /** null when nothing could be analysed; the problems say why. */
  readonly analysis: LotAnalysis | null
  readonly problems: readonly Problem[]
}

export async function analyzeFiles(readings: readonly OpenedFile[], procedure: OpenedFile): Promise<Outcome> {
  const [{ analyze }, { readReadings }, { parseProcedure }] = await Promise.all([
    import('../../core/analysis/analyze'),
    import('../../core/ingest/read-files'),
    import('../../core/procedure/parse-procedure'),
  ])
  const text = procedureText(procedure)
  if (typeof text !== 'string') return { analysis: null, problems: [text] }
  const parsed = parseProcedure(text, procedure.name)
  if (!parsed.procedure) return { analysis: null, problems: parsed.problems }
  const read = readReadings(await Promise.all(readings.map(withDigest)), parsed.procedure.readings)
  if (!read.readings) return { analysis: null, problems: read.problems }
  const analysis = analyze({
    readings: read.readings,
    procedure: parsed.procedure,
    defaults: parsed.defaults,
    problems: read.problems,
    notes: read.notes,
  })
  return { analysis, problems: analysis.problems }
}

function procedureText({ name, bytes }: OpenedFile): string | Problem {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes)
  } catch {
    return { kind: 'cannot-read', file: name, why: 'it is not UTF-8 text' }
  }
}

async function withDigest({ name, bytes }: OpenedFile): Promise<{ name: string; bytes: Uint8Array; sha256: string }> {
  const digest = new Uint8Array(await crypto.subtle.digest('SHA-256', new Uint8Array(bytes)))
  return { name, bytes, sha256: Array.from(digest, (byte) => byte.toString(16).padStart(2, '0')).join('') }
}
