/** The words in which a verdict on a wafer is given. Numbers come with their units and enough digits to tell them from the limit. */
import { formatNumber, formatScientific, formatSignificant } from '../units/format'
import type { SiteFindings } from './judge-sites'
import type { Limits } from './limits'

export const NO_LIMITS = 'the procedure sets no limits'

/** "1 site", "49 sites". */
export function plural(count: number, noun: string): string {
  return `${count} ${noun}${count === 1 ? '' : 's'}`
}

/** "wafer 07"; a label that says "wafer" already is left as it is. */
export function waferName(id: string): string {
  return /^wafer\b/i.test(id) ? id : `wafer ${id}`
}

/** "87 to 97 Ω/sq", "at least 87 Ω/sq", "at most 97 Ω/sq": what is inside the limits. */
export function limitsText({ lower, upper }: Limits, unit: string): string {
  if (lower !== undefined && upper !== undefined) return `${asWritten(lower)} to ${asWritten(upper)} ${unit}`
  if (lower !== undefined) return `at least ${asWritten(lower)} ${unit}`
  if (upper !== undefined) return `at most ${asWritten(upper)} ${unit}`
  return 'no limits'
}

/** "6 of 49 sites outside 87 to 97 Ω/sq (all above), 2 allowed"; "no site outside ..." where none is. */
export function sitesReason({
  findings,
  limits,
  unit,
  allowed,
}: {
  readonly findings: SiteFindings
  readonly limits: Limits
  readonly unit: string
  readonly allowed: number
}): string {
  const judged = judgedSites(findings)
  const out = findings.counts['out-of-spec']
  if (out === 0) return `${judged} of ${plural(judged, 'site')} inside ${limitsText(limits, unit)}`
  const allowance = allowed > 0 ? `, ${allowed} allowed` : ''
  return `${out} of ${plural(judged, 'site')} ${outside(findings, limits, unit)}${allowance}`
}

/** "mean 98.21 Ω/sq above the limit of 95 Ω/sq"; "mean 93.10 Ω/sq inside 89 to 95 Ω/sq". */
export function meanReason(
  mean: number,
  side: 'below' | 'inside' | 'above' | null,
  limits: Limits,
  unit: string,
): string {
  const limit = side === 'below' ? limits.lower : side === 'above' ? limits.upper : undefined
  if (limit === undefined) return `mean ${formatNumber(mean, unit)} ${unit} inside ${limitsText(limits, unit)}`
  return `mean ${apartFrom(limit, mean, unit)} ${unit} ${side} the limit of ${asWritten(limit)} ${unit}`
}

/** "mean 94.61 Ω/sq in the guard band: inside 89 to 95 Ω/sq, and accepted only inside 89.42 to 94.58 Ω/sq". */
export function meanUndecidedReason(mean: number, accepted: Limits, limits: Limits, unit: string): string {
  const { lower = -Infinity, upper = Infinity } = accepted
  const only =
    lower > upper ? 'too uncertain to be accepted anywhere' : `accepted only inside ${shortLimits(accepted, unit)}`
  return `mean ${formatNumber(mean, unit)} ${unit} in the guard band: inside ${limitsText(limits, unit)}, and ${only}`
}

function shortLimits({ lower, upper }: Limits, unit: string): string {
  const short = (limit: number | undefined) => (limit === undefined ? undefined : Number(limit.toPrecision(4)))
  return limitsText({ lower: short(lower), upper: short(upper) }, unit)
}

/** "non-uniformity 2.41 % above the limit of 1.5 % (100 s / mean)". */
export function uniformityReason(percent: number, upper: number, formula: string): string {
  const limit = `limit of ${asWritten(upper)} % (${formula})`
  if (percent > upper) return `non-uniformity ${apartFrom(upper, percent, '%')} % above the ${limit}`
  return `non-uniformity ${formatNumber(percent, '%')} % within the ${limit}`
}

export function uniformityUnknownReason(sites: number, formula: string): string {
  return `non-uniformity (${formula}) can't be told from ${plural(sites, 'site')}`
}

export function undecidedSitesReason(undecided: number, judged: number): string {
  return `${undecided} of ${plural(judged, 'site')} undecided, in the guard band`
}

/** "1 of 49 sites has no usable reading". */
export function missingSitesReason(missing: number, sites: number): string {
  return `${missing} of ${plural(sites, 'site')} ${missing === 1 ? 'has' : 'have'} no usable reading`
}

/** Sites that got a verdict. */
export function judgedSites({ counts }: SiteFindings): number {
  return counts['in-spec'] + counts['out-of-spec'] + counts.undecided
}

function outside({ above, below }: SiteFindings, limits: Limits, unit: string): string {
  if (limits.lower === undefined) return `above ${asWritten(limits.upper!)} ${unit}`
  if (limits.upper === undefined) return `below ${asWritten(limits.lower)} ${unit}`
  const all = above + below > 1 ? 'all ' : ''
  const sides = below === 0 ? `${all}above` : above === 0 ? `${all}below` : `${above} above, ${below} below`
  return `outside ${limitsText(limits, unit)} (${sides})`
}

/** A limit with the digits it was given with: 87 stays 87. One that means "none", such as 1e300, keeps its power of ten. */
function asWritten(limit: number): string {
  const [mantissa = ''] = Math.abs(limit).toExponential().split('e')
  const digits = mantissa.replace('.', '').length
  if (Math.abs(limit) >= 1e15 || Math.abs(limit) < 1e-6) return formatScientific(limit, digits)
  return formatSignificant(limit, Math.max(digits, wholeDigits(limit)))
}

function wholeDigits(value: number): number {
  return Math.abs(value) >= 1 && Number.isInteger(value) ? Math.floor(Math.log10(Math.abs(value))) + 1 : 1
}

/** A value outside a limit, with more digits than usual where it would otherwise read the same as the limit. */
function apartFrom(limit: number, value: number, unit: string): string {
  const usual = formatNumber(value, unit)
  if (usual !== formatNumber(limit, unit)) return usual
  for (let digits = 3; digits < 17; digits++) {
    const text = formatSignificant(value, digits)
    if (text !== formatSignificant(limit, digits)) return text
  }
  return String(value)
}
