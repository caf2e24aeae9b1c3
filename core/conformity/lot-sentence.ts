/** The lot's verdict in one sentence, as a person would say it across the room. */
import { formatSignificant } from '../units/format'
import type { Statistics } from '../statistics/summarize'
import type { WaferJudgement } from './judge-wafer'
import { hasLimits, sideOf } from './limits'
import { NO_LIMITS, judgedSites, plural, waferName } from './reasons'
import type { Verdict } from './verdict'

/** More wafers than these are counted, not named. */
const NAMED_WAFERS = 3

export interface LotToTell {
  readonly lot: string
  readonly verdict: Verdict
  readonly wafers: readonly WaferJudgement[]
  /** Over wafer means. */
  readonly statistics: Statistics
  readonly unit: string
}

/**
 * "TB-0417 is out of spec: wafer 07 reads high at the edge (43 of 49 sites in, mean 93.1 Ω/sq, 2.4 % spread);
 * 24 wafers are in spec." Spread is 100 s / mean.
 */
export function lotSentence({ lot, verdict, wafers, statistics, unit }: LotToTell): string {
  const mean = Number.isNaN(statistics.mean) ? '' : `mean ${formatSignificant(statistics.mean, 4)} ${unit}`
  switch (verdict) {
    case 'out-of-spec':
      return `${lot} is out of spec: ${trouble(wafers, unit)}.`
    case 'undecided':
      return `${lot} is undecided: ${trouble(wafers, unit)}.`
    case 'in-spec': {
      const all = wafers.length === 1 ? waferName(wafers[0].id) : `all ${wafers.length} wafers`
      return `${lot} is in spec: ${all}${mean && `, ${mean}`}.`
    }
    case 'not-assessed': {
      const why = wafers.length === 0 ? 'no wafer has readings' : NO_LIMITS
      return `${lot} was not assessed: ${why}${mean && ` (${plural(wafers.length, 'wafer')}, ${mean})`}.`
    }
  }
}

function trouble(wafers: readonly WaferJudgement[], unit: string): string {
  const out = wafers.filter((wafer) => wafer.verdict === 'out-of-spec').sort(worstFirst)
  const unsettled = wafers.filter((wafer) => wafer.verdict === 'undecided' || wafer.verdict === 'not-assessed')
  const named = (out.length > 0 ? out : unsettled).slice(0, NAMED_WAFERS)
  const parts = [
    listed(named.map((wafer) => (wafer.verdict === 'out-of-spec' ? outPhrase(wafer, unit) : unsettledPhrase(wafer)))),
    more(out.length, named, 'out of spec'),
    more(unsettled.length, out.length > 0 ? [] : named, 'undecided'),
    more(wafers.length - out.length - unsettled.length, [], 'in spec'),
  ]
  return parts.filter((part) => part !== '').join('; ')
}

/** "24 wafers are in spec", "2 more wafers are out of spec"; nothing where all of them are named already. */
function more(count: number, named: readonly WaferJudgement[], state: string): string {
  const rest = count - named.length
  if (rest <= 0) return ''
  const word = named.length > 0 ? 'more wafer' : 'wafer'
  return `${plural(rest, word)} ${rest === 1 ? 'is' : 'are'} ${state}`
}

function outPhrase(wafer: WaferJudgement, unit: string): string {
  const { statistics, findings, limits } = wafer
  const judged = judgedSites(findings)
  const inside = `${findings.counts['in-spec']} of ${plural(judged, 'site')} in`
  const figures = [
    hasLimits(limits.site) ? inside : plural(statistics.count, 'site'),
    `mean ${formatSignificant(statistics.mean, 3)} ${unit}`,
  ]
  const spread = statistics.nonuniformityPercent
  if (!Number.isNaN(spread)) figures.push(`${formatSignificant(spread, 2)} % spread`)
  return `${waferName(wafer.id)} ${whatIsWrong(wafer)} (${figures.join(', ')})`
}

function whatIsWrong({ deciding, findings, statistics, limits }: WaferJudgement): string {
  const first = deciding[0]?.about
  if (first === 'sites') {
    const sides = findings.below === 0 ? 'high' : findings.above === 0 ? 'low' : 'both high and low'
    if (findings.above + findings.below === 1) return `has one ${sides} site`
    return `reads ${sides}${findings.outOnlyAtEdge ? ' at the edge' : ''}`
  }
  if (first === 'mean') return `has a ${sideOf(statistics.mean, limits.mean!) === 'above' ? 'high' : 'low'} mean`
  return 'is not uniform enough'
}

function unsettledPhrase({ id, verdict }: WaferJudgement): string {
  return `${waferName(id)} ${verdict === 'undecided' ? "can't be decided" : 'has no usable reading'}`
}

function worstFirst(a: WaferJudgement, b: WaferJudgement): number {
  const sitesOut = b.findings.counts['out-of-spec'] - a.findings.counts['out-of-spec']
  const beyond = beyondMeanLimit(b) - beyondMeanLimit(a)
  return sitesOut || beyond || spreadOf(b) - spreadOf(a)
}

function spreadOf({ statistics }: WaferJudgement): number {
  return Number.isNaN(statistics.nonuniformityPercent) ? 0 : statistics.nonuniformityPercent
}

function beyondMeanLimit({ statistics, limits }: WaferJudgement): number {
  const { lower = -Infinity, upper = Infinity } = limits.mean ?? {}
  return Math.max(0, statistics.mean - upper, lower - statistics.mean)
}

/** "a", "a and b", "a, b and c". */
function listed(phrases: readonly string[]): string {
  if (phrases.length < 2) return phrases.join('')
  return `${phrases.slice(0, -1).join(', ')} and ${phrases[phrases.length - 1]}`
}
