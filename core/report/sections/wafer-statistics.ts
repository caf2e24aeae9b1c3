/** What stands in words and numbers on a wafer's page. Each figure carries its formula or short name. */
import type { WaferAnalysis } from '../../analysis/lot-analysis'
import type { CapabilityIndex } from '../../statistics/capability'
import type { ConfidenceInterval } from '../../statistics/intervals'
import type { RadialGroup, RadialVariation } from '../../statistics/radial-variation'
import type { SiteStatistics } from '../../statistics/site-statistics'
import {
  formatFixed, formatNumber, formatPercent, formatQuantity, formatScientific, formatSignificant, formatToUncertainty,
  formatWithUncertainty,
} from '../../units/format' // prettier-ignore
import type { KeyValue } from '../document'
import type { ReportContext } from '../report-context'
import { layerColumns } from './layer-words'

export function statisticsEntries(wafer: WaferAnalysis, context: ReportContext): KeyValue[] {
  const { statistics: s } = wafer
  const { unit } = context.analysis.quantity
  const { figures } = context.detailsOf(wafer)
  const { areaWeighted } = figures
  const how = areaWeighted && (areaWeighted.method === 'rings' ? 'area of each ring' : 'area nearest each site')
  return [
    { key: 'Mean', value: formatWithUncertainty(s.mean, wafer.uMean, unit), note: 'standard uncertainty' },
    ...intervalEntry(figures.meanInterval, unit, 't s / √n'),
    ...(areaWeighted
      ? [{ key: 'Area-weighted mean', value: formatQuantity(areaWeighted.mean, unit), note: how ?? '' }]
      : []),
    { key: 'Median', value: formatQuantity(s.median, unit) },
    { key: 'Standard deviation s', value: formatQuantity(s.standardDeviation, unit), note: 'divisor n − 1' },
    ...intervalEntry(figures.standardDeviationInterval, unit, 'χ²'),
    ...(areaWeighted?.standardDeviation != null
      ? [{ key: 'Area-weighted s', value: formatQuantity(areaWeighted.standardDeviation, unit) }]
      : []),
    { key: 'Minimum, maximum', value: `${formatNumber(s.min, unit)} to ${formatQuantity(s.max, unit)}` },
  ]
}

function intervalEntry(interval: ConfidenceInterval | null, unit: string, note: string): KeyValue[] {
  if (!interval) return []
  return [{ key: `${percentOf(interval)} interval`, value: `${rangeWords(interval)} ${unit}`, note }]
}

/** With as many digits as its width allows. */
function rangeWords({ lower, upper }: ConfidenceInterval): string {
  const half = (upper - lower) / 2
  const write = (value: number) => (half > 0 ? formatToUncertainty(value, half) : formatSignificant(value, 4))
  return `${write(lower)} to ${write(upper)}`
}

function percentOf({ level }: ConfidenceInterval): string {
  return `${Number((100 * level).toPrecision(6))} %`
}

export function nonuniformityEntries({ statistics }: WaferAnalysis): KeyValue[] {
  return statistics.nonuniformity.map(({ formula, percent }) => ({
    key: formatPercent(percent),
    value: '',
    note: formula.replaceAll('-', '−'),
  }))
}

/** How the spread fits the limits, whether it looks normal, and how it runs outwards. */
export function shapeEntries(wafer: WaferAnalysis, context: ReportContext): KeyValue[] {
  const { capability, normality, radialVariation } = context.detailsOf(wafer).figures
  return [
    ...(capability?.cp ? [{ key: 'Cp', value: indexWords(capability.cp), note: '(U − L) / 6 s' }] : []),
    ...(capability ? [{ key: 'Cpk', value: indexWords(capability.cpk), note: nearerLimit(capability) }] : []),
    ...(normality
      ? [
          {
            key: 'Normality',
            value: `A² = ${formatSignificant(normality.adjusted, 3)}, p ${probability(normality.p)}`,
            note: 'Anderson–Darling',
          },
        ]
      : []),
    ...(radialVariation ? radialEntries(radialVariation) : []),
  ]
}

