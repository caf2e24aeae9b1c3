import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { orthogonalColumns } from '../../../core/map/householder'

const entry = fc.double({ min: -1, max: 1, noNaN: true })
const designs = fc
  .tuple(fc.integer({ min: 1, max: 6 }), fc.integer({ min: 0, max: 9 }))
  .chain(([count, more]) =>
    fc.array(fc.array(entry, { minLength: count + more, maxLength: count + more }), {
      minLength: count,
      maxLength: count,
    }),
  ) // prettier-ignore
  .map((lists) => lists.map((list) => Float64Array.from(list)))
const dot = (a: Float64Array, b: Float64Array) => a.reduce((sum, value, i) => sum + value * b[i], 0)

describe('orthogonal columns', () => {
  it('are orthonormal, and the columns are made of them from the first on', () => {
    fc.assert(
      fc.property(designs, (columns) => {
        const { q, r } = orthogonalColumns(columns)
        q.forEach((a, k) => q.forEach((b, l) => expect(Math.abs(dot(a, b) - (k === l ? 1 : 0))).toBeLessThan(1e-14)))
        columns.forEach((column, k) => {
          const made = column.map((_, i) => q.reduce((sum, unit, l) => sum + unit[i] * r[l][k], 0))
          made.forEach((value, i) => expect(Math.abs(value - column[i])).toBeLessThan(1e-14))
          for (let row = k + 1; row < columns.length; row++) expect(r[row][k]).toBe(0)
        })
      }),
    )
  })

  it('stay orthonormal where a column is nothing or made of others', () => {
    const a = Float64Array.of(1, 0, 0, 1)
    const { q, r } = orthogonalColumns([a, a, new Float64Array(4)])
    expect([r[1][1], r[2][2]].every((own) => Math.abs(own) < 1e-15)).toBe(true)
    q.forEach((b, k) => q.forEach((c, l) => expect(Math.abs(dot(b, c) - (k === l ? 1 : 0))).toBeLessThan(1e-14)))
  })
})
