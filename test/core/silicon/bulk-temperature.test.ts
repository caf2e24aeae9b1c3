import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../core/problems/problem'
import { bulkTemperatureFactor, bulkTemperatureFactors } from '../../../core/silicon/bulk-temperature'
import { DOPANTS } from '../../../core/silicon/dopants'
import { temperatureCoefficient } from '../../../core/silicon/temperature'

const anyDopant = fc.constantFrom(...DOPANTS)
const anyResistivity = fc.double({ min: -4, max: 4, noNaN: true }).map((e) => 10 ** e)
const near23 = fc.double({ min: 18, max: 28, noNaN: true })

describe('published convention', () => {
  it('SEMI MF1527: 10 ohm cm boron at 23 C reads 1.6 % more at 25 C, and comes back', () => {
    // C_T of 10 ohm cm boron is 0.8248 %/C (table R2-1); rho(T) = rho(23) / (1 - C_T (T - 23)).
    const measured = 10 / (1 - 0.008248 * 2)
    const found = bulkTemperatureFactor({
      dopant: 'boron',
      resistivity_ohm_cm: measured,
      measured_C: 25,
      reference_C: 23,
    })
    expect(found.coefficient_percent_per_C).toBeCloseTo(0.8248, 4)
    expect(measured * found.factor).toBeCloseTo(10, 5)
    expect(found.resistivityAt23C_ohm_cm).toBe(measured * found.factor)
  })
})

describe('laws', () => {
  it('takes the coefficient at the resistivity that it finds', () => {
    fc.assert(
      fc.property(
        anyDopant,
        anyResistivity,
        fc.double({ min: -50, max: 100, noNaN: true }),
        (dopant, resistivity_ohm_cm, measured_C) => {
          const found = bulkTemperatureFactor({ dopant, resistivity_ohm_cm, measured_C, reference_C: 23 })
          const there = temperatureCoefficient({ dopant, resistivity_ohm_cm: resistivity_ohm_cm * found.factor })
          expect(Math.abs(found.coefficient_percent_per_C - there.coefficient_percent_per_C)).toBeLessThan(1e-11)
          expect(Math.abs(1 - (there.coefficient_percent_per_C / 100) * (measured_C - 23) - found.factor)).toBeLessThan(
            1e-12,
          )
          expect(found.isClamped).toBe(there.isClamped)
        },
      ),
      { numRuns: 200 },
    )
  })

  it('comes back from another temperature to where it was', () => {
    fc.assert(
      fc.property(anyDopant, anyResistivity, near23, near23, (dopant, resistivity_ohm_cm, a, b) => {
        const there = bulkTemperatureFactor({ dopant, resistivity_ohm_cm, measured_C: a, reference_C: b }).factor
        const moved = resistivity_ohm_cm * there
        const back = bulkTemperatureFactor({ dopant, resistivity_ohm_cm: moved, measured_C: b, reference_C: a }).factor
        expect(Math.abs(there * back - 1)).toBeLessThan(1e-12)
      }),
      { numRuns: 200 },
    )
  })

  it('is exactly 1 when measured at the reference', () => {
    fc.assert(
      fc.property(anyDopant, anyResistivity, near23, (dopant, resistivity_ohm_cm, t) => {
        expect(bulkTemperatureFactor({ dopant, resistivity_ohm_cm, measured_C: t, reference_C: t }).factor).toBe(1)
      }),
      { numRuns: 50 },
    )
  })

  it('has a slope within 2 % of the whole change: what the coefficient moves by itself is that little', () => {
    fc.assert(
      fc.property(
        fc.constantFrom('boron' as const, 'phosphorus' as const),
        fc.double({ min: 0, max: 2.5, noNaN: true }),
        near23,
        (dopant, e, t) => {
          const query = { dopant, resistivity_ohm_cm: 10 ** e, reference_C: 23 }
          const at = (measured_C: number) => Math.log(bulkTemperatureFactor({ ...query, measured_C }).factor)
          const whole = (at(t + 0.01) - at(t - 0.01)) / 0.02
          expect(Math.abs(bulkTemperatureFactor({ ...query, measured_C: t }).slope_per_C / whole - 1)).toBeLessThan(
            0.02,
          )
        },
      ),
      { numRuns: 100 },
    )
  })
})

it('agrees with a second implementation: bisection on the resistivity at 23 C', () => {
  for (const [resistivity, t] of [
    [0.03, 27.5],
    [0.5, 18.2],
    [12, 26],
    [300, 19],
  ] as const) {
    let [low, high] = [resistivity / 2, resistivity * 2]
    for (let i = 0; i < 100; i++) {
      const middle = (low + high) / 2
      const c = temperatureCoefficient({ dopant: 'phosphorus', resistivity_ohm_cm: middle }).coefficient_percent_per_C
      if (middle / (1 - (c * (t - 23)) / 100) < resistivity) low = middle
      else high = middle
    }
    const found = bulkTemperatureFactor({
      dopant: 'phosphorus',
      resistivity_ohm_cm: resistivity,
      measured_C: t,
      reference_C: 23,
    })
    expect(Math.abs(found.resistivityAt23C_ohm_cm / low - 1)).toBeLessThan(1e-12)
  }
})

describe('the column function', () => {
  it('fills as the single function would, NaN where a row has no factor', () => {
    const columns = {
      resistivity_ohm_cm: Float64Array.of(10, 0.02, 2000, NaN, 10, -3, 10, 1),
      measured_C: Float64Array.of(24.1, 21.5, 23.7, 23, NaN, 23, 250, 22),
    }
    const into = { factor: new Float64Array(8), slope_per_C: new Float64Array(8), isClamped: new Uint8Array(8) }
    bulkTemperatureFactors(columns, { dopant: 'boron', reference_C: 22 }, into)
    for (const row of [0, 1, 2, 7]) {
      const single = bulkTemperatureFactor({
        dopant: 'boron',
        resistivity_ohm_cm: columns.resistivity_ohm_cm[row] ?? NaN,
        measured_C: columns.measured_C[row] ?? NaN,
        reference_C: 22,
      })
      expect([into.factor[row], into.slope_per_C[row], into.isClamped[row] === 1]).toEqual([
        single.factor,
        single.slope_per_C,
        single.isClamped,
      ])
    }
    expect([...into.isClamped]).toEqual([0, 0, 1, 0, 0, 0, 0, 0])
    for (const row of [3, 4, 5, 6]) expect([into.factor[row], into.slope_per_C[row]]).toEqual([NaN, NaN])
  })
})

describe('refusals', () => {
  const fine = { dopant: 'boron', resistivity_ohm_cm: 1, measured_C: 23, reference_C: 23 } as const
  it.each([
    { resistivity_ohm_cm: 0 },
    { resistivity_ohm_cm: NaN },
    { measured_C: 120 },
    { measured_C: NaN },
    { reference_C: 296 },
  ])('%o', (wrong) => {
    expect(() => bulkTemperatureFactor({ ...fine, ...wrong })).toThrow(CoreError)
  })
})
