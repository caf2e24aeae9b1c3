/** The report's first page: what was measured, what came of it, and every wafer in a line. */
import { plural } from '../../conformity/reasons'
import type { LotAnalysis } from '../../analysis/lot-analysis'
import type { Block, KeyValue, TableBlock, TableColumn, TableRow } from '../document'
import { DECISIONS } from '../decision'
import { lotStrip } from '../figures/lot-strip'
import { formatLimit } from '../figures/map-legend'
import type { SiteLimits } from '../figures/marks'
import { lotMarkOf, VERDICT_WORDS, waferMarkOf, type ReportContext } from '../report-context'
import { formatFixed, formatNumber, formatSignificant, NO_VALUE } from '../../units/format'
import { layerColumnOf, layerWords } from './layer-words'

export function summarySection(context: ReportContext): Block[] {
  const { analysis, input } = context
  return [
    {
      kind: 'heading',
      level: 1,
      text: `Lot ${analysis.lot.name}`,
      aside: writtenDate(input.date),
      bookmark: 'Summary',
    },
    {
      kind: 'verdict',
      word: VERDICT_WORDS[analysis.lot.verdict],
      mark: lotMarkOf(context),
      sentence: analysis.lot.sentence,
    },
    ...decisionOf(context),
    { kind: 'key-values', columns: 2, entries: measured(context) },
    ...strip(context),
    { kind: 'heading', level: 2, text: 'Wafers' },
    wafersTable(context),
  ]
}

/** Beside the rules' verdict, which stays as it is. */
function decisionOf({ input: { decision } }: ReportContext): Block[] {
  if (!decision) return []
  const by = [decision.name.trim() || 'unnamed', writtenDate(decision.date)].join(', ')
  const comment = decision.comment.trim()
  const entries: KeyValue[] = [
    { key: 'Decision', value: DECISIONS[decision.decision], note: by },
    ...(comment === '' ? [] : [{ key: 'Comment', value: comment.replace(/\s+/g, ' ') }]),
  ]
  return [{ kind: 'key-values', columns: 1, entries }]
}

/** 2026-03-14 09:30 +01:00: the time as given, without its seconds. */
export function writtenDate(date: string | null): string {
  if (date === null) return 'undated'
  return date
    .replace(/T(\d\d:\d\d)(:\d\d(\.\d+)?)?/, ' $1 ')
    .replace(/ Z$/, ' UTC')
    .trim()
}

function measured({ analysis, siteLimits, meanLimits, input }: ReportContext): KeyValue[] {
  const { procedure, readings, quantity, sites } = analysis
  const { uniformityPercent, allowedSitesOut } = procedure.limits
  const withValue = sites.value.reduce((count, value) => (Number.isNaN(value) ? count : count + 1), 0)
  const files = readings.files.map((file) => file.name)
  return [
    { key: 'Judged', value: `${quantity.title}, ${quantity.unit}` },
    { key: 'Site limits', value: limitsWords(siteLimits, quantity.unit) },
    { key: 'Procedure', value: procedure.title || NO_VALUE },
    { key: 'Wafer mean limits', value: limitsWords(meanLimits, quantity.unit) },
    { key: 'Layer', value: layerWords(procedure.layer) },
    {
      key: 'Non-uniformity',
      value: uniformityPercent ? `at most ${formatLimit(uniformityPercent.upper)} %` : 'no limit',
      ...(uniformityPercent && { note: formulaOf(analysis, uniformityPercent.definition) }),
    },
    { key: 'Readings', value: shortList(files, 2) },
    { key: 'Sites allowed out', value: `${allowedSitesOut} a wafer` },
    {
      key: 'Extent',
      value: `${plural(analysis.wafers.length, 'wafer')}, ${withValue} of ${sites.count} sites with a value`,
    },
    { key: 'Made by', value: input.program },
    ...measuredAt(readings.time_ms),
  ]
}

/** As it stands in the statistics, with real minus signs. */
function formulaOf({ wafers }: LotAnalysis, id: string): string {
  const definition = wafers[0]?.statistics.nonuniformity.find((each) => each.id === id)
  return definition?.formula.replaceAll('-', '−') ?? id
}

function measuredAt(times: Float64Array | null): KeyValue[] {
  let first = Infinity
  let last = -Infinity
  for (const time of times ?? []) {
    if (time < first) first = time
    if (time > last) last = time
  }
  if (!(first <= last)) return []
  const words = (time: number) => new Date(time).toISOString().slice(0, 16).replace('T', ' ')
  return [{ key: 'Measured', value: first === last ? `${words(first)} UTC` : `${words(first)} to ${words(last)} UTC` }]
}

