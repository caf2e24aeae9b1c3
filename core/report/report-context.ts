/** What several sections of the report draw on, worked out once: limits, order, marks, and each wafer's own columns. */
import { SITE_FLAGS } from '../analysis/flags'
import type { FormulaSource } from '../analysis/formula-sources'
import type { LotAnalysis, WaferAnalysis } from '../analysis/lot-analysis'
import { limitsOn } from '../analysis/quantity'
import { sitePositions, type SitePositions } from '../analysis/site-positions'
import { waferDetails, type WaferDetails } from '../analysis/wafer-details'
import type { Working } from '../analysis/working'
import type { Decision } from './decision'
import { bandScale, type BandScale } from './figures/band-scale'
import { NO_LIMITS, type MarkKind, type SiteLimits } from './figures/marks'
import type { MapSites } from './figures/map-input'
import { contentHeight_pt, contentWidth_pt, type PaperSize } from './document'
import { surfacesFor, type MapDetail, type WaferSurface } from './surface'
import type { SourceList } from './source-list'

export interface LotReportInput {
  readonly analysis: LotAnalysis
  /** Of one site, set out in full; null leaves the section out. */
  readonly working: Working | null
  /** ISO 8601 with zone; null where neither the readings nor anybody says. */
  readonly date: string | null
  /** Name and version. */
  readonly program: string
  readonly paper: PaperSize
  /** Of every formula the analysis used, from the registers. */
  readonly sources: readonly FormulaSource[]
  /** Of the responsible person; null or absent where none is made yet. */
  readonly decision?: Decision | null
}

export interface ReportContext {
  readonly input: LotReportInput
  readonly analysis: LotAnalysis
  /** Of the page's content. */
  readonly width_pt: number
  readonly height_pt: number
  /** In slot order; wafers without a slot come last, as read. */
  readonly wafers: readonly WaferAnalysis[]
  readonly siteLimits: SiteLimits
  readonly meanLimits: SiteLimits
  /** Columns of one wafer's sites; x and y are NaN where the file has no positions. */
  readonly sitesOf: (wafer: WaferAnalysis) => MapSites
  readonly detailsOf: (wafer: WaferAnalysis) => WaferDetails
  readonly hasPositions: boolean
  readonly positions: SitePositions | null
  /** One colour scale for every map; null where no site has a value. */
  readonly scale: BandScale | null
  readonly surfaceOf: (sites: MapSites, detail: MapDetail) => WaferSurface | null
  readonly sources: SourceList
}

export function reportContext(input: LotReportInput, sources: SourceList): ReportContext {
  const { analysis } = input
  const positions = sitePositions(analysis.readings, analysis.procedure)
  const { value, verdict, flags } = analysis.sites
  const none = new Float64Array(positions ? 0 : analysis.sites.count).fill(NaN)
  const x = positions?.x_mm ?? none
  const y = positions?.y_mm ?? none
  const { siteLimits, meanLimits } = judgedLimits(analysis)
  const scale = scaleOf(value, siteLimits)
  return {
    input,
    analysis,
    width_pt: contentWidth_pt(input.paper),
    height_pt: contentHeight_pt(input.paper),
    wafers: inSlotOrder(analysis.wafers),
    siteLimits,
    meanLimits,
    sitesOf: ({ sites }) => ({
      x_mm: Float64Array.from(sites, (i) => x[i]),
      y_mm: Float64Array.from(sites, (i) => y[i]),
      value: Float64Array.from(sites, (i) => value[i]),
      u: Float64Array.from(sites, (i) => analysis.sites.uIndependent[i]),
      verdict: Uint8Array.from(sites, (i) => verdict[i]),
      excluded: Uint8Array.from(sites, (i) => (flags[i] & LEFT_OUT ? 1 : 0)),
    }),
    detailsOf: (wafer) => waferDetails(analysis, wafer),
    hasPositions: positions !== null,
    positions,
    scale,
    surfaceOf: surfacesFor(analysis.outline, scale, analysis.procedure.map.interpolation),
    sources,
  }
}

/** Sites with a value that neither count nor shape a surface. */
const LEFT_OUT = SITE_FLAGS.excludedByPerson.bit | SITE_FLAGS.outlierLeftOut.bit

