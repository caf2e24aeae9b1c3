/** Sites and dies against their limits, by the procedure's decision rule. */
import { judgeBy, type Acceptance } from './acceptance'
import { sideOf, hasLimits, type Limits } from './limits'
import { countVerdicts, verdictCode, type Verdict, type VerdictCounts } from './verdict'

/** The outer ring of a wafer, where "at the edge" begins: a share of the largest site radius. */
export const EDGE_RADIUS_SHARE = 0.8

/** A value on a limit is in spec; no value, or no limits, is not assessed. */
export function judgeValue(value: number, limits: Limits | undefined): Verdict {
  const side = hasLimits(limits) ? sideOf(value, limits) : null
  if (side === null) return 'not-assessed'
  return side === 'inside' ? 'in-spec' : 'out-of-spec'
}

/** As `judgeBy`, a column at a time, into codes in the order of VERDICTS. */
export function fillVerdictsBy(
  { value, u }: { readonly value: Float64Array; readonly u: Float64Array },
  limits: Limits | undefined,
  acceptance: Acceptance,
  out: Uint8Array,
): Uint8Array {
  if (acceptance.rule === 'simple') return fillVerdicts(value, limits, out)
  for (let i = 0; i < value.length; i++) out[i] = verdictCode(judgeBy(value[i], u[i], limits, acceptance))
  return out
}

/** By simple acceptance: the value decides, its uncertainty doesn't (JCGM 106:2012, 8.2). */
export function fillVerdicts(value: Float64Array, limits: Limits | undefined, out: Uint8Array): Uint8Array {
  const inSpec = verdictCode('in-spec')
  const outOfSpec = verdictCode('out-of-spec')
  const notAssessed = verdictCode('not-assessed')
  if (!hasLimits(limits)) return out.fill(notAssessed, 0, value.length)
  const { lower = -Infinity, upper = Infinity } = limits
  for (let i = 0; i < value.length; i++) {
    const v = value[i]
    out[i] = v >= lower && v <= upper ? inSpec : v < lower || v > upper ? outOfSpec : notAssessed
  }
  return out
}

/** The sites of one wafer as the judge of the wafer sees them. */
export interface SiteFindings {
  readonly counts: VerdictCounts
  readonly above: number
  readonly below: number
  /** Every site out of spec lies in the outer ring, and not every judged site does. */
  readonly outOnlyAtEdge: boolean
}

export interface JudgedSites {
  readonly value: Float64Array
  /** Codes in the order of VERDICTS. */
  readonly verdict: Uint8Array
  /** null where the places aren't known. */
  readonly x_mm: Float64Array | null
  readonly y_mm: Float64Array | null
  /** The rows of this wafer that are judged or ought to have been. */
  readonly sites: Uint32Array
  readonly limits: Limits | undefined
}

export function siteFindings({ value, verdict, x_mm, y_mm, sites, limits }: JudgedSites): SiteFindings {
  const outOfSpec = verdictCode('out-of-spec')
  let above = 0
  let below = 0
  for (const site of sites) {
    const side = limits && verdict[site] === outOfSpec ? sideOf(value[site], limits) : null
    if (side === 'above') above++
    if (side === 'below') below++
  }
  const outOnlyAtEdge = x_mm !== null && y_mm !== null && isOutOnlyAtEdge({ verdict, x_mm, y_mm, sites })
  return { counts: countVerdicts(verdict, sites), above, below, outOnlyAtEdge }
}

function isOutOnlyAtEdge({
  verdict,
  x_mm,
  y_mm,
  sites,
}: Pick<JudgedSites, 'verdict' | 'sites'> & { readonly x_mm: Float64Array; readonly y_mm: Float64Array }): boolean {
  const outOfSpec = verdictCode('out-of-spec')
  const inSpec = verdictCode('in-spec')
  let largest = 0
  let innermostOut = Infinity
  let innermostIn = Infinity
  for (const site of sites) {
    const radius = Math.hypot(x_mm[site], y_mm[site])
    largest = Math.max(largest, radius)
    if (verdict[site] === outOfSpec) innermostOut = Math.min(innermostOut, radius)
    if (verdict[site] === inSpec) innermostIn = Math.min(innermostIn, radius)
  }
  const ring = EDGE_RADIUS_SHARE * largest
  return innermostOut > ring && innermostOut < Infinity && innermostIn <= ring
}
