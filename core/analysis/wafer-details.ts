/** What is said of one wafer beyond its summary: made when somebody looks, since a lot may have hundreds of wafers. */
import { frameOf } from '../map/frame'
import { findPatterns, type PatternFindings } from '../map/pattern-findings'
import { patternWords, type PatternWords } from '../map/pattern-words'
import { CoreError } from '../problems/problem'
import { siteStatistics, type SiteStatistics } from '../statistics/site-statistics'
import type { LotAnalysis, WaferAnalysis } from './lot-analysis'
import { mapFit, type MapFit } from './map-fit'
import { limitsOn } from './quantity'
import { sitePositions, type SitePositions } from './site-positions'
import { countingSites } from './wafers'

export interface WaferDetails {
  /** Of the judged quantity over the sites that count; rows of outliers are rows of the site columns. */
  readonly figures: SiteStatistics
  /** null where sites have no places, are too few, or lie on a line. */
  readonly patterns: PatternFindings | null
  readonly words: readonly PatternWords[]
  /** null without places. */
  readonly map: MapFit | null
}

/** Sites a wafer needs before a pattern is looked for: a plane and something left to judge it by. */
const LEAST_SITES = 9

/** Worked out once a wafer: the result, the report and the window ask for the same. */
export function waferDetails(analysis: LotAnalysis, wafer: WaferAnalysis): WaferDetails {
  const details = known.get(wafer) ?? workedOut(analysis, wafer)
  known.set(wafer, details)
  return details
}

const known = new WeakMap<WaferAnalysis, WaferDetails>()

function workedOut(analysis: LotAnalysis, wafer: WaferAnalysis): WaferDetails {
  const { procedure, outline, sites, readings, quantity } = analysis
  const positions = sitePositions(readings, procedure)
  const counting = countingSites(wafer.sites, sites.flags)
  const figures = siteStatistics({
    values: sites.value,
    indices: counting,
    x_mm: positions?.x_mm ?? null,
    y_mm: positions?.y_mm ?? null,
    outline,
    edgeExclusion_mm: procedure.wafer.edgeExclusionMm,
    limits: limitsOn(quantity, procedure).site,
    confidence: procedure.statistics.confidence,
  })
  const patterns = positions && patternsOf(analysis, positions, counting)
  return {
    figures,
    patterns,
    words: patterns ? patternWords(patterns, quantity.unit) : [],
    map: mapFit(analysis, wafer),
  }
}

function patternsOf(analysis: LotAnalysis, positions: SitePositions, counting: Uint32Array): PatternFindings | null {
  const { sites, outline, procedure } = analysis
  if (counting.length < LEAST_SITES) return null
  const pick = (column: Float64Array): Float64Array => Float64Array.from(counting, (i) => column[i])
  const [x_mm, y_mm, values] = [pick(positions.x_mm), pick(positions.y_mm), pick(sites.value)]
  if (frameOf(x_mm, y_mm).isCollinear) return null
  const outermost_mm = x_mm.reduce((most, x, i) => Math.max(most, Math.hypot(x, y_mm[i])), 0)
  const usable_mm = outline.shape === 'disc' ? outline.diameter_mm / 2 - procedure.wafer.edgeExclusionMm : 0
  const radius_mm = Math.max(outermost_mm, usable_mm)
  try {
    return findPatterns({ x_mm, y_mm }, values, { radius_mm, order: 'zernike-4', ringWidth_mm: RING_WIDTH_MM })
  } catch (error) {
    // Sites that not even a plane fits uniquely (nearly a line, a few close clusters) have no pattern to speak of.
    if (error instanceof CoreError) return null
    throw error
  }
}

/** Sites whose distances from the centre differ by less belong to one ring. */
const RING_WIDTH_MM = 1
