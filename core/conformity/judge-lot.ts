/** The verdict on a lot, from its wafers. */
import { hasAnyLimit, type WaferJudgement, type WaferLimits } from './judge-wafer'
import { NO_LIMITS } from './reasons'
import type { Verdict } from './verdict'

export interface LotJudgement {
  readonly verdict: Verdict
  /** In words; those that decided come first. */
  readonly reasons: readonly string[]
}

/**
 * Out of spec where any wafer is; else undecided where any wafer is undecided or was not assessed; else in spec.
 * Without limits, or without wafers, not assessed.
 */
export function judgeLot(wafers: readonly WaferJudgement[], limits: WaferLimits): LotJudgement {
  if (!hasAnyLimit(limits)) return { verdict: 'not-assessed', reasons: [NO_LIMITS] }
  if (wafers.length === 0) return { verdict: 'not-assessed', reasons: ['no wafer has readings'] }
  const out = wafers.filter((wafer) => wafer.verdict === 'out-of-spec')
  const unsettled = wafers.filter((wafer) => wafer.verdict === 'undecided' || wafer.verdict === 'not-assessed')
  const reasons = [...out, ...unsettled].flatMap((wafer) => wafer.reasons)
  if (out.length > 0) return { verdict: 'out-of-spec', reasons }
  if (unsettled.length > 0) return { verdict: 'undecided', reasons }
  const all = wafers.length === 1 ? 'the wafer is in spec' : `all ${wafers.length} wafers are in spec`
  return { verdict: 'in-spec', reasons: [all] }
}
