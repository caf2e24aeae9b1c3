import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../core/problems/problem'
import { DOPANTS } from '../../../core/silicon/dopants'
import {
  MF723_DENSITY_RANGE_CM3,
  MF723_PIECES,
  MF723_RESISTIVITY_RANGE_OHM_CM,
  mf723Curve_ohm_cm,
  mf723Density_cm3,
  mf723Resistivity_ohm_cm,
} from '../../../core/silicon/mf723'
import { EMIS_RESISTIVITIES } from '../../reference/emis-1999'
import { MF723_ARSENIC, MF723_ARSENIC_AS_PRINTED, MF723_DECADES, MF723_ROUND_TRIP } from '../../reference/semi-mf723'

const rho = (dopant: 'boron' | 'phosphorus' | 'arsenic', concentration_cm3: number) =>
  mf723Resistivity_ohm_cm({ dopant, concentration_cm3 })

describe('resistivity from density, published values', () => {
  it.each(MF723_DECADES)('the decade %d', (concentration_cm3, phosphorus, boron) => {
    // Four digits are printed: half a unit in the last of them.
    expect(Math.abs(rho('boron', concentration_cm3) / boron - 1)).toBeLessThan(5e-4)
    if (!Number.isNaN(phosphorus))
      expect(Math.abs(rho('phosphorus', concentration_cm3) / phosphorus - 1)).toBeLessThan(5e-4)
  })

  it.each(EMIS_RESISTIVITIES)('EMIS 1999 at %d', (concentration_cm3, phosphorus, boron) => {
    // Printed to three digits, save P at 1e12 and 1e13 and B at 1e12 and 1e13 (two digits); B at 1e21 stands 4 % above the standard's fit.
    const tolerance =
      concentration_cm3 < 5e13 ? { phosphorus: 0.012, boron: 0.005 } : { phosphorus: 0.005, boron: 0.005 }
    const ofBoron = rho('boron', concentration_cm3) / boron - 1
    if (concentration_cm3 === 1e21) {
      expect(ofBoron).toBeCloseTo(-0.042, 2)
      // Beyond the standard's range for phosphorus the curve itself still agrees; the conversion refuses.
      expect(Math.abs(mf723Curve_ohm_cm('phosphorus', concentration_cm3) / phosphorus - 1)).toBeLessThan(0.005)
      return
    }
    expect(Math.abs(ofBoron)).toBeLessThan(tolerance.boron)
    expect(Math.abs(rho('phosphorus', concentration_cm3) / phosphorus - 1)).toBeLessThan(tolerance.phosphorus)
  })

  it.each(MF723_ARSENIC)('arsenic at %d', (concentration_cm3, expected) => {
    expect(Math.abs(rho('arsenic', concentration_cm3) / expected - 1)).toBeLessThan(2e-5)
  })
})

describe('laws', () => {
  it('falls with density, every dopant over its range', () => {
    const place = fc.double({ min: 0, max: 1, noNaN: true })
    fc.assert(
      fc.property(fc.constantFrom(...DOPANTS), place, place, (dopant, a, b) => {
        const { min, max } = MF723_DENSITY_RANGE_CM3[dopant]
        const at = (u: number) => Math.min(max, min * Math.pow(max / min, u))
        const [less, more] = [at(Math.min(a, b)), at(Math.max(a, b))]
        if (more > less * (1 + 1e-9)) expect(rho(dopant, more)).toBeLessThan(rho(dopant, less))
      }),
      { numRuns: 200 },
    )
  })

  it('lets arsenic follow phosphorus below 1e19 and drop by 3.8 % there', () => {
    for (const density of [1e12, 1e16, 9.99e18]) expect(rho('arsenic', density)).toBe(rho('phosphorus', density))
    expect(rho('arsenic', 1e19) / rho('phosphorus', 1e19) - 1).toBeCloseTo(-0.038, 3)
  })

  it('has pieces that meet and together span the range', () => {
    for (const dopant of DOPANTS) {
      const pieces = MF723_PIECES[dopant]
      expect(pieces[0]?.min_cm3).toBe(MF723_DENSITY_RANGE_CM3[dopant].min)
      expect(pieces[pieces.length - 1]?.max_cm3).toBe(MF723_DENSITY_RANGE_CM3[dopant].max)
      for (let i = 1; i < pieces.length; i++) expect(pieces[i]?.min_cm3).toBe(pieces[i - 1]?.max_cm3)
    }
  })
})

