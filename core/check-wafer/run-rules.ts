/**
 * Runs of values that a process in control hardly shows, though each by itself may be sound.
 *
 * Source: the rules of the Western Electric Statistical Quality Control Handbook (1956), as the NIST/SEMATECH e-Handbook of
 * Statistical Methods 6.3.2 prints them: any point beyond 3 sigma; 2 of the last 3 beyond 2 sigma; 4 of the last 5 beyond
 * 1 sigma; 8 in a row on one side of the centre line; and its trend rules: 6 in a row rising or falling, 14 in a row
 * going up and down in turn.
 */
export interface RunRule {
  readonly id: string
  /** What a value breaks that ends such a run, as a clause. */
  readonly words: string
}

export const RUN_RULES = {
  'beyond-3-sigma': { id: 'beyond-3-sigma', words: 'lies more than three standard deviations from the centre line' },
  '2-of-3-beyond-2-sigma': { id: '2-of-3-beyond-2-sigma', words: 'is the second of three in a row more than two standard deviations off on the same side' },
  '4-of-5-beyond-1-sigma': { id: '4-of-5-beyond-1-sigma', words: 'is the fourth of five in a row more than one standard deviation off on the same side' },
  '8-on-one-side': { id: '8-on-one-side', words: 'is the eighth in a row or a later one on the same side of the centre line' },
  '6-rising-or-falling': { id: '6-rising-or-falling', words: 'is the sixth in a row or a later one rising, or falling' },
  '14-alternating': { id: '14-alternating', words: 'is the fourteenth in a row or a later one going up and down in turn' },
} as const satisfies Record<string, RunRule> // prettier-ignore

export type RunRuleId = keyof typeof RUN_RULES

/** The rules that each value breaks as the last of a run; scores are (value - centre) / sigma, in the order of time. */
export function brokenRules(scores: readonly number[]): readonly (readonly RunRuleId[])[] {
  return scores.map((score, i) => {
    const broken: RunRuleId[] = []
    if (Math.abs(score) > 3) broken.push('beyond-3-sigma')
    if (isOneOf(scores, i, 3, 2, 2)) broken.push('2-of-3-beyond-2-sigma')
    if (isOneOf(scores, i, 5, 4, 1)) broken.push('4-of-5-beyond-1-sigma')
    if (isOneOf(scores, i, 8, 8, 0)) broken.push('8-on-one-side')
    if (isTrend(scores, i, 6)) broken.push('6-rising-or-falling')
    if (isAlternating(scores, i, 14)) broken.push('14-alternating')
    return broken
  })
}

/** Value i lies beyond `sigma` and at least `least` of the last `of` lie beyond it on the same side. */
function isOneOf(scores: readonly number[], i: number, of: number, least: number, sigma: number): boolean {
  const side = Math.sign(scores[i])
  if (i + 1 < least || side * scores[i] <= sigma) return false
  const last = scores.slice(Math.max(0, i + 1 - of), i + 1)
  return last.filter((score) => side * score > sigma).length >= least
}

function isTrend(scores: readonly number[], i: number, length: number): boolean {
  if (i + 1 < length) return false
  const steps = Array.from({ length: length - 1 }, (_, k) => Math.sign(scores[i - k] - scores[i - k - 1]))
  return steps[0] !== 0 && steps.every((step) => step === steps[0])
}

function isAlternating(scores: readonly number[], i: number, length: number): boolean {
  if (i + 1 < length) return false
  const steps = Array.from({ length: length - 1 }, (_, k) => Math.sign(scores[i - k] - scores[i - k - 1]))
  return steps.every((step, k) => step !== 0 && (k === 0 || step === -steps[k - 1]))
}
