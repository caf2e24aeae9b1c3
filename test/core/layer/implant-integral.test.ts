import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { implantDose_cm2, implantSheetResistance_ohm_sq } from '../../../core/layer/implant-integral'
import type { ImplantedGaussian } from '../../../core/layer/implant-integral'
import { erfc } from '../../../core/numeric/erfc'
import { modelOf, tanhSinh } from './layer-fixtures'

const q = 1.602176634e-19
const silicon = { dopant: 'boron', mobility: modelOf('masetti'), temperature_K: 300 } as const
const constantSilicon = { ...silicon, mobility: modelOf('constant') }
const constantHoleMobility = 250

const anyImplant = fc
  .record({
    range_um: fc.double({ min: 0.01, max: 1, noNaN: true }),
    rangeInStraggles: fc.double({ min: 0.3, max: 6, noNaN: true }),
    logPeak: fc.double({ min: 16.1, max: 21, noNaN: true }),
    background_cm3: fc.constantFrom(0, 1e13, 1e15, 1e16),
  })
  .map(({ range_um, rangeInStraggles, logPeak, background_cm3 }): ImplantedGaussian => {
    return { silicon, range_um, straggle_um: range_um / rangeInStraggles, peak_cm3: 10 ** logPeak, background_cm3 }
  })

/** Over the conducting depths in one, cut at the peak. */
function sheetByTanhSinh({ range_um, straggle_um, peak_cm3, background_cm3 }: ImplantedGaussian): number {
  const z = background_cm3 > 0 ? Math.sqrt(2 * Math.log(peak_cm3 / background_cm3)) : 9
  const conductivity = (x: number): number => {
    const n = peak_cm3 * Math.exp(-(((x - range_um) / straggle_um) ** 2) / 2)
    const query = { carrier: 'hole', dopant: 'boron', impurity_cm3: n + background_cm3, temperature_K: 300 } as const
    return q * silicon.mobility.mobility_cm2_per_Vs(query) * (n - background_cm3)
  }
  const [from, to] = [Math.max(0, range_um - z * straggle_um), range_um + z * straggle_um]
  return 1e4 / (tanhSinh(conductivity, from, range_um) + tanhSinh(conductivity, range_um, to))
}

describe('sheet resistance of an implant', () => {
  it('with one mobility and no background is 1 / (q mu Q) of the dose inside the silicon', () => {
    for (const [range_um, straggle_um] of [
      [0.1, 0.04],
      [0.05, 0.1],
      [1, 0.1],
    ]) {
      const implant = { silicon: constantSilicon, range_um, straggle_um, peak_cm3: 3e19, background_cm3: 0 }
      const inside = 1 - erfc(range_um / straggle_um / Math.SQRT2) / 2
      const exact = 1 / (q * constantHoleMobility * implantDose_cm2(implant) * inside)
      expect(Math.abs(implantSheetResistance_ohm_sq(implant) / exact - 1)).toBeLessThan(1e-12)
    }
  })

  it('with one mobility and a background loses the background between its two junctions', () => {
    const implant = { silicon: constantSilicon, range_um: 1, straggle_um: 0.1, peak_cm3: 1e18, background_cm3: 1e16 }
    const z = Math.sqrt(2 * Math.log(100))
    const net = implantDose_cm2(implant) * (1 - erfc(z / Math.SQRT2)) - 1e16 * 2 * z * 0.1e-4
    expect(implantSheetResistance_ohm_sq(implant) * q * constantHoleMobility * net).toBeCloseTo(1, 12)
  })

  it('is half as conducting cut at its peak: range next to nothing', () => {
    const whole = { silicon, range_um: 10, straggle_um: 0.1, peak_cm3: 1e19, background_cm3: 1e15 }
    const half = implantSheetResistance_ohm_sq({ ...whole, range_um: 1e-12 })
    expect(half / implantSheetResistance_ohm_sq(whole)).toBeCloseTo(2, 9)
  })

  it('falls with dose, rises with background', () => {
    fc.assert(
      fc.property(anyImplant, (implant) => {
        const sheet = implantSheetResistance_ohm_sq(implant)
        expect(implantSheetResistance_ohm_sq({ ...implant, peak_cm3: implant.peak_cm3 * 1.001 })).toBeLessThan(sheet)
        const more = implant.background_cm3 * 1.01 + 1e12
        expect(implantSheetResistance_ohm_sq({ ...implant, background_cm3: more })).toBeGreaterThan(sheet)
      }),
      { numRuns: 150 },
    )
  })

  it('scales with depth: twice the range and straggle, half the resistance', () => {
    fc.assert(
      fc.property(anyImplant, (implant) => {
        const deep = { ...implant, range_um: 2 * implant.range_um, straggle_um: 2 * implant.straggle_um }
        const ratio = implantSheetResistance_ohm_sq(implant) / implantSheetResistance_ohm_sq(deep)
        expect(ratio).toBeCloseTo(2, 11)
      }),
      { numRuns: 100 },
    )
  })

  it('agrees with the tanh-sinh rule to 1e-10', () => {
    fc.assert(
      fc.property(anyImplant, (implant) => {
        const ratio = implantSheetResistance_ohm_sq(implant) / sheetByTanhSinh(implant)
        expect(Math.abs(ratio - 1)).toBeLessThan(1e-10)
      }),
      { numRuns: 150 },
    )
  })
})

describe('dose of an implant', () => {
  it('is the integral of the whole Gaussian', () => {
    const [peak_cm3, straggle_um] = [2e19, 0.03]
    const gaussian = (x_um: number): number => peak_cm3 * Math.exp(-((x_um / straggle_um) ** 2) / 2)
    const integral = 1e-4 * tanhSinh(gaussian, -12 * straggle_um, 12 * straggle_um)
    expect(implantDose_cm2({ peak_cm3, straggle_um }) / integral).toBeCloseTo(1, 12)
  })
})
