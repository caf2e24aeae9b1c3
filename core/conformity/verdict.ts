/** What is said of a site, a die, a wafer, a lot. `undecided`: what is known doesn't settle it. */
export type Verdict = 'in-spec' | 'out-of-spec' | 'undecided' | 'not-assessed'

/** Order of the codes in verdict columns. */
export const VERDICTS = ['in-spec', 'out-of-spec', 'undecided', 'not-assessed'] as const satisfies readonly Verdict[]

/** Code of a verdict in a verdict column. */
export function verdictCode(verdict: Verdict): number {
  return VERDICTS.indexOf(verdict)
}

export type VerdictCounts = Readonly<Record<Verdict, number>>

/** How often each verdict stands in a column, over all rows or those that `indices` names. */
export function countVerdicts(codes: Uint8Array, indices?: Uint32Array): VerdictCounts {
  const counts = [0, 0, 0, 0]
  const count = indices ? indices.length : codes.length
  for (let i = 0; i < count; i++) counts[codes[indices ? indices[i] : i]]!++
  return {
    'in-spec': counts[0],
    'out-of-spec': counts[1],
    undecided: counts[2],
    'not-assessed': counts[3],
  }
}
