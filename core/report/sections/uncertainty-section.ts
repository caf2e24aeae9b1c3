/** What the standard uncertainties are made of, what they come to, and whether the first order is enough for them. */
import { waferName } from '../../conformity/reasons'
import type { Working } from '../../analysis/working'
import {
  expandedUncertainty,
  splitByEffect,
  type BudgetLine,
  type ExpandedUncertainty,
} from '../../analysis/uncertainty-budget'
import { UNCERTAINTY_COMPONENTS, type UncertaintyComponent } from '../../procedure/schema'
import { formatFixed, formatQuantity, formatSignificant } from '../../units/format'
import type { Block, KeyValue, TableRow } from '../document'
import { budgetBars } from '../figures/budget-bars'
import type { ReportContext } from '../report-context'
import { monteCarloBlocks } from './monte-carlo-blocks'

const COMPONENTS: Readonly<Record<UncertaintyComponent, string>> = {
  currentRel: 'current',
  voltageRel: 'voltage',
  thermalEmfUV: 'stray voltages',
  spacingMm: 'each pin spacing',
  spacingWanderMm: 'wander of the pins',
  orientationDeg: 'direction of the pin line',
  thicknessUm: 'wafer thickness',
  temperatureC: 'temperature',
  temperatureCoefficientPercentPerC: 'temperature coefficient',
  diameterMm: 'wafer diameter',
  positionMm: 'place of the probe',
  repeatabilityRel: 'repeatability',
  depthUm: 'layer depth',
  mobilityRel: 'mobility model',
  reportedRel: 'value as the file reports it',
}

export function uncertaintySection(context: ReportContext): Block[] {
  return [...uncertaintyBlocks(context), ...monteCarloBlocks(context)]
}

/** Without the Monte Carlo calculation, which takes its time. */
export function uncertaintyBlocks(context: ReportContext): Block[] {
  const { working } = context.input
  const { uncertainty } = context.analysis.procedure
  const exact = UNCERTAINTY_COMPONENTS.filter((component) => uncertainty[component] === 0)
  return [
    { kind: 'heading', level: 1, text: 'Uncertainty' },
    {
      kind: 'paragraph',
      text: 'Standard uncertainties (one sigma), combined by the law of propagation of JCGM 100:2008, 5.1.2. What all sites share stays whole in the mean of a wafer; what is independent from site to site is averaged down with the number of sites.',
    },
    ...(working && working.budget.length > 0 ? budgetBlocks(working, context) : []),
    { kind: 'key-values', columns: 1, entries: [...typicalSite(context), ...expandedEntries(context)] },
    ...(exact.length > 0
      ? [{ kind: 'paragraph', text: `Taken as exactly known: ${exact.map((id) => COMPONENTS[id]).join('; ')}.`, quiet: true } as const]
      : []),
  ]
} // prettier-ignore

/** One site's, largest first, as table and as picture. */
function budgetBlocks({ site, wafer, budget, expanded }: Working, { width_pt }: ReportContext): Block[] {
  const where = `site ${site} of ${waferName(wafer)}`
  const { listed: bars, idle: rest } = splitByEffect(budget)
  const title = `Uncertainty budget of ${where}`
  return [
    { kind: 'heading', level: 2, text: `Budget at ${where}` },
    {
      kind: 'table',
      summary: 'Uncertainty budget of one site',
      columns: [
        { title: 'Component', align: 'left', share: 2.7 },
        { title: 'u', align: 'right', share: 1.1 },
        { title: 'Type', align: 'right', share: 0.5 },
        { title: 'Degrees of freedom', align: 'right', share: 0.9 },
        { title: 'Sensitivity', align: 'right', share: 1.3 },
        { title: 'Effect', unit: '%', align: 'decimal', share: 0.8 },
        { title: 'Of variance', unit: '%', align: 'decimal', share: 0.9 },
        { title: 'At all sites', align: 'right', share: 0.8 },
      ],
      rows: [...bars.map(budgetRow), combinedRow(expanded)],
    },
    ...(rest.length > 0
      ? [{ kind: 'paragraph', text: `Without effect there: ${rest.map((line) => line.title).join('; ')}.`, quiet: true } as const]
      : []),
    { kind: 'figures', figures: [budgetBars({ title, bars, combined: expanded.standard, width_pt })] },
  ]
} // prettier-ignore

