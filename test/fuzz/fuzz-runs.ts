/**
 * How many inputs each property gets, and from which seed. `PERSQUARE_FUZZ_RUNS=200000 npm test` looks longer;
 * `PERSQUARE_FUZZ_SEED=7` elsewhere. What a failing run prints (seed and path) replays it.
 */
import fc from 'fast-check'

/** Of all properties together, unless the environment says otherwise. */
const USUAL_RUNS = 10_000
const USUAL_SEED = 417

const total = wholeNumber(process.env['PERSQUARE_FUZZ_RUNS']) ?? USUAL_RUNS
const seed = wholeNumber(process.env['PERSQUARE_FUZZ_SEED']) ?? USUAL_SEED

function wholeNumber(text: string | undefined): number | null {
  return text !== undefined && /^\d{1,9}$/.test(text) ? Number(text) : null
}

/** For vitest, which would give up on a long look. */
export const PATIENCE_MS = Math.max(60_000, 50 * total)

/** A share of all inputs, in percent. */
function inputs(sharePercent: number): number {
  return Math.max(1, Math.round((total * sharePercent) / 100))
}

/** Checks a property and prints how often, from which seed, and how long its slowest input took. */
export function fuzz<T>(
  name: string,
  sharePercent: number,
  input: fc.Arbitrary<T>,
  check: (input: T) => unknown,
): void {
  const numRuns = inputs(sharePercent)
  let slowest_ms = 0
  const start = performance.now()
  fc.assert(
    fc.property(input, (value) => {
      const begin = performance.now()
      check(value)
      slowest_ms = Math.max(slowest_ms, performance.now() - begin)
    }),
    { seed, numRuns },
  )
  const took_s = ((performance.now() - start) / 1000).toFixed(1)
  console.log(`fuzz: ${name}: ${numRuns} inputs, seed ${seed}, ${took_s} s, slowest ${slowest_ms.toFixed(0)} ms`)
}

/** No input may take longer. Twice the promise, since the machine of a test has other work too. */
const BOUND_MS = 4000
const AGAIN_MS = 2000

/** Runs once; again where it was slow, for the machine may have been busy. */
export function inTime<T>(work: () => T): T {
  const begin = performance.now()
  const result = work()
  if (performance.now() - begin < AGAIN_MS) return result
  const again = performance.now()
  work()
  const took_ms = performance.now() - again
  if (took_ms > BOUND_MS) throw new Error(`took ${took_ms.toFixed(0)} ms, more than ${BOUND_MS}`)
  return result
}
