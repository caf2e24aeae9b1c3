/** The one pipeline: readings and a procedure to everything that is shown of a lot. */
import type { CheckResult } from '../check-wafer/check'
import type { Acceptance } from '../conformity/acceptance'
import { fillConformanceProbability } from '../conformity/conformance-probability'
import { judgeLot } from '../conformity/judge-lot'
import { fillVerdictsBy } from '../conformity/judge-sites'
import type { WaferLimits } from '../conformity/judge-wafer'
import type { Limits } from '../conformity/limits'
import { lotSentence } from '../conformity/lot-sentence'
import { verdictCode } from '../conformity/verdict'
import type { GaugeStudy } from '../gauge/gauge-study'
import type { DepthProfile } from '../ingest/read-profile'
import type { Readings } from '../ingest/readings'
import { CoreError, type Problem } from '../problems/problem'
import { neededForReadings } from '../procedure/needed-for-readings'
import type { Procedure } from '../procedure/schema'
import { componentsOfVariance } from '../statistics/components-of-variance'
import { criticalDeviates } from '../statistics/outliers'
import { summarize } from '../statistics/summarize'
import { isUsable } from '../wafer/die-grid'
import type { Outline } from '../wafer/outline'
import { checkOfLot, checkProblems } from './check-of-lot'
import { correct, type Corrections } from './corrections'
import { analyzeDies } from './dies'
import { exclusionNotes, flagExcluded, type Exclusion } from './exclusions'
import { flagProblems, readingProblems } from './findings'
import { NOT_JUDGED, SITE_FLAGS } from './flags'
import { lotRisks } from './lot-risks'
import { layerResults } from './layer-results'
import type { DieColumns, LotAnalysis, Quantity, SiteColumns } from './lot-analysis'
import { measuringSetUp, type MeasuringSetUp } from './measuring-set-up'
import { mapNotes } from './map-notes'
import { analysisNotes } from './notes'
import { flagOutliers } from './outlying-sites'
import { prepareLayer } from './prepare-layer'
import type { Stage, Watch } from './progress'
import { judgedQuantity, limitsOn } from './quantity'
import { siteColumns } from './site-columns'
import { sitePositions, type SitePositions } from './site-positions'
import { contributions } from './contributions'
import { propagate } from './uncertainty'
import { healthNotes, healthProblems, readingHealth } from './reading-health'
import { repeatabilityOf, type Repeatability } from './repeatability'
import { ratios } from './v-over-i'
import { analyzeWafer, waferMembers, type WaferMembers } from './wafers'

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
  /** The depth profile that the procedure of a tabulated layer names. */
  readonly profile?: DepthProfile | null
  /** The gauge study and the check wafer's history that it names. */
  readonly gauge?: GaugeStudy | null
  readonly check?: CheckResult | null
  readonly watch?: Watch
}

/**
 * Analyses a lot.
 *
 * @throws CoreError where the procedure can't be applied to these readings (a layer setting out of range, a thickness
 * that is missing); whatever is wrong with single sites is in the result
 */
export function analyze(input: AnalysisInput): LotAnalysis {
  const { readings, procedure, defaults, problems, notes, excluded = [], profile = null, gauge = null, watch } = input
  const enter = (stage: Stage): void => watch?.({ stage, share: 0, rows: readings.count })
  enter('correcting')
  const measured = measure(readings, procedure, profile, gauge)
  const { sites, positions, outline, quantity } = measured
  const unmatched = flagExcluded(readings, excluded, sites.flags)
  const limits = limitsOn(quantity, procedure)
  const { members, outliers } = membersAndOutliers(readings, procedure, sites)
  judgeSites(sites, limits.site, procedure.acceptance)
  enter('mapping')
  const dies = analyzeDies(procedure, outline, positions, inReadingOrder(members), sites, limits.site)
  enter('judging')
  const { wafers, lot } = judgeWafersAndLot({ readings, procedure, measured, limits, members, outliers, dies })
  const health = readingHealth({ readings, procedure, ...measured, members })
  const check = input.check ? checkOfLot(input.check, readings) : null
  const found = [
    ...unmatched,
    ...checkProblems(check),
    ...healthProblems(health, readings, sites.flags),
    ...readingProblems({ readings, procedure, positions, outline, sites, quantity }),
    ...flagProblems(readings, sites.flags),
  ]
  return {
    procedure,
    defaults,
    readings,
    profile,
    gauge,
    check,
    repeatability: measured.repeatability,
    health,
    outline,
    quantity,
    sites,
    dies,
    wafers,
    lot,
    risks: lotRisks({ procedure, sites, members, limits: limits.site }),
    excluded,
    problems: [...problems, ...found],
    notes: [
      ...notes,
      ...exclusionNotes(excluded),
      ...healthNotes(health, readings.count),
      ...analysisNotes({ readings, procedure, profile, gauge, check, ...measured, dies }),
      ...mapNotes({ readings, procedure, positions, sites, members }),
    ],
  }
}

