/** Files that a procedure names and that come with it: today the depth profile of a tabulated layer. */
import { decodeText } from '../ingest/decode-text'
import type { InputFile } from '../ingest/read-files'
import { readProfile, type DepthProfile } from '../ingest/read-profile'
import type { Problem } from '../problems/problem'
import { parseProcedure } from '../procedure/parse-procedure'
import type { Procedure } from '../procedure/schema'

/** Their bare names, so that whoever reads files can fetch them from beside the procedure. */
export function companionNames({ layer }: Procedure): readonly string[] {
  return layer.kind === 'doped-layer' && layer.profileFile !== undefined ? [layer.profileFile] : []
}

/** The same of a procedure still in bytes; none where it can't be read: `run` says why. */
export function companionsNamedIn({ name, bytes }: { name: string; bytes: Uint8Array }): readonly string[] {
  const decoded = decodeText(bytes)
  if ('looksLike' in decoded) return []
  const { procedure } = parseProcedure(decoded.text, name)
  return procedure ? companionNames(procedure) : []
}

/** Of the files given, those that the procedure names. */
export function companionsOf<File extends { readonly name: string }>(
  procedure: Procedure,
  given: readonly File[],
): readonly File[] {
  const names = companionNames(procedure).map((name) => name.normalize('NFC'))
  return given.filter(({ name }) => names.includes(baseName(name)))
}

export interface Companions {
  /** null where the procedure names none, or there is a problem. */
  readonly profile: DepthProfile | null
  readonly problems: readonly Problem[]
}

/** `given` is matched by base name; `file` is the procedure's. */
export function readCompanions(procedure: Procedure, given: readonly InputFile[], file: string): Companions {
  const [name] = companionNames(procedure)
  if (name === undefined) return { profile: null, problems: [] }
  const [found] = companionsOf(procedure, given)
  if (!found) return { profile: null, problems: [missingProfile(name, file)] }
  return readProfile({ ...found, name })
}

export function missingProfile(name: string, file: string): Problem {
  return { kind: 'missing-file', file, key: 'layer.profileFile', name }
}

function baseName(path: string): string {
  return path.replace(/^.*[/\\]/, '').normalize('NFC')
}
