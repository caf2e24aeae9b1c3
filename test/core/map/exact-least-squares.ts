/** Least squares by normal equations in whole numbers: no rounding before the last. */
import { exactly, ratio } from '../statistics/exact-rational'

/** Coefficients that minimise the squares; every double is taken as the whole multiple of a power of two that it is. */
export function exactLeastSquares(columns: readonly ArrayLike<number>[], values: ArrayLike<number>): number[] {
  const rows = values.length
  const design = exactly(columns.flatMap((column) => Array.from(column)))
  const right = exactly(values)
  const at = (k: number, i: number) => design.whole[k * rows + i]
  const sum = (term: (i: number) => bigint) => Array.from({ length: rows }, (_, i) => term(i)).reduce((a, b) => a + b)
  const matrix = columns.map((_, k) => columns.map((_, l) => sum((i) => at(k, i) * at(l, i))))
  const sides = columns.map((_, k) => sum((i) => at(k, i) * right.whole[i]))
  const determinant = determinantOf(matrix)
  // Cramer: A' A c = A' v, with A = design / 2^shift and v = right / 2^shift.
  return columns.map((_, k) => {
    const replaced = matrix.map((row, r) => row.map((entry, l) => (l === k ? sides[r] : entry)))
    const numerator = determinantOf(replaced) << BigInt(design.shift)
    const denominator = determinant << BigInt(right.shift)
    return denominator < 0n ? ratio(-numerator, -denominator) : ratio(numerator, denominator)
  })
}

/** Bareiss: every division comes out even. */
function determinantOf(matrix: readonly (readonly bigint[])[]): bigint {
  const m = matrix.map((row) => [...row])
  let [sign, before] = [1n, 1n]
  for (let k = 0; k < m.length - 1; k++) {
    const pivot = m.findIndex((row, r) => r >= k && row[k] !== 0n)
    if (pivot < 0) return 0n
    if (pivot !== k) {
      ;[m[k], m[pivot]] = [m[pivot], m[k]]
      sign = -sign
    }
    for (let i = k + 1; i < m.length; i++) {
      for (let j = k + 1; j < m.length; j++) m[i][j] = (m[i][j] * m[k][k] - m[i][k] * m[k][j]) / before
    }
    before = m[k][k]
  }
  return sign * m[m.length - 1][m.length - 1]
}
