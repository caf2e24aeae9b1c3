/** Everything that is made of an analysis: result.json, the tables, a working, the report and its figures. */
import { diesCsv, sitesCsv } from '../../core/analysis/export-csv'
import { formulaSources } from '../../core/analysis/formula-sources'
import type { LotAnalysis } from '../../core/analysis/lot-analysis'
import { reportSite } from '../../core/analysis/report-site'
import { resultJson } from '../../core/analysis/result-json'
import { siteWorking } from '../../core/analysis/site-working'
import type { Drawing } from '../../core/report/drawing'
import { lotReport } from '../../core/report/lot-report'
import { toSvg } from '../../core/report/to-svg'
import { require, type Words } from './sound-result'

export function checkOutputs(analysis: LotAnalysis, words: Words): void {
  checkJson(resultJson(analysis, { program: 'persquare', version: '0' }), words)
  const sites = sitesCsv(analysis)
  const dies = diesCsv(analysis)
  words.check(sites, 'sites.csv')
  words.check(dies, 'dies.csv')
  checkTable(sites, 17)
  checkTable(dies, analysis.quantity.id === 'resistivity' ? 12 : 10)
  checkWorkings(analysis, words)
  checkReport(analysis, words)
}

function checkJson(text: string, words: Words): void {
  words.check(text.replace(/\bnull\b/g, '0'), 'result.json')
  const result = JSON.parse(text) as { format: string }
  require(result.format === 'persquare-result/1', () => 'format')
  walk(result, '', {})
}

function walk(value: unknown, path: string, parent: Readonly<Record<string, unknown>>): void {
  if (value === null) {
    require(mayBeNull(path, parent), () => `null at ${path} in ${JSON.stringify(parent).slice(0, 300)}`)
  }
  if (typeof value !== 'object' || value === null) return
  for (const [key, entry] of Object.entries(value)) {
    const step = Array.isArray(value) ? `[${key}]` : path === '' ? key : `.${key}`
    walk(entry, path + step, value as Record<string, unknown>)
  }
}

/** Parts that hold what the input has or what a site count gives; a null among them must have a reason. */
const SELDOM_NULL =
  /^(format|program|inputs|procedure|defaultsUsed|notes|quantity)\b|\.(statistics|verdict|reasons|id|name|meanStandardUncertainty|sites\w*)\b/

function mayBeNull(path: string, parent: Readonly<Record<string, unknown>>): boolean {
  if (!SELDOM_NULL.test(path)) return true
  const count = parent['count']
  if (/\.statistics\.\w+$/.test(path)) {
    return count === 0 || (count === 1 && /\.(standardDeviation|nonuniformityPercent)$/.test(path))
  }
  if (path.endsWith('.percent')) return true
  if (path.endsWith('.meanStandardUncertainty')) return (parent['statistics'] as { count: number }).count === 0
  return false
}

/** Every line holds as many cells, and no unquoted cell would be run as a formula. */
export function checkTable(text: string, width: number): void {
  let cells = 1
  let isOpen = false
  let begin = 0
  for (let at = 0; at < text.length; at++) {
    const sign = text[at]
    if (sign === '"') isOpen = !isOpen
    if (isOpen || (sign !== ',' && sign !== '\n')) continue
    checkCell(text.slice(begin, at))
    begin = at + 1
    if (sign === ',') cells++
    else {
      require(cells === width, () => `${cells} cells of ${width}`)
      cells = 1
    }
  }
  require(!isOpen && text.endsWith('\n'), () => 'the table ends inside a cell')
}

function checkCell(cell: string): void {
  const content = cell.startsWith('"') ? cell.slice(1) : cell
  const isNumber = /^-?\d+(\.\d+)?(e[+-]\d+)?$/.test(content)
  require(isNumber || !/^[=+\-@\t\r]/.test(content), () => `formula: ${cell}`)
}

function checkWorkings(analysis: LotAnalysis, words: Words): void {
  const { count } = analysis.sites
  for (const site of new Set([0, count >> 1, count - 1])) {
    if (site < 0 || site >= count) continue
    const { steps, budget } = siteWorking(analysis, site)
    // Where the layer has no such value the first step that seeks it says so, and the rest are dashes.
    let isNone = !(analysis.sites.value[site] > 0)
    for (const step of steps) {
      isNone ||= step.formula.startsWith('none: ')
      words.check([step.symbol, step.title, step.formula, step.source].join(' '), 'working')
      require(isNone || Number.isFinite(step.value), () => `working: ${step.symbol} is ${step.value}, ${step.formula}`)
      require(step.u >= 0 || Number.isNaN(step.u), () => `working: u of ${step.symbol} is ${step.u}`)
    }
    for (const { share, relative } of budget) {
      require(isNone || (share >= 0 && share <= 1 && relative >= 0), () => `budget ${share} ${relative}`)
    }
  }
}

function checkReport(analysis: LotAnalysis, words: Words): void {
  const site = reportSite(analysis)
  const report = lotReport({
    analysis,
    working: site === null ? null : siteWorking(analysis, site),
    date: null,
    program: 'persquare 0',
    paper: 'A4',
    sources: formulaSources(analysis),
  })
  const drawings: Drawing[] = []
  collect(report, drawings, words)
  drawings.forEach((drawing, at) => checkSvg(toSvg(drawing, { idPrefix: `figure-${at}` }), words))
}

/** Visits every text of the document; figures are looked at as SVG. */
function collect(value: unknown, drawings: Drawing[], words: Words): void {
  if (typeof value === 'string') {
    if (value.trim() !== '') words.check(value, 'report')
  } else if (Array.isArray(value)) for (const entry of value) collect(entry, drawings, words)
  else if (typeof value === 'object' && value !== null) {
    if ('shapes' in value) drawings.push(value as Drawing)
    else for (const entry of Object.values(value)) collect(entry, drawings, words)
  } else if (typeof value === 'number') require(Number.isFinite(value), () => `the report holds ${value}`)
}

function checkSvg(svg: string, words: Words): void {
  words.check(svg, 'figure')
  require(!/="[^"]*(NaN|Infinity|undefined)/.test(svg), () =>
    /.{80}="[^"]*(NaN|Infinity|undefined).{40}/s.exec(svg)?.[0] ?? '')
  const open = svg.match(/<(g|clipPath|text|title|desc|svg)\b/g)?.length ?? 0
  const closed = svg.match(/<\/(g|clipPath|text|title|desc|svg)>/g)?.length ?? 0
  require(open === closed, () => `${open} elements open, ${closed} closed`)
}