describe('the two published directions are not inverses', () => {
  const worst = (dopant: 'boron' | 'phosphorus') => {
    let densityAndBack = 0
    let resistivityAndBack = 0
    const { min, max } = MF723_RESISTIVITY_RANGE_OHM_CM[dopant]
    for (let i = 0; i <= 4000; i++) {
      const resistivity_ohm_cm = min * Math.pow(max / min, i / 4000)
      const density = mf723Density_cm3({ dopant, resistivity_ohm_cm })
      resistivityAndBack = Math.max(
        resistivityAndBack,
        Math.abs(mf723Curve_ohm_cm(dopant, density) / resistivity_ohm_cm - 1),
      )
      const start = 1e12 * Math.pow(MF723_DENSITY_RANGE_CM3[dopant].max / 1e12, i / 4000)
      const between = rho(dopant, start)
      if (between < min || between > max) continue
      densityAndBack = Math.max(
        densityAndBack,
        Math.abs(mf723Density_cm3({ dopant, resistivity_ohm_cm: between }) / start - 1),
      )
    }
    return { densityAndBack, resistivityAndBack }
  }

  it.each(['boron', 'phosphorus'] as const)('%s misses on return by what was measured', (dopant) => {
    const found = worst(dopant)
    expect(found.densityAndBack).toBeCloseTo(MF723_ROUND_TRIP[dopant].densityAndBack, 3)
    expect(found.resistivityAndBack).toBeCloseTo(MF723_ROUND_TRIP[dopant].resistivityAndBack, 3)
  })
})

describe('second implementations', () => {
  it("arsenic's polynomial as printed, in exact integers", () => {
    // 1e-20 is the unit; the powers of an integer log10 N are exact, so the sum is too.
    const unit = 20
    const scaled = MF723_ARSENIC_AS_PRINTED.map((printed) => {
      const [mantissa = '', exponent = '0'] = printed.split('e')
      const [whole = '', fraction = ''] = mantissa.split('.')
      return BigInt(whole + fraction) * 10n ** BigInt(unit - fraction.length + Number(exponent))
    })
    for (const decade of [19n, 20n]) {
      const log = scaled.reduce((sum, c, i) => sum + c * decade ** BigInt(i), 0n)
      const expected = Math.pow(10, Number(log) / Math.pow(10, unit))
      expect(Math.abs(rho('arsenic', Math.pow(10, Number(decade))) / expected - 1)).toBeLessThan(1e-13)
    }
    // Elsewhere as printed in floating point, whose cancellation of +-1e4 leaves some 1e-11.
    for (const density of [2e19, 7e19, 3.3e20, 6e20]) {
      const x = Math.log10(density)
      const log = MF723_ARSENIC_AS_PRINTED.reduce((sum, c, i) => sum + Number(c) * Math.pow(x, i), 0)
      expect(Math.abs(rho('arsenic', density) / Math.pow(10, log) - 1)).toBeLessThan(1e-10)
    }
  })

  it('boron and phosphorus by natural logarithms', () => {
    for (let decade = 12; decade <= 20.5; decade += 0.25) {
      const n = Math.pow(10, decade)
      const boron = (1.305e16 + 1.133e17 / (1 + Math.exp(-0.737 * (Math.log(2.58e-19) + Math.log(n))))) / n
      expect(Math.abs(rho('boron', n) / boron - 1)).toBeLessThan(1e-12)
      const y = Math.log(n / 1e16) / Math.LN10
      const over = -3.0769 + 2.2108 * y - 0.62272 * y ** 2 + 0.057501 * y ** 3
      const under = 1 - 0.68157 * y + 0.19833 * y ** 2 - 0.018376 * y ** 3
      const phosphorus = Math.exp(Math.log(6.242e18) - Math.log(n) + (Math.LN10 * over) / under)
      expect(Math.abs(rho('phosphorus', n) / phosphorus - 1)).toBeLessThan(1e-12)
    }
  })
})

describe('refusals', () => {
  it.each([
    ['boron', 1.01e21],
    ['phosphorus', 5.01e20],
    ['arsenic', 6.01e20],
    ['boron', 9.9e11],
    ['phosphorus', NaN],
    ['arsenic', 0],
  ] as const)('%s at %d', (dopant, concentration_cm3) => {
    expect(() => rho(dopant, concentration_cm3)).toThrow(CoreError)
  })

  it('density from resistivity: outside the range, and arsenic altogether', () => {
    for (const [dopant, resistivity_ohm_cm] of [
      ['boron', 1.1e4],
      ['phosphorus', 1.9e-4],
      ['phosphorus', 4100],
      ['arsenic', 1],
    ] as const) {
      expect(() => mf723Density_cm3({ dopant, resistivity_ohm_cm })).toThrow(CoreError)
    }
  })
})
