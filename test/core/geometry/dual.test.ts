import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { DUAL_RATIO, dualQuadratic, dualSheetResistance, dualSheetResistances } from '../../../core/geometry/dual'
import { thinSheetFactor } from '../../../core/geometry/thin-sheet'
import type { PinSpacings } from '../../../core/geometry/pin-line'
import { CoreError } from '../../../core/problems/problem'
import { MF1529_COEFFICIENTS, QUADRATIC_AGAINST_EXACT_PERCENT } from '../../reference/semi-mf1529-dual'

const RA = Math.log(4) / (2 * Math.PI)
const RB = Math.log(3) / (2 * Math.PI)
const solve = (resistanceA_ohm: number, resistanceB_ohm: number) =>
  dualSheetResistance({ resistanceA_ohm, resistanceB_ohm })
/** V/I of pins in line on an infinite sheet of 1 ohm/sq. */
const resistance = (configuration: 'A' | 'B', spacings_mm: PinSpacings) => {
  const sheet = { outline: { shape: 'infinite' }, x_mm: 0, y_mm: 0, orientation: { angleDeg: 0 } } as const
  return 1 / thinSheetFactor({ ...sheet, configuration, spacings_mm }).value
}

describe('published values', () => {
  it('equal pitch: RA/Rs = 0.220635600, RB/Rs = 0.174849576', () => {
    expect(resistance('A', [1, 1, 1])).toBeCloseTo(0.2206356, 9)
    expect(resistance('B', [1, 1, 1])).toBeCloseTo(0.174849576, 9)
    expect(solve(RA, RB).sheetResistance_ohm_sq).toBeCloseTo(1, 14)
  })

  it.each(QUADRATIC_AGAINST_EXACT_PERCENT)('MF1529 eq. 8 against the exact relation: RA/RB = %f', (ratio, percent) => {
    const [c0, c1, c2] = MF1529_COEFFICIENTS
    const printed = c0 + c1 * ratio + c2 * ratio * ratio
    const decimals = percent.split('.')[1]!.length
    const exact = solve(ratio, 1).sheetResistance_ohm_sq / ratio
    expect(Math.abs(100 * (printed / exact - 1) - Number(percent))).toBeLessThan(0.51 * 10 ** -decimals)
    if (ratio < 1.2 || ratio > 1.35) return
    expect(dualQuadratic({ resistanceA_ohm: ratio, resistanceB_ohm: 1 }).value).toBeCloseTo(printed * ratio, 12)
  })

  it('MF1529 eq. 8: the minus sign makes it pi/ln 2 for equal pins; as printed it would be 33.9', () => {
    const ka = dualQuadratic({ resistanceA_ohm: RA, resistanceB_ohm: RB }).value / RA
    expect(ka).toBeCloseTo(4.534287, 5)
    expect(ka + 2 * 14.696).toBeCloseTo(33.9, 1)
  })
})

describe('limits', () => {
  it('RB half of RA: the golden section', () => {
    // exp(-x) + exp(-x/2) = 1 at exp(-x/2) = (sqrt 5 - 1)/2.
    const x = -2 * Math.log((Math.sqrt(5) - 1) / 2)
    expect(solve(2, 1).sheetResistance_ohm_sq).toBeCloseTo((4 * Math.PI) / x, 13)
  })

  it('RB far below RA: Rs = 2 pi RA/ln 2', () => {
    expect(solve(DUAL_RATIO.max, 1).sheetResistance_ohm_sq / DUAL_RATIO.max).toBeCloseTo((2 * Math.PI) / Math.LN2, 1)
  })
})

const ratioArbitrary = fc
  .double({ min: Math.log(0.00101), max: Math.log(990), noNaN: true })
  .map((x) => 1 + Math.exp(x))
const pins = fc.tuple(...[0, 1, 2].map(() => fc.double({ min: 0.7, max: 1.4, noNaN: true }))) as fc.Arbitrary<
  [number, number, number]
>

