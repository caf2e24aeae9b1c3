import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { HealthInput } from '../../../core/health/finding'
import { orderSlopes } from '../../../core/health/order-slopes'
import { stepAt } from '../../../core/health/resolution'
import { seededRandom } from '../../../core/numeric/random'
import { concentricPlan } from '../../../core/wafer/site-patterns'

const { x_mm, y_mm, count } = concentricPlan({ circles: 3, outerRadius_mm: 95 })
const R = 95

/** As much of the input as the slopes read. */
function inputOf(value: Float64Array): HealthInput {
  const rows = Uint32Array.from(value.keys())
  return { readings: { time_ms: null }, wafers: [{ id: '1', rows }], x_mm, y_mm, value } as unknown as HealthInput
}
const valuesOf = (of: (k: number) => number) => Float64Array.from({ length: count }, (_, k) => of(k))

/** Plain powers up to the fourth: they span the surface of order zernike-4. */
const POWERS = [0, 1, 2, 3, 4].flatMap((a) => [0, 1, 2, 3, 4].filter((b) => a + b <= 4).map((b) => [a, b] as const))

/** Slope by one joint least-squares fit, by Gauss and Jordan on the normal equations of surface and order together. */
function jointSlope(value: Float64Array): number {
  const columns = [
    ...POWERS.map(([a, b]) => valuesOf((k) => (x_mm[k] / R) ** a * (y_mm[k] / R) ** b)),
    valuesOf((k) => k / (count - 1)),
  ]
  const dot = (a: Float64Array, b: Float64Array) => a.reduce((sum, v, k) => sum + v * b[k], 0)
  const m = columns.map((a) => [...columns.map((b) => dot(a, b)), dot(a, value)])
  m.forEach((pivot, p) => {
    const scale = pivot[p]
    for (let c = 0; c < pivot.length; c++) pivot[c] /= scale
    m.forEach((row, r) => {
      const factor = row[p]
      if (r !== p) for (let c = 0; c < row.length; c++) row[c] -= factor * pivot[c]
    })
  })
  return m[m.length - 1][columns.length]
} // prettier-ignore

describe('the change with the order of reading', () => {
  it('is that of one fit of surface and drift together (Frisch and Waugh 1933, Lovell 1963)', () => {
    const random = seededRandom(7)
    const value = valuesOf((k) => 100 * (1 + (0.004 * k) / count + 1e-3 * Math.sin(5 * k) + (0.01 * x_mm[k]) / R + 1e-5 * random.normal()))
    const [{ change }] = orderSlopes(inputOf(value))
    const median = [...value].sort((a, b) => a - b)[(count - 1) / 2]
    expect(change).toBeCloseTo(jointSlope(value) / median, 9)
  })

  it('is unmoved by any surface, and of the size put in', () => {
    fc.assert(
      fc.property(fc.double({ min: -0.02, max: 0.02, noNaN: true }), fc.double({ min: -0.03, max: 0.03, noNaN: true }), fc.integer({ min: 1, max: 999 }), (drift, bowl, seed) => {
        const random = seededRandom(seed)
        const noise = 2e-4
        const value = valuesOf((k) => 100 * (1 + (bowl * (x_mm[k] ** 2 + y_mm[k] ** 2)) / R ** 2 + noise * random.normal() + (drift * k) / (count - 1)))
        const [{ change, standardError }] = orderSlopes(inputOf(value))
        // The median is not the centre's value: the share is of a few percent more or less.
        expect(Math.abs(change - drift)).toBeLessThan(6 * standardError + 0.05 * Math.abs(drift))
      }),
      { numRuns: 200 },
    )
  })

  it('is told for no wafer of too few sites', () => {
    const { readings, wafers, value, ...rest } = inputOf(valuesOf(() => 1))
    expect(orderSlopes({ ...rest, readings, value, wafers: [{ ...wafers[0], rows: wafers[0].rows.slice(0, 8) }] })).toEqual([])
  })
}) // prettier-ignore

describe('the step of a display', () => {
  it('is the distance to the nearest other value at a place', () => {
    expect(stepAt([1.1, 1.2, 1.2, 1.4], 1.4)).toBeCloseTo(0.2, 12)
    expect(stepAt([0.0101, 0.0102, 0.00998, 0.00999], 0.0101)).toBeCloseTo(1e-4, 12)
    expect(stepAt([0.0101, 0.0102, 0.00998, 0.00999], 0.01)).toBeCloseTo(1e-5, 12)
  })
  it('is 0 where all are the same, whatever is missing', () => {
    expect(stepAt([2, 2, NaN, 2], 2)).toBe(0)
    expect(stepAt([], 1)).toBe(0)
  })
})
