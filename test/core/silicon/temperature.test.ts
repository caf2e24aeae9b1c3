import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../core/problems/problem'
import {
  temperatureCoefficient,
  temperatureFactor,
  temperatureFactorSlope_per_C,
} from '../../../core/silicon/temperature'
import { MF1527_COEFFICIENTS, MF1527_TABLE_R2_1 } from '../../reference/semi-mf1527-temperature'

describe('SEMI MF1527, table R2-1', () => {
  it.each(MF1527_COEFFICIENTS)('at %d ohm cm', (resistivity_ohm_cm, phosphorus, boron) => {
    const of = (dopant: 'phosphorus' | 'boron' | 'arsenic') =>
      temperatureCoefficient({ dopant, resistivity_ohm_cm }).coefficient_percent_per_C
    // Four decimals are printed.
    expect(Math.abs(of('phosphorus') - phosphorus)).toBeLessThan(6e-5)
    expect(Math.abs(of('boron') - boron)).toBeLessThan(6e-5)
    expect(of('arsenic')).toBe(of('phosphorus'))
  })

  it('agrees with the powers summed one by one', () => {
    for (const dopant of ['phosphorus', 'boron'] as const) {
      for (let x = -6.9; x < 6.2; x += 0.37) {
        const sum = MF1527_TABLE_R2_1[dopant].map((a, n) => a * Math.pow(x, n)).reduce((a, b) => a + b)
        const found = temperatureCoefficient({ dopant, resistivity_ohm_cm: Math.exp(x) })
        expect(Math.abs(found.coefficient_percent_per_C - sum)).toBeLessThan(1e-10)
      }
    }
  })

  it('holds the coefficient at the ends of its range and says so', () => {
    const at = (resistivity_ohm_cm: number) => temperatureCoefficient({ dopant: 'boron', resistivity_ohm_cm })
    expect(at(2000)).toEqual({ ...at(500), isClamped: true })
    expect(at(1e-4)).toEqual({ ...at(0.001), isClamped: true })
    expect([at(500).isClamped, at(0.001).isClamped]).toEqual([false, false])
  })
})

describe('temperature factor', () => {
  const degrees = fc.double({ min: 18, max: 28, noNaN: true })
  const coefficient = fc.double({ min: -1, max: 1, noNaN: true })

  it('is 1 - C_T (T - 23) to 23 C: 0.8 %/C two degrees above takes 1.6 % off', () => {
    expect(temperatureFactor({ coefficient_percent_per_C: 0.8, measured_C: 25, reference_C: 23 })).toBeCloseTo(
      0.984,
      15,
    )
  })

  it('is 1 without a difference or a coefficient, and goes through any third temperature', () => {
    fc.assert(
      fc.property(coefficient, degrees, degrees, degrees, (c, a, b, third) => {
        const from = (measured_C: number, reference_C: number) =>
          temperatureFactor({ coefficient_percent_per_C: c, measured_C, reference_C })
        expect(from(a, a)).toBe(1)
        expect(temperatureFactor({ coefficient_percent_per_C: 0, measured_C: a, reference_C: b })).toBe(1)
        expect(from(a, third) * from(third, b)).toBeCloseTo(from(a, b), 14)
        expect(from(a, b) * from(b, a)).toBeCloseTo(1, 14)
      }),
      { numRuns: 200 },
    )
  })

  it('has the slope that two neighbouring temperatures give', () => {
    fc.assert(
      fc.property(coefficient, degrees, degrees, (c, measured_C, reference_C) => {
        const step = { coefficient_percent_per_C: c, measured_C, reference_C }
        const at = (t: number) => Math.log(temperatureFactor({ ...step, measured_C: t }))
        const expected = (at(measured_C + 1e-3) - at(measured_C - 1e-3)) / 2e-3
        expect(Math.abs(temperatureFactorSlope_per_C(step) - expected)).toBeLessThan(1e-10)
      }),
      { numRuns: 200 },
    )
  })
})

describe('refusals', () => {
  it.each([NaN, 0, -1, Infinity])('coefficient at %d ohm cm', (resistivity_ohm_cm) => {
    expect(() => temperatureCoefficient({ dopant: 'boron', resistivity_ohm_cm })).toThrow(CoreError)
  })
  it('temperatures and coefficients that are none, or that would bring resistivity to nothing', () => {
    const fine = { coefficient_percent_per_C: 0.8, measured_C: 25, reference_C: 23 }
    expect(() => temperatureFactor({ ...fine, measured_C: NaN })).toThrow(CoreError)
    expect(() => temperatureFactor({ ...fine, reference_C: 298 })).toThrow(CoreError)
    expect(() => temperatureFactor({ ...fine, coefficient_percent_per_C: 11 })).toThrow(CoreError)
    expect(() => temperatureFactor({ ...fine, measured_C: 150 })).toThrow(CoreError)
    expect(() => temperatureFactorSlope_per_C({ ...fine, measured_C: 150 })).toThrow(CoreError)
  })
})