function budgetRow({ title, shared, relative, share, u, unit, degreesOfFreedom, evaluation, sensitivity }: BudgetLine): TableRow {
  const isFraction = unit === ''
  return {
    cells: [
      title,
      isFraction ? `${formatSignificant(100 * u, 2)} %` : `${formatSignificant(u, 2)} ${unit}`,
      evaluation,
      freedom(degreesOfFreedom),
      isFraction ? formatSignificant(sensitivity, 3) : `${formatSignificant(100 * sensitivity, 3)} %/${unit.replace('%/', '(%/')}${unit.startsWith('%') ? ')' : ''}`,
      formatSignificant(100 * relative, 2),
      formatFixed(100 * share, 1),
      shared ? 'the same' : 'new',
    ],
  }
} // prettier-ignore

function combinedRow({ standard, effectiveDegreesOfFreedom }: ExpandedUncertainty): TableRow {
  const cells = ['combined', '', '', freedom(effectiveDegreesOfFreedom), '', formatSignificant(100 * standard, 2), '', '']
  return { cells, emphasis: 'result' }
} // prettier-ignore

function freedom(degrees: number): string {
  return degrees >= 1e6 ? '∞' : formatFixed(degrees, 0)
}

function typicalSite({ analysis }: ReportContext): KeyValue[] {
  const { sites, quantity } = analysis
  const rows: readonly (readonly [string, Float64Array])[] = [
    ['Typical site, combined', sites.u],
    ['of that shared by all sites', sites.uShared],
    ["of that the site's own", sites.uIndependent],
  ]
  return rows.map(([key, column]) => ({
    key,
    value: formatQuantity(medianOf(column), quantity.unit),
    note: 'median over the sites',
  }))
}

/** Of the site of the budget, of the mean of its wafer, and of the lot's. */
function expandedEntries({ analysis, input: { working } }: ReportContext): KeyValue[] {
  if (!working || working.budget.length === 0) return []
  const { procedure, quantity, wafers, lot } = analysis
  const wafer = wafers.find(({ id }) => id === working.wafer)
  const level = procedure.statistics.confidence
  const all = wafers.reduce((sum, { statistics }) => sum + statistics.count, 0)
  const entry = (key: string, value: number, { expanded, coverageFactor, effectiveDegreesOfFreedom }: ExpandedUncertainty): KeyValue => ({
    key,
    value: `± ${formatQuantity(expanded * value, quantity.unit)}`,
    note: `${formatSignificant(100 * expanded, 2)} %; k = ${formatFixed(coverageFactor, 2)} for ${formatFixed(100 * level, level < 0.995 ? 0 : 1)} %, ${freedom(effectiveDegreesOfFreedom)} degrees of freedom`,
  })
  const site = wafer?.sites.find((i) => analysis.readings.siteNames[analysis.readings.site[i]] === working.site)
  return [
    ...(site === undefined ? [] : [entry('Expanded, of that site', analysis.sites.value[site], working.expanded)]),
    ...(wafer ? [entry('Expanded, of the mean of its wafer', wafer.statistics.mean, expandedUncertainty(working.budget, level, wafer.statistics.count))] : []),
    ...(wafers.length > 1 ? [entry("Expanded, of the lot's mean", lot.statistics.mean, expandedUncertainty(working.budget, level, all))] : []),
  ]
} // prettier-ignore

function medianOf(column: Float64Array): number {
  const sorted = column.filter(Number.isFinite).sort()
  return sorted.length > 0 ? sorted[Math.floor((sorted.length - 1) / 2)] : NaN
}
