/** One page for one wafer: its map, how its values run and spread, its statistics, and what they imply for the layer. */
import { VERDICTS, type WaferAnalysis } from '../../analysis/lot-analysis'
import { formatNumber, formatPercent, formatQuantity, formatWithUncertainty } from '../../units/format'
import type { Block, KeyValue } from '../document'
import { histogram } from '../figures/histogram'
import { radialProfile } from '../figures/radial-profile'
import { waferMap, type MapDies } from '../figures/wafer-map'
import { reasonsOf, VERDICT_WORDS, waferMarkOf, waferTitle, type ReportContext } from '../report-context'
import { layerColumns } from './layer-words'

const CHART_GAP_PT = 14
const CHART_HEIGHT_PT = 126
const MOST_MAP_PT = 340
const LEAST_MAP_PT = 200
/** Title, verdict, map caption and charts. */
const BESIDES_MAP_PT = 84 + CHART_HEIGHT_PT
const LINE_PT = 12.4
/** A small heading with the space about it. */
const HEADING_PT = 26
const CHARACTERS_A_LINE = 100

/** What the page leaves for the map, so that everything of a wafer stands on one page. */
function mapHeight_pt(sentence: string, stacks: readonly number[], context: ReportContext): number {
  const lines = Math.ceil(sentence.length / CHARACTERS_A_LINE)
  const room = context.height_pt - BESIDES_MAP_PT - LINE_PT * (lines + 1) - Math.max(...stacks)
  return Math.max(LEAST_MAP_PT, Math.min(MOST_MAP_PT, room))
}

export function waferSection(wafer: WaferAnalysis, context: ReportContext): Block[] {
  const title = waferTitle(wafer.id)
  const slot = Number.isNaN(wafer.slot) ? '' : `, slot ${wafer.slot}`
  const sentence = sentenceOf(reasonsOf(wafer))
  const statistics = statisticsEntries(wafer, context)
  const counts = countEntries(wafer)
  const layer = layerEntries(wafer, context)
  const stacks = [
    HEADING_PT + statistics.length * LINE_PT,
    HEADING_PT + counts.length * LINE_PT + (layer.length > 0 ? HEADING_PT + layer.length * LINE_PT : 0),
  ]
  return [
    { kind: 'page-break' },
    {
      kind: 'heading',
      level: 1,
      text: title,
      aside: `${context.analysis.lot.name}${slot}`,
      bookmark: `${title}: ${VERDICT_WORDS[wafer.verdict].toLowerCase()}`,
    },
    {
      kind: 'verdict',
      word: VERDICT_WORDS[wafer.verdict],
      mark: waferMarkOf(wafer, context),
      sentence: sentence,
    },
    ...figures(wafer, mapHeight_pt(sentence, stacks, context), context),
    {
      kind: 'columns',
      columns: [
        [
          { kind: 'heading', level: 3, text: 'Statistics' },
          { kind: 'key-values', columns: 1, entries: statistics },
        ],
        [
          { kind: 'heading', level: 3, text: 'Counts' },
          { kind: 'key-values', columns: 1, entries: counts },
          ...(layer.length > 0
            ? ([
                { kind: 'heading', level: 3, text: 'Layer, means over the sites' },
                { kind: 'key-values', columns: 1, entries: layer },
              ] as const)
            : []),
        ],
      ],
    },
  ]
}

/** Reasons joined to one sentence with a capital and a stop. */
function sentenceOf(reasons: readonly string[]): string {
  const text = reasons.join('; ')
  if (text === '') return ''
  return `${text.charAt(0).toUpperCase()}${text.slice(1)}${/[.!?]$/.test(text) ? '' : '.'}`
}