function judgedLimits({ procedure, quantity }: LotAnalysis): { siteLimits: SiteLimits; meanLimits: SiteLimits } {
  const { site, waferMean } = limitsOn(quantity, procedure)
  return { siteLimits: asLimits(site), meanLimits: asLimits(waferMean) }
}

interface WrittenLimits {
  readonly target?: number | undefined
  readonly lower?: number | undefined
  readonly upper?: number | undefined
}

function asLimits(written: WrittenLimits | undefined): SiteLimits {
  if (!written) return NO_LIMITS
  return { target: written.target ?? NaN, lower: written.lower ?? NaN, upper: written.upper ?? NaN }
}

function inSlotOrder(wafers: readonly WaferAnalysis[]): readonly WaferAnalysis[] {
  const place = (wafer: WaferAnalysis) => (Number.isNaN(wafer.slot) ? Infinity : wafer.slot)
  return [...wafers].sort((a, b) => (place(a) === place(b) ? a.index - b.index : place(a) - place(b)))
}

/** Bands of the maps: enough to show a pattern inside the limits. */
const BANDS = 18

/** Share of the sites that may lie off the scale, so that a stray one doesn't flatten every map. */
const STRAY_SHARE = 0.004

/**
 * Spans the values, without at most a few stray ones at either end: those farther than 4 quartile widths from the
 * middle half. The limits are included where they are not far from that.
 */
function scaleOf(values: Float64Array, limits: SiteLimits): BandScale | null {
  const sorted = values.filter(Number.isFinite).sort()
  if (sorted.length === 0) return null
  const last = sorted.length - 1
  const lower = sorted[Math.floor(0.25 * last)]
  const upper = sorted[Math.ceil(0.75 * last)]
  const reach = 4 * Math.max(upper - lower, 1e-6 * Math.abs(upper))
  const stray = Math.ceil(STRAY_SHARE * sorted.length)
  let low = 0
  let high = last
  while (low < stray && sorted[low] < lower - reach) low++
  while (last - high < stray && sorted[high] > upper + reach) high--
  const least = sorted[low]
  const most = sorted[high]
  const room = Math.max(most - least, 1e-6 * Math.abs(most))
  const min = limits.lower < least && least - limits.lower < room ? limits.lower : least
  const max = limits.upper > most && limits.upper - most < room ? limits.upper : most
  const scale = bandScale(min, max, BANDS)
  return { ...scale, goesOn: { below: low > 0, above: high < last } }
}

export const VERDICT_WORDS = {
  'in-spec': 'In spec',
  'out-of-spec': 'Out of spec',
  undecided: 'Undecided',
  'not-assessed': 'Not assessed',
} as const

/** The shape beside a wafer's verdict; null is calm. A triangle points the way most of its sites, or its mean, are off. */
export function waferMarkOf(
  wafer: WaferAnalysis,
  { analysis, siteLimits, meanLimits }: ReportContext,
): MarkKind | null {
  if (wafer.verdict === 'in-spec') return null
  if (wafer.verdict !== 'out-of-spec') return wafer.verdict
  let above = 0
  let below = 0
  for (const i of wafer.sites) {
    if (analysis.sites.verdict[i] !== 1) continue
    if (analysis.sites.value[i] > siteLimits.upper) above++
    if (analysis.sites.value[i] < siteLimits.lower) below++
  }
  if (above !== below) return above > below ? 'above' : 'below'
  return wafer.statistics.mean < meanLimits.lower ? 'below' : 'above'
}

/** The lot's shape: that of its worst wafers. */
export function lotMarkOf(context: ReportContext): MarkKind | null {
  const { verdict } = context.analysis.lot
  if (verdict === 'in-spec') return null
  if (verdict !== 'out-of-spec') return verdict
  const marks = context.wafers.map((wafer) => waferMarkOf(wafer, context))
  const below = marks.filter((mark) => mark === 'below').length
  return below > marks.filter((mark) => mark === 'above').length ? 'below' : 'above'
}

/** "Wafer 07"; a label that says "wafer" already is left as it is. */
export function waferTitle(id: string): string {
  return /^wafer\b/i.test(id) ? id : `Wafer ${id}`
}

/** Why a wafer has its verdict, without its name in front of each reason. */
export function reasonsOf({ id, reasons }: WaferAnalysis): string[] {
  const name = `${waferTitle(id).toLowerCase()}: `
  return reasons.map((reason) => (reason.toLowerCase().startsWith(name) ? reason.slice(name.length) : reason))
}
