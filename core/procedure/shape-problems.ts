/** What the schema objects to, as problems that a person can act on. */
import type { z } from 'zod'
import type { ProcedureProblem } from '../problems/problem'
import { allowedWords } from './allowed'
import { keyPaths } from './keys'
import { dotted, isObject, knownKeys, meantShape, shapeAt, valueAt } from './key-shape'
import type { KeyPath } from './key-shape'
import { nearestKey } from './nearest-key'
import { whyNeeded } from './why-needed'

/** A problem and the place in the written procedure that must be left out to look at the rest. */
export interface ShapeProblem {
  readonly problem: ProcedureProblem
  readonly path: KeyPath
}

type Issue = z.core.$ZodIssue

export function shapeProblems(
  issues: readonly Issue[],
  written: unknown,
  file: string,
  above: KeyPath = [],
): readonly ShapeProblem[] {
  return issues.flatMap((issue) => {
    const path = [...above, ...issue.path.map((part) => (typeof part === 'symbol' ? String(part) : part))]
    if (issue.code === 'unrecognized_keys') {
      return issue.keys.map((key) => unknownKey([...path, key], written, file))
    }
    if (issue.code === 'invalid_union') {
      const inside = issuesOfMeantOption(issue, valueAt(path, written))
      if (inside) return shapeProblems(inside, written, file, path)
    }
    return [valueAt(path, written) === undefined ? missingKey(path, file) : badValue(path, written, file)]
  })
}

/** An object was meant as the one option that is an object: its own issues say more than "neither of two". */
function issuesOfMeantOption(issue: Issue & { code: 'invalid_union' }, value: unknown): readonly Issue[] | null {
  if (!isObject(value)) return null
  return issue.errors.find((option) => option.every((inside) => inside.path.length > 0 || !isTypeIssue(inside))) ?? null
}

function isTypeIssue(issue: Issue): boolean {
  return issue.code === 'invalid_type' || issue.code === 'invalid_value'
}

export function unknownKey(path: KeyPath, written: unknown, file: string): ShapeProblem {
  const parent = path.slice(0, -1)
  const name = String(path[path.length - 1])
  const known = knownKeys(meantShape(shapeAt(parent, written), valueAt(parent, written)))
  const sibling = nearestKey(name, known)
  const nearest = sibling === null ? elsewhere(name) : dotted([...parent, sibling])
  return { path, problem: { kind: 'unknown-key', file, key: dotted(path), nearest, known } }
}

/** A key that is right but stands in the wrong object; its uncertainty's namesake is never the first thing meant. */
function elsewhere(name: string): string | null {
  const same = keyPaths().filter((key) => key.split('.').pop() === name && !key.startsWith('uncertainty.'))
  return same.length === 1 ? same[0] : null
}

function missingKey(path: KeyPath, file: string): ShapeProblem {
  const key = dotted(path)
  return { path, problem: { kind: 'missing-key', file, key, why: whyNeeded(key) } }
}

function badValue(path: KeyPath, written: unknown, file: string): ShapeProblem {
  const found = foundText(valueAt(path, written))
  return {
    path,
    problem: { kind: 'bad-value', file, key: dotted(path), found, allowed: allowedWords(shapeAt(path, written), path) },
  }
}

/** JSON has no such number, but `1e999` in a file is one all the same. */
const BEYOND_ALL = 'a number larger than any'

function isBeyondAll(value: unknown): boolean {
  return typeof value === 'number' && !Number.isFinite(value)
}

const FOUND_LENGTH = 60

/** The value as the file writes it, cut to what fits into a sentence. */
export function foundText(value: unknown): string {
  const text = JSON.stringify(value, (_, part: unknown) => (isBeyondAll(part) ? BEYOND_ALL : part)) ?? 'nothing'
  return text.length > FOUND_LENGTH ? `${text.slice(0, FOUND_LENGTH - 1)}…` : text
}
