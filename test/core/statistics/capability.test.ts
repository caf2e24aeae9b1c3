import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../core/problems/problem'
import { capability } from '../../../core/statistics/capability'
import { summarize } from '../../../core/statistics/summarize'
import { FURNACE_CAPABILITY } from '../../reference/nist-handbook-statistics'
import { strdRows } from '../../reference/nist-strd'

const furnace = summarize(Float64Array.from(strdRows('handbook-furnace'), (row) => Number(row[3])))
const sample = { mean: 94, standardDeviation: 1, count: 49 }

describe('published values', () => {
  it('NIST e-Handbook 3.5.1.2: the furnace data, all printed digits', () => {
    const { cp, cpl, cpu, cpk } = capability({ ...furnace, limits: FURNACE_CAPABILITY.limits })
    const printed = ({ value, interval }: typeof cpk) =>
      [value, interval.lower, interval.upper].map((x) => x.toFixed(5))
    expect(printed(cp!)).toEqual(FURNACE_CAPABILITY.cp.map((x) => x.toFixed(5)))
    expect(printed(cpk)).toEqual(FURNACE_CAPABILITY.cpk.map((x) => x.toFixed(5)))
    expect([cpl!.value, cpu!.value].map((x) => x.toFixed(5))).toEqual([
      FURNACE_CAPABILITY.cpl.toFixed(5),
      FURNACE_CAPABILITY.cpu.toFixed(5),
    ])
  })
})

describe('limits', () => {
  it('with one limit there is that side only', () => {
    const below = capability({ ...sample, limits: { lower: 91 } })
    expect([below.cp, below.cpu, below.cpl!.value, below.cpk.value]).toEqual([null, null, 1, 1])
    const above = capability({ ...sample, limits: { upper: 100 } })
    expect([above.cp, above.cpl, above.cpu!.value, above.cpk.value]).toEqual([null, null, 2, 2])
  })

  it('centred: Cpk is Cp; outside the limits it is negative', () => {
    const centred = capability({ ...sample, limits: { lower: 90, upper: 98 } })
    expect(centred.cpk.value).toBe(centred.cp!.value)
    expect(capability({ ...sample, limits: { lower: 95, upper: 98 } }).cpk.value).toBeCloseTo(-1 / 3, 14)
  })
})

describe('laws', () => {
  it('Cpk is at most Cp, Cpl and Cpu have Cp as their mean, and a higher level is wider', () => {
    const mean = fc.double({ min: 80, max: 110, noNaN: true })
    fc.assert(
      fc.property(mean, fc.double({ min: 0.1, max: 20, noNaN: true }), (mean, standardDeviation) => {
        const of = (level: number) =>
          capability({ mean, standardDeviation, count: 30, limits: { lower: 90, upper: 98 }, level })
        const { cp, cpl, cpu, cpk } = of(0.95)
        expect(cpk.value).toBeLessThanOrEqual(cp!.value + 1e-12)
        expect((cpl!.value + cpu!.value) / 2).toBeCloseTo(cp!.value, 9)
        expect(of(0.99).cp!.interval.upper).toBeGreaterThan(cp!.interval.upper)
        expect(of(0.99).cpk.interval.lower).toBeLessThan(cpk.interval.lower)
      }),
    )
  })
})

describe('refusals', () => {
  it('no limits, limits the wrong way round, no spread, one value', () => {
    const limits = { lower: 90, upper: 98 }
    expect(() => capability({ ...sample, limits: {} })).toThrow(CoreError)
    expect(() => capability({ ...sample, limits: { lower: 98, upper: 90 } })).toThrow(CoreError)
    expect(() => capability({ ...sample, limits: { lower: NaN } })).toThrow(CoreError)
    expect(() => capability({ ...sample, standardDeviation: 0, limits })).toThrow(CoreError)
    expect(() => capability({ ...sample, standardDeviation: NaN, limits })).toThrow(CoreError)
    expect(() => capability({ ...sample, count: 1, limits })).toThrow(CoreError)
  })
})
