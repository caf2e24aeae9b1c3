/** Words and marks of verdicts and decisions, the same in every part of the window. */
import type { Verdict } from '../../../core/analysis/lot-analysis'
import type { MarkKind } from '../../../core/report/figures/marks'

/** "wafer 07", the same as in every sentence of core. */
export { waferName } from '../../../core/conformity/reasons'

export const VERDICT_WORDS: Readonly<Record<Verdict, string>> = {
  'in-spec': 'in spec',
  'out-of-spec': 'out of spec',
  undecided: 'undecided',
  'not-assessed': 'not assessed',
}

export const MARK_WORDS: Readonly<Record<MarkKind, string>> = {
  'in-spec': 'in spec',
  above: 'above its limit',
  below: 'below its limit',
  undecided: 'undecided',
  'not-assessed': 'not assessed',
}

/** "1 site", "12 sites". */
export function counted(count: number, one: string, many = `${one}s`): string {
  return `${count} ${count === 1 ? one : many}`
}

export function capital(text: string): string {
  return text === '' ? text : text[0].toUpperCase() + text.slice(1)
}
