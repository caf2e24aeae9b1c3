import { describe, expect, it } from 'vitest'
import { TABLE_FROM_SITES, curveInverse } from '../../../core/layer/curve-layer'
import type { LayerCurve } from '../../../core/layer/layer-curve'
import { between, untouchedColumns } from './layer-fixtures'

/** ln R = -t - 0.2 sin t, ln N = t, ln Q = 2 t: known in closed form, and counting how often it is asked. */
function countedCurve(bend = 0): { curve: LayerCurve; calls: () => number } {
  let calls = 0
  const lnSheetResistance = (t: number): number => {
    calls++
    return -t - 0.2 * Math.sin(t) - (t > 2 ? bend : 0)
  }
  const bends = bend === 0 ? [] : [2]
  return {
    calls: () => calls,
    curve: { from: 0, to: 6, bends, lnConcentration: (t) => t, lnDose: (t) => 2 * t, lnSheetResistance },
  }
}

const sheetAt = (t: number, jump = 0): number => Math.exp(-t - 0.2 * Math.sin(t) - jump)
const depths = between(0.01, 5.99, 500)

describe('inverse of a layer curve', () => {
  it('meets the closed form, with its slopes', () => {
    const into = untouchedColumns(depths.length)
    curveInverse(countedCurve().curve).fill(
      depths.map((t) => sheetAt(t)),
      into,
    )
    depths.forEach((t, i) => {
      expect(Math.abs(Math.log(into.concentration_cm3[i]) - t)).toBeLessThan(1e-10)
      expect(Math.abs(Math.log(into.dose_cm2[i]) - 2 * t)).toBeLessThan(2e-10)
      expect(into.concentrationSensitivity[i]).toBeCloseTo(-1 / (1 + 0.2 * Math.cos(t)), 7)
      expect(into.doseSensitivity[i]).toBeCloseTo(-2 / (1 + 0.2 * Math.cos(t)), 7)
    })
  })

  it('leaves the columns alone that are not its own', () => {
    const into = untouchedColumns(2)
    curveInverse(countedCurve().curve).fill(Float64Array.of(0.5, NaN), into)
    expect([...into.resistivity_ohm_cm, ...into.thickness_um]).toEqual([-1, -1, -1, -1])
  })

  it('makes its table once, for many sites alone', () => {
    const { curve, calls } = countedCurve()
    const inverse = curveInverse(curve)
    const ask = (count: number): number => {
      const before = calls()
      inverse.fill(new Float64Array(count).fill(0.5), untouchedColumns(count))
      return calls() - before
    }
    expect(ask(TABLE_FROM_SITES - 1)).toBeGreaterThan(TABLE_FROM_SITES)
    expect(ask(TABLE_FROM_SITES)).toBeGreaterThan(0)
    expect(ask(100_000)).toBe(0)
  })

  it('keeps to both sides of a jump, and answers inside it with the jump itself', () => {
    const { curve } = countedCurve(0.3)
    const [low, high] = [1.9, 2.1]
    const sheets = [sheetAt(low), sheetAt(2, 0.15), sheetAt(high, 0.3)]
    for (const repeats of [1, 40]) {
      const column = Float64Array.from(Array.from({ length: repeats }).flatMap(() => sheets))
      const into = untouchedColumns(column.length)
      curveInverse(curve).fill(column, into)
      expect(Math.log(into.concentration_cm3[0])).toBeCloseTo(low, 9)
      expect(Math.log(into.concentration_cm3[1])).toBeCloseTo(2, 9)
      expect(Math.log(into.concentration_cm3[2])).toBeCloseTo(high, 9)
    }
  })

  it('solves sites one by one where the curve has a kink nobody announced', () => {
    const { curve } = countedCurve(0)
    const kinked: LayerCurve = { ...curve, lnSheetResistance: (t) => -t - 0.5 * Math.abs(t - 3.1) * (t > 3.1 ? 1 : 0) }
    const near = between(2.9, 3.3, 200)
    const into = untouchedColumns(near.length)
    curveInverse(kinked).fill(
      near.map((t) => Math.exp(kinked.lnSheetResistance(t))),
      into,
    )
    near.forEach((t, i) => expect(Math.abs(Math.log(into.concentration_cm3[i]) - t)).toBeLessThan(1e-9))
  })
})
