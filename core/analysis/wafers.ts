/** From site columns to wafers: which sites belong and count, statistics, and what is needed to judge. */
import type { Acceptance } from '../conformity/acceptance'
import { siteFindings } from '../conformity/judge-sites'
import { judgeWafer, type WaferJudgement, type WaferLimits } from '../conformity/judge-wafer'
import { countVerdicts } from '../conformity/verdict'
import type { Readings } from '../ingest/readings'
import { summarize, type Statistics } from '../statistics/summarize'
import { NOT_JUDGED, SITE_FLAGS } from './flags'
import type { DieColumns, Quantity, SiteColumns, WaferAnalysis } from './lot-analysis'
import type { SitePositions } from './site-positions'

/** Bits of the flags whose sites are shown but don't count. */
const NOT_COUNTING = Object.values(SITE_FLAGS).reduce((bits, flag) => (flag.counts ? bits : bits | flag.bit), 0)

/** Those of the sites that have a value which counts. */
export function countingSites(sites: Uint32Array, flags: Uint32Array): Uint32Array {
  return sites.filter((i) => (flags[i] & NOT_COUNTING) === 0)
}

export interface WaferMembers {
  readonly index: number
  /** All its sites, in reading order. */
  readonly sites: Uint32Array
  /** Those that were to be judged: all but the ones in the edge exclusion and those a person took out. */
  readonly judged: Uint32Array
  /** Those with a value that counts. */
  readonly counting: Uint32Array
}

/** The sites of every wafer, wafers in slot order, those without a slot last, as read. */
export function waferMembers({ wafers, wafer, count }: Readings, flags: Uint32Array): WaferMembers[] {
  const sizes = new Uint32Array(wafers.length)
  for (let i = 0; i < count; i++) sizes[wafer[i]]++
  const sites = wafers.map((_, index) => new Uint32Array(sizes[index]))
  const filled = new Uint32Array(wafers.length)
  for (let i = 0; i < count; i++) sites[wafer[i]][filled[wafer[i]]++] = i
  const slotOf = (index: number): number => (Number.isNaN(wafers[index].slot) ? Infinity : wafers[index].slot)
  return wafers
    .map((_, index) => index)
    .sort((a, b) => (slotOf(a) === slotOf(b) ? a - b : slotOf(a) - slotOf(b)))
    .map((index) => ({
      index,
      sites: sites[index],
      judged: sites[index].filter((i) => (flags[i] & NOT_JUDGED) === 0),
      counting: countingSites(sites[index], flags),
    }))
}

export interface WaferToAnalyze {
  readonly members: WaferMembers
  readonly readings: Readings
  readonly positions: SitePositions | null
  readonly sites: SiteColumns
  /** This wafer's dies, as rows of the die columns. */
  readonly dies: { readonly columns: DieColumns; readonly rows: Uint32Array } | null
  readonly outliers: Uint32Array
  readonly limits: WaferLimits
  readonly acceptance: Acceptance
  readonly quantity: Quantity
}

export function analyzeWafer(wafer: WaferToAnalyze): { wafer: WaferAnalysis; judgement: WaferJudgement } {
  const { members, sites, positions, limits, acceptance, quantity, readings } = wafer
  const { id, slot, rejectedRows } = readings.wafers[members.index]
  const statistics = summarize(sites.value, members.counting)
  const uMean = uncertaintyOfMean(sites, members.counting)
  const findings = findingsOf(wafer)
  const judgement = judgeWafer({ id, statistics, limits, unit: quantity.unit, findings, uMean, acceptance })
  const meanOf = (column: Float64Array): number => finiteMean(column, members.counting)
  return {
    judgement,
    wafer: {
      index: members.index,
      id,
      slot,
      sites: members.sites,
      statistics,
      outliers: wafer.outliers,
      statisticsOtherwise: statisticsOtherwise(wafer),
      uMean,
      means: {
        resistivity_ohm_cm: meanOf(sites.resistivity_ohm_cm),
        concentration_cm3: meanOf(sites.concentration_cm3),
        dose_cm2: meanOf(sites.dose_cm2),
        thickness_um: meanOf(sites.thickness_um),
      },
      sitesOut: judgement.findings.counts['out-of-spec'],
      sitesNotAssessed: members.sites.length - members.counting.length,
      rejectedRows,
      dieCounts: wafer.dies && countVerdicts(wafer.dies.columns.verdict, wafer.dies.rows),
      verdict: judgement.verdict,
      reasons: judgement.reasons,
    },
  }

  function findingsOf({ sites: { value, verdict } }: WaferToAnalyze) {
    const places = { x_mm: positions?.x_mm ?? null, y_mm: positions?.y_mm ?? null }
    return siteFindings({ value, verdict, ...places, sites: members.judged, limits: limits.site })
  }
}

/** With the outliers where they were left out, without them where they count; null where there are none. */
function statisticsOtherwise({ outliers, members, sites }: WaferToAnalyze): Statistics | null {
  if (outliers.length === 0) return null
  const isOutlier = new Set(outliers)
  const without = members.counting.filter((i) => !isOutlier.has(i))
  const counted = without.length < members.counting.length
  return summarize(sites.value, counted ? without : Uint32Array.from([...without, ...outliers]))
}

/** What all sites share stays whole in their mean; what each has to itself averages out. */
function uncertaintyOfMean({ uShared, uIndependent }: SiteColumns, rows: Uint32Array): number {
  let shared = 0
  let independentSquared = 0
  for (const i of rows) {
    shared += uShared[i]
    independentSquared += uIndependent[i] ** 2
  }
  return rows.length > 0 ? Math.hypot(shared, Math.sqrt(independentSquared)) / rows.length : NaN
}

/** Of what a layer gives; a site outside its range has no value and is flagged, the others still have a mean. */
function finiteMean(column: Float64Array, rows: Uint32Array): number {
  let sum = 0
  let count = 0
  for (const i of rows) {
    if (!Number.isFinite(column[i])) continue
    sum += column[i]
    count++
  }
  return count > 0 ? sum / count : NaN
}
