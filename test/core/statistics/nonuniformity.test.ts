import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../core/problems/problem'
import { nonuniformities, nonuniformity, nonuniformityIds } from '../../../core/statistics/nonuniformity'

const wafer = { mean: 92, standardDeviation: 1.84, min: 88, max: 98 }

describe('by hand', () => {
  it.each([
    ['sup', 2],
    ['hlv', (200 * 10) / 186],
    ['half-range-over-mean', 1000 / 184],
    ['contrast', 1000 / 186],
    ['range-over-mean', 1000 / 92],
    ['range-over-min', 1000 / 88],
  ])('%s', (id, percent) => {
    expect(nonuniformity(id).percent(wafer)).toBeCloseTo(percent, 12)
  })
})

describe('the register', () => {
  it('has every id once, in the order of the ids', () => {
    expect(nonuniformities.map(({ id }) => id)).toEqual([...nonuniformityIds])
  })

  it.each(nonuniformities)('$id: 0 for a flat wafer, the same in any unit, with title, formula and source', (entry) => {
    expect(entry.percent({ mean: 92, standardDeviation: 0, min: 92, max: 92 })).toBe(0)
    expect(entry.title && entry.formula && entry.source).not.toBe('')
    fc.assert(
      fc.property(fc.double({ min: 1e-6, max: 1e6, noNaN: true }), (k) => {
        const scaled = { mean: 92 * k, standardDeviation: 1.84 * k, min: 88 * k, max: 98 * k }
        expect(entry.percent(scaled)).toBeCloseTo(entry.percent(wafer), 9)
      }),
    )
  })

  it.each(nonuniformities)('$id: no number where it would divide by zero', ({ percent }) => {
    expect(percent({ mean: 0, standardDeviation: 1, min: 0, max: 0 })).toBeNaN()
  })

  it('knows no other', () => {
    expect(() => nonuniformity('max-over-min')).toThrow(CoreError)
  })
})
