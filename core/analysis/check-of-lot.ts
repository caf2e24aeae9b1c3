/** How the check wafer stood when a lot was measured. */
import { standingAt, type CheckResult, type StandingCheck } from '../check-wafer/check'
import { standingWords } from '../check-wafer/check-words'
import type { Readings } from '../ingest/readings'
import type { AnalysisProblem } from '../problems/problem'

export interface CheckOfLot {
  readonly result: CheckResult
  readonly standing: StandingCheck
}

/** The lot counts from its first reading to its last. Without times the history's end stands. */
export function checkOfLot(result: CheckResult, { time_ms }: Readings): CheckOfLot {
  let first = Infinity
  let last = -Infinity
  for (const time of time_ms ?? []) {
    if (time < first) first = time
    if (time > last) last = time
  }
  return { result, standing: Number.isFinite(first) ? standingAt(result, first, last) : standingAt(result, NaN) }
}

/** An alarm before or while the lot was measured, or at the next occasion after it. */
export function isMarked({ standing: { state } }: CheckOfLot): boolean {
  return state === 'alarm' || state === 'doubtful'
}

/**
 * An alarm marks the lot and doesn't change its verdict: the readings may be right all the same, and whether the lot is
 * held is for a person to say, who must be told.
 */
export function checkProblems(check: CheckOfLot | null): AnalysisProblem[] {
  if (!check || !isMarked(check)) return []
  return [{ kind: 'check-wafer-alarm', sentence: standingWords(check.result, check.standing) }]
}
