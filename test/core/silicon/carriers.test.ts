import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../core/problems/problem'
import { carriers } from '../../../core/silicon/carriers'

const NI = 7.0104e9

describe('limits', () => {
  it('has as many electrons as holes undoped', () => {
    expect(carriers({ netDoping_cm3: 0, intrinsicDensity_cm3: NI })).toEqual({ electrons_cm3: NI, holes_cm3: NI })
    expect(carriers({ netDoping_cm3: 0, intrinsicDensity_cm3: 0 })).toEqual({ electrons_cm3: 0, holes_cm3: 0 })
  })

  it('keeps every digit of the few minority carriers in heavy doping', () => {
    const { electrons_cm3, holes_cm3 } = carriers({ netDoping_cm3: 1e21, intrinsicDensity_cm3: NI })
    expect(electrons_cm3).toBe(1e21)
    expect(Math.abs(holes_cm3 / ((NI * NI) / 1e21) - 1)).toBeLessThan(1e-15)
  })
})

describe('laws', () => {
  const anyDoping = fc
    .tuple(fc.constantFrom(-1, 1), fc.double({ min: -5, max: 22, noNaN: true }))
    .map(([s, e]) => s * 10 ** e)
  const anyDensity = fc.double({ min: -10, max: 20, noNaN: true }).map((e) => 10 ** e)

  it('n p = ni^2, n - p = N, and the types mirror each other', () => {
    fc.assert(
      fc.property(anyDoping, anyDensity, (doping, intrinsicDensity_cm3) => {
        const netDoping_cm3 = Math.max(-1e22, Math.min(1e22, doping))
        const ni = Math.min(1e20, intrinsicDensity_cm3)
        const { electrons_cm3: n, holes_cm3: p } = carriers({ netDoping_cm3, intrinsicDensity_cm3: ni })
        expect(Math.abs(((n / ni) * p) / ni - 1)).toBeLessThan(1e-14)
        expect(Math.abs(n - p - netDoping_cm3)).toBeLessThanOrEqual(1e-15 * (n + p))
        const mirror = carriers({ netDoping_cm3: -netDoping_cm3, intrinsicDensity_cm3: ni })
        expect([mirror.electrons_cm3, mirror.holes_cm3]).toEqual([p, n])
      }),
      { numRuns: 200 },
    )
  })
})

it('agrees with a second implementation by the hyperbolic sine of the Fermi level', () => {
  for (const doping of [-1e14, -3e10, 1e9, 7e9, 1e12, 1e16]) {
    const level = Math.asinh(doping / (2 * NI))
    const { electrons_cm3, holes_cm3 } = carriers({ netDoping_cm3: doping, intrinsicDensity_cm3: NI })
    expect(Math.abs(electrons_cm3 / (NI * Math.exp(level)) - 1)).toBeLessThan(1e-13)
    expect(Math.abs(holes_cm3 / (NI * Math.exp(-level)) - 1)).toBeLessThan(1e-13)
  }
})

it('refuses what is not a density', () => {
  for (const netDoping_cm3 of [NaN, 2e22, -Infinity]) {
    expect(() => carriers({ netDoping_cm3, intrinsicDensity_cm3: NI })).toThrow(CoreError)
  }
  for (const intrinsicDensity_cm3 of [NaN, -1, 1e21]) {
    expect(() => carriers({ netDoping_cm3: 1e15, intrinsicDensity_cm3 })).toThrow(CoreError)
  }
})
