import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { fillVerdicts, judgeValue, siteFindings } from '../../../core/conformity/judge-sites'
import { VERDICTS, countVerdicts } from '../../../core/conformity/verdict'

const limits = { lower: 87, upper: 97 }

describe('a value against its limits', () => {
  it.each([
    [87, 'in-spec'],
    [97, 'in-spec'],
    [86.99999999, 'out-of-spec'],
    [97.00000001, 'out-of-spec'],
    [NaN, 'not-assessed'],
    [Infinity, 'out-of-spec'],
  ])('%s is %s', (value, verdict) => expect(judgeValue(value, limits)).toBe(verdict))

  it('one limit is enough, none is nothing to judge by', () => {
    expect(judgeValue(1, { upper: 97 })).toBe('in-spec')
    expect(judgeValue(1, { lower: 87 })).toBe('out-of-spec')
    expect(judgeValue(92, {})).toBe('not-assessed')
    expect(judgeValue(92, undefined)).toBe('not-assessed')
  })

  it('a column says the same as one at a time', () => {
    const oneLimit = fc.option(fc.integer({ min: 0, max: 10 }), { nil: undefined })
    fc.assert(
      fc.property(fc.array(fc.oneof(fc.integer({ min: -2, max: 12 }), fc.constant(NaN))), oneLimit, oneLimit, (values, lower, upper) => {
        const codes = fillVerdicts(Float64Array.from(values), { lower, upper }, new Uint8Array(values.length))
        expect([...codes].map((code) => VERDICTS[code])).toEqual(values.map((value) => judgeValue(value, { lower, upper })))
      }),
    ) // prettier-ignore
  })

  it('counts of a part of a column', () => {
    expect(countVerdicts(Uint8Array.of(0, 1, 1, 3), Uint32Array.of(0, 1, 3))).toEqual({
      'in-spec': 1, 'out-of-spec': 1, undecided: 0, 'not-assessed': 1,
    }) // prettier-ignore
  })
})

describe('the sites of a wafer', () => {
  const x_mm = Float64Array.of(0, 40, 79, 81, 100)
  const y_mm = new Float64Array(5)
  const find = (values: number[], places = x_mm) => {
    const value = Float64Array.from(values)
    const verdict = fillVerdicts(value, limits, new Uint8Array(5))
    return siteFindings({ value, verdict, x_mm: places, y_mm, sites: Uint32Array.of(0, 1, 2, 3, 4), limits })
  }

  it('counts each side', () => {
    expect(find([86, 92, 98, 99, NaN])).toMatchObject({ above: 2, below: 1 })
    expect(find([86, 92, 98, 99, NaN]).counts).toMatchObject({ 'in-spec': 1, 'out-of-spec': 3, 'not-assessed': 1 })
  })

  it('at the edge: only where all sites out lie beyond 80 % of the largest radius', () => {
    expect(find([92, 92, 92, 99, 99]).outOnlyAtEdge).toBe(true)
    expect(find([92, 92, 92, 92, 99]).outOnlyAtEdge).toBe(true)
    expect(find([92, 92, 99, 99, 99]).outOnlyAtEdge).toBe(false)
    expect(find([99, 92, 92, 92, 99]).outOnlyAtEdge).toBe(false)
  })

  it('not at the edge: none out, nothing judged further in, or no places known', () => {
    expect(find([92, 92, 92, 92, 92]).outOnlyAtEdge).toBe(false)
    expect(find([92, 99, 99, 99, 99], Float64Array.of(100, 100, -100, -100, 100)).outOnlyAtEdge).toBe(false)
    expect(find([92, 92, 92, 92, 99], Float64Array.of(0, 40, 79, 81, NaN)).outOnlyAtEdge).toBe(false)
  })
})
