/** How the check wafer stood when a lot was measured. */
import { standingAt, type CheckResult, type StandingCheck } from '../check-wafer/check'
import { standingWords } from '../check-wafer/check-words'
import type { Readings } from '../ingest/readings'
import type { AnalysisProblem } from '../problems/problem'

export interface CheckOfLot {
  readonly result: CheckResult
  readonly standing: StandingCheck
}

/** The lot counts by its first reading: what the prober was when it began. Without times the history's end stands. */
export function checkOfLot(result: CheckResult, { time_ms }: Readings): CheckOfLot {
  const first = time_ms ? time_ms.reduce((least, time) => (time < least ? time : least), Infinity) : NaN
  return { result, standing: standingAt(result, Number.isFinite(first) ? first : NaN) }
}

/**
 * An alarm marks the lot and doesn't change its verdict: the readings may be right all the same, and whether the lot is
 * held is for a person to say, who must be told.
 */
export function checkProblems(check: CheckOfLot | null): AnalysisProblem[] {
  if (check?.standing.state !== 'alarm') return []
  return [{ kind: 'check-wafer-alarm', sentence: standingWords(check.result, check.standing) }]
}
