/** One page for one wafer: its map, how its values run and spread, its statistics, and what they imply for the layer. */
import type { WaferAnalysis } from '../../analysis/lot-analysis'
import { COLUMN_GAP_PT, columnWidths_pt, type Block, type ColumnsBlock, type KeyValue } from '../document'
import { formatQuantity } from '../../units/format'
import { labelWidth_pt } from '../drawing'
import { reasonsOf, VERDICT_WORDS, waferMarkOf, waferTitle, type ReportContext } from '../report-context'
import { histogramFigure, radialFigure, waferMapFigure } from './wafer-figures'
import {
  countEntries, layerEntries, nonuniformityEntries, outlierEntries, shapeEntries, statisticsEntries,
} from './wafer-statistics' // prettier-ignore

const CHART_GAP_PT = 14
const MOST_CHART_PT = 108
const LEAST_CHART_PT = 78
const LEAST_MAP_PT = 170
/** A round map and its colour bar need so much more width than height. */
const MAP_WIDER_PT = 34
const MAP_SHARES = [0.67, 0.33]
/** Title, verdict's word, caption, the space after figures, and a little to spare. */
const BESIDES_PT = 94
const LINE_PT = 12.4
const SMALL_LINE_PT = 9.9
const TEXT_PT = 8.6
const SMALL_PT = 7.2
/** Of the width that labels of figures are given, to be safe, words take about this share. */
const WORDS_SHARE = 0.93
/** A small heading with the space about it. */
const HEADING_PT = 22

export function waferSection(wafer: WaferAnalysis, context: ReportContext): Block[] {
  const title = waferTitle(wafer.id)
  const slot = Number.isNaN(wafer.slot) ? '' : `, slot ${wafer.slot}`
  const sentence = sentenceOf(reasonsOf(wafer))
  const below = [statisticsColumns(wafer, context), ...patternBlocks(wafer, context)]
  return [
    { kind: 'page-break' },
    {
      kind: 'heading',
      level: 1,
      text: title,
      aside: `${context.analysis.lot.name}${slot}`,
      bookmark: `${title}: ${VERDICT_WORDS[wafer.verdict].toLowerCase()}`,
    },
    { kind: 'verdict', word: VERDICT_WORDS[wafer.verdict], mark: waferMarkOf(wafer, context), sentence },
    ...figures(wafer, heightsOf(wafer, sentence, below, context), context),
    ...below,
  ]
}

/** Reasons joined to one sentence with a capital and a stop. */
function sentenceOf(reasons: readonly string[]): string {
  const text = reasons.join('; ')
  if (text === '') return ''
  return `${text.charAt(0).toUpperCase()}${text.slice(1)}${/[.!?]$/.test(text) ? '' : '.'}`
}

function figures(wafer: WaferAnalysis, heights: FigureHeights, context: ReportContext): Block[] {
  const chart = { width_pt: (context.width_pt - CHART_GAP_PT) / 2, height_pt: heights.chart_pt }
  const spread = histogramFigure(wafer, chart, context)
  const counts = countStack(wafer)
  const columns: ColumnsBlock = { kind: 'columns', shares: MAP_SHARES, columns: [[], counts] }
  const size = { width_pt: columnWidths_pt(columns, context.width_pt)[0], height_pt: heights.map_pt }
  const drawn = waferMapFigure(wafer, size, context)
  if (!drawn) {
    const text = context.scale ? 'No map: the readings carry no positions.' : 'No map: no site of the lot has a value.'
    const stack: Block[] = [
      { kind: 'paragraph', text, quiet: true },
      { kind: 'figures', figures: [spread] },
    ]
    return [{ kind: 'columns', columns: [stack, counts] }]
  }
  return [
    { ...columns, columns: [[{ kind: 'figures', figures: [drawn.map] }], counts] },
    caption(drawn.method, wafer, context),
    { kind: 'figures', figures: [radialFigure(wafer, chart, context), spread] },
  ]
}

function caption(method: string | null, wafer: WaferAnalysis, context: ReportContext): Block {
  const map = method
    ? `Colours between the sites: ${method}; extrapolated beyond the outermost${leftOutWords(wafer, context)}. Printed values are those of the sites. `
    : ''
  return { kind: 'paragraph', text: `${map}Radial profile: ring means ± standard error.`, quiet: true }
}

/** How far off the surface is where a site is left out of it. */
function leftOutWords(wafer: WaferAnalysis, { detailsOf, analysis: { quantity } }: ReportContext): string {
  const fit = detailsOf(wafer).map
  const rms = fit?.interpolation === 'gaussian-process' ? fit.process!.leaveOneOut : (fit?.plainLeaveOneOut ?? NaN)
  return Number.isFinite(rms) ? `; a site left out is missed by ${formatQuantity(rms, quantity.unit)} rms` : ''
}

