import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { prepareLeastSquares } from '../../../core/map/least-squares'
import { CoreError } from '../../../core/problems/problem'
import { agreeingDigits, strdRows } from '../../reference/nist-strd'
import { STRD_REGRESSION, type CertifiedRegression } from '../../reference/nist-strd-regression'
import { exactLeastSquares } from './exact-least-squares'

function read({ set, degree }: CertifiedRegression): { columns: Float64Array[]; values: Float64Array } {
  const rows = strdRows(`strd-regression-${set}`).map((row) => row.map(Number))
  const column = (entry: (row: number[]) => number) => Float64Array.from(rows, entry)
  const columns =
    degree === null
      ? rows[0].map((_, k) => column((row) => (k === 0 ? 1 : row[k])))
      : Array.from({ length: degree + 1 }, (_, power) => column((row) => row[1] ** power))
  return { columns, values: column((row) => row[0]) }
}

const entry = fc.integer({ min: -4096, max: 4096 }).map((whole) => whole / 256)
/** Three columns and values over 6 to 12 rows. */
const problems = fc
  .integer({ min: 6, max: 12 })
  .chain((rows) => fc.array(fc.array(entry, { minLength: rows, maxLength: rows }), { minLength: 4, maxLength: 4 }))
  .map((lists) => lists.map((list) => Float64Array.from(list)))
  .filter(([a, b, c]) => Math.min(...prepareLeastSquares([a, b, c]).independence) > 1e-3)

describe('published values', () => {
  it.each(STRD_REGRESSION)('NIST StRD $set to $digits digits, without centring', (certified) => {
    const { columns, values } = read(certified)
    const fit = prepareLeastSquares(columns).fit(values)
    const mean = values.reduce((sum, value) => sum + value, 0) / values.length
    const total = values.reduce((sum, value) => sum + (value - mean) ** 2, 0)
    const pairs: [number, string][] = [
      ...certified.coefficients.map((text, k): [number, string] => [fit.coefficients[k], text]),
      ...certified.standardErrors.map((text, k): [number, string] => [fit.standardErrors[k], text]),
      [fit.residualStandardDeviation, certified.residualStandardDeviation],
      [1 - fit.residualSumOfSquares / total, certified.rSquared],
    ]
    const digits = pairs.map(([computed, text]) => agreeingDigits(computed, Number(text)))
    expect(Math.min(...digits)).toBeGreaterThanOrEqual(certified.digits)
  })
})

describe('limits', () => {
  it('values made of the columns leave nothing', () => {
    const columns = [Float64Array.of(1, 1, 1, 1), Float64Array.of(1, 2, 4, 8)]
    const fit = prepareLeastSquares(columns).fit(Float64Array.of(5, 7, 11, 19))
    expect([...fit.coefficients]).toEqual([3, 2])
    expect(fit.residualSumOfSquares).toBeLessThan(1e-28)
  })

  it('a constant alone gives the mean and its standard error', () => {
    const fit = prepareLeastSquares([new Float64Array(4).fill(1)]).fit(Float64Array.of(1, 2, 3, 6))
    expect(fit.coefficients[0]).toBeCloseTo(3, 14)
    expect(fit.standardErrors[0]).toBeCloseTo(Math.sqrt(14 / 3 / 4), 14)
    expect([...fit.leverage].map((h) => h.toFixed(12))).toEqual(Array(4).fill('0.250000000000'))
  })
})

