/** `persquare uncertainty`: the budget of one site of a lot, held against a Monte Carlo calculation. */
import type { LotAnalysis } from '../../core/analysis/lot-analysis'
import { reportSite } from '../../core/analysis/report-site'
import { run } from '../../core/analysis/run'
import { siteWorking } from '../../core/analysis/site-working'
import { splitByEffect } from '../../core/analysis/uncertainty-budget'
import { budgetObject } from '../../core/analysis/trust-objects'
import type { Working } from '../../core/analysis/working'
import { waferName } from '../../core/conformity/reasons'
import { checkSite, DEFAULT_SEED, DEFAULT_TRIALS, type SiteCheck } from '../../core/monte-carlo/check-site'
import { formatFixed, formatQuantity, formatSignificant } from '../../core/units/format'
import { numberOf, refuse } from './convert-arguments'
import { jsonText } from './json-text'
import { oneFile } from './one-file'
import { printProblems } from './print-problems'
import { readCompanions } from './read-companions'
import { readInput } from './read-inputs'
import { alignedNumbers } from './text-table'

const OPTIONS = {
  procedure: { type: 'string' },
  wafer: { type: 'string' },
  site: { type: 'string' },
  trials: { type: 'string' },
  seed: { type: 'string' },
  json: { type: 'boolean' },
} as const

export async function uncertaintyCommand(args: readonly string[]): Promise<number> {
  const { path: csv, given } = oneFile(args, OPTIONS, "the lot's CSV file")
  const path = given.procedure ?? refuse('--procedure', 'name the procedure (JSON) with the components of uncertainty')
  const readings = await readInput(csv)
  const procedure = await readInput(path)
  const { analysis, problems } = run({
    readings: [readings],
    procedure,
    companions: await readCompanions(path, procedure),
  })
  printProblems(problems)
  if (!analysis) return 2
  const site = siteNamed(analysis, given.wafer, given.site)
  const trials = numberOf('trials', given.trials ?? String(DEFAULT_TRIALS))
  const seed = numberOf('seed', given.seed ?? String(DEFAULT_SEED))
  const working = siteWorking(analysis, site)
  const check = checkSite(analysis, site, { trials, seed })
  process.stdout.write(given.json ? jsonText(uncertaintyObject(working, check)) : uncertaintyText(working, check))
  return check.agreement.isFirstOrderEnough ? 0 : 1
}

function siteNamed(analysis: LotAnalysis, waferId: string | undefined, siteName: string | undefined): number {
  const { wafers, readings } = analysis
  const usual = reportSite(analysis) ?? refuse('FILE', 'no site of it has a value')
  const usualId = readings.wafers[readings.wafer[usual]].id
  const wafer = wafers.find(({ id }) => id === (waferId ?? usualId))
  if (!wafer) return refuse('--wafer', `there is no wafer "${waferId}"; there are ${wafers.map(({ id }) => id).join(', ')}`)
  if (siteName === undefined) return wafer.id === usualId ? usual : wafer.sites[0]
  const row = wafer.sites.find((i) => readings.siteNames[readings.site[i]] === siteName)
  return row ?? refuse('--site', `${waferName(wafer.id)} has no site "${siteName}"`)
} // prettier-ignore

function uncertaintyObject(working: Working, { unit, firstOrder, monteCarlo, agreement }: SiteCheck): object {
  return {
    format: 'persquare-uncertainty/1',
    ...budgetObject(working),
    unit,
    firstOrder,
    monteCarlo: { ...monteCarlo, sorted: undefined, source: 'JCGM 101:2008' },
    agreement,
  }
}

function uncertaintyText(working: Working, { unit, firstOrder, monteCarlo: drawn, agreement }: SiteCheck): string {
  const { wafer, site, budget, expanded } = working
  const percent = (share: number): string => formatSignificant(100 * share, 2)
  const freedom = (degrees: number): string => (degrees >= 1e6 ? '∞' : formatFixed(degrees, 0))
  const { listed, idle } = splitByEffect(budget)
  const rows = listed.map((line) => [
    line.title,
    line.unit === '' ? `${percent(line.u)} %` : `${formatSignificant(line.u, 2)} ${line.unit}`,
    line.evaluation,
    freedom(line.degreesOfFreedom),
    percent(line.relative),
    formatFixed(100 * line.share, 1),
    line.shared ? 'the same' : 'new',
  ])
  const combined = ['combined', '', '', freedom(expanded.effectiveDegreesOfFreedom), percent(expanded.standard), '', '']
  const quantity = (value: number): string => formatQuantity(value, unit)
  const { value, standardUncertainty: u, expandedUncertainty: half } = firstOrder
  return [
    `Site ${site} of ${waferName(wafer)}: ${quantity(value)} ± ${quantity(expanded.expanded * value)} (k = ${formatFixed(expanded.coverageFactor, 2)}, ${formatFixed(100 * expanded.level, 0)} %)`,
    '',
    ...alignedNumbers([['component', 'u', 'type', 'df', 'effect %', 'of variance %', 'at all sites'], ...rows, combined]),
    ...(idle.length > 0 ? [`without effect there: ${idle.map(({ title }) => title).join('; ')}`] : []),
    '',
    ...alignedNumbers([
      ['', 'value', 'u', 'from', 'to'],
      ['first order', ...[value, u, value - half, value + half].map(quantity)],
      [`${formatFixed(drawn.trials, 0)} draws`, ...[drawn.mean, drawn.standardUncertainty, drawn.interval.lower, drawn.interval.upper].map(quantity)],
    ]),
    '',
    agreement.sentence,
    '',
  ].join('\n')
} // prettier-ignore
