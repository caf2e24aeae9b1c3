/** Columns of one width for a terminal, to the right where it is said. */
export function aligned(rows: readonly (readonly string[])[], toRight: readonly boolean[]): readonly string[] {
  const widths = toRight.map((_, column) => Math.max(...rows.map((row) => row[column].length)))
  const pad = (cell: string, at: number) => (toRight[at] ? cell.padStart(widths[at]) : cell.padEnd(widths[at]))
  return rows.map((row) => row.map(pad).join('  ').trimEnd())
}

/** Names to the left in the first column, numbers to the right in the others. */
export function alignedNumbers(rows: readonly (readonly string[])[]): readonly string[] {
  return aligned(
    rows,
    rows[0].map((_, column) => column > 0),
  )
}
