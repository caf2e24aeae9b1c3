/** A wafer's further figures and its patterns as result.json holds them: sites by their names, keys in a fixed order. */
import type { SiteStatistics } from '../statistics/site-statistics'
import type { LotAnalysis, WaferAnalysis } from './lot-analysis'
import type { WaferDetails } from './wafer-details'
import { countingSites } from './wafers'

type WaferOf = Pick<LotAnalysis, 'readings' | 'procedure' | 'sites'>

export function figuresObject(analysis: WaferOf, wafer: WaferAnalysis, figures: SiteStatistics): object {
  return {
    count: figures.count,
    mean: figures.mean,
    standardDeviation: figures.standardDeviation,
    meanInterval: figures.meanInterval,
    standardDeviationInterval: figures.standardDeviationInterval,
    areaWeighted: figures.areaWeighted,
    radialVariation: figures.radialVariation,
    outliers: outliersObject(analysis, wafer, figures),
    capability: figures.capability,
    normality: figures.normality,
    missing: figures.missing.map(({ figure, why }) => ({ figure, why })),
  }
}

/** The statistics without the outliers that count, or with those that were left out, under the name of which they are. */
export function statisticsOtherwiseObject(
  { procedure }: WaferOf,
  { statisticsOtherwise }: WaferAnalysis,
): object | null {
  if (!statisticsOtherwise) return null
  const which = procedure.statistics.outliers.leaveOut ? 'withOutliers' : 'withoutOutliers'
  const { nonuniformity, ...figures } = statisticsOtherwise
  return { which, ...figures, nonuniformity }
}

/**
 * The sites that the analysis flagged, farthest first. The steps of the test are those of all sites at its alpha; where
 * outliers were left out, the figures are of the rest and have none to tell.
 */
function outliersObject(
  { readings, procedure }: WaferOf,
  { outliers }: WaferAnalysis,
  figures: SiteStatistics,
): object {
  const { alpha, leaveOut } = procedure.statistics.outliers
  const nameOf = (row: number): string => readings.siteNames[readings.site[row]]
  const test = leaveOut || figures.outliers?.alpha !== alpha ? null : figures.outliers
  const steps = test && test.steps.map(({ row, statistic, critical }) => ({ site: nameOf(row), statistic, critical }))
  return { test: 'generalized-esd', alpha, leftOut: leaveOut, sites: Array.from(outliers, nameOf), steps }
}

/** null where no pattern can be looked for. */
export function patternsObject(
  { readings, sites }: WaferOf,
  wafer: WaferAnalysis,
  { patterns, words }: WaferDetails,
): object | null {
  if (!patterns) return null
  const counting = countingSites(wafer.sites, sites.flags)
  const nameOf = (entry: number | null) => (entry === null ? null : readings.siteNames[readings.site[counting[entry]]])
  const { trend, findings } = patterns
  return {
    order: trend.order,
    rSquared: trend.rSquared,
    terms: trend.terms.map(({ name, coefficient, standardError }) => ({ name, coefficient, standardError })),
    groups: trend.groups.map(({ id, share }) => ({ id, share })),
    findings: findings.map(({ kind, share, pValue, amount, direction_deg, site }) => ({
      kind, share, pValue, amount, direction_deg, site: nameOf(site),
    })), // prettier-ignore
    sentences: words.map(({ sentence, mayPointTo }) => ({ sentence, mayPointTo })),
  }
}

/** How the surface between the sites was made, and how well it is known; the Gaussian process stands beside the plain one. */
export function mapObject({ map }: WaferDetails): object | null {
  if (!map) return null
  const { interpolation, plainLeaveOneOut, process: fit } = map
  return {
    interpolation,
    plainLeaveOneOutRms: plainLeaveOneOut,
    gaussianProcess: fit && {
      trendDegree: fit.surface.degree,
      lengthScale_mm: fit.surface.lengthScale_mm,
      standardDeviation: fit.surface.standardDeviation,
      nugget: fit.surface.nugget,
      leaveOneOutRms: fit.leaveOneOut,
      coverage95: fit.coverage,
    },
  }
}
