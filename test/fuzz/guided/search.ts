/** Looks for inputs that lead somewhere new in the program, and builds on those. */
import { dice, mutated } from './mutate'
import type { Target } from './targets'

export interface Failure {
  readonly target: string
  readonly bytes: Uint8Array
  readonly why: string
}

export interface Search {
  readonly target: string
  inputs: number
  slowest_ms: number
  /** Inputs that led somewhere new. */
  corpus: Uint8Array[]
  branches: number
  readonly failures: Failure[]
}

/** No input may take longer. */
const BOUND_ms = 1000
const MOST_FAILURES = 20

/** @param branches  what the instrumented program counts in; null goes without a guide */
export function searcher(
  { name, seeds, dictionary, check }: Target,
  { root, seed, branches }: { readonly root: string; readonly seed: number; readonly branches: Uint8Array | null },
): { readonly found: Search; step(inputs: number): void } {
  const roll = dice(seed)
  const found: Search = { target: name, inputs: 0, slowest_ms: 0, corpus: [], branches: 0, failures: [] }
  const seen = new Uint8Array(branches?.length ?? 0)
  const known = new Set<string>()

  function tryOne(bytes: Uint8Array): boolean {
    branches?.fill(0)
    const begin = performance.now()
    const why = failureOf(check, bytes)
    let took_ms = performance.now() - begin
    // The machine may have been busy elsewhere.
    if (took_ms > BOUND_ms) took_ms = timeOf(() => failureOf(check, bytes))
    found.inputs++
    found.slowest_ms = Math.max(found.slowest_ms, took_ms)
    const told = why ?? (took_ms > BOUND_ms ? `took ${took_ms.toFixed(0)} ms` : null)
    const kind = told?.replace(/[\d.e+-]+/g, '0').slice(0, 80)
    if (told !== null && kind !== undefined && !known.has(kind) && found.failures.length < MOST_FAILURES) {
      known.add(kind)
      found.failures.push({ target: name, bytes, why: told })
    }
    return branches !== null && leadsOn(branches, seen, found)
  }

  const first = seeds(root)
  found.corpus = [...first]
  for (const bytes of first) tryOne(bytes)
  return {
    found,
    step: (inputs) => {
      for (let n = 0; n < inputs; n++) {
        const [one, other] = [found.corpus[roll(found.corpus.length)], found.corpus[roll(found.corpus.length)]]
        const bytes = mutated(one, other, dictionary, roll)
        if (tryOne(bytes)) found.corpus.push(bytes)
      }
    },
  }
}

/** A branch never taken before, or taken many more times. */
function leadsOn(branches: Uint8Array, seen: Uint8Array, found: Search): boolean {
  let isNew = false
  for (let at = 0; at < branches.length; at++) {
    if (branches[at] === 0) continue
    const bucket = branches[at] < 4 ? branches[at] : branches[at] < 32 ? 4 : 5
    const bit = 1 << bucket
    if (seen[at] & bit) continue
    if (seen[at] === 0) found.branches++
    seen[at] |= bit
    isNew = true
  }
  return isNew
}

function failureOf(check: Target['check'], bytes: Uint8Array): string | null {
  try {
    check(bytes)
    return null
  } catch (error) {
    return error instanceof Error ? `${error.message}\n${error.stack?.split('\n')[1] ?? ''}` : String(error)
  }
}

function timeOf(work: () => void): number {
  const begin = performance.now()
  work()
  return performance.now() - begin
}
