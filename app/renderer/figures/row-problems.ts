/** Problems of single rows, as rows of a table. */
import type { Problem } from '../../../core/problems/problem'

export interface RowOfProblem {
  readonly line: number
  readonly column: string
  readonly found: string
  readonly why: string
}

export function rowProblems(problems: readonly Problem[]): readonly RowOfProblem[] {
  return problems.flatMap((problem): RowOfProblem[] =>
    problem.kind === 'bad-cell' || problem.kind === 'bad-row'
      ? [{ line: problem.line, column: problem.column, found: problem.found, why: problem.why }]
      : [],
  )
}
