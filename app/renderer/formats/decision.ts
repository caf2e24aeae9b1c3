/** When a decision in the making is one. */
import type { Decision } from '../../../core/report/decision'
import type { DecisionDraft } from '../stores/choices'

export function isSettled(draft: DecisionDraft): boolean {
  return settledDecision(draft) !== null
}

/** Null without a decision, a name or a date: nobody signs for it then. */
export function settledDecision({ decision, name, comment, date }: DecisionDraft): Decision | null {
  if (decision === null || date === null || name.trim() === '') return null
  return { decision, name: name.trim(), comment: comment.trim(), date }
}
