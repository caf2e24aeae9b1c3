/** The verdict on a wafer: its sites, its mean, its uniformity, each against its limit. */
import type { NonuniformityId } from '../statistics/nonuniformity'
import type { Statistics } from '../statistics/summarize'
import type { SiteFindings } from './judge-sites'
import { acceptanceLimits, judgeBy, SIMPLE, type Acceptance } from './acceptance'
import { hasLimits, sideOf, type Limits } from './limits'
import {
  NO_LIMITS,
  judgedSites,
  meanReason,
  meanUndecidedReason,
  missingSitesReason,
  sitesReason,
  undecidedSitesReason,
  uniformityReason,
  uniformityUnknownReason,
  waferName,
} from './reasons'
import type { Verdict } from './verdict'

/** All in the unit of the judged quantity, uniformity in percent. An absent one isn't judged. */
export interface WaferLimits {
  readonly site?: Limits | undefined
  readonly mean?: Limits | undefined
  readonly uniformity?: { readonly upper: number; readonly definition: NonuniformityId } | undefined
  /** How many sites may lie outside the site limits before the wafer does. */
  readonly allowedSitesOut: number
}

export interface WaferToJudge {
  readonly id: string
  readonly findings: SiteFindings
  readonly statistics: Statistics
  readonly limits: WaferLimits
  readonly unit: string
  /** Standard uncertainty of the mean; absent or NaN: the mean is judged simply. */
  readonly uMean?: number
  readonly acceptance?: Acceptance
}

/** One thing that was judged, and how it came out. */
export interface Finding {
  readonly about: 'sites' | 'mean' | 'uniformity'
  readonly verdict: Verdict
  readonly reason: string
}

export interface WaferJudgement {
  readonly id: string
  readonly verdict: Verdict
  /** In words; those that decided come first. */
  readonly reasons: readonly string[]
  /** What decided: of an out-of-spec wafer the findings that are out of spec, and so on. */
  readonly deciding: readonly Finding[]
  readonly findings: SiteFindings
  readonly statistics: Statistics
  readonly limits: WaferLimits
}

export function hasAnyLimit(limits: WaferLimits): boolean {
  return hasLimits(limits.site) || hasLimits(limits.mean) || limits.uniformity !== undefined
}

/**
 * The uniformity is judged simply whatever the rule: its uncertainty is that of so few sites, not of the measurement.
 *
 * Out of spec where anything judged is; else undecided where anything is; else in spec. Not assessed without limits or
 * without a single site that counts. Sites without a reading are said, and decide nothing while others are judged.
 */
export function judgeWafer(wafer: WaferToJudge): WaferJudgement {
  const { id, findings, statistics, limits } = wafer
  const known = { id, findings, statistics, limits }
  const unjudged = !hasAnyLimit(limits) ? NO_LIMITS : statistics.count === 0 ? 'no site has a usable reading' : null
  if (unjudged !== null) {
    return { ...known, verdict: 'not-assessed', reasons: [`${waferName(id)}: ${unjudged}`], deciding: [] }
  }
  const all = [judgeSites(wafer), judgeMean(wafer), judgeUniformity(wafer)].filter((finding) => finding !== null)
  const verdict = (['out-of-spec', 'undecided'] as const).find((v) => all.some((f) => f.verdict === v)) ?? 'in-spec'
  const deciding = all.filter((finding) => finding.verdict === verdict)
  // Not the verdict's count: without site limits no site is assessed, though every one counts in the mean.
  const sites = Object.values(findings.counts).reduce((sum, count) => sum + count, 0)
  const missing = sites - statistics.count
  const remarks = missing > 0 ? [missingSitesReason(missing, sites)] : []
  const reasons = [...deciding.map((finding) => finding.reason), ...remarks]
  return { ...known, verdict, reasons: reasons.map((reason) => `${waferName(id)}: ${reason}`), deciding }
}

function judgeSites({ findings, limits, unit }: WaferToJudge): Finding | null {
  if (!hasLimits(limits.site)) return null
  const allowed = limits.allowedSitesOut
  const out = findings.counts['out-of-spec']
  const { undecided } = findings.counts
  const sites = sitesReason({ findings, limits: limits.site, unit, allowed })
  if (out > allowed) return { about: 'sites', verdict: 'out-of-spec', reason: sites }
  if (out + undecided <= allowed) return { about: 'sites', verdict: 'in-spec', reason: sites }
  return { about: 'sites', verdict: 'undecided', reason: undecidedSitesReason(undecided, judgedSites(findings)) }
}

function judgeMean({ statistics, limits, unit, uMean = NaN, acceptance = SIMPLE }: WaferToJudge): Finding | null {
  if (!hasLimits(limits.mean)) return null
  const { mean } = statistics
  const verdict = judgeBy(mean, uMean, limits.mean, acceptance)
  if (verdict === 'undecided') {
    const accepted = acceptanceLimits(limits.mean, uMean, acceptance)
    return { about: 'mean', verdict, reason: meanUndecidedReason(mean, accepted, limits.mean, unit) }
  }
  const side = sideOf(mean, limits.mean)
  const isTolerated = verdict === 'in-spec' && side !== 'inside'
  const reason = meanReason(mean, side, limits.mean, unit)
  return { about: 'mean', verdict, reason: isTolerated ? `${reason}, within its guard band` : reason }
}

function judgeUniformity({ statistics, limits }: WaferToJudge): Finding | null {
  if (!limits.uniformity) return null
  const { upper, definition } = limits.uniformity
  const { formula, percent } = statistics.nonuniformity.find((entry) => entry.id === definition)!
  if (Number.isNaN(percent)) {
    return { about: 'uniformity', verdict: 'undecided', reason: uniformityUnknownReason(statistics.count, formula) }
  }
  const verdict = percent > upper ? 'out-of-spec' : 'in-spec'
  return { about: 'uniformity', verdict, reason: uniformityReason(percent, upper, formula) }
}
