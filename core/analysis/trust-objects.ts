/** What result.json says of how far its numbers can be trusted: the budget of a site, the gauge, the check wafer. */
import { checkObject } from '../check-wafer/check-object'
import { gaugeObject } from '../gauge/study-object'
import { acceptanceWords } from '../conformity/acceptance'
import type { GlobalRisks } from '../conformity/global-risk'
import type { CheckOfLot } from './check-of-lot'
import type { LotAnalysis } from './lot-analysis'
import { RISK_SOURCE } from './lot-risks'
import { reportSite } from './report-site'
import { siteWorking } from './site-working'
import type { Working } from './working'

/** null where nothing is uncertain. */
export function uncertaintyObject(analysis: LotAnalysis): object | null {
  const site = reportSite(analysis)
  if (site === null) return null
  const working = siteWorking(analysis, site)
  return working.budget.length === 0 ? null : budgetObject(working)
}

export function budgetObject({ wafer, site, budget, expanded }: Working): object {
  return {
    wafer,
    site,
    relative: expanded.standard,
    effectiveDegreesOfFreedom: finite(expanded.effectiveDegreesOfFreedom),
    coverageProbability: expanded.level,
    coverageFactor: expanded.coverageFactor,
    expandedRelative: expanded.expanded,
    budget: budget.map((line) => ({
      component: line.component,
      title: line.title,
      standardUncertainty: line.u,
      unit: line.unit,
      evaluation: line.evaluation,
      degreesOfFreedom: finite(line.degreesOfFreedom),
      sensitivity: line.sensitivity,
      relative: line.relative,
      varianceShare: line.share,
      shared: line.shared,
    })),
    source: 'JCGM 100:2008',
  }
}

/** The decision rule, and what it risks on such lots. */
export function acceptanceObject({ procedure: { acceptance }, risks }: LotAnalysis): object {
  const shares = ({ consumer, producer, nonconforming, accepted }: GlobalRisks) => ({
    falseAccept: consumer, falseReject: producer, nonconforming, accepted,
  }) // prettier-ignore
  return {
    rule: acceptance.rule,
    guardFactor: acceptance.guardFactor,
    maximumFalseAcceptRisk: acceptance.maximumFalseAcceptRisk,
    sentence: acceptanceWords(acceptance),
    risks: risks && {
      ...shares(risks),
      standardUncertainty: risks.u,
      acceptanceLimits: { lower: risks.acceptanceLimits.lower ?? null, upper: risks.acceptanceLimits.upper ?? null },
      process: { ...risks.process, given: risks.isGiven },
      byRule: Object.fromEntries(Object.entries(risks.byRule).map(([rule, of]) => [rule, shares(of)])),
    },
    source: RISK_SOURCE,
  }
}

/** Infinitely many degrees of freedom are null, as JSON has no infinity. */
function finite(degrees: number): number | null {
  return Number.isFinite(degrees) ? degrees : null
}

export function gaugePart({ gauge }: LotAnalysis): object | null {
  return gauge && gaugeObject(gauge)
}

export function checkPart(check: CheckOfLot | null): object | null {
  if (!check) return null
  const { state, when, lastGood, place, byTime } = check.standing
  return { standing: { state, when, lastGood, place, byTime }, ...checkObject(check.result) }
}

/** What a look at the readings brought up; sites by their names. */
export function healthObject({ health, readings }: LotAnalysis): readonly object[] {
  return health.map(({ check, severity, sentence, nextStep, wafers, site, evidence, source }) => ({
    check,
    severity,
    sentence,
    nextStep,
    wafers,
    site: site === null ? null : readings.siteNames[readings.site[site]],
    evidence,
    source,
  }))
}
