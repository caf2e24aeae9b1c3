/** Wafers of the invented lot TB-0417 as the judges see them. */
import { fillVerdicts, siteFindings } from '../../../core/conformity/judge-sites'
import { judgeWafer, type WaferJudgement, type WaferLimits } from '../../../core/conformity/judge-wafer'
import { summarize } from '../../../core/statistics/summarize'
import { concentricPlan } from '../../../core/wafer/site-patterns'

export const LIMITS: WaferLimits = {
  site: { lower: 87, upper: 97 },
  mean: { lower: 89, upper: 95 },
  uniformity: { upper: 3, definition: 'sup' },
  allowedSitesOut: 0,
}

export const PLAN = concentricPlan({ circles: 3, outerRadius_mm: 95 })

/** A wafer of 49 sites with a value at each place. */
export function waferOf(
  id: string,
  valueAt: (r_mm: number, site: number) => number,
  limits: WaferLimits = LIMITS,
): WaferJudgement {
  const value = Float64Array.from(PLAN.x_mm, (x, i) => valueAt(Math.hypot(x, PLAN.y_mm[i]!), i))
  return judge(id, value, limits)
}

export function judge(id: string, value: Float64Array, limits: WaferLimits): WaferJudgement {
  const verdict = fillVerdicts(value, limits.site, new Uint8Array(value.length))
  const sites = Uint32Array.from(value.keys())
  const { x_mm, y_mm } = PLAN
  const findings = siteFindings({ value, verdict, x_mm, y_mm, sites, limits: limits.site })
  const counting = sites.filter((site) => !Number.isNaN(value[site]!))
  return judgeWafer({ id, findings, statistics: summarize(value, counting), limits, unit: 'Ω/sq' })
}

/** In spec everywhere: 92 to 92.5. */
export const goodWafer = (id: string) => waferOf(id, (_, site) => 92 + 0.01 * site)

/** Six sites of the outermost circle too high. */
export const edgyWafer = (id: string) => waferOf(id, (r, site) => (r > 90 && site >= 43 ? 99 : 92.5))