function figures(wafer: WaferAnalysis, mapHeight: number, context: ReportContext): Block[] {
  const { analysis, width_pt, siteLimits, scale } = context
  const sites = context.sitesOf(wafer)
  const { quantity, outline, procedure } = analysis
  const chart = { quantity, limits: siteLimits, width_pt: (width_pt - CHART_GAP_PT) / 2, height_pt: CHART_HEIGHT_PT }
  const title = waferTitle(wafer.id)
  const spread = histogram({ ...chart, title: `${title}: histogram`, values: sites.value })
  if (!context.hasPositions || !scale) {
    const text = scale ? 'No map: the readings carry no positions.' : 'No map: no site of the lot has a value.'
    return [
      { kind: 'paragraph', text, quiet: true },
      { kind: 'figures', figures: [spread] },
    ]
  }
  const surface = context.surfaceOf(sites, 'large')
  const map = waferMap({
    title: `${title}: map of ${quantity.title}`,
    outline,
    edgeExclusion_mm: procedure.wafer.edgeExclusionMm,
    quantity,
    sites,
    limits: siteLimits,
    scale,
    contours: surface?.contours ?? null,
    diesOut: diesOutOf(wafer, context),
    width_pt,
    height_pt: mapHeight,
  })
  const profile = radialProfile({
    ...chart,
    title: `${title}: radial profile`,
    sites,
    edgeRadius_mm: outline.shape === 'disc' ? outline.diameter_mm / 2 : NaN,
    edgeExclusion_mm: outline.shape === 'disc' ? procedure.wafer.edgeExclusionMm : 0,
  })
  return [
    { kind: 'figures', figures: [map] },
    ...(surface ? [mapCaption(surface.method)] : []),
    { kind: 'figures', figures: [profile, spread] },
  ]
}

function mapCaption(method: string): Block {
  const text = `Colours between the sites: ${method}; extrapolated beyond the outermost. Printed values are those of the sites.`
  return { kind: 'paragraph', text, quiet: true }
}

function diesOutOf(wafer: WaferAnalysis, { analysis }: ReportContext): MapDies | null {
  const { dies, procedure } = analysis
  if (!dies || !procedure.dieGrid) return null
  const centreX_mm: number[] = []
  const centreY_mm: number[] = []
  for (let i = 0; i < dies.count; i++) {
    if (dies.wafer[i] !== wafer.index || VERDICTS[dies.verdict[i]] !== 'out-of-spec') continue
    centreX_mm.push(dies.x_mm[i])
    centreY_mm.push(dies.y_mm[i])
  }
  return { centreX_mm, centreY_mm, pitchX_mm: procedure.dieGrid.pitchXMm, pitchY_mm: procedure.dieGrid.pitchYMm }
}

function statisticsEntries(wafer: WaferAnalysis, { analysis }: ReportContext): KeyValue[] {
  const { statistics: s } = wafer
  const { unit } = analysis.quantity
  return [
    { key: 'Mean', value: formatWithUncertainty(s.mean, wafer.uMean, unit), note: 'standard uncertainty' },
    { key: 'Median', value: formatQuantity(s.median, unit) },
    { key: 'Standard deviation', value: formatQuantity(s.standardDeviation, unit), note: 'divisor n − 1' },
    { key: 'Minimum, maximum', value: `${formatNumber(s.min, unit)} to ${formatQuantity(s.max, unit)}` },
    ...s.nonuniformity.map(({ formula, percent }, i) => ({
      key: i === 0 ? 'Non-uniformity' : '',
      value: formatPercent(percent),
      note: formula.replaceAll('-', '−'),
    })),
  ]
}

function countEntries(wafer: WaferAnalysis): KeyValue[] {
  const { dieCounts: dies } = wafer
  return [
    { key: 'Sites', value: String(wafer.sites.length) },
    { key: 'In the statistics', value: String(wafer.statistics.count) },
    { key: 'Out of spec', value: String(wafer.sitesOut) },
    { key: 'Not assessed', value: String(wafer.sitesNotAssessed) },
    { key: 'Rejected rows', value: String(wafer.rejectedRows) },
    ...(dies
      ? [
          {
            key: 'Dies',
            value: `${dies['in-spec']} in, ${dies['out-of-spec']} out`,
            note: `${dies.undecided} undecided, ${dies['not-assessed']} not assessed`,
          },
        ]
      : []),
  ]
}

function layerEntries(wafer: WaferAnalysis, { analysis }: ReportContext): KeyValue[] {
  const { layer } = analysis.procedure
  const entries = layerColumns(analysis).map(({ title, unit, mean }) => ({
    key: title,
    value: formatQuantity(mean(wafer), unit),
  }))
  if (entries.length === 0 || !('mobility' in layer)) return entries
  return [...entries, { key: 'Mobility model', value: layer.mobility }]
}
