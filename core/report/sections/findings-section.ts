/** What the reader must know before signing: what is out of spec, what was wrong with the readings, what was assumed. */
import { explain } from '../../problems/explain'
import type { Problem } from '../../problems/problem'
import { formatFixed, formatMm, formatSignificant, formatWithUncertainty } from '../../units/format'
import type { Block, TableRow } from '../document'
import { waferMeans } from '../figures/wafer-means'
import { markOf } from '../figures/marks'
import { VERDICTS } from '../../analysis/lot-analysis'
import type { VarianceComponent } from '../../statistics/components-of-variance'
import { lotMapsSection } from './lot-maps'
import { lotPatternsSection } from './lot-patterns'
import { reasonsOf, VERDICT_WORDS, waferMarkOf, waferTitle, type ReportContext } from '../report-context'

export function findingsSection(context: ReportContext): Block[] {
  return [
    { kind: 'heading', level: 1, text: 'Findings', aside: context.analysis.lot.name },
    ...outOfSpec(context),
    ...meansFigure(context),
    ...lotMapsSection(context),
    ...lotPatternsSection(context),
    ...mustKnow(context),
    { kind: 'heading', level: 2, text: 'Cautions' },
    { kind: 'list', numbered: false, entries: CAUTIONS },
    signature,
  ]
}

const CAUTIONS = [
  "These results support a decision. They don't replace the site's own release procedure, nor the judgement of those it licenses to release.",
  'Every probed site carries the marks of the pins; a probed wafer is a monitor, not a product.',
  "An oxide that is stripped before probing means hydrofluoric acid, and wafers doped with arsenic or phosphorus need handling of their own: the site's safety rules come first.",
]

const signature: Block = {
  kind: 'signature',
  statement: 'Decision by the responsible person, who has read the verdict, the findings and the cautions above.',
  choices: ['Release', 'Hold', 'Reject', 'Measure again'],
  fields: ['Name', 'Signature', 'Date'],
}

function outOfSpec(context: ReportContext): Block[] {
  const noted = context.wafers.filter((wafer) => wafer.verdict !== 'in-spec')
  const title: Block = { kind: 'heading', level: 2, text: 'What is out of spec' }
  if (noted.length === 0) return [title, { kind: 'paragraph', text: 'Nothing: every wafer is in spec.' }]
  const shown = noted.slice(0, MOST_WAFERS)
  const rows = shown.map((wafer): TableRow => {
    const mark = waferMarkOf(wafer, context)
    const dies = wafer.dieCounts ? `; ${plural(wafer.dieCounts['out-of-spec'], 'die')} out of spec` : ''
    const cells = [waferTitle(wafer.id), VERDICT_WORDS[wafer.verdict], `${reasonsOf(wafer).join('; ')}${dies}`]
    return { cells, ...(mark && { mark, markColumn: 1 }) }
  })
  const rest = noted.length - shown.length
  return [
    title,
    {
      kind: 'table',
      summary: 'Wafers that are not in spec, with the reasons',
      columns: [
        { title: 'Wafer', align: 'left', share: 1 },
        { title: 'Verdict', align: 'left', share: 1 },
        { title: 'Why', align: 'left', share: 5 },
      ],
      rows,
    },
    ...(rest > 0 ? [quiet(`${plural(rest, 'more wafer')}: see the table of wafers.`)] : []),
    ...sitesOut(context),
  ]
}

const MOST_WAFERS = 30
const MOST_SITES = 12

/** The sites farthest outside their limits, worst first. */
function sitesOut(context: ReportContext): Block[] {
  const { analysis, siteLimits } = context
  const { sites, readings, quantity } = analysis
  const out: number[] = []
  for (let i = 0; i < sites.count; i++) if (VERDICTS[sites.verdict[i]] === 'out-of-spec') out.push(i)
  if (out.length === 0) return []
  const beyond = (i: number) => Math.max(sites.value[i] - siteLimits.upper || 0, siteLimits.lower - sites.value[i] || 0)
  const worst = [...out].sort((a, b) => beyond(b) - beyond(a) || a - b).slice(0, MOST_SITES)
  const positions = worst.map((i) => positionOf(context, i))
  const rows = worst.map((i, at): TableRow => ({
    cells: [
      readings.wafers[readings.wafer[i]]!.id,
      readings.siteNames[readings.site[i]] ?? '',
      ...positions[at],
      '',
      formatWithUncertainty(sites.value[i], sites.u[i], quantity.unit),
      formatFixed(100 * sites.conformanceProbability[i], 1),
      '',
    ],
    mark: markOf(sites.verdict[i], sites.value[i], siteLimits),
    markColumn: 5,
  }))
  const rest = out.length - worst.length
  return [
    { kind: 'heading', level: 3, text: 'Sites out of spec, the farthest first' },
    {
      kind: 'table',
      summary: 'Sites out of spec',
      columns: [
        { title: 'Wafer', align: 'left', share: 1 },
        { title: 'Site', align: 'left', share: 1 },
        { title: 'x', unit: 'mm', align: 'decimal', share: 0.7 },
        { title: 'y', unit: 'mm', align: 'decimal', share: 0.9 },
        { title: '', align: 'left', share: 0.3 },
        { title: quantity.title, align: 'left', share: 2.2 },
        { title: 'Probability to conform', unit: '%', align: 'decimal', share: 1.6 },
        { title: '', align: 'left', share: 1.2 },
      ],
      rows,
    },
    ...(rest > 0
      ? [quiet(`${plural(rest, 'more site')} out of spec: see sites.csv and the pages of the wafers.`)]
      : []),
  ]
}

