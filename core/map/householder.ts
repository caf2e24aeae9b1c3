/** Orthogonal columns from any columns. */

export interface OrthogonalColumns {
  /** Orthonormal, one a column, spanning the first k columns with its first k. */
  readonly q: readonly Float64Array[]
  /** Upper triangular, r[row][column]: the columns are the q times it. */
  readonly r: readonly Float64Array[]
}

/** Squares that small have lost digits; of columns of about 1 they are nothing. */
const NOTHING = 1e-280

/**
 * Householder's reflections, column by column. Written out on typed columns since 100 000 sites and 28 shapes take
 * seconds through a general matrix and a fraction of one here.
 *
 * @param columns  at least as long as they are many, entries of about 1
 *
 * Source: G. H. Golub, C. F. Van Loan, Matrix Computations, 4th ed. (2013), sect. 5.2 (from memory).
 */
export function orthogonalColumns(columns: readonly Float64Array[]): OrthogonalColumns {
  const rows = columns[0].length
  const work = columns.map((column) => column.slice())
  const r = columns.map(() => new Float64Array(columns.length))
  const reflectors: Reflector[] = []
  work.forEach((column, k) => {
    for (let i = 0; i < k; i++) r[i][k] = column[i]
    let size = 0
    for (let i = k; i < rows; i++) size += column[i] * column[i]
    const isNothing = size < NOTHING
    // Away from the diagonal's sign, so that it doesn't cancel.
    if (!isNothing) r[k][k] = column[k] > 0 ? -Math.sqrt(size) : Math.sqrt(size)
    column[k] -= r[k][k]
    const reflector = { from: k, column, factor: isNothing ? 0 : -1 / (r[k][k] * column[k]) }
    for (let j = k + 1; j < work.length; j++) reflect(work[j], reflector)
    reflectors.push(reflector)
  })
  const q = columns.map((_, k) => {
    const unit = new Float64Array(rows)
    unit[k] = 1
    for (let j = k; j >= 0; j--) reflect(unit, reflectors[j])
    return unit
  })
  return { q, r }
}

/** I - factor v v', v the column from that row on; the factor is 2 / v'v. */
interface Reflector {
  readonly from: number
  readonly column: Float64Array
  readonly factor: number
}

function reflect(target: Float64Array, { from, column, factor }: Reflector): void {
  let sum = 0
  for (let i = from; i < target.length; i++) sum += column[i] * target[i]
  sum *= factor
  for (let i = from; i < target.length; i++) target[i] -= sum * column[i]
}
