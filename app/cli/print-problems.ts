import { explain } from '../../core/problems/explain'
import type { Problem } from '../../core/problems/problem'

/** More of one kind than this are counted, not listed. */
const LISTED = 12

/** To standard error, as every command says what was wrong. */
export function printProblems(problems: readonly Problem[], elsewhere = ''): void {
  for (const problem of problems.slice(0, LISTED)) console.error(`! ${explain(problem)}`)
  if (problems.length > LISTED) console.error(`! ... and ${problems.length - LISTED} more${elsewhere}`)
}