function positionOf(context: ReportContext, site: number): readonly [string, string] {
  const { positions } = context
  const mm = (value: number) => formatMm(value).replace(/ mm$/, '')
  return positions ? [mm(positions.x_mm[site]), mm(positions.y_mm[site])] : ['–', '–']
}

function meansFigure(context: ReportContext): Block[] {
  const { wafers, analysis } = context
  if (wafers.length < 2 || wafers.length > 400) return []
  const figure = waferMeans({
    title: 'Wafer means in slot order',
    quantity: analysis.quantity,
    names: wafers.map((wafer) => wafer.id),
    mean: wafers.map((wafer) => wafer.statistics.mean),
    spread: wafers.map((wafer) => wafer.statistics.standardDeviation),
    verdict: wafers.map((wafer) => VERDICTS.indexOf(wafer.verdict)),
    limits: context.meanLimits,
    width_pt: context.width_pt,
    height_pt: 150,
  })
  return [
    { kind: 'heading', level: 2, text: 'Wafer means' },
    { kind: 'figures', figures: [figure] },
    { kind: 'key-values', columns: 2, entries: lotStatistics(context) },
  ]
}

function lotStatistics({ analysis }: ReportContext): { key: string; value: string; note?: string }[] {
  const { statistics: s, varianceComponents: v } = analysis.lot
  const { unit } = analysis.quantity
  return [
    { key: 'Mean of wafer means', value: formatWithUncertainty(s.mean, NaN, unit) },
    { key: 'Their standard deviation', value: formatWithUncertainty(s.standardDeviation, NaN, unit) },
    ...(v
      ? [
          {
            key: 'Within a wafer, s',
            value: formatWithUncertainty(v.withinWafer.standardDeviation, NaN, unit),
            note: intervalWords(v.withinWafer),
          },
          {
            key: 'Between wafers, s',
            value: betweenWords(v.betweenWafers, unit),
            note: intervalWords(v.betweenWafers),
          },
        ]
      : []),
  ]
}

/** "95 %: 0.54 to 1.01". */
function intervalWords({ interval: { level, lower, upper } }: VarianceComponent): string {
  return `${Number((100 * level).toPrecision(6))} %: ${formatSignificant(lower, 3)} to ${formatSignificant(upper, 3)}`
}

/** A negative variance component is left negative: the wafers differ less than their sites let expect. */
function betweenWords(
  { variance, standardDeviation }: { variance: number; standardDeviation: number },
  unit: string,
): string {
  return variance < 0 ? 'none: the variance comes out negative' : formatWithUncertainty(standardDeviation, NaN, unit)
}

function mustKnow({ analysis }: ReportContext): Block[] {
  const { problems, notes, defaults } = analysis
  const blocks: Block[] = [{ kind: 'heading', level: 2, text: 'What the reader must know' }]
  if (problems.length === 0) blocks.push({ kind: 'paragraph', text: 'No problems were found in the readings.' })
  else blocks.push(...problemList(problems))
  if (notes.length > 0) blocks.push({ kind: 'list', numbered: false, entries: notes })
  if (defaults.length > 0) {
    const list = defaults.map(({ key, value }) => `${key} = ${value.replaceAll('"', '')}`).join('; ')
    blocks.push(quiet(`Defaults used where the procedure says nothing: ${list}.`))
  }
  return blocks
}

const MOST_PROBLEMS = 24

function problemList(problems: readonly Problem[]): Block[] {
  const entries = problems.slice(0, MOST_PROBLEMS).map((problem) => explain(problem))
  const rest = problems.length - entries.length
  return [
    { kind: 'list', numbered: true, entries },
    ...(rest > 0 ? [quiet(`${plural(rest, 'more problem')}, all of them listed in result.json.`)] : []),
  ]
}

function quiet(text: string): Block {
  return { kind: 'paragraph', text, quiet: true }
}

export function plural(count: number, noun: string): string {
  return `${count} ${noun}${count === 1 ? '' : 's'}`
}
