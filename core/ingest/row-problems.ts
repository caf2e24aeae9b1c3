/** The problems of one file's rows: as many as a person could read are kept, the others are counted. */
import type { RowProblem } from '../problems/problem'

export const MAX_LISTED_ROWS = 10_000
const MAX_FOUND = 80

export class RowProblems {
  readonly listed: RowProblem[] = []
  count = 0

  constructor(readonly file: string) {}

  cell(line: number, column: string, found: string, why: string): void {
    this.add({ kind: 'bad-cell', file: this.file, line, column, found: shorten(found), why })
  }

  row(line: number, column: string, found: string, why: string): void {
    this.add({ kind: 'bad-row', file: this.file, line, column, found: shorten(found), why })
  }

  add(problem: RowProblem): void {
    this.count++
    if (this.listed.length < MAX_LISTED_ROWS) this.listed.push(problem)
  }
}

function shorten(text: string): string {
  const line = text.trim().replace(/[\r\n\t]+/g, ' ')
  return line.length > MAX_FOUND ? `${line.slice(0, MAX_FOUND - 1)}…` : line
}
