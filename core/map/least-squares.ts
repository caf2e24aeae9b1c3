/** Linear least squares by orthogonal columns, for surfaces fitted to sites. */
import { CoreError } from '../problems/problem'
import { CompensatedSum } from './compensated-sum'
import { orthogonalColumns, type OrthogonalColumns } from './householder'

/** A design made ready: one factorisation serves every wafer measured at the same sites. */
export interface LeastSquares {
  readonly rows: number
  readonly terms: number
  /**
   * For each column the share of its length that the columns before it can't make: 1 if orthogonal to them, about
   * 1e-16 if made of them. Its inverse is how much surer the coefficient would be with an orthogonal column.
   */
  readonly independence: Float64Array
  /** The length of that share itself: a coefficient's standard error is at least the residual one over this. */
  readonly ownLengths: Float64Array
  /** Throws CoreError not-applicable where a column is made of those before it. */
  fit(values: Float64Array): LeastSquaresFit
}

export interface LeastSquaresFit {
  readonly coefficients: Float64Array
  /** From the residuals, which are taken as noise, independent and equally strong everywhere. */
  readonly standardErrors: Float64Array
  readonly fitted: Float64Array
  readonly residuals: Float64Array
  /** How much each value pulls the surface to itself, 0 to 1; they sum to the number of terms. */
  readonly leverage: Float64Array
  /** Rows less terms, at least 1. */
  readonly degreesOfFreedom: number
  readonly residualSumOfSquares: number
  readonly residualStandardDeviation: number
  /** What each column takes from the sum of squares after those before it; with the residual one they sum to that of the values. */
  readonly sequentialSumsOfSquares: Float64Array
}

/** Below this share a column is made of those before it, and its coefficient has no digit. */
const NOTHING_OF_ITS_OWN = 1e-12
/** Each brings about as many digits as the factorisation keeps; two settle the last one. */
const REFINEMENTS = 2

/**
 * min |A c - values|: Householder QR of the columns, scaled to length 1/2 to 1 by powers of two (exactly), with two
 * steps of refinement of residuals and coefficients together, whose own residuals are carried in twice the digits.
 *
 * @param columns  one a term, each with one entry a row; more rows than columns
 * @throws CoreError not-applicable for no columns, unequal lengths, too few rows or an entry that isn't finite
 *
 * Accuracy: the NIST StRD sets Norris, Pontius, Longley and Wampler5 to 13 digits or more, without centring.
 * Sources: G. H. Golub, Numer. Math. 7 (1965) 206; refinement A. Bjorck, BIT 7 (1967) 257 (both from memory).
 */
export function prepareLeastSquares(columns: readonly Float64Array[]): LeastSquares {
  const rows = requireColumns(columns)
  const lengths = columns.map(length)
  const scales = lengths.map((size) => (size > 0 ? 2 ** -Math.ceil(Math.log2(size)) : 1))
  const scaled = columns.map((column, k) => column.map((entry) => entry * scales[k]))
  const { q, r } = orthogonalColumns(scaled)
  const independence = Float64Array.from(lengths, (size, k) => (size > 0 ? Math.abs(r[k][k]) / (size * scales[k]) : 0))
  const dependent = independence.findIndex((share) => !(share > NOTHING_OF_ITS_OWN))
  return {
    rows,
    terms: columns.length,
    independence,
    ownLengths: Float64Array.from(scales, (scale, k) => Math.abs(r[k][k]) / scale),
    fit: (values) => {
      if (dependent >= 0) throw refusal(`column ${dependent + 1} is made of those before it`)
      if (values.length !== rows) throw refusal(`${values.length} values for ${rows} rows`)
      if (!values.every(Number.isFinite)) throw refusal('a value is no number')
      return fit({ scaled, q, r, scales }, values)
    },
  }
}

interface Factors extends OrthogonalColumns {
  readonly scaled: readonly Float64Array[]
  readonly scales: readonly number[]
}

