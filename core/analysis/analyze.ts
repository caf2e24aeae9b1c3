/** The one pipeline: readings and a procedure to everything that is shown of a lot. */
import { fillConformanceProbability } from '../conformity/conformance-probability'
import { judgeLot } from '../conformity/judge-lot'
import { fillVerdicts } from '../conformity/judge-sites'
import type { WaferLimits } from '../conformity/judge-wafer'
import { lotSentence } from '../conformity/lot-sentence'
import { verdictCode } from '../conformity/verdict'
import type { Readings } from '../ingest/readings'
import type { Problem } from '../problems/problem'
import { neededForReadings } from '../procedure/needed-for-readings'
import type { Procedure } from '../procedure/schema'
import { CoreError } from '../problems/problem'
import { componentsOfVariance } from '../statistics/components-of-variance'
import { summarize } from '../statistics/summarize'
import { isUsable } from '../wafer/die-grid'
import type { Outline } from '../wafer/outline'
import { correct } from './corrections'
import { analyzeDies } from './dies'
import { exclusionNotes, flagExcluded, type Exclusion } from './exclusions'
import { flagProblems, readingProblems } from './findings'
import { NOT_JUDGED, SITE_FLAGS } from './flags'
import { layerResults } from './layer-results'
import type { DieColumns, LotAnalysis } from './lot-analysis'
import { measuringSetUp } from './measuring-set-up'
import { analysisNotes } from './notes'
import { prepareLayer } from './prepare-layer'
import { judgedQuantity, limitsOn } from './quantity'
import { siteColumns } from './site-columns'
import { sitePositions, type SitePositions } from './site-positions'
import { contributions, propagate } from './uncertainty'
import { ratios } from './v-over-i'
import { analyzeWafer, waferMembers } from './wafers'

export interface AnalysisInput {
  readonly readings: Readings
  readonly procedure: Procedure
  /** The procedure's defaults that were used, from `parseProcedure`. */
  readonly defaults: LotAnalysis['defaults']
  /** What reading the files brought up. */
  readonly problems: readonly Problem[]
  readonly notes: readonly string[]
  /** Sites that a person took out. */
  readonly excluded?: readonly Exclusion[]
}

/**
 * Analyses a lot.
 *
 * @throws CoreError where the procedure can't be applied to these readings (a layer setting out of range, a thickness
 * that is missing); whatever is wrong with single sites is in the result
 */
export function analyze({ readings, procedure, defaults, problems, notes, excluded = [] }: AnalysisInput): LotAnalysis {
  const flags = new Uint32Array(readings.count)
  const positions = sitePositions(readings, procedure)
  const setUp = measuringSetUp(procedure)
  const { outline } = setUp
  const vOverI = ratios(readings, flags)
  requireWhatReadingsNeed(readings, procedure)
  const layer = prepareLayer(procedure)
  const corrections = correct(readings, procedure, setUp, positions, vOverI, flags)
  const inverted = layerResults(procedure, layer, corrections, flags)
  const relative = propagate(contributions(procedure, corrections, flags), inverted, readings.count)
  const quantity = judgedQuantity(procedure, readings)
  const limits = limitsOn(quantity, procedure)
  const sites = siteColumns({ corrections, layer: inverted, relative, quantity, flags })
  flagUncounted(sites.value, positions, outline, procedure, flags)
  const unmatched = flagExcluded(readings, excluded, flags)
  fillConformanceProbability(
    { value: sites.value, u: sites.u, limits: limits.site ?? {} },
    sites.conformanceProbability,
  )
  fillVerdicts(sites.value, limits.site, sites.verdict)
  withholdVerdicts(sites.verdict, flags)

  const members = waferMembers(readings, flags)
  const dies = analyzeDies(procedure, outline, positions, inReadingOrder(members), sites, limits.site)
  const waferLimits: WaferLimits = {
    site: limits.site,
    mean: limits.waferMean,
    uniformity: procedure.limits.uniformityPercent,
    allowedSitesOut: procedure.limits.allowedSitesOut,
  }
  const judged = members.map((wafer) =>
    analyzeWafer({
      members: wafer,
      readings,
      positions,
      sites,
      dies: dies && { columns: dies, rows: rowsOfWafer(dies, wafer.index, members.length) },
      limits: waferLimits,
      quantity,
    }),
  )
  const wafers = judged.map(({ wafer }) => wafer)
  const judgements = judged.map(({ judgement }) => judgement)
  const waferMeans = Float64Array.from(
    wafers.filter(({ statistics }) => statistics.count > 0),
    ({ statistics }) => statistics.mean,
  )
  const statistics = summarize(waferMeans)
  const { verdict, reasons } = judgeLot(judgements, waferLimits)
  return {
    procedure,
    defaults,
    readings,
    outline,
    quantity,
    sites,
    dies,
    wafers,
    lot: {
      name: readings.lot,
      verdict,
      sentence: lotSentence({ lot: readings.lot, verdict, wafers: judgements, statistics, unit: quantity.unit }),
      reasons,
      statistics,
      varianceComponents: componentsOfVariance(
        sites.value,
        members.map(({ counting }) => counting),
      ),
    },
    excluded,
    problems: [
      ...problems,
      ...unmatched,
      ...readingProblems({ readings, procedure, positions, outline, sites, quantity }),
      ...flagProblems(readings, flags),
    ],
    notes: [
      ...notes,
      ...exclusionNotes(excluded),
      ...analysisNotes({ readings, procedure, positions, setUp, corrections, quantity, dies }),
    ],
  }
}

function requireWhatReadingsNeed(readings: Readings, procedure: Procedure): void {
  const { voltage_V, vOverI_ohm, resistivity_ohm_cm, sheetResistance_ohm_sq } = readings
  const recovered = procedure.reported !== undefined && (sheetResistance_ohm_sq ?? resistivity_ohm_cm) !== null
  const gives = { vOverI: (voltage_V ?? vOverI_ohm) !== null || recovered, resistivity: resistivity_ohm_cm !== null }
  const [missing] = neededForReadings(procedure, gives, '')
  if (missing) throw new CoreError(missing)
}

/** A site in the edge exclusion is shown and not judged; one without a value can't be. */
function flagUncounted(
  value: Float64Array,
  positions: SitePositions | null,
  outline: Outline,
  procedure: Procedure,
  flags: Uint32Array,
): void {
  const usable = { outline, edgeExclusion_mm: procedure.wafer.edgeExclusionMm }
  for (let i = 0; i < value.length; i++) {
    if (Number.isNaN(value[i])) flags[i] |= SITE_FLAGS.noReading.bit
    else if (positions && !isUsable(usable, positions.x_mm[i], positions.y_mm[i]))
      flags[i] |= SITE_FLAGS.inEdgeExclusion.bit
  }
}

function withholdVerdicts(verdict: Uint8Array, flags: Uint32Array): void {
  const notAssessed = verdictCode('not-assessed')
  for (let i = 0; i < verdict.length; i++) {
    if (flags[i] & NOT_JUDGED) verdict[i] = notAssessed
  }
}

function inReadingOrder<T extends { readonly index: number }>(wafers: readonly T[]): T[] {
  return [...wafers].sort((a, b) => a.index - b.index)
}

/** Die columns hold the wafers one after another, equally many dies each. */
function rowsOfWafer(dies: DieColumns, index: number, wafers: number): Uint32Array {
  const each = dies.count / wafers
  return Uint32Array.from({ length: each }, (_, k) => index * each + k)
}
