/** What each decision rule would say of this lot's own sites and wafer means. */
import type { LotAnalysis } from '../../../core/analysis/lot-analysis'
import { limitsOn } from '../../../core/analysis/quantity'
import { ACCEPTANCE_RULES, judgeBy, type AcceptanceRule } from '../../../core/conformity/acceptance'
import type { Verdict } from '../../../core/conformity/verdict'

export interface RuleCount {
  readonly rule: AcceptanceRule
  readonly isProcedures: boolean
  readonly sites: Readonly<Record<Verdict, number>>
  readonly waferMeans: Readonly<Record<Verdict, number>>
  /** Sites whose verdict is another than under the procedure's rule. */
  readonly changed: number
}

/** Of more sites the count would halt the window. */
export const MOST_COUNTED = 20_000

/** null for more than MOST_COUNTED sites. */
export function ruleCounts(analysis: LotAnalysis): readonly RuleCount[] | null {
  const { procedure, quantity, sites, wafers } = analysis
  const { site: siteLimits, waferMean } = limitsOn(quantity, procedure)
  if (sites.count > MOST_COUNTED) return null
  const judged = wafers.flatMap((wafer) => [...wafer.sites]).filter((i) => sites.value[i] > 0)
  const own = procedure.acceptance
  const verdictsUnder = (rule: AcceptanceRule): Verdict[] =>
    judged.map((i) => judgeBy(sites.value[i], sites.u[i], siteLimits, { ...own, rule }))
  const now = verdictsUnder(own.rule)
  return ACCEPTANCE_RULES.map((rule) => {
    const verdicts = verdictsUnder(rule)
    const means = wafers.map(({ statistics, uMean }) => judgeBy(statistics.mean, uMean, waferMean, { ...own, rule }))
    return {
      rule,
      isProcedures: rule === own.rule,
      sites: counted(verdicts),
      waferMeans: counted(means),
      changed: verdicts.filter((verdict, k) => verdict !== now[k]).length,
    }
  })
}

function counted(verdicts: readonly Verdict[]): Record<Verdict, number> {
  const counts = { 'in-spec': 0, 'out-of-spec': 0, undecided: 0, 'not-assessed': 0 }
  for (const verdict of verdicts) counts[verdict]++
  return counts
}