function indexWords({ value, interval }: CapabilityIndex): string {
  return `${formatFixed(value, 2)} (${formatFixed(interval.lower, 2)} to ${formatFixed(interval.upper, 2)})`
}

function nearerLimit({ cpl, cpu, cpk }: NonNullable<SiteStatistics['capability']>): string {
  if (cpk === cpl) return '(mean − L) / 3 s'
  return cpk === cpu ? '(U − mean) / 3 s' : ''
}

function probability(p: number): string {
  if (p < 1e-4) return '< 0.0001'
  return `= ${p < 0.001 ? formatScientific(p, 2) : formatSignificant(p, 2)}`
}

function radialEntries({ halfRadius, nearEdge, maximumPercent }: RadialVariation): KeyValue[] {
  const part = (name: string, group: RadialGroup | null) =>
    group ? [`${name} ${signedPercent(group.variationPercent)}`] : []
  const parts = [...part('half radius', halfRadius), ...part('edge', nearEdge)]
  return [
    { key: 'Radial variation', value: parts.join(', '), note: 'against the centre' },
    { key: 'Its largest', value: formatPercent(maximumPercent), note: '(max − min) / min, as SEMI MF81' },
  ]
}

function signedPercent(percent: number): string {
  return `${percent > 0 ? '+' : ''}${formatPercent(percent)}`
}

const MOST_OUTLIERS = 4

/** The outlying sites by name, and what the statistics would be the other way. */
export function outlierEntries(wafer: WaferAnalysis, { analysis }: ReportContext): KeyValue[] {
  const { readings, sites, quantity, procedure } = analysis
  const { alpha, leaveOut } = procedure.statistics.outliers
  const test = `generalized ESD, α = ${alpha}`
  if (wafer.outliers.length === 0) return [{ key: 'Outliers', value: 'none', note: test }]
  const named = Array.from(wafer.outliers.slice(0, MOST_OUTLIERS), (row) => {
    return `site ${readings.siteNames[readings.site[row]]}: ${formatQuantity(sites.value[row], quantity.unit)}`
  })
  const rest = wafer.outliers.length - named.length
  const value = `${named.join('; ')}${rest > 0 ? `; and ${rest} more` : ''}`
  const other = wafer.statisticsOtherwise
  return [
    { key: 'Outliers', value, note: `${leaveOut ? 'left out' : 'flagged, counted'}; ${test}` },
    ...(other
      ? [
          {
            key: leaveOut ? 'With them' : 'Without them',
            value: `mean ${formatNumber(other.mean, quantity.unit)}, s ${formatSignificant(other.standardDeviation, 3)} ${quantity.unit}`,
            note: `s / mean ${formatPercent(other.nonuniformityPercent)}`,
          },
        ]
      : []),
  ]
}

export function countEntries(wafer: WaferAnalysis): KeyValue[] {
  const { dieCounts: dies } = wafer
  return [
    { key: 'Sites', value: String(wafer.sites.length), note: `${wafer.statistics.count} in the statistics` },
    { key: 'Out of spec', value: String(wafer.sitesOut) },
    { key: 'Not assessed', value: String(wafer.sitesNotAssessed) },
    { key: 'Rejected rows', value: String(wafer.rejectedRows) },
    ...(dies
      ? [
          { key: 'Dies in, out', value: `${dies['in-spec']}, ${dies['out-of-spec']}` },
          { key: 'Dies undecided', value: String(dies.undecided) },
          { key: 'Dies not assessed', value: String(dies['not-assessed']) },
        ]
      : []),
  ]
}

export function layerEntries(wafer: WaferAnalysis, { analysis }: ReportContext): KeyValue[] {
  const { layer } = analysis.procedure
  const entries = layerColumns(analysis).map(({ title, unit, mean }) => ({
    key: title,
    value: formatQuantity(mean(wafer), unit),
  }))
  if (entries.length === 0 || !('mobility' in layer)) return entries
  return [...entries, { key: 'Mobility model', value: layer.mobility }]
}
