/** Cholesky factor of a symmetric positive definite matrix, and what is solved with it. Rows of n entries in one column. */

/**
 * Overwrites the lower triangle of `a` with L, a = L L^T.
 *
 * @param a  n x n, row by row; only its lower triangle is read
 * @returns whether it is positive definite to working precision; the content is of no use where it isn't
 */
export function factorCholesky(a: Float64Array, n: number): boolean {
  for (let j = 0; j < n; j++) {
    const rowJ = j * n
    for (let i = j; i < n; i++) {
      const rowI = i * n
      let sum = a[rowI + j]
      for (let k = 0; k < j; k++) sum -= a[rowI + k] * a[rowJ + k]
      if (i === j) {
        if (!(sum > 0)) return false
        a[rowJ + j] = Math.sqrt(sum)
      } else a[rowI + j] = sum / a[rowJ + j]
    }
  }
  return true
}

/** L z = b; writes z over b. */
export function solveLower(l: Float64Array, n: number, b: Float64Array): Float64Array {
  for (let i = 0; i < n; i++) {
    let sum = b[i]
    for (let k = 0; k < i; k++) sum -= l[i * n + k] * b[k]
    b[i] = sum / l[i * n + i]
  }
  return b
}

/** L^T z = b; writes z over b. */
export function solveUpper(l: Float64Array, n: number, b: Float64Array): Float64Array {
  for (let i = n - 1; i >= 0; i--) {
    const z = (b[i] /= l[i * n + i])
    for (let k = 0; k < i; k++) b[k] -= l[i * n + k] * z
  }
  return b
}

/** ln det(L L^T). */
export function logDeterminant(l: Float64Array, n: number): number {
  let sum = 0
  for (let i = 0; i < n; i++) sum += Math.log(l[i * n + i])
  return 2 * sum
}
