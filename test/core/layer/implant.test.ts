import { describe, expect, it } from 'vitest'
import { implant } from '../../../core/layer/implant'
import type { ImplantSettings } from '../../../core/layer/implant'
import { implantDose_cm2 } from '../../../core/layer/implant-integral'
import { between, inverted, largestRelativeDifference, modelOf, oppositeOf, problemOf } from './layer-fixtures'

/** An arsenic monitor of the Tern Bay pilot line. */
const monitor: ImplantSettings = {
  dopant: 'arsenic',
  mobility: modelOf('masetti'),
  temperature_K: 300,
  range_um: 0.06,
  straggle_um: 0.022,
  background: { dopant: 'boron', concentration_cm3: 2e15 },
}

const cases: [string, ImplantSettings][] = (
  ['masetti', 'klaassen', 'arora', 'caughey-thomas', 'constant', 'mf723'] as const
).flatMap((id) =>
  (['boron', 'arsenic'] as const).flatMap((dopant): [string, ImplantSettings][] => {
    const settings = { ...monitor, mobility: modelOf(id), dopant }
    const background = { dopant: oppositeOf(dopant), concentration_cm3: 2e15 }
    return [
      [`${id} ${dopant}, junction below and buried above a peak of 8e16`, { ...settings, background }],
      [`${id} ${dopant}, no background`, { ...settings, background: undefined }],
    ]
  }),
)

describe('implant', () => {
  it.each(cases)('returns what it was given, table and single sites alike: %s', (_, settings) => {
    const layer = implant.prepare(settings)
    const { min, max } = layer.range_ohm_sq
    const sheets = between(min, max, 120)
    const table = inverted(layer, sheets)
    const single = [0, 1].map((part) =>
      inverted(
        layer,
        sheets.filter((_, i) => i % 2 === part),
      ),
    )
    const ofPart = (name: 'concentration_cm3' | 'dose_cm2' | 'doseSensitivity') =>
      sheets.map((_, i) => single[i % 2][name][Math.floor(i / 2)])
    expect(largestRelativeDifference(table.concentration_cm3, ofPart('concentration_cm3'))).toBeLessThan(3e-10)
    expect(largestRelativeDifference(table.dose_cm2, ofPart('dose_cm2'))).toBeLessThan(3e-10)
    expect(largestRelativeDifference(table.doseSensitivity, ofPart('doseSensitivity'))).toBeLessThan(1e-6)
    const back = table.concentration_cm3.map((n) => layer.forward(n))
    expect(largestRelativeDifference(back, sheets)).toBeLessThan(3e-10)
    const doses = table.concentration_cm3.map((peak_cm3) => implantDose_cm2({ peak_cm3, straggle_um: 0.022 }))
    expect(largestRelativeDifference(doses, table.dose_cm2)).toBeLessThan(1e-12)
  })

  it('is exact where the layer comes to the surface and its curve bends', () => {
    const layer = implant.prepare(monitor)
    const surfacing_cm3 = 2e15 * Math.exp((0.06 / 0.022) ** 2 / 2)
    const peaks = between(surfacing_cm3 * 0.97, surfacing_cm3 * 1.03, 101)
    const found = inverted(
      layer,
      peaks.map((n) => layer.forward(n)),
    )
    expect(largestRelativeDifference(found.concentration_cm3, peaks)).toBeLessThan(3e-10)
  })

  it('has sensitivities that are the slopes of its own results', () => {
    const layer = implant.prepare(monitor)
    const sheets = between(layer.range_ohm_sq.min * 1.01, 3000, 80)
    const at = inverted(layer, sheets)
    const [above, below] = [1e-4, -1e-4].map((step) =>
      inverted(
        layer,
        sheets.map((sheet) => sheet * Math.exp(step)),
      ),
    )
    sheets.forEach((_, i) => {
      const slope = Math.log(above.dose_cm2[i] / below.dose_cm2[i]) / 2e-4
      expect(slope / at.doseSensitivity[i]).toBeCloseTo(1, 5)
    })
  })

  it('has no answer outside its range, nor for what is not a number', () => {
    const layer = implant.prepare(monitor)
    const { min, max } = layer.range_ohm_sq
    const found = inverted(layer, [min / 1.001, max * 1.001, NaN, min, max])
    expect([...found.dose_cm2].map(Number.isNaN)).toEqual([true, true, true, false, false])
    expect(found.concentration_cm3[3] / 1e21).toBeCloseTo(1, 9)
    expect(found.resistivity_ohm_cm.every(Number.isNaN)).toBe(true)
    expect(found.thickness_um.every(Number.isNaN)).toBe(true)
  })

  it('shows its working with the part of the dose that lies in the silicon', () => {
    const layer = implant.prepare(monitor)
    const steps = layer.explain(120)
    const found = inverted(layer, [120])
    expect(steps.map(({ symbol }) => symbol)).toEqual(['N_p', 'Q', 'Φ', 'd ln Q / d ln R_s', 'd ln R_s / d ln Q'])
    expect(steps[0].value).toBe(found.concentration_cm3[0])
    expect(steps[1].value).toBe(found.dose_cm2[0])
    // The normal distribution up to 2.727 (tables: 0.9968).
    expect(steps[2].value).toBeCloseTo(0.9968, 4)
    expect(steps[0].formula).toContain('R_p = 0.06000 µm')
    // One percent more dose, made anew by the integral.
    const moved = layer.forward(found.concentration_cm3[0] * 1.0001) / layer.forward(found.concentration_cm3[0])
    expect(steps[4].value).toBeCloseTo(Math.log(moved) / Math.log(1.0001), 4)
    expect(steps[4].formula).toMatch(/^1 % of dose moves sheet resistance by −0\.\d{3} %$/)
    expect(layer.explain(1e9)[0].formula).toMatch(/^none: /)
    expect(layer.explain(1e9)[4].formula).toMatch(/^none: /)
  })

  it('refuses a background of its own type, sizes and peaks out of range', () => {
    const refused = (settings: Partial<ImplantSettings>) =>
      problemOf(() => implant.prepare({ ...monitor, ...settings }))
    expect(refused({ background: { dopant: 'phosphorus', concentration_cm3: 1e15 } })).toMatchObject({
      kind: 'not-applicable',
    })
    expect(refused({ range_um: 0 })).toMatchObject({ quantity: 'projected range' })
    expect(refused({ straggle_um: -1 })).toMatchObject({ quantity: 'straggle' })
    expect(problemOf(() => implant.prepare(monitor).forward(2e15))).toMatchObject({ quantity: 'peak concentration' })
  })
})