describe('laws', () => {
  it('any spacings on the infinite sheet give its sheet resistance', () => {
    fc.assert(
      fc.property(pins, (spacings_mm) => {
        const { sheetResistance_ohm_sq } = solve(resistance('A', spacings_mm), resistance('B', spacings_mm))
        expect(Math.abs(sheetResistance_ohm_sq - 1)).toBeLessThan(2e-14)
      }),
    )
  })

  it('satisfies the relation over the whole domain, and scales with the resistances', () => {
    fc.assert(
      fc.property(ratioArbitrary, fc.double({ min: 1e-6, max: 1e6, noNaN: true }), (ratio, scale) => {
        const rs = solve(ratio, 1).sheetResistance_ohm_sq
        const residual = Math.exp((-2 * Math.PI * ratio) / rs) + Math.exp((-2 * Math.PI * (ratio - 1)) / rs) - 1
        expect(Math.abs(residual)).toBeLessThan(1e-13)
        expect(Math.abs(solve(ratio * scale, scale).sheetResistance_ohm_sq / (rs * scale) - 1)).toBeLessThan(1e-11)
      }),
    )
  })

  it('the partial derivatives agree with central differences and add up to 1', () => {
    fc.assert(
      fc.property(fc.double({ min: 1.05, max: 50, noNaN: true }), (ratio) => {
        const h = 1e-6
        const lnRs = (a: number, b: number) => Math.log(solve(ratio * Math.exp(a), Math.exp(b)).sheetResistance_ohm_sq)
        const { dLnA, dLnB } = solve(ratio, 1)
        const scale = Math.abs(dLnA)
        expect(Math.abs((lnRs(h, 0) - lnRs(-h, 0)) / (2 * h) - dLnA)).toBeLessThan(1e-7 * scale)
        expect(Math.abs((lnRs(0, h) - lnRs(0, -h)) / (2 * h) - dLnB)).toBeLessThan(1e-7 * scale)
        expect(dLnA + dLnB).toBeCloseTo(1, 12)
      }),
    )
  })

  it('columns are the single values, NaN where there is none', () => {
    const resistanceA_ohm = Float64Array.of(RA, 50, NaN, 1, 1, -2)
    const resistanceB_ohm = Float64Array.of(RB, 40, 1, 1, 0, -1)
    const columns = dualSheetResistances({ resistanceA_ohm, resistanceB_ohm })
    expect([...columns.sheetResistance_ohm_sq].map(Number.isFinite)).toEqual([true, true, false, false, false, false])
    const single = solve(50, 40)
    expect(columns.sheetResistance_ohm_sq[1]).toBe(single.sheetResistance_ohm_sq)
    expect(columns.dLnA[1]).toBe(single.dLnA)
    expect(columns.dLnB[1]).toBe(single.dLnB)
  })
})

describe('a second route', () => {
  it('bisection on exp(2 pi RA/Rs) - exp(2 pi RB/Rs) = 1', () => {
    for (const ratio of [1.02, 1.1, 1.2, 1.2619, 1.35, 1.5, 2, 5, 30]) {
      let [low, high] = [0.01 * ratio, 1000 * ratio]
      for (let step = 0; step < 200; step++) {
        const middle = (low + high) / 2
        // In logarithms, so that a small Rs does not overflow.
        const left = (2 * Math.PI * ratio) / middle + Math.log(-Math.expm1((-2 * Math.PI * (ratio - 1)) / middle))
        if (left > 0) low = middle
        else high = middle
      }
      expect(Math.abs(solve(ratio, 1).sheetResistance_ohm_sq / low - 1)).toBeLessThan(1e-12)
    }
  })
})

describe('refusals', () => {
  it('refuses what is not RA > RB > 0', () => {
    for (const [a, b] of [
      [1, 1],
      [1, 2],
      [1, 0],
      [1, -1],
      [-2, -1],
      [NaN, 1],
      [1, NaN],
      [2000, 1],
      [Infinity, 1],
    ]) {
      expect(() => solve(a!, b!)).toThrow(CoreError)
    }
    for (const ratio of [1.19, 1.36, NaN]) {
      expect(() => dualQuadratic({ resistanceA_ohm: ratio, resistanceB_ohm: 1 })).toThrow(CoreError)
    }
    const uneven = { resistanceA_ohm: new Float64Array(2), resistanceB_ohm: new Float64Array(3) }
    expect(() => dualSheetResistances(uneven)).toThrow(CoreError)
  })
})
