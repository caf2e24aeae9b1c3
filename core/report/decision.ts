/** What the responsible person decided, beside the verdict by the rules: it overrules nothing, it stands next to it. */
export const DECISIONS = {
  release: 'Release',
  hold: 'Hold',
  reject: 'Reject',
  'measure-again': 'Measure again',
} as const

export interface Decision {
  readonly decision: keyof typeof DECISIONS
  readonly name: string
  readonly comment: string
  /** ISO 8601, as the person's clock had it. */
  readonly date: string
}
