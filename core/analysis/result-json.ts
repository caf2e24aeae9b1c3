/** The lot's result as data for other programs: `"format": "persquare-result/1"`. */
import { explain, placeOf } from '../problems/explain'
import type { LotAnalysis, WaferAnalysis } from './lot-analysis'
import { flagNames } from './flags'
import { mobilityComparison } from './mobility-comparison'
import { figuresObject, mapObject, patternsObject, statisticsOtherwiseObject } from './result-details'
import { acceptanceObject, checkPart, gaugePart, healthObject, uncertaintyObject } from './trust-objects'
import { waferDetails, type WaferDetails } from './wafer-details'
import type { VarianceComponents, VarianceComponent } from '../statistics/components-of-variance'
import type { Statistics } from '../statistics/summarize'

export const RESULT_FORMAT = 'persquare-result/1'

export interface ResultContext {
  /** Name and version of what made it. */
  readonly program: string
  readonly version: string
}

/** Plain data; numbers that don't exist are null, since JSON has no NaN. Keys stand in a fixed order. */
export function resultObject(analysis: LotAnalysis, context: ResultContext): object {
  const { program, version } = context
  const { readings, procedure, defaults, excluded, problems, notes, quantity, lot, wafers } = analysis
  return {
    format: RESULT_FORMAT,
    program: { name: program, version },
    inputs: readings.files.map(({ name, bytes, sha256, dialect, preamble, matches, ignoredHeaders, rows, rejectedRows }) => ({
      name, bytes, sha256, dialect, preamble, columns: matches, ignoredHeaders, rows, rejectedRows,
    })), // prettier-ignore
    procedure,
    defaultsUsed: defaults,
    excluded: excluded.map(({ wafer, site, reason }) => ({ wafer, site, reason })),
    problems: problems.map((problem) => ({ ...problem, sentence: explain(problem), place: placeOf(problem) })),
    notes,
    health: healthObject(analysis),
    quantity: { id: quantity.id, title: quantity.title, unit: quantity.asciiUnit },
    lot: {
      name: lot.name,
      verdict: lot.verdict,
      sentence: lot.sentence,
      reasons: lot.reasons,
      wafers: wafers.length,
      statistics: statisticsObject(lot.statistics),
      varianceComponents: lot.varianceComponents && componentsObject(lot.varianceComponents),
    },
    layer: layerObject(analysis),
    uncertainty: uncertaintyObject(analysis),
    acceptance: acceptanceObject(analysis),
    gauge: gaugePart(analysis),
    checkWafer: checkPart(analysis.check),
    wafers: wafers.map((wafer) => waferObject(wafer, analysis, waferDetails(analysis, wafer))),
  }
}

/** Text of result.json: two-space indent, a line break at the end, the same for the same input. */
export function resultJson(analysis: LotAnalysis, context: ResultContext): string {
  return JSON.stringify(resultObject(analysis, context), numbersOrNull, 2) + '\n'
}

function numbersOrNull(_key: string, value: unknown): unknown {
  return typeof value === 'number' && !Number.isFinite(value) ? null : value
}

function layerObject(analysis: LotAnalysis): object {
  const { profile, procedure } = analysis
  const file = profile && {
    name: profile.file,
    bytes: profile.bytes,
    sha256: profile.sha256,
    columns: profile.headers,
    points: profile.depth_um.length,
  }
  return { kind: procedure.layer.kind, profile: file, mobilityComparison: mobilityComparison(analysis) }
}

function waferObject(wafer: WaferAnalysis, analysis: LotAnalysis, details: WaferDetails): object {
  const { id, slot, verdict, reasons, statistics, uMean, means, sitesOut, sitesNotAssessed, rejectedRows, dieCounts } =
    wafer
  const flagged = wafer.sites.reduce((bits, site) => bits | analysis.sites.flags[site], 0)
  return {
    id,
    slot,
    verdict,
    reasons,
    statistics: statisticsObject(statistics),
    meanStandardUncertainty: uMean,
    means,
    sitesOutOfSpec: sitesOut,
    sitesNotAssessed,
    rejectedRows,
    dies: dieCounts,
    flags: flagNames(flagged).split('|').filter(Boolean),
    statisticsOtherwise: statisticsOtherwiseObject(analysis, wafer),
    figures: figuresObject(analysis, wafer, details.figures),
    patterns: patternsObject(analysis, wafer, details),
    map: mapObject(details),
  }
}

function statisticsObject({ nonuniformity, ...figures }: Statistics): object {
  return { ...figures, nonuniformity }
}

function componentsObject({ withinWafer, betweenWafers, source }: VarianceComponents): object {
  const component = ({ variance, standardDeviation, degreesOfFreedom, interval }: VarianceComponent): object => ({
    variance,
    standardDeviation,
    degreesOfFreedom,
    interval,
  })
  return { withinWafer: component(withinWafer), betweenWafers: component(betweenWafers), source }
}
