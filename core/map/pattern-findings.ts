/** Which patterns a wafer shows beyond its noise. Their words are in `pattern-words.ts`. */
import { fUpperProbability } from '../numeric/distributions'
import { edgeStep } from './edge-step'
import { mostOutlyingSite } from './outlying-site'
import type { Targets } from './thin-plate-spline'
import { trendSurface, type TrendSurface } from './trend-surface'
import { highestTrendOrder, TREND_ORDERS, type TrendGroupId, type TrendOrder } from './trend-terms'

export type PatternKind = TrendGroupId | 'edge-only' | 'single-site' | 'nothing'

export interface PatternFinding {
  readonly kind: PatternKind
  /** Of the variance; of 'nothing' what the whole surface explains. */
  readonly share: number
  /** Probability that noise alone does as much; 1 for 'nothing'. */
  readonly pValue: number
  /** In the unit of the values: tilt a radius, bowl and edge against the rest, saddle's amplitude, a site's deviation; null for the others. */
  readonly amount: number | null
  /** Of tilt towards the high side, of a saddle its high axis; else null. */
  readonly direction_deg: number | null
  /** Of a single site the entry of the columns given; else null. */
  readonly site: number | null
}

export interface PatternFindings {
  /** Of all sites but an outlying one. */
  readonly trend: TrendSurface
  /** The largest share first; one 'nothing' where there is none. */
  readonly findings: readonly PatternFinding[]
}

export interface PatternSearch {
  readonly radius_mm: number
  /** Not above this order; fewer sites than it needs take the highest that they allow. */
  readonly order: TrendOrder
  readonly ringWidth_mm: number
}

/** A pattern is spoken of where noise would do as much in fewer than one wafer of a hundred, */
export const SIGNIFICANCE = 0.01
/** and where it explains more than this share of the variance. Common practice, no source. */
export const SPOKEN_SHARE = 0.2

/**
 * Fits a trend surface, sets a single outlying site aside and fits again, and tests each group of shapes by F. A step
 * at the outermost ring that makes the bowl needless, while the bowl doesn't make the step needless, is told instead
 * of bowl and rings.
 *
 * @param sites, values  finite, one value a site; at least 4
 * @throws CoreError as `prepareTrendSurface`
 */
export function findPatterns(sites: Targets, values: Float64Array, search: PatternSearch): PatternFindings {
  const first = trendOf(sites, values, search)
  const outlying = mostOutlyingSite(first)
  const isSpoken = outlying !== null && speaks(outlying.share, outlying.pValue)
  const rest = isSpoken ? without(sites, values, outlying.site) : { sites, values }
  const trend = isSpoken ? trendOf(rest.sites, rest.values, search) : first
  const edge = edgeFinding(rest.sites, rest.values, search)
  const groups = trend.groups
    .map((group) => groupFinding(trend, group))
    .filter(({ kind }) => edge === null || (kind !== 'bowl' && kind !== 'higher-radial'))
  const candidates = [...groups, ...(edge ? [edge] : [])].filter(({ share, pValue }) => speaks(share, pValue))
  if (isSpoken) candidates.push({ kind: 'single-site', amount: outlying.deviation, direction_deg: null, ...outlying })
  const findings = candidates.sort((a, b) => b.share - a.share)
  return { trend, findings: findings.length > 0 ? findings : [nothing(trend)] }
}

function speaks(share: number, pValue: number): boolean {
  return share > SPOKEN_SHARE && pValue < SIGNIFICANCE
}

function trendOf(sites: Targets, values: Float64Array, { radius_mm, order }: PatternSearch): TrendSurface {
  const highest = highestTrendOrder(values.length) ?? 'plane'
  const level = Math.min(TREND_ORDERS.indexOf(order), TREND_ORDERS.indexOf(highest))
  return trendSurface(sites, values, { radius_mm, order: TREND_ORDERS[level] })
}

function groupFinding(trend: TrendSurface, group: TrendSurface['groups'][number]): PatternFinding {
  const { id, share, f, degreesOfFreedom } = group
  const { tilt, bowl, saddle } = trend
  const pValue = fUpperProbability(f, degreesOfFreedom, trend.degreesOfFreedom)
  const finding = { kind: id, share, pValue, amount: null, direction_deg: null, site: null }
  if (id === 'tilt') return { ...finding, amount: tilt.perRadius, direction_deg: tilt.direction_deg }
  if (id === 'bowl') return { ...finding, amount: bowl?.edgeMinusCentre ?? null }
  if (id === 'two-fold')
    return { ...finding, amount: saddle?.amplitude ?? null, direction_deg: saddle?.axis_deg ?? null }
  return finding
}

function edgeFinding(sites: Targets, values: Float64Array, search: PatternSearch): PatternFinding | null {
  const edge = edgeStep(sites, values, search)
  if (!edge) return null
  const chance = (f: number) => fUpperProbability(f, 1, edge.degreesOfFreedom)
  const isEdgeOnly = chance(edge.fBeyondBowl) < SIGNIFICANCE && chance(edge.fOfBowlBeyond) >= SIGNIFICANCE
  const pValue = chance(edge.f)
  if (!isEdgeOnly || !speaks(edge.share, pValue)) return null
  return { kind: 'edge-only', share: edge.share, pValue, amount: edge.step, direction_deg: null, site: null }
}

function nothing({ rSquared }: TrendSurface): PatternFinding {
  return { kind: 'nothing', share: rSquared, pValue: 1, amount: null, direction_deg: null, site: null }
}

function without(sites: Targets, values: Float64Array, site: number): { sites: Targets; values: Float64Array } {
  const drop = (column: Float64Array) => column.filter((_, i) => i !== site)
  return { sites: { x_mm: drop(sites.x_mm), y_mm: drop(sites.y_mm) }, values: drop(values) }
}
