/**
 * What a pattern is, in a sentence, and what it may point to. The causes are common practice, no source: where to look
 * first, never a verdict.
 */
import { formatFixed, formatPercent, formatQuantity } from '../units/format'
import type { PatternFinding, PatternFindings, PatternKind } from './pattern-findings'
import { SIGNIFICANCE, SPOKEN_SHARE } from './pattern-findings'

export interface PatternWords {
  readonly kind: PatternKind
  /** What is seen. */
  readonly sentence: string
  /** What it may point to, in one sentence; null where nothing is seen. */
  readonly mayPointTo: string | null
}

const CAUSES: Readonly<Record<PatternKind, string | null>> = {
  tilt: 'May point to the wafer tilted in the beam, to one set off centre on the chuck, or to the side of the gas inlet or pump.',
  bowl: 'May point to gas flow or temperature that changes from centre to edge, or to the profile of the plate or the deposition.',
  'higher-radial':
    'May point to zones of a heater or a plate set against each other, or to a ring of gas holes or lamps.',
  'two-fold':
    'May point to the row of lamps of an anneal, to contact with a boat or a two-armed holder, or to scan lines.',
  'three-fold': 'May point to three support pins, clamps or lift pins.',
  rest: 'May point to a source or a flow off centre, or to four or more supports; look at the map before at the numbers.',
  'edge-only':
    'May point to an edge effect of the process, or of the correction near the edge: check the edge exclusion and the wafer diameter.',
  'single-site': 'May point to a probe that made poor contact, or to a particle or scratch: measure the site again.',
  nothing: null,
}

/**
 * One entry a finding, in the same order.
 *
 * @param unit  of the values, for amounts where the mean isn't above 0 and per cent would mean nothing
 */
export function patternWords({ trend, findings }: PatternFindings, unit: string): PatternWords[] {
  const amountOf = (amount: number) =>
    trend.mean > 0 ? `${formatPercent((100 * amount) / trend.mean)} of the mean` : formatQuantity(amount, unit)
  return findings.map((finding) => ({
    kind: finding.kind,
    sentence: `${sentenceOf(finding, amountOf)}${shareOf(finding)}`,
    mayPointTo: CAUSES[finding.kind],
  }))
}

function sentenceOf(finding: PatternFinding, amountOf: (amount: number) => string): string {
  const amount = Math.abs(finding.amount ?? 0)
  const side = (finding.amount ?? 0) < 0 ? 'below' : 'above'
  // What rounds to a full turn is none.
  const turn = finding.kind === 'two-fold' ? 180 : 360
  const direction = `${Math.round(finding.direction_deg ?? 0) % turn}°`
  switch (finding.kind) {
    case 'tilt':
      return `It rises evenly across, by ${amountOf(amount)} from the centre to the edge, towards ${direction}`
    case 'bowl':
      return `The edge lies ${amountOf(amount)} ${side} the centre, evenly all round`
    case 'two-fold':
      return `A saddle: the edge is high along ${direction} and low across, each by ${amountOf(amount)}`
    case 'edge-only':
      return `Only the outermost ring departs: it lies ${amountOf(amount)} ${side} the rest`
    case 'single-site':
      return `One site alone lies ${amountOf(amount)} ${side} the surface of the others`
    case 'higher-radial':
      return 'Rings round the centre, beyond a plain bowl'
    case 'three-fold':
      return 'A pattern that repeats three times in a turn'
    case 'rest':
      return 'A smooth pattern that is lopsided or repeats four times or more in a turn'
    case 'nothing':
      return 'No pattern stands out of the noise'
  }
}

function shareOf({ kind, share }: PatternFinding): string {
  if (kind !== 'nothing') return ` (${formatFixed(100 * share, 0)} % of the variance).`
  return `: none explains more than ${100 * SPOKEN_SHARE} % of the variance at ${100 * SIGNIFICANCE} % significance.`
}