function countStack(wafer: WaferAnalysis): Block[] {
  return [...titled('Counts', countEntries(wafer)), ...titled('Non-uniformity', nonuniformityEntries(wafer))]
}

function statisticsColumns(wafer: WaferAnalysis, context: ReportContext): ColumnsBlock {
  return {
    kind: 'columns',
    columns: [
      titled('Statistics', [...statisticsEntries(wafer, context), ...outlierEntries(wafer, context)]),
      [
        ...titled('Capability and shape', shapeEntries(wafer, context)),
        ...titled('Layer, means over the sites', layerEntries(wafer, context)),
      ],
    ],
  }
}

function titled(text: string, entries: readonly KeyValue[]): Block[] {
  if (entries.length === 0) return []
  return [
    { kind: 'heading', level: 3, text },
    { kind: 'key-values', columns: 1, entries },
  ]
}

/** What the map looks like, by share of the variance, and where to look first. */
function patternBlocks(wafer: WaferAnalysis, context: ReportContext): Block[] {
  const { words } = context.detailsOf(wafer)
  if (words.length === 0) return []
  const entries = words.map(({ sentence, mayPointTo }) => (mayPointTo ? `${sentence} ${mayPointTo}` : sentence))
  const isPointing = words.some(({ mayPointTo }) => mayPointTo !== null)
  const text = isPointing ? 'Pattern, and what it may point to (common practice, no source)' : 'Pattern'
  return [
    { kind: 'heading', level: 3, text },
    { kind: 'list', numbered: false, entries },
  ]
}

interface FigureHeights {
  readonly map_pt: number
  readonly chart_pt: number
}

/** What the page leaves for the figures, so that everything of a wafer stands on one page: the charts yield before the map. */
function heightsOf(
  wafer: WaferAnalysis,
  sentence: string,
  below: readonly Block[],
  context: ReportContext,
): FigureHeights {
  const { width_pt, height_pt } = context
  const [map_pt, side_pt] = MAP_SHARES.map((share) => share * (width_pt - COLUMN_GAP_PT))
  const besideMap_pt = stackHeight_pt(countStack(wafer), side_pt)
  const verdict_pt = roughHeight_pt({ kind: 'paragraph', text: sentence }, width_pt)
  const room = height_pt - BESIDES_PT - verdict_pt - stackHeight_pt(below, width_pt)
  const chart_pt = Math.max(LEAST_CHART_PT, Math.min(MOST_CHART_PT, room - Math.max(LEAST_MAP_PT, besideMap_pt)))
  return { chart_pt, map_pt: Math.max(LEAST_MAP_PT, Math.min(map_pt - MAP_WIDER_PT, room - chart_pt)) }
}

function stackHeight_pt(blocks: readonly Block[], width_pt: number): number {
  return blocks.reduce((sum, block) => sum + roughHeight_pt(block, width_pt), 0)
}

/** Rather high than low; whoever sets the page measures. */
function roughHeight_pt(block: Block, width_pt: number): number {
  const linesOf = (text: string, size: number) => Math.max(1, Math.ceil(wordsWidth_pt(text, size) / width_pt))
  switch (block.kind) {
    case 'heading':
      return HEADING_PT
    case 'key-values':
      return 4 + keyValuesHeight_pt(block.entries, width_pt)
    case 'list':
      return 4 + block.entries.reduce((sum, entry) => sum + 2 + LINE_PT * linesOf(entry, TEXT_PT), 0)
    case 'paragraph':
      return 4 + (block.quiet ? SMALL_LINE_PT * linesOf(block.text, SMALL_PT) : LINE_PT * linesOf(block.text, TEXT_PT))
    case 'columns': {
      const widths = columnWidths_pt(block, width_pt)
      return Math.max(...block.columns.map((stack, i) => stackHeight_pt(stack, widths[i])))
    }
    default:
      return 0
  }
}

function keyValuesHeight_pt(entries: readonly KeyValue[], width_pt: number): number {
  const keys = Math.max(0, ...entries.map(({ key }) => wordsWidth_pt(key, TEXT_PT)))
  const room = width_pt - Math.min(0.5 * width_pt, keys + 10)
  return entries.reduce((sum, entry) => sum + rowHeight_pt(entry, room), 0)
}

function rowHeight_pt({ value, note = '' }: KeyValue, room: number): number {
  const valueWidth = wordsWidth_pt(value, TEXT_PT)
  const lines = Math.max(1, Math.ceil(valueWidth / room))
  const last = valueWidth - (lines - 1) * room
  const isNoteBelow = note !== '' && last + 7 + wordsWidth_pt(note, SMALL_PT) > room
  return LINE_PT * (lines + (isNoteBelow ? 1 : 0))
}

function wordsWidth_pt(words: string, size_pt: number): number {
  return WORDS_SHARE * labelWidth_pt(words, size_pt)
}