describe('laws', () => {
  it('residuals are orthogonal to every column; leverages sum to the terms', () => {
    fc.assert(
      fc.property(problems, ([a, b, c, values]) => {
        const fit = prepareLeastSquares([a, b, c]).fit(values)
        for (const column of [a, b, c]) {
          expect(Math.abs(column.reduce((sum, entry, i) => sum + entry * fit.residuals[i], 0))).toBeLessThan(1e-10)
        }
        expect(fit.leverage.reduce((x, y) => x + y)).toBeCloseTo(3, 12)
      }),
      { numRuns: 100 },
    )
  })

  it('sequential sums of squares are what each further column takes from the residuals, and add up', () => {
    fc.assert(
      fc.property(problems, ([a, b, c, values]) => {
        const whole = values.reduce((sum, value) => sum + value * value, 0)
        const left = [[a], [a, b], [a, b, c]].map(
          (columns) => prepareLeastSquares(columns).fit(values).residualSumOfSquares,
        )
        const fit = prepareLeastSquares([a, b, c]).fit(values)
        const steps = [whole - left[0], left[0] - left[1], left[1] - left[2]]
        steps.forEach((step, k) =>
          expect(Math.abs(step - fit.sequentialSumsOfSquares[k])).toBeLessThan(1e-11 * (1 + whole)),
        )
        const sum = fit.sequentialSumsOfSquares.reduce((x, y) => x + y) + fit.residualSumOfSquares
        expect(Math.abs(sum - whole)).toBeLessThan(1e-12 * (1 + whole))
      }),
      { numRuns: 100 },
    )
  })

  it('a column in another unit changes its coefficient by that unit alone', () => {
    const { columns, values } = read(STRD_REGRESSION[2])
    const inOther = columns.map((column, k) => column.map((entry) => entry * 1000 ** (k - 3)))
    const [fit, other] = [columns, inOther].map((design) => prepareLeastSquares(design).fit(values))
    other.coefficients.forEach((value, k) => expect(value * 1000 ** (k - 3)).toBeCloseTo(fit.coefficients[k], 5))
  })
})

describe('a second implementation: normal equations in whole numbers', () => {
  it('coefficients to the last digits', () => {
    fc.assert(
      fc.property(problems, ([a, b, c, values]) => {
        const exact = exactLeastSquares([a, b, c], values)
        const { coefficients } = prepareLeastSquares([a, b, c]).fit(values)
        const scale = Math.max(...exact.map(Math.abs), 1e-3)
        exact.forEach((value, k) => expect(Math.abs(coefficients[k] - value)).toBeLessThan(1e-13 * scale))
      }),
      { numRuns: 100 },
    )
  })

  it('Wampler5 itself, where the certified coefficients are 1', () => {
    const { columns, values } = read(STRD_REGRESSION[3])
    expect(exactLeastSquares(columns, values)).toEqual([1, 1, 1, 1, 1, 1])
  })
})

describe('columns that depend on each other', () => {
  const [a, b] = [Float64Array.of(1, 1, 1, 1, 1), Float64Array.of(0.1, 0.2, 0.3, 0.4, 0.7)]

  it('have no share of their own, and no fit', () => {
    const doubled = prepareLeastSquares([a, b, b.map((x) => 3 * x - 7)])
    expect(doubled.independence[0]).toBeCloseTo(1, 14)
    expect(doubled.independence[1]).toBeGreaterThan(0.4)
    expect(doubled.independence[2]).toBeLessThan(1e-14)
    expect(() => doubled.fit(b)).toThrow(CoreError)
  })

  it('a column of zeros likewise', () => {
    const zero = prepareLeastSquares([a, new Float64Array(5)])
    expect(zero.independence[1]).toBe(0)
    expect(() => zero.fit(b)).toThrow(CoreError)
  })
})

describe('refusals', () => {
  const ones = new Float64Array(3).fill(1)
  it.each([
    ['no columns', []],
    ['as many columns as rows', [ones, Float64Array.of(1, 2, 3), Float64Array.of(1, 4, 9)]],
    ['unequal lengths', [ones, new Float64Array(2)]],
    ['an entry that is no number', [Float64Array.of(1, NaN, 1)]],
    ['an infinite entry', [Float64Array.of(1, Infinity, 1)]],
  ])('%s', (_, columns) => expect(() => prepareLeastSquares(columns)).toThrow(CoreError))

  it.each([
    ['too few values', Float64Array.of(1, 2)],
    ['a value that is no number', Float64Array.of(1, NaN, 2)],
  ])('%s', (_, values) => expect(() => prepareLeastSquares([ones]).fit(values)).toThrow(CoreError))
})