interface Measured {
  readonly positions: SitePositions | null
  readonly setUp: MeasuringSetUp
  readonly outline: Outline
  readonly corrections: Corrections
  readonly quantity: Quantity
  readonly sites: SiteColumns
  readonly repeatability: Repeatability | null
}

/** Every site's result with its uncertainty and flags; verdicts and probabilities are still to be filled. */
function measure(
  readings: Readings,
  procedure: Procedure,
  profile: DepthProfile | null,
  gauge: GaugeStudy | null,
): Measured {
  requireWhatReadingsNeed(readings, procedure)
  const flags = new Uint32Array(readings.count)
  const positions = sitePositions(readings, procedure)
  const vOverI = ratios(readings, flags)
  const setUp = measuringSetUp(procedure, { hasConfigurationB: vOverI.b_ohm !== null })
  const layer = prepareLayer(procedure, profile)
  const corrections = correct(readings, procedure, setUp, positions, vOverI, flags)
  const inverted = layerResults(procedure, layer, corrections, flags)
  const repeatability = procedure.uncertainty.repeatabilityRel === 'readings' ? repeatabilityOf(readings) : null
  const parts = contributions({ procedure, profile, corrections, readings, flags, repeatability, gauge })
  const quantity = judgedQuantity(procedure, readings)
  const uncertainties = propagate(parts, inverted, corrections.sheetResistance_ohm_sq, quantity.id)
  const sites = siteColumns({ corrections, layer: inverted, uncertainties, quantity, flags })
  flagUncounted(sites.value, positions, setUp.outline, procedure, flags)
  return { positions, setUp, outline: setUp.outline, corrections, quantity, sites, repeatability }
}

/** Outliers are sought among what counts; where the procedure leaves them out, what counts is then fewer. */
function membersAndOutliers(
  readings: Readings,
  procedure: Procedure,
  { value, flags }: SiteColumns,
): { members: WaferMembers[]; outliers: Uint32Array[] } {
  const members = waferMembers(readings, flags)
  const critical = criticalDeviates(procedure.statistics.outliers.alpha)
  const outliers = members.map((wafer) => flagOutliers(value, wafer, procedure.statistics, flags, critical))
  const areLeftOut = procedure.statistics.outliers.leaveOut && outliers.some(({ length }) => length > 0)
  return { members: areLeftOut ? waferMembers(readings, flags) : members, outliers }
}

function judgeSites(sites: SiteColumns, limits: Limits | undefined, acceptance: Acceptance): void {
  const { value, u, conformanceProbability, verdict, flags } = sites
  fillConformanceProbability({ value, u, limits: limits ?? {} }, conformanceProbability)
  fillVerdictsBy({ value, u }, limits, acceptance, verdict)
  const notAssessed = verdictCode('not-assessed')
  for (let i = 0; i < verdict.length; i++) if (flags[i] & NOT_JUDGED) verdict[i] = notAssessed
}

function judgeWafersAndLot({
  readings,
  procedure,
  measured: { sites, positions, quantity },
  limits,
  members,
  outliers,
  dies,
}: {
  readonly readings: Readings
  readonly procedure: Procedure
  readonly measured: Measured
  readonly limits: ReturnType<typeof limitsOn>
  readonly members: readonly WaferMembers[]
  readonly outliers: readonly Uint32Array[]
  readonly dies: DieColumns | null
}): Pick<LotAnalysis, 'wafers' | 'lot'> {
  const { uniformityPercent: uniformity, allowedSitesOut } = procedure.limits
  const waferLimits: WaferLimits = { site: limits.site, mean: limits.waferMean, uniformity, allowedSitesOut }
  const diesOf = (index: number) => dies && { columns: dies, rows: rowsOfWafer(dies, index, members.length) }
  const { acceptance } = procedure
  const common = { readings, positions, sites, limits: waferLimits, acceptance, quantity }
  const judged = members.map((wafer, k) =>
    analyzeWafer({ ...common, members: wafer, outliers: outliers[k], dies: diesOf(wafer.index) }),
  )
  const wafers = judged.map(({ wafer }) => wafer)
  const judgements = judged.map(({ judgement }) => judgement)
  const measuredWafers = wafers.filter(({ statistics }) => statistics.count > 0)
  const statistics = summarize(Float64Array.from(measuredWafers, ({ statistics: { mean } }) => mean))
  const { verdict, reasons } = judgeLot(judgements, waferLimits)
  const { lot: name } = readings
  const sentence = lotSentence({ lot: name, verdict, wafers: judgements, statistics, unit: quantity.unit })
  const varianceComponents = componentsOfVariance(
    sites.value,
    members.map(({ counting }) => counting),
    procedure.statistics.confidence,
  )
  return { wafers, lot: { name, verdict, sentence, reasons, statistics, varianceComponents } }
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

function inReadingOrder<T extends { readonly index: number }>(wafers: readonly T[]): T[] {
  return [...wafers].sort((a, b) => a.index - b.index)
}

/** Die columns hold the wafers one after another, equally many dies each. */
function rowsOfWafer(dies: DieColumns, index: number, wafers: number): Uint32Array {
  const each = dies.count / wafers
  return Uint32Array.from({ length: each }, (_, k) => index * each + k)
}
