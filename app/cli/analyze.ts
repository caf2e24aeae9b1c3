/** `persquare analyze`: CSV and procedure in; verdict on standard output, files in a folder. */
import { parseArgs } from 'node:util'
import type { LotAnalysis } from '../../core/analysis/lot-analysis'
import { resultJson } from '../../core/analysis/result-json'
import { run } from '../../core/analysis/run'
import { CoreError } from '../../core/problems/problem'
import { parseTime } from '../../core/ingest/parse-time'
import { refuseAsNode } from './convert-arguments'
import { lotTable } from './lot-table'
import { ARTIFACTS, outputFiles, type Artifact } from './output-files'
import { printProblems } from './print-problems'
import { readCompanions } from './read-companions'
import { readInput } from './read-inputs'
import { PROGRAM, VERSION } from './version'
import { writeWhole } from '../host/write-whole'

export interface AnalyzeOptions {
  readonly files: readonly string[]
  readonly procedure: string
  readonly out: string | null
  readonly write: readonly Artifact[]
  readonly date: string | null
  readonly paper: 'A4' | 'Letter'
  readonly output: 'table' | 'json' | 'none'
}

export const EXIT = { inSpec: 0, notInSpec: 1, notAnalysed: 2 } as const

export async function analyzeCommand(args: readonly string[]): Promise<number> {
  return analyzeLot(parseOptions(args))
}

/** Analyses, prints and writes; problems go to standard error. */
export async function analyzeLot(options: AnalyzeOptions): Promise<number> {
  const procedure = await readInput(options.procedure)
  const readings = await Promise.all(options.files.map(readInput))
  const companions = await readCompanions(options.procedure, procedure)
  const { analysis, problems } = run({ readings, procedure, companions })
  if (options.output !== 'none') printProblems(problems, ', all listed in result.json')
  if (!analysis) {
    console.error('Nothing was analysed and nothing written.')
    return EXIT.notAnalysed
  }
  if (options.out !== null) {
    await writeWhole(options.out, await outputFiles(analysis, { readings, procedure, companions }, options))
  }
  print(analysis, options)
  return analysis.lot.verdict === 'in-spec' ? EXIT.inSpec : EXIT.notInSpec
}

function print(analysis: LotAnalysis, { output, out, write }: AnalyzeOptions): void {
  if (output === 'json') process.stdout.write(resultJson(analysis, { program: PROGRAM, version: VERSION }))
  if (output !== 'table') return
  console.log(lotTable(analysis))
  console.log(
    out === null
      ? '\nNothing written: no folder was given (--out DIR).'
      : `\nWritten to ${out}: ${write.map((id) => ARTIFACTS[id]).join(', ')}`,
  )
}

function parseOptions(args: readonly string[]): AnalyzeOptions {
  const { values, positionals } = parse(args)
  if (positionals.length === 0) refuse('FILE', 'name at least one CSV file with readings')
  if (values.procedure === undefined)
    refuse('--procedure', 'name the procedure (JSON) that says how to correct and judge the readings')
  const paper = values.paper ?? 'A4'
  if (paper !== 'A4' && paper !== 'Letter') refuse('--paper', `it is A4 or Letter, not "${paper}"`)
  if (values.date !== undefined && typeof parseTime(values.date) === 'string')
    refuse('--date', `"${values.date}" is no ISO 8601 date, such as 2026-03-16T12:00:00Z`)
  return {
    files: positionals,
    procedure: values.procedure,
    out: values.out ?? null,
    write: artifacts(values.write),
    date: values.date ?? null,
    paper,
    output: values.quiet ? 'none' : values.json ? 'json' : 'table',
  }
}

function parse(args: readonly string[]) {
  try {
    return parseArgs({
      args: [...args],
      allowPositionals: true,
      options: {
        procedure: { type: 'string' },
        out: { type: 'string' },
        write: { type: 'string' },
        date: { type: 'string' },
        paper: { type: 'string' },
        json: { type: 'boolean' },
        quiet: { type: 'boolean' },
      },
    })
  } catch (error) {
    return refuseAsNode(error, args)
  }
}

function artifacts(list: string | undefined): readonly Artifact[] {
  const known = Object.keys(ARTIFACTS) as Artifact[]
  if (list === undefined) return known
  const wanted = list.split(',').map((id) => id.trim())
  const unknown = wanted.find((id) => !(known as string[]).includes(id))
  if (unknown !== undefined) refuse('--write', `"${unknown}" is none of ${known.join(', ')}`)
  return known.filter((id) => wanted.includes(id))
}

function refuse(argument: string, why: string): never {
  throw new CoreError({ kind: 'bad-argument', argument, why })
}
