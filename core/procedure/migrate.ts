/** Procedures written in an older edition of the format, brought up to the current one step by step. */
import type { ProcedureProblem } from '../problems/problem'
import { orList } from './allowed'
import { isObject } from './key-shape'
import { PROCEDURE_FORMAT } from './schema'
import { foundText } from './shape-problems'

export type Written = Readonly<Record<string, unknown>>

/** One step from an edition to the next. */
export interface Migration {
  readonly from: string
  readonly to: string
  /**
   * The keys of the file in the later edition, without `format`, which is set afterwards. It gets whatever the file holds:
   * a value it can't read it hands on as it stands, for the schema to complain of.
   */
  readonly migrate: (written: Written) => Written
}

/** The older editions that are still read. A step, once released, is never changed. */
export const migrations: readonly Migration[] = []

export interface Migrated {
  /** In the current format, where `problem` is null and the file holds an object. */
  readonly written: unknown
  /** The edition that the file is written in, where it is an older one. */
  readonly from: string | null
  readonly problem: ProcedureProblem | null
}

const ANY_EDITION = /^persquare-procedure\/\d{1,9}$/

/** A file without a format, or with one that is no edition at all, is left to the schema. */
export function migrate(written: unknown, file: string, register: readonly Migration[] = migrations): Migrated {
  const format = formatOf(written)
  if (format === null || format === PROCEDURE_FORMAT) return { written, from: null, problem: null }
  let step = stepFrom(format, register)
  if (!step) {
    const problem = ANY_EDITION.test(format) ? unreadFormat(format, file, register) : null
    return { written, from: null, problem }
  }
  let brought = written as Written
  // Each step is taken once at most, so that a register that leads in a circle still ends.
  for (let steps = 0; step && steps < register.length; steps++) {
    brought = { ...step.migrate(brought), format: step.to }
    step = stepFrom(step.to, register)
  }
  if (brought['format'] !== PROCEDURE_FORMAT)
    throw new Error(`no migration leads from ${format} to ${PROCEDURE_FORMAT}`)
  return { written: brought, from: format, problem: null }
}

function formatOf(written: unknown): string | null {
  if (!isObject(written) || !Object.hasOwn(written, 'format')) return null
  return typeof written['format'] === 'string' ? written['format'] : null
}

function stepFrom(format: string, register: readonly Migration[]): Migration | undefined {
  return format === PROCEDURE_FORMAT ? undefined : register.find(({ from }) => from === format)
}

function unreadFormat(format: string, file: string, register: readonly Migration[]): ProcedureProblem {
  const read = [...register.map(({ from }) => from), PROCEDURE_FORMAT].map((known) => JSON.stringify(known))
  const allowed = `${orList(read)}: a newer edition needs a newer program`
  return { kind: 'bad-value', file, key: 'format', found: foundText(format), allowed }
}
