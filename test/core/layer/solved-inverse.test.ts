import { describe, expect, it } from 'vitest'
import type { LayerCurve } from '../../../core/layer/layer-curve'
import { solvedInverse } from '../../../core/layer/solved-inverse'
import { between, largestRelativeDifference, untouchedColumns } from './layer-fixtures'

/** ln R_s = -t - 0.01 t^2 and kinks of the second kind every tenth; concentration e^t, dose e^(t/2). */
function kinked(height: number): LayerCurve {
  const kinks = (t: number): number => {
    let sum = 0
    for (let at = 0.05; at < t; at += 0.1) sum += (t - at) ** 2
    return height * sum
  }
  return {
    from: 0,
    to: 3,
    bends: [],
    slopeStep: 1e-3,
    lnConcentration: (t) => t,
    lnDose: (t) => t / 2,
    lnSheetResistance: (t) => -t - 0.01 * t * t - kinks(t),
  }
}

describe('an inverse solved cell by cell', () => {
  it.each([0, 1e-7, 1e-3])('with kinks of %d: many sites and single ones alike', (height) => {
    const curve = kinked(height)
    const inverse = solvedInverse(curve)
    const { min, max } = inverse.range_ohm_sq
    expect(max).toBe(1)
    const sheets = between(min, max, 500)
    const [many, single] = [untouchedColumns(500), untouchedColumns(500)]
    inverse.fill(sheets, many)
    sheets.forEach((sheet, i) => (single.concentration_cm3[i] = inverse.pointAt(sheet).concentration))
    expect(largestRelativeDifference(many.concentration_cm3, single.concentration_cm3)).toBeLessThan(1e-9)
    const back = many.concentration_cm3.map((n) => Math.exp(curve.lnSheetResistance(Math.log(n))))
    expect(largestRelativeDifference(back, sheets)).toBeLessThan(1e-9)
    many.dose_cm2.forEach((dose, i) => expect(dose / Math.sqrt(many.concentration_cm3[i])).toBeCloseTo(1, 9))
  })

  it('gives nothing outside its range, few sites or many', () => {
    const inverse = solvedInverse(kinked(0))
    const { min, max } = inverse.range_ohm_sq
    for (const copies of [1, 40]) {
      const sheets = Float64Array.from(Array.from({ length: copies }).flatMap(() => [min / 1.01, max * 1.01, NaN, 0, -1]))
      const into = untouchedColumns(sheets.length)
      inverse.fill(sheets, into)
      expect(into.concentration_cm3.every(Number.isNaN)).toBe(true)
      expect(into.doseSensitivity.every(Number.isNaN)).toBe(true)
    }
  }) // prettier-ignore
})