function fit(design: Factors, values: Float64Array): LeastSquaresFit {
  const { q, r, scales } = design
  const effects = q.map((column) => dot(column, values))
  const solution = backSubstituted(r, effects)
  const residuals = values.slice()
  design.scaled.forEach((column, k) => addMultiple(residuals, column, -solution[k]))
  for (let step = 0; step < REFINEMENTS; step++) refine(design, values, solution, residuals)
  const degreesOfFreedom = values.length - q.length
  const residualSumOfSquares = dot(residuals, residuals)
  const residualStandardDeviation = Math.sqrt(residualSumOfSquares / degreesOfFreedom)
  return {
    coefficients: solution.map((value, k) => value * scales[k]),
    standardErrors: inverseRowLengths(r).map((size, k) => size * scales[k] * residualStandardDeviation),
    fitted: values.map((value, i) => value - residuals[i]),
    residuals,
    leverage: leverages(q, values.length),
    degreesOfFreedom,
    residualSumOfSquares,
    residualStandardDeviation,
    sequentialSumsOfSquares: Float64Array.from(effects, (effect) => effect * effect),
  }
}

/** One step on the augmented system r + A c = values, A' r = 0, in place. */
function refine(
  { scaled, q, r }: Factors,
  values: Float64Array,
  solution: Float64Array,
  residuals: Float64Array,
): void {
  const sum = new CompensatedSum()
  const left = values.map((value, i) => {
    sum.reset()
    sum.addProduct(value, 1)
    sum.addProduct(residuals[i], -1)
    for (let k = 0; k < scaled.length; k++) sum.addProduct(scaled[k][i], -solution[k])
    return sum.value
  })
  const slant = scaled.map((column) => {
    sum.reset()
    for (let i = 0; i < column.length; i++) sum.addProduct(column[i], -residuals[i])
    return sum.value
  })
  const tilted = forwardSubstituted(r, slant)
  const along = q.map((column, k) => dot(column, left) - tilted[k])
  backSubstituted(r, along).forEach((change, k) => (solution[k] += change))
  addMultiple(residuals, left, 1)
  q.forEach((column, k) => addMultiple(residuals, column, -along[k]))
}

/** R c = right. */
function backSubstituted(r: readonly Float64Array[], right: readonly number[]): Float64Array {
  const solution = Float64Array.from(right)
  for (let k = r.length - 1; k >= 0; k--) {
    for (let j = k + 1; j < r.length; j++) solution[k] -= r[k][j] * solution[j]
    solution[k] /= r[k][k]
  }
  return solution
}

/** R' c = right. */
function forwardSubstituted(r: readonly Float64Array[], right: readonly number[]): Float64Array {
  const solution = Float64Array.from(right)
  for (let k = 0; k < r.length; k++) {
    for (let j = 0; j < k; j++) solution[k] -= r[j][k] * solution[j]
    solution[k] /= r[k][k]
  }
  return solution
}

/** Lengths of the rows of R^-1: standard errors in units of the residual standard deviation. */
function inverseRowLengths(r: readonly Float64Array[]): Float64Array {
  const squares = new Float64Array(r.length)
  for (let column = 0; column < r.length; column++) {
    const unit = r.map((_, k) => (k === column ? 1 : 0))
    backSubstituted(r, unit).forEach((entry, k) => (squares[k] += entry * entry))
  }
  return squares.map(Math.sqrt)
}

function leverages(q: readonly Float64Array[], rows: number): Float64Array {
  const leverage = new Float64Array(rows)
  for (const column of q) for (let i = 0; i < rows; i++) leverage[i] += column[i] * column[i]
  return leverage
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0
  for (let i = 0; i < a.length; i++) sum += a[i] * b[i]
  return sum
}

function addMultiple(to: Float64Array, column: Float64Array, factor: number): void {
  for (let i = 0; i < to.length; i++) to[i] += factor * column[i]
}

function length(column: Float64Array): number {
  const largest = column.reduce((most, entry) => Math.max(most, Math.abs(entry)), 0)
  return largest > 0 ? largest * Math.sqrt(column.reduce((sum, entry) => sum + (entry / largest) ** 2, 0)) : 0
}

function requireColumns(columns: readonly Float64Array[]): number {
  const rows = columns[0]?.length ?? 0
  if (columns.length === 0) throw refusal('there are no terms')
  if (columns.some((column) => column.length !== rows)) throw refusal('its columns have unequal lengths')
  if (rows <= columns.length) throw refusal(`${columns.length} terms need more than ${rows} values`)
  if (!columns.every((column) => column.every(Number.isFinite))) throw refusal('an entry is no number')
  return rows
}

function refusal(why: string): CoreError {
  return new CoreError({ kind: 'not-applicable', what: 'least squares', why })
}