/** "87 to 97 Ω/sq, target 92". */
export function limitsWords({ lower, upper, target }: SiteLimits, unit: string): string {
  const aim = Number.isNaN(target) ? '' : `, target ${formatLimit(target)}`
  if (Number.isNaN(lower) && Number.isNaN(upper)) return `none${aim}`
  if (Number.isNaN(lower)) return `at most ${formatLimit(upper)} ${unit}${aim}`
  if (Number.isNaN(upper)) return `at least ${formatLimit(lower)} ${unit}${aim}`
  return `${formatLimit(lower)} to ${formatLimit(upper)} ${unit}${aim}`
}

function shortList(words: readonly string[], most: number): string {
  if (words.length === 0) return NO_VALUE
  const rest = words.length - most
  return rest > 0 ? `${words.slice(0, most).join(', ')} and ${rest} more` : words.join(', ')
}

/** More than these would be a wall; the wafers have pages of their own. */
const MOST_STRIP = 60

function strip(context: ReportContext): Block[] {
  const { analysis, wafers, scale, siteLimits } = context
  if (!context.hasPositions || !scale || wafers.length < 2 || wafers.length > MOST_STRIP) return []
  const drawing = lotStrip({
    title: `Maps of lot ${analysis.lot.name}`,
    outline: analysis.outline,
    quantity: analysis.quantity,
    scale,
    limits: siteLimits,
    wafers: wafers.map((wafer) => {
      const sites = context.sitesOf(wafer)
      const contours = context.surfaceOf(sites, 'small')?.contours ?? null
      return { name: wafer.id, sites, contours, mark: waferMarkOf(wafer, context) ?? 'in-spec' }
    }),
    width_pt: context.width_pt,
  })
  return [
    { kind: 'heading', level: 2, text: 'Maps on one colour scale' },
    { kind: 'figures', figures: [drawing] },
  ]
}

function wafersTable(context: ReportContext): TableBlock {
  const { analysis, wafers } = context
  const { unit, symbol } = analysis.quantity
  const layer = layerColumnOf(analysis)
  const withSlots = wafers.some((wafer) => !Number.isNaN(wafer.slot) && Number(wafer.id) !== wafer.slot)
  const columns: TableColumn[] = [
    { title: 'Wafer', align: 'left', share: 0.9 },
    ...(withSlots ? [{ title: 'Slot', align: 'right', share: 0.6 } as const] : []),
    { title: 'Sites', align: 'right', share: 0.7 },
    { title: 'Out', align: 'right', share: 0.6 },
    { title: `Mean ${symbol}`, unit, align: 'decimal', share: 1.1 },
    { title: 'u(mean)', unit, align: 'decimal', share: 0.9 },
    { title: 's', unit, align: 'decimal', share: 0.9 },
    { title: 'Spread', unit: '%', align: 'decimal', share: 0.8 },
    { title: 'Min', unit, align: 'decimal', share: 1 },
    { title: 'Max', unit, align: 'decimal', share: 1 },
    ...(layer ? [{ title: layer.title, unit: layer.unit, align: 'decimal', share: 1.4 } as const] : []),
    { title: 'Verdict', align: 'left', share: 1.8 },
  ]
  const rows = wafers.map((wafer): TableRow => {
    const { statistics: s } = wafer
    const mark = waferMarkOf(wafer, context)
    const cells = [
      wafer.id,
      ...(withSlots ? [Number.isNaN(wafer.slot) ? NO_VALUE : String(wafer.slot)] : []),
      String(s.count),
      String(wafer.sitesOut),
      formatNumber(s.mean, unit),
      formatSignificant(wafer.uMean, 2),
      formatSignificant(s.standardDeviation, 3),
      formatFixed(s.nonuniformityPercent, 2),
      formatNumber(s.min, unit),
      formatNumber(s.max, unit),
      ...(layer ? [formatNumber(layer.mean(wafer), layer.unit)] : []),
      VERDICT_WORDS[wafer.verdict],
    ]
    return { cells, ...(mark && { mark, markColumn: cells.length - 1, emphasis: 'strong' as const }) }
  })
  return {
    kind: 'table',
    summary: `Every wafer of lot ${analysis.lot.name} with its statistics and verdict`,
    columns,
    rows,
  }
}
