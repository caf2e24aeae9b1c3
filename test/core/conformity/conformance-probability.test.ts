import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { conformanceProbability, fillConformanceProbability } from '../../../core/conformity/conformance-probability'
import { CoreError } from '../../../core/problems/problem'
import { CONFORMANCE_EXAMPLES } from '../../reference/jcgm-106'

describe('published values', () => {
  it.each(CONFORMANCE_EXAMPLES)('JCGM 106:2012, $what', ({ published, recomputed, ...measured }) => {
    const p = conformanceProbability(measured)
    expect(p.toFixed(2)).toBe(published.toFixed(2))
    expect(p).toBeCloseTo(recomputed, 10)
  })
})

describe('limits', () => {
  it('on a limit it is one half, or 1 without uncertainty', () => {
    expect(conformanceProbability({ value: 97, u: 0.3, upper: 97 })).toBe(0.5)
    expect(conformanceProbability({ value: 97, u: 0, upper: 97 })).toBe(1)
    expect(conformanceProbability({ value: 87, u: 0, lower: 87, upper: 97 })).toBe(1)
  })

  it('without uncertainty it is a step', () => {
    expect(conformanceProbability({ value: 97.000001, u: 0, lower: 87, upper: 97 })).toBe(0)
    expect(conformanceProbability({ value: 92, u: 0, lower: 87 })).toBe(1)
  })

  it('without limits there is none', () => {
    expect(conformanceProbability({ value: 92, u: 0.3 })).toBeNaN()
    expect(conformanceProbability({ value: 92, u: 0 })).toBeNaN()
  })

  it('far out of spec it keeps its digits', () => {
    const p = conformanceProbability({ value: 107, u: 1, lower: 87, upper: 97 })
    expect(p / 7.619853024160527e-24).toBeCloseTo(1, 10)
    expect(conformanceProbability({ value: 77, u: 1, lower: 87, upper: 97 })).toBeCloseTo(p, 30)
  })
})

describe('laws', () => {
  const value = fc.double({ min: 80, max: 104, noNaN: true })
  const u = fc.double({ min: 1e-3, max: 10, noNaN: true })

  it('two-sided is what both one-sided ones leave: p = p_lower + p_upper - 1', () => {
    fc.assert(
      fc.property(value, u, (value, u) => {
        const both = conformanceProbability({ value, u, lower: 87, upper: 97 })
        const sum = conformanceProbability({ value, u, lower: 87 }) + conformanceProbability({ value, u, upper: 97 })
        expect(both).toBeCloseTo(sum - 1, 12)
        expect(both >= 0 && both <= 1).toBe(true)
      }),
    )
  })

  it('does not depend on the unit, nor on which side is which', () => {
    fc.assert(
      fc.property(value, u, (value, u) => {
        const p = conformanceProbability({ value, u, lower: 87, upper: 97 })
        const milli = conformanceProbability({ value: 1e3 * value, u: 1e3 * u, lower: 87e3, upper: 97e3 })
        expect(milli).toBeCloseTo(p, 12)
        expect(conformanceProbability({ value: -value, u, lower: -97, upper: -87 })).toBeCloseTo(p, 12)
      }),
    )
  })

  it('a column gives the same, row by row, and NaN where a row knows nothing', () => {
    const column = { value: Float64Array.of(86, 92, NaN, 95, 95), u: Float64Array.of(0.5, 0.5, 0.5, NaN, 0) }
    const out = fillConformanceProbability({ ...column, limits: { lower: 87, upper: 97 } }, new Float64Array(5))
    expect(out[0]).toBe(conformanceProbability({ value: 86, u: 0.5, lower: 87, upper: 97 }))
    expect(out[1]).toBe(conformanceProbability({ value: 92, u: 0.5, lower: 87, upper: 97 }))
    expect([out[2], out[3], out[4]]).toEqual([NaN, NaN, 1])
  })
})

describe('refusals', () => {
  it.each([
    ['no value', { value: NaN, u: 1, upper: 97 }],
    ['no uncertainty', { value: 92, u: NaN, upper: 97 }],
    ['a negative uncertainty', { value: 92, u: -1, upper: 97 }],
    ['limits the wrong way round', { value: 92, u: 1, lower: 97, upper: 87 }],
  ])('%s', (_, measured) => expect(() => conformanceProbability(measured)).toThrow(CoreError))
})
