import { describe, expect, it } from 'vitest'
import { film } from '../../../core/layer/film'
import { inverted, problemOf } from './layer-fixtures'

describe('film', () => {
  it('of known resistivity: 2.7e-6 ohm cm at 27 mohm/sq is 1 um thick', () => {
    const layer = film.prepare({ resistivity_ohm_cm: 2.7e-6 })
    const found = inverted(layer, [0.027, 0.054, NaN, 0, -1])
    expect(found.thickness_um[0]).toBeCloseTo(1, 12)
    expect(found.thickness_um[1]).toBeCloseTo(0.5, 12)
    expect(found.resistivity_ohm_cm[0]).toBe(2.7e-6)
    for (const i of [2, 3, 4]) expect([found.thickness_um[i], found.resistivity_ohm_cm[i]]).toEqual([NaN, NaN])
    expect(layer.forward(found.thickness_um[1])).toBeCloseTo(0.054, 14)
    expect(found.concentration_cm3.every(Number.isNaN) && found.dose_cm2.every(Number.isNaN)).toBe(true)
    expect(found.doseSensitivity.every(Number.isNaN)).toBe(true)
  })

  it('of known thickness: 0.5 um at 54 mohm/sq is 2.7e-6 ohm cm', () => {
    const layer = film.prepare({ thickness_um: 0.5 })
    const found = inverted(layer, [0.054, NaN])
    expect(found.resistivity_ohm_cm[0]).toBeCloseTo(2.7e-6, 18)
    expect(found.thickness_um[0]).toBe(0.5)
    expect([found.resistivity_ohm_cm[1], found.thickness_um[1]]).toEqual([NaN, NaN])
    expect(problemOf(() => layer.forward(0.5))).toMatchObject({ kind: 'not-applicable' })
  })

  it('shows its working', () => {
    const [thickness] = film.prepare({ resistivity_ohm_cm: 2.7e-6 }).explain(0.027)
    expect(thickness).toMatchObject({
      symbol: 't',
      unit: 'µm',
      formula: '2.700 × 10⁻⁶ Ω·cm / 0.02700 Ω/sq × 10⁴ µm/cm',
    })
    expect(thickness.value).toBeCloseTo(1, 12)
    const [resistivity] = film.prepare({ thickness_um: 0.5 }).explain(0.054)
    expect(resistivity.value).toBeCloseTo(2.7e-6, 18)
  })

  it('refuses both, neither, and what is out of range', () => {
    const both = { resistivity_ohm_cm: 1e-6, thickness_um: 1 }
    expect(problemOf(() => film.prepare(both))).toMatchObject({ kind: 'not-applicable' })
    expect(problemOf(() => film.prepare({}))).toMatchObject({ kind: 'not-applicable' })
    expect(problemOf(() => film.prepare({ thickness_um: undefined }))).toMatchObject({ kind: 'not-applicable' })
    expect(problemOf(() => film.prepare({ thickness_um: 0 }))).toMatchObject({ quantity: 'film thickness' })
    expect(problemOf(() => film.prepare({ resistivity_ohm_cm: NaN }))).toMatchObject({ quantity: 'film resistivity' })
    const layer = film.prepare({ resistivity_ohm_cm: 1e-6 })
    expect(problemOf(() => layer.forward(0))).toMatchObject({ quantity: 'film thickness' })
  })
})
