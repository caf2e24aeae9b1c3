/** From the bytes of files to a lot: reading, checking and analysing, the way every part of the program does it. */
import { decodeText } from '../ingest/decode-text'
import { readReadings, type InputFile } from '../ingest/read-files'
import { CoreError, type Problem } from '../problems/problem'
import { parseProcedure } from '../procedure/parse-procedure'
import { PROCEDURE_FORMAT } from '../procedure/schema'
import { analyze } from './analyze'
import { readCompanions } from './companions'
import type { Exclusion } from './exclusions'
import type { LotAnalysis } from './lot-analysis'
import type { Watch } from './progress'

export interface RunInput {
  readonly readings: readonly InputFile[]
  readonly procedure: { readonly name: string; readonly bytes: Uint8Array }
  /** Files that the procedure names, matched by base name; others are passed over. */
  readonly companions?: readonly InputFile[]
  /** Sites that a person took out. */
  readonly excluded?: readonly Exclusion[]
  /** Is told of the progress while it runs. */
  readonly watch?: Watch
}

/** `analysis` is null exactly when something stood in the way; `problems` then says what. */
export interface RunResult {
  readonly analysis: LotAnalysis | null
  readonly problems: readonly Problem[]
}

/** Never throws for what a user can bring in; a throw is a bug. */
export function run(input: RunInput): RunResult {
  const { readings: files, excluded = [], watch } = input
  const { name, bytes } = input.procedure
  const decoded = decodeText(bytes)
  if ('looksLike' in decoded) {
    return { analysis: null, problems: [{ kind: 'not-text', file: name, looksLike: decoded.looksLike }] }
  }
  const parsed = parseProcedure(decoded.text(), name)
  if (!parsed.procedure) return { analysis: null, problems: parsed.problems }
  const companions = readCompanions(parsed.procedure, input.companions ?? [], name)
  if (companions.obstacles.length > 0) return { analysis: null, problems: companions.obstacles }
  const read = readReadings(files, parsed.procedure.readings, (share, rows) =>
    watch?.({ stage: 'reading', share, rows }),
  )
  if (!read.readings) return { analysis: null, problems: read.problems }
  try {
    const analysis = analyze({
      readings: read.readings,
      procedure: parsed.procedure,
      defaults: parsed.defaults,
      problems: [...read.problems, ...companions.problems],
      notes: [...migrationNotes(parsed.migratedFrom, name), ...read.notes],
      excluded,
      profile: companions.profile,
      gauge: companions.gauge,
      check: companions.check,
      ...(watch && { watch }),
    })
    return { analysis, problems: analysis.problems }
  } catch (error) {
    if (!(error instanceof CoreError)) throw error
    return { analysis: null, problems: [...read.problems, namingFile(error.problem, name)] }
  }
}

function migrationNotes(from: string | null, file: string): readonly string[] {
  return from === null ? [] : [`${file}: written in the older edition ${from} and read as ${PROCEDURE_FORMAT}`]
}

/** The pipeline knows no file names; a key that turned out to be missing is missed in the procedure's file. */
function namingFile(problem: Problem, file: string): Problem {
  return 'file' in problem && problem.file === '' ? { ...problem, file } : problem
}
