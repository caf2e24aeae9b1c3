/**
 * What one run of the pipeline found: columns a site, a row a wafer, one lot. The window, the command line and the
 * report all read this and compute nothing of their own.
 */
import type { AcceptanceRule } from '../conformity/acceptance'
import type { GlobalRisks, Process } from '../conformity/global-risk'
import type { Limits } from '../conformity/limits'
import type { Verdict } from '../conformity/verdict'
import type { GaugeStudy } from '../gauge/gauge-study'
import type { DepthProfile } from '../ingest/read-profile'
import type { HealthFinding } from '../health/finding'
import type { Readings } from '../ingest/readings'
import type { Outline } from '../wafer/outline'
import type { Problem } from '../problems/problem'
import type { Procedure } from '../procedure/schema'
import type { CheckOfLot } from './check-of-lot'
import type { Exclusion } from './exclusions'
import type { Repeatability } from './repeatability'
import type { Statistics } from '../statistics/summarize'
import type { VarianceComponents } from '../statistics/components-of-variance'

export { VERDICTS } from '../conformity/verdict'
export type { Statistics, VarianceComponents, Verdict }

export interface LotAnalysis {
  readonly procedure: Procedure
  /** Dotted keys of every procedure default that was used, with its value. */
  readonly defaults: readonly { readonly key: string; readonly value: string }[]
  readonly readings: Readings
  /** Of a tabulated layer: the profile that its procedure names. */
  readonly profile: DepthProfile | null
  /** The gauge study that the procedure names. */
  readonly gauge: GaugeStudy | null
  /** The check wafer that the procedure names, as it stood when the lot was measured. */
  readonly check: CheckOfLot | null
  /** What a look at the readings themselves brought up, worst first. */
  readonly health: readonly HealthFinding[]
  /** Where the procedure takes it from the readings. */
  readonly repeatability: Repeatability | null
  readonly outline: Outline
  readonly quantity: Quantity
  readonly sites: SiteColumns
  readonly dies: DieColumns | null
  readonly wafers: readonly WaferAnalysis[]
  readonly lot: LotSummary
  /** Of the decision rule on such lots; null without limits, uncertainties or a spread. */
  readonly risks: LotRisks | null
  /** Sites that a person took out, as asked for. */
  readonly excluded: readonly Exclusion[]
  /** Rejected rows and everything else that was wrong, in reading order. */
  readonly problems: readonly Problem[]
  /** What was assumed or left undone, in sentences ("no temperature correction: ..."). */
  readonly notes: readonly string[]
}

/** What the decision rule risks on lots such as this one. */
export interface LotRisks extends GlobalRisks {
  readonly process: Process
  /** Whether the process is as the procedure gives it; otherwise it is this lot's own. */
  readonly isGiven: boolean
  /** Standard uncertainty of a typical site: the median. */
  readonly u: number
  /** Of the limits of a site. */
  readonly limits: Limits
  /** Within which a typical site is accepted. */
  readonly acceptanceLimits: Limits
  /** The same under every rule, with the procedure's guard factor and risk. */
  readonly byRule: Readonly<Record<AcceptanceRule, GlobalRisks>>
}

/** What is judged and mapped: statistics, limits and maps are all of this. */
export interface Quantity {
  readonly id: 'sheet-resistance' | 'resistivity'
  readonly title: string
  readonly symbol: string
  readonly unit: string
  /** For JSON and CSV. */
  readonly asciiUnit: 'ohm/sq' | 'ohm.cm'
}

/** One entry a reading of `readings`, same order. A quantity not given or not computable is NaN. */
export interface SiteColumns {
  readonly count: number
  readonly vOverI_ohm: Float64Array
  readonly vOverIB_ohm: Float64Array | null
  /** Rs/(V/I) of the thin sheet: geometry and pin spacing together. */
  readonly geometryFactor: Float64Array
  readonly thicknessFactor: Float64Array
  readonly temperatureFactor: Float64Array
  readonly sheetResistance_ohm_sq: Float64Array
  readonly resistivity_ohm_cm: Float64Array
  readonly concentration_cm3: Float64Array
  readonly dose_cm2: Float64Array
  readonly thickness_um: Float64Array
  /** Combined standard uncertainties. */
  readonly uSheetResistance_ohm_sq: Float64Array
  readonly uResistivity_ohm_cm: Float64Array
  readonly uConcentration_cm3: Float64Array
  /** The judged quantity's uncertainty, apart: common to all sites, and each site's own. */
  readonly uShared: Float64Array
  readonly uIndependent: Float64Array
  /** The column that is judged: one of the above, not a copy. */
  readonly value: Float64Array
  readonly u: Float64Array
  readonly conformanceProbability: Float64Array
  /** Codes in the order of VERDICTS. */
  readonly verdict: Uint8Array
  /** Bits of SITE_FLAGS. */
  readonly flags: Uint32Array
}

export interface WaferAnalysis {
  /** Index into readings.wafers. */
  readonly index: number
  readonly id: string
  readonly slot: number
  /** Indices into the site columns, in reading order. */
  readonly sites: Uint32Array
  /** Of the judged quantity over the sites that count: a value, and outside the edge exclusion. */
  readonly statistics: Statistics
  /** Sites found to be outliers, farthest first; whether they count, the procedure says. */
  readonly outliers: Uint32Array
  /** The statistics without the outliers that count, or with those that were left out; null where there are none. */
  readonly statisticsOtherwise: Statistics | null
  /** Standard uncertainty of the wafer mean: shared part whole, independent parts averaged. */
  readonly uMean: number
  /** Means over the same sites of what the layer gives; NaN where it gives none. */
  readonly means: {
    readonly resistivity_ohm_cm: number
    readonly concentration_cm3: number
    readonly dose_cm2: number
    readonly thickness_um: number
  }
  readonly sitesOut: number
  readonly sitesNotAssessed: number
  readonly rejectedRows: number
  readonly dieCounts: Readonly<Record<Verdict, number>> | null
  readonly verdict: Verdict
  /** In words, the reason that decided first. */
  readonly reasons: readonly string[]
}

export interface LotSummary {
  readonly name: string
  readonly verdict: Verdict
  /** One sentence a person would say. */
  readonly sentence: string
  readonly reasons: readonly string[]
  /** Over wafer means. */
  readonly statistics: Statistics
  readonly varianceComponents: VarianceComponents | null
}

export interface DieColumns {
  readonly count: number
  /** Index into wafers. */
  readonly wafer: Uint32Array
  readonly dieX: Int32Array
  readonly dieY: Int32Array
  /** Die centre. */
  readonly x_mm: Float64Array
  readonly y_mm: Float64Array
  readonly value: Float64Array
  readonly u: Float64Array
  readonly conformanceProbability: Float64Array
  readonly verdict: Uint8Array
  /** 0 measured, 1 interpolated. */
  readonly basis: Uint8Array
}
