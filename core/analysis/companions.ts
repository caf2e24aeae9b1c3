/** Files that a procedure names and that come with it: a depth profile, a gauge study, a check wafer's history. */
import { checkHistory, type CheckResult } from '../check-wafer/check'
import { readHistory } from '../check-wafer/history'
import { gaugeStudy, type GaugeStudy } from '../gauge/gauge-study'
import { readOccasions } from '../gauge/occasions'
import { decodeText } from '../ingest/decode-text'
import type { InputFile } from '../ingest/read-files'
import { readProfile, type DepthProfile } from '../ingest/read-profile'
import { CoreError, type Problem } from '../problems/problem'
import { parseProcedure } from '../procedure/parse-procedure'
import type { Procedure } from '../procedure/schema'

interface NamedFile {
  /** Dotted key of the procedure. */
  readonly key: string
  readonly name: string
}

function namedFiles({ layer, gaugeStudy, checkWafer }: Procedure): readonly NamedFile[] {
  const profile = layer.kind === 'doped-layer' ? layer.profileFile : undefined
  return [
    ...(profile === undefined ? [] : [{ key: 'layer.profileFile', name: profile }]),
    ...(gaugeStudy ? [{ key: 'gaugeStudy.file', name: gaugeStudy.file }] : []),
    ...(checkWafer ? [{ key: 'checkWafer.file', name: checkWafer.file }] : []),
  ]
}

/** Their bare names, each once, so that whoever reads files can fetch them from beside the procedure. */
export function companionNames(procedure: Procedure): readonly string[] {
  return [...new Set(namedFiles(procedure).map(({ name }) => name))]
}

/** The same of a procedure still in bytes; none where it can't be read: `run` says why. */
export function companionsNamedIn({ name, bytes }: { name: string; bytes: Uint8Array }): readonly string[] {
  const decoded = decodeText(bytes)
  if ('looksLike' in decoded) return []
  const { procedure } = parseProcedure(decoded.text(), name)
  return procedure ? companionNames(procedure) : []
}

/** Of the files given, those that the procedure names, in its order; of several of one name the first. */
export function companionsOf<File extends { readonly name: string }>(
  procedure: Procedure,
  given: readonly File[],
): readonly File[] {
  return companionNames(procedure).flatMap((name) => foundUnder(name, given) ?? [])
}

export interface Companions {
  /** Each null where the procedure names none, or it can't be used. */
  readonly profile: DepthProfile | null
  readonly gauge: GaugeStudy | null
  readonly check: CheckResult | null
  /** That leave the lot unanalysed. */
  readonly obstacles: readonly Problem[]
  /** Rows of them that were left out. */
  readonly problems: readonly Problem[]
}

/** `given` is matched by base name; `file` is the procedure's. */
export function readCompanions(procedure: Procedure, given: readonly InputFile[], file: string): Companions {
  const fileOf = (key: string): InputFile | null => {
    const named = namedFiles(procedure).find((entry) => entry.key === key)
    const found = named && foundUnder(named.name, given)
    return named && found ? { ...found, name: named.name } : null
  }
  const missing = namedFiles(procedure)
    .filter(({ name }) => !foundUnder(name, given))
    .map(({ key, name }): Problem => ({ kind: 'missing-file', file, key, name }))
  const profile = profileIn(fileOf('layer.profileFile'))
  const gauge = gaugeIn(procedure, fileOf('gaugeStudy.file'))
  const check = checkIn(procedure, fileOf('checkWafer.file'))
  return {
    profile: profile.value,
    gauge: gauge.value,
    check: check.value,
    obstacles: [...missing, ...profile.obstacles, ...gauge.obstacles, ...check.obstacles],
    problems: [...gauge.problems, ...check.problems],
  }
}

interface Read<Value> {
  readonly value: Value | null
  readonly obstacles: readonly Problem[]
  readonly problems: readonly Problem[]
}

const NONE = { value: null, obstacles: [], problems: [] } as const

function profileIn(file: InputFile | null): Read<DepthProfile> {
  if (!file) return NONE
  const { profile, problems } = readProfile(file)
  return { value: profile, obstacles: problems, problems: [] }
}

function gaugeIn({ gaugeStudy: named, statistics }: Procedure, file: InputFile | null): Read<GaugeStudy> {
  if (!file) return NONE
  const { occasions, problems } = readOccasions(file)
  if (!occasions) return { value: null, obstacles: problems, problems: [] }
  const options = { level: statistics.confidence, probe: named?.probe ?? null }
  return settled(file.name, problems, () => gaugeStudy(occasions, options))
}

function checkIn({ checkWafer: named }: Procedure, file: InputFile | null): Read<CheckResult> {
  if (!file) return NONE
  const { history, problems } = readHistory(file)
  if (!history) return { value: null, obstacles: problems, problems: [] }
  const options = { baseline: named?.baseline ?? null, accepted: named?.acceptedValue ?? null }
  return settled(file.name, problems, () => checkHistory(history, options))
}

/** What can't be made of a file that could be read is a fault of the file. */
function settled<Value>(file: string, problems: readonly Problem[], make: () => Value): Read<Value> {
  try {
    return { value: make(), obstacles: [], problems }
  } catch (error) {
    if (!(error instanceof CoreError)) throw error
    const why = 'why' in error.problem ? error.problem.why : error.problem.kind
    return { value: null, obstacles: [{ kind: 'bad-table', file, why }], problems }
  }
}

export function missingProfile(name: string, file: string): Problem {
  return { kind: 'missing-file', file, key: 'layer.profileFile', name }
}

function foundUnder<File extends { readonly name: string }>(name: string, given: readonly File[]): File | undefined {
  return given.find((file) => baseName(file.name) === name.normalize('NFC'))
}

function baseName(path: string): string {
  return path.replace(/^.*[/\\]/, '').normalize('NFC')
}
