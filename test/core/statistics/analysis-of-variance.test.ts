import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../core/problems/problem'
import { analysisOfVariance } from '../../../core/statistics/analysis-of-variance'
import { STRD_ANOVA, agreeingDigits, strdRows } from '../../reference/nist-strd'
import { exactly, exactSumOfSquares, ratio } from './exact-rational'

function read(set: string): { values: Float64Array; groups: Uint32Array[] } {
  const rows = strdRows(`strd-anova-${set}`)
  const groups: number[][] = []
  rows.forEach(([treatment], i) => (groups[Number(treatment) - 1] ??= []).push(i))
  return { values: Float64Array.from(rows, ([, y]) => Number(y)), groups: groups.map((g) => Uint32Array.from(g)) }
}

describe('published values', () => {
  it.each(STRD_ANOVA)('NIST StRD $set to $digits digits', (certified) => {
    const { values, groups } = read(certified.set)
    const table = analysisOfVariance(values, groups)
    expect(table.between.degreesOfFreedom).toBe(certified.dfBetween)
    expect(table.within.degreesOfFreedom).toBe(certified.dfWithin)
    const pairs: [number, number][] = [
      [table.between.sumOfSquares, certified.ssBetween],
      [table.within.sumOfSquares, certified.ssWithin],
      [table.f, certified.f],
      [table.rSquared, certified.rSquared],
      [table.residualStandardDeviation, certified.residualStandardDeviation],
    ]
    const reached = Math.min(...pairs.map(([computed, value]) => agreeingDigits(computed, value)))
    expect(reached).toBeGreaterThanOrEqual(certified.digits)
  })

  it.each(STRD_ANOVA)('NIST StRD $set: all digits of the doubles that were read', ({ set }) => {
    const { values, groups } = read(set)
    const table = analysisOfVariance(values, groups)
    const within = groups.map((group) => exactSumOfSquares(Float64Array.from(group, (i) => values[i]!)))
    const exactWithin = within.reduce((a, b) => a + b, 0)
    expect(agreeingDigits(table.within.sumOfSquares, exactWithin)).toBeGreaterThan(14)
    expect(agreeingDigits(table.between.sumOfSquares, exactBetween(values, groups))).toBeGreaterThan(14)
  })
})

describe('laws', () => {
  it('equal groups have their common size as effective size', () => {
    const values = Float64Array.of(1, 2, 3, 4, 5, 7)
    const groups = [Uint32Array.of(0, 1), Uint32Array.of(2, 3), Uint32Array.of(4, 5)]
    expect(analysisOfVariance(values, groups).effectiveGroupSize).toBe(2)
  })

  it('unequal groups by hand: sizes 1, 2, 3 have n0 = (6 - 14/6) / 2', () => {
    const values = Float64Array.of(1, 2, 3, 4, 5, 7)
    const groups = [Uint32Array.of(0), Uint32Array.of(1, 2), Uint32Array.of(3, 4, 5)]
    expect(analysisOfVariance(values, groups).effectiveGroupSize).toBeCloseTo((6 - 14 / 6) / 2, 14)
  })

  it('between and within make up the whole', () => {
    const { values, groups } = read('sirstv')
    const { between, within } = analysisOfVariance(values, groups)
    expect(between.sumOfSquares + within.sumOfSquares).toBeCloseTo(exactSumOfSquares(values), 13)
  })
})

describe('refusals', () => {
  it.each([
    ['one group', [Uint32Array.of(0, 1)]],
    ['no group of two', [Uint32Array.of(0), Uint32Array.of(1)]],
    ['a NaN that counts', [Uint32Array.of(0, 2), Uint32Array.of(1)]],
  ])('%s', (_, groups) => {
    expect(() => analysisOfVariance(Float64Array.of(1, 2, NaN), groups)).toThrow(CoreError)
  })
})

/** sum n_i (m_i - m)^2 = sum S_i^2 / n_i - S^2 / N, of groups of equal size n, in whole numbers. */
function exactBetween(values: Float64Array, groups: readonly Uint32Array[]): number {
  const { whole, shift } = exactly(values)
  const size = BigInt(groups[0]!.length)
  const sums = groups.map((group) => [...group].reduce((sum, i) => sum + whole[i]!, 0n))
  const total = sums.reduce((a, b) => a + b, 0n)
  const k = BigInt(groups.length)
  return ratio(k * sums.reduce((a, b) => a + b * b, 0n) - total * total, (size * k) << BigInt(2 * shift))
}
