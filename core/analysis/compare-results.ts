/** Two results, value by value: where they differ, and in what. */

/** Stands where one side has no value at all; JSON has none that could be mistaken for it. */
export const ABSENT = Symbol('absent')

export interface Difference {
  /** `wafers[3].statistics.mean`; empty where the whole differs. */
  readonly path: string
  /** A value of JSON, or ABSENT. */
  readonly before: unknown
  readonly after: unknown
}

export interface Comparison {
  /** The first of them, in the order of the document. */
  readonly differences: readonly Difference[]
  /** All of them; a part that only one side has counts as one. */
  readonly count: number
}

export interface CompareOptions {
  /** How many differences are listed at most. */
  readonly limit?: number
  /** Paths that may differ. */
  readonly except?: readonly string[]
  /** By how much numbers may differ, relative to the larger; absent: not at all. */
  readonly tolerance?: number
}

const LISTED = 200

/** A step of a path, linked to the one before, so that a path is written out only where something differs. */
interface Step {
  readonly above: Step | null
  readonly key: string | number
}

interface Pair {
  readonly step: Step | null
  readonly before: unknown
  readonly after: unknown
}

/** Of values as `JSON.parse` makes them. Numbers are equal when their values are, to the last digit unless a tolerance is given. */
export function compareResults(before: unknown, after: unknown, options: CompareOptions = {}): Comparison {
  const { limit = LISTED, except = [], tolerance = 0 } = options
  const differences: Difference[] = []
  let count = 0
  // A stack of our own: how deep a foreign document goes is not for us to say.
  const open: Pair[] = [{ step: null, before, after }]
  for (let pair = open.pop(); pair; pair = open.pop()) {
    const inside = childrenOf(pair)
    if (inside) {
      for (let k = inside.length - 1; k >= 0; k--) open.push(inside[k])
    } else if (!isEqual(pair, tolerance) && !(except.length > 0 && except.includes(pathOf(pair.step)))) {
      count++
      const { before, after } = pair
      if (differences.length < limit) differences.push({ path: pathOf(pair.step), before, after })
    }
  }
  return { differences, count }
}

function isEqual({ before, after }: Pair, tolerance: number): boolean {
  if (before === after) return true
  if (tolerance === 0 || typeof before !== 'number' || typeof after !== 'number') return false
  return Math.abs(before - after) <= tolerance * Math.max(Math.abs(before), Math.abs(after))
}

/** In document order; null where the two don't hold the same kind of thing with something inside. */
function childrenOf({ step, before, after }: Pair): readonly Pair[] | null {
  if (Array.isArray(before) && Array.isArray(after)) {
    return Array.from({ length: Math.max(before.length, after.length) }, (_, index) => ({
      step: { above: step, key: index },
      before: index < before.length ? (before[index] as unknown) : ABSENT,
      after: index < after.length ? (after[index] as unknown) : ABSENT,
    }))
  }
  if (!isObject(before) || !isObject(after)) return null
  const added = Object.keys(after).filter((key) => !Object.hasOwn(before, key))
  return [...Object.keys(before), ...added].map((key) => ({
    step: { above: step, key },
    before: Object.hasOwn(before, key) ? before[key] : ABSENT,
    after: Object.hasOwn(after, key) ? after[key] : ABSENT,
  }))
}

function isObject(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value)
}

const PLAIN_KEY = /^[A-Za-z_$][\w$]*$/

function pathOf(step: Step | null): string {
  const parts: string[] = []
  for (let here = step; here; here = here.above) {
    const { key } = here
    if (typeof key === 'number') parts.push(`[${key}]`)
    else parts.push(PLAIN_KEY.test(key) ? `.${key}` : `[${JSON.stringify(key)}]`)
  }
  const path = parts.reverse().join('')
  return path.startsWith('.') ? path.slice(1) : path
}
