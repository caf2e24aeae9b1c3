/** How many wafers show which pattern: what several share points to the process, what one shows to that wafer. */
import { TREND_GROUP_TITLES } from '../../map/trend-terms'
import type { PatternKind } from '../../map/pattern-findings'
import { formatFixed } from '../../units/format'
import type { Block } from '../document'
import type { ReportContext } from '../report-context'

const TITLES: Readonly<Record<PatternKind, string>> = {
  ...TREND_GROUP_TITLES,
  'edge-only': 'outermost ring alone',
  'single-site': 'single site',
  nothing: 'no pattern',
}

interface Seen {
  readonly kind: PatternKind
  readonly wafers: string[]
  readonly shares: number[]
  readonly mayPointTo: string | null
}

/** One line a pattern, that of the most wafers first; nothing where none could be looked for. */
export function lotPatternsSection(context: ReportContext): Block[] {
  const looked = context.wafers.filter((wafer) => context.detailsOf(wafer).patterns !== null)
  if (looked.length < 2) return []
  const seen = [...patternsSeen(context).values()].sort((a, b) => b.wafers.length - a.wafers.length)
  const names = looked.map(({ id }) => id)
  return [
    { kind: 'heading', level: 2, text: 'Patterns' },
    { kind: 'list', numbered: false, entries: seen.map((each) => lineOf(each, names)) },
    { kind: 'paragraph', text: NOTE, quiet: true },
  ]
}

const NOTE = 'A pattern is told where its shapes of a trend surface (Zernike polynomials, a single outlying site set aside) explain more than 20 % of a wafer’s variance, beyond noise at 1 % significance. What it may point to is common practice, no source: where to look first, no verdict.' // prettier-ignore

function patternsSeen(context: ReportContext): Map<PatternKind, Seen> {
  const seen = new Map<PatternKind, Seen>()
  for (const wafer of context.wafers) {
    const { patterns, words } = context.detailsOf(wafer)
    patterns?.findings.forEach(({ kind, share }, i) => {
      const entry = seen.get(kind) ?? { kind, wafers: [], shares: [], mayPointTo: words[i].mayPointTo }
      entry.wafers.push(wafer.id)
      entry.shares.push(share)
      seen.set(kind, entry)
    })
  }
  return seen
}

/** "Bowl in 23 of 25 wafers: all but 13 and 19 (32 to 92 % of the variance). May point to ..." */
function lineOf({ kind, wafers, shares, mayPointTo }: Seen, all: readonly string[]): string {
  const title = `${TITLES[kind].charAt(0).toUpperCase()}${TITLES[kind].slice(1)}`
  const cause = mayPointTo === null ? '' : ` ${mayPointTo}`
  const share = kind === 'nothing' ? '' : ` (${sharesWords(shares)} % of the variance)`
  return `${title} in ${wafers.length} of ${all.length} wafers: ${wafersWords(wafers, all)}${share}.${cause}`
}

function sharesWords(shares: readonly number[]): string {
  const [least, most] = [Math.min(...shares), Math.max(...shares)].map((share) => formatFixed(100 * share, 0))
  return least === most ? least : `${least} to ${most}`
}

const MOST_NAMES = 12

function wafersWords(wafers: readonly string[], all: readonly string[]): string {
  const others = all.filter((id) => !wafers.includes(id))
  if (others.length === 0) return 'all'
  if (others.length < wafers.length && others.length <= MOST_NAMES) return `all but ${listed(others)}`
  const rest = wafers.length - MOST_NAMES
  return rest > 0 ? `${wafers.slice(0, MOST_NAMES).join(', ')} and ${rest} more` : listed(wafers)
}

function listed(names: readonly string[]): string {
  return names.length < 2 ? names.join('') : `${names.slice(0, -1).join(', ')} and ${names[names.length - 1]}`
}
