/** How a check of a procedure says what is wrong with a key. */
import type { ProcedureProblem } from '../problems/problem'
import type { Procedure } from './schema'
import { foundText } from './shape-problems'
import { whyNeeded } from './why-needed'

/** The sections that read well on their own; a bad one must not hide what is wrong in the others. */
export type Sections = Partial<Procedure>

/** Makes the problem of one key; the file's name is put in once. */
export interface Blame {
  readonly missing: (key: string) => ProcedureProblem
  readonly bad: (key: string, found: unknown, allowed: string) => ProcedureProblem
  readonly reversed: (key: string, lower: number, upper: number) => ProcedureProblem
}

export function blameIn(file: string): Blame {
  return {
    missing: (key) => ({ kind: 'missing-key', file, key, why: whyNeeded(key) }),
    bad: (key, found, allowed) => ({ kind: 'bad-value', file, key, found: foundText(found), allowed }),
    reversed: (key, lower, upper) => ({ kind: 'limits-reversed', file, key, lower, upper }),
  }
}
