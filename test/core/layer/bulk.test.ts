import { describe, expect, it } from 'vitest'
import { bulk } from '../../../core/layer/bulk'
import type { BulkSettings } from '../../../core/layer/bulk'
import { DOPANTS } from '../../../core/silicon/dopants'
import { between, inverted, largestRelativeDifference, modelOf, problemOf } from './layer-fixtures'

const wafer: BulkSettings = { dopant: 'boron', mobility: modelOf('mf723'), temperature_K: 296.15, thickness_um: 725 }

describe('bulk silicon', () => {
  it('has the resistivity of the standard: SEMI MF723, boron 1e15 is 13.31 ohm cm, phosphorus 4.482', () => {
    const sheetOf = (dopant: 'boron' | 'phosphorus') => bulk.prepare({ ...wafer, dopant }).forward(1e15)
    expect(sheetOf('boron') * 0.0725).toBeCloseTo(13.31, 2)
    expect(sheetOf('phosphorus') * 0.0725).toBeCloseTo(4.482, 3)
  })

  it.each(DOPANTS)('returns the concentration it was given: %s', (dopant) => {
    const layer = bulk.prepare({ ...wafer, mobility: modelOf('masetti'), dopant })
    const concentrations = between(1e12, 1e21, 200)
    const found = inverted(
      layer,
      concentrations.map((n) => layer.forward(n)),
    )
    expect(largestRelativeDifference(found.concentration_cm3, concentrations)).toBeLessThan(1e-9)
    expect(found.concentrationSensitivity.every((slope) => slope < -0.8)).toBe(true)
  })

  it('gives resistivity for every number, concentration inside its range alone', () => {
    const layer = bulk.prepare(wafer)
    const { min, max } = layer.range_ohm_sq
    const found = inverted(layer, [min / 1.01, min * 1.01, max / 1.01, max * 1.01, NaN])
    expect([...found.concentration_cm3].map(Number.isNaN)).toEqual([true, false, false, true, true])
    expect([...found.resistivity_ohm_cm].map(Number.isNaN)).toEqual([false, false, false, false, true])
    expect(found.resistivity_ohm_cm[1] / (min * 1.01 * 0.0725)).toBeCloseTo(1, 12)
    for (const column of [found.dose_cm2, found.doseSensitivity, found.thickness_um]) {
      expect(column.every(Number.isNaN)).toBe(true)
    }
  })

  it('shows its working', () => {
    const layer = bulk.prepare(wafer)
    const steps = layer.explain(184)
    const found = inverted(layer, [184])
    expect(steps[0].formula).toBe('184.0 Ω/sq × 725.0 µm × 10⁻⁴ cm/µm')
    expect(steps[0].value).toBeCloseTo(13.34, 10)
    expect(steps[1].value / found.concentration_cm3[0]).toBeCloseTo(1, 9)
    expect(steps[2].value / found.concentrationSensitivity[0]).toBeCloseTo(1, 5)
    expect(layer.explain(1e9)[1].formula).toMatch(/^none: /)
  })

  it('refuses a thickness or a concentration out of range', () => {
    expect(problemOf(() => bulk.prepare({ ...wafer, thickness_um: 0 }))).toMatchObject({ quantity: 'thickness' })
    expect(problemOf(() => bulk.prepare(wafer).forward(1e23))).toMatchObject({ kind: 'out-of-range' })
  })
})
