/** A procedure file's text to a procedure with every default filled in, or to everything that is wrong with it. */
import type { ProcedureProblem } from '../problems/problem'
import { crossChecks } from './cross-checks'
import type { Sections } from './blame'
import { defaultsUsed } from './defaults-used'
import type { DefaultUsed } from './defaults-used'
import { dotted, isObject, valueAt } from './key-shape'
import type { KeyPath } from './key-shape'
import { migrate, migrations } from './migrate'
import type { Migration } from './migrate'
import { scanJson } from './scan-json'
import { procedureSchema } from './schema'
import type { Procedure } from './schema'
import { shapeProblems, unknownKey } from './shape-problems'
import type { ShapeProblem } from './shape-problems'

export interface ParsedProcedure {
  /** null when there is any problem. */
  readonly procedure: Procedure | null
  readonly defaults: readonly DefaultUsed[]
  readonly problems: readonly ProcedureProblem[]
  /** The older edition of the format that the file is written in; null where it is the current one. */
  readonly migratedFrom: string | null
}

/** `file` names the file in problems; a byte order mark before the text is passed over. */
export function parseProcedure(
  text: string,
  file: string,
  register: readonly Migration[] = migrations,
): ParsedProcedure {
  const json = text.startsWith('\uFEFF') ? text.slice(1) : text
  const { fault, doubledKeys } = scanJson(json)
  if (fault) {
    const why = `line ${fault.line}, column ${fault.column}: ${fault.why}`
    return refused([{ kind: 'not-json', file, why }])
  }
  const { written, from, problem } = migrate(JSON.parse(json), file, register)
  // What an unread edition means by its other keys isn't known either.
  if (problem) return refused([problem])
  const shape = [...schemaProblems(written, file), ...prototypeKeys(written, file)]
  const problems = [
    ...doubledKeys.map((key) => doubledKey(key, file)),
    ...shape.map(({ problem }) => problem),
    ...crossChecks(readableSections(written, shape), file).filter(isNewsBeside(shape)),
  ].filter(isNotMisspelt(shape))
  if (problems.length > 0) return refused(problems)
  const procedure = procedureSchema.parse(written)
  delete procedure.$schema
  return { procedure, defaults: defaultsUsed(written, procedure), problems: [], migratedFrom: from }
}

function refused(problems: readonly ProcedureProblem[]): ParsedProcedure {
  return { procedure: null, defaults: [], problems, migratedFrom: null }
}

function schemaProblems(written: unknown, file: string): readonly ShapeProblem[] {
  const result = procedureSchema.safeParse(written)
  return result.success ? [] : shapeProblems(result.error.issues, written, file)
}

/** The schema passes over a key named `__proto__` where the keys of an object are free; it is as unknown as any other. */
function prototypeKeys(written: unknown, file: string): readonly ShapeProblem[] {
  const path = ['readings', 'columns']
  const columns = valueAt(path, written)
  return isObject(columns) && Object.hasOwn(columns, '__proto__')
    ? [unknownKey([...path, '__proto__'], written, file)]
    : []
}

function doubledKey(key: string, file: string): ProcedureProblem {
  return {
    kind: 'bad-value',
    file,
    key,
    found: 'the key twice',
    allowed: 'one entry; only one of the two can be meant',
  }
}

/** Each section by itself, without the places already complained of. */
function readableSections(written: unknown, shape: readonly ShapeProblem[]): Sections {
  const rest = without(written, [], new Set(shape.map(({ path }) => dotted(path))))
  if (!isObject(rest)) return {}
  const sections: Record<string, unknown> = {}
  for (const [key, schema] of Object.entries(procedureSchema.shape)) {
    const section = schema.safeParse(Object.hasOwn(rest, key) ? rest[key] : undefined)
    if (section.success && section.data !== undefined) sections[key] = section.data
  }
  return sections as Sections
}

/** A copy of plain JSON without the given places; what it leaves out of a list shortens the list. */
function without(value: unknown, path: KeyPath, unwanted: ReadonlySet<string>): unknown {
  if (Array.isArray(value)) {
    return value.filter((_, index) => !unwanted.has(dotted([...path, index])))
  }
  if (!isObject(value)) return value
  return Object.fromEntries(
    Object.entries(value)
      .filter(([key]) => !unwanted.has(dotted([...path, key])))
      .map(([key, entry]) => [key, without(entry, [...path, key], unwanted)]),
  )
}

/** A key already complained of was left out to look at the rest; its absence is no second problem. */
function isNewsBeside(shape: readonly ShapeProblem[]): (problem: ProcedureProblem) => boolean {
  const blamed = new Set(shape.map(({ path }) => dotted(path)))
  return (problem) => !('key' in problem) || !blamed.has(problem.key)
}

/** A misspelt key is not missing as well: mending the one mends the other. */
function isNotMisspelt(shape: readonly ShapeProblem[]): (problem: ProcedureProblem) => boolean {
  const meant = new Set(shape.map(({ problem }) => (problem.kind === 'unknown-key' ? problem.nearest : null)))
  return (problem) => problem.kind !== 'missing-key' || !meant.has(problem.key)
}
