/** What a decision rule risks on lots such as this one. */
import { ACCEPTANCE_RULES, acceptanceLimits, type AcceptanceRule } from '../conformity/acceptance'
import { DECISION_RULES } from '../conformity/formulas'
import { globalRisks, type GlobalRisks, type Process } from '../conformity/global-risk'
import { hasLimits, type Limits } from '../conformity/limits'
import type { Procedure } from '../procedure/schema'
import type { LotRisks, SiteColumns } from './lot-analysis'
import type { WaferMembers } from './wafers'

export const RISK_SOURCE = DECISION_RULES.source

export function lotRisks({
  procedure,
  sites,
  members,
  limits,
}: {
  readonly procedure: Procedure
  readonly sites: SiteColumns
  readonly members: readonly WaferMembers[]
  readonly limits: Limits | undefined
}): LotRisks | null {
  if (!hasLimits(limits)) return null
  const { acceptance } = procedure
  const u = typical(sites.u, members)
  const production = acceptance.process ?? processOf(sites, members)
  if (!(u > 0) || !(production.standardDeviation > 0)) return null
  const risksUnder = (rule: AcceptanceRule): GlobalRisks => globalRisks(limits, u, production, { ...acceptance, rule })
  const byRule = Object.fromEntries(ACCEPTANCE_RULES.map((rule) => [rule, risksUnder(rule)])) as LotRisks['byRule']
  return {
    ...byRule[acceptance.rule],
    process: production,
    isGiven: acceptance.process !== undefined,
    u,
    limits,
    acceptanceLimits: acceptanceLimits(limits, u, acceptance),
    byRule,
  }
}

/**
 * Mean and spread of the true values: of the measured ones, less what each site's own error of measurement adds to their
 * variance. An error that all share moves the mean and spreads nothing.
 */
function processOf({ value, uIndependent }: SiteColumns, members: readonly WaferMembers[]): Process {
  let count = 0
  let sum = 0
  let error = 0
  for (const { counting } of members) {
    for (const i of counting) {
      count++
      sum += value[i]
      error += uIndependent[i] ** 2
    }
  }
  const mean = sum / count
  let measured = 0
  for (const { counting } of members) for (const i of counting) measured += (value[i] - mean) ** 2
  return { mean, standardDeviation: Math.sqrt(Math.max(0, measured / (count - 1) - error / count)) }
}

/** More than these tell nothing more of a median. */
const MOST_ROWS = 20_000

function typical(column: Float64Array, members: readonly WaferMembers[]): number {
  const count = members.reduce((sum, { counting }) => sum + counting.length, 0)
  const every = Math.max(1, Math.ceil(count / MOST_ROWS))
  const picked = members.flatMap(({ counting }) =>
    Array.from({ length: Math.ceil(counting.length / every) }, (_, k) => column[counting[k * every]]),
  )
  const sorted = Float64Array.from(picked.filter(Number.isFinite)).sort()
  return sorted.length > 0 ? sorted[(sorted.length - 1) >> 1] : NaN
}
