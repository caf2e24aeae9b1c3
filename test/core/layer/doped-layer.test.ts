import { describe, expect, it } from 'vitest'
import { dopedLayer } from '../../../core/layer/doped-layer'
import type { DopedLayerSettings } from '../../../core/layer/doped-layer'
import { layerProfiles } from '../../../core/layer/profiles/registry'
import { DOPANTS } from '../../../core/silicon/dopants'
import { mobilityIds } from '../../../core/silicon/mobility/registry'
import { irvinLayers } from '../../reference/irvin-layers'
import { between, inverted, largestRelativeDifference, modelOf, oppositeOf, problemOf } from './layer-fixtures'

const DEPTH_UM = 0.35

/** A boron source/drain monitor of the Tern Bay pilot line. */
const monitor: DopedLayerSettings = {
  dopant: 'boron',
  mobility: modelOf('masetti'),
  temperature_K: 300,
  profile: 'gaussian',
  depth_um: DEPTH_UM,
  background: { dopant: 'phosphorus', concentration_cm3: 1e15 },
}

const everyLayer = mobilityIds.flatMap((id) =>
  DOPANTS.flatMap((dopant) =>
    layerProfiles.map(({ id: profile }): [string, DopedLayerSettings] => {
      const background = { dopant: oppositeOf(dopant), concentration_cm3: 1e14 }
      return [`${id} ${dopant} ${profile}`, { ...monitor, mobility: modelOf(id), dopant, profile, background }]
    }),
  ),
)

describe('doped layer', () => {
  it('finds the surface concentration of each reference layer', () => {
    for (const row of irvinLayers) {
      const layer = dopedLayer.prepare({
        ...monitor,
        dopant: row.dopant,
        mobility: modelOf(row.mobility),
        profile: row.profile,
        background: { dopant: oppositeOf(row.dopant), concentration_cm3: row.background_cm3 },
      })
      const found = inverted(layer, [row.product_ohm_um / DEPTH_UM])
      expect(Math.abs(found.concentration_cm3[0] / row.surface_cm3 - 1)).toBeLessThan(1e-10)
      expect(found.resistivity_ohm_cm[0] / (row.product_ohm_um * 1e-4)).toBeCloseTo(1, 12)
    }
  })

  it('gives the dose of the diffusion that made it, where the background is negligible', () => {
    const background = { dopant: 'phosphorus', concentration_cm3: 1e10 } as const
    const depth_cm = DEPTH_UM * 1e-4
    const ratio = 1e20 / 1e10
    const doseAt = (profile: 'gaussian' | 'erfc'): number => {
      const layer = dopedLayer.prepare({ ...monitor, profile, background })
      return inverted(layer, [layer.forward(1e20)]).dose_cm2[0]
    }
    const rootDt = depth_cm / (2 * Math.sqrt(Math.log(ratio)))
    expect(doseAt('gaussian') / (1e20 * Math.sqrt(Math.PI) * rootDt)).toBeCloseTo(1, 8)
    // erfc^-1(1e-10) = 4.5728249674 (from memory)
    expect(doseAt('erfc') / ((2 * 1e20 * depth_cm) / (2 * 4.5728249674) / Math.sqrt(Math.PI))).toBeCloseTo(1, 8)
  })

  it.each(everyLayer)('returns what it was given, table and single sites alike: %s', (_, settings) => {
    const layer = dopedLayer.prepare(settings)
    const { min, max } = layer.range_ohm_sq
    const sheets = between(min, max, 140)
    const table = inverted(layer, sheets)
    const single = [0, 1, 2].map((part) =>
      inverted(
        layer,
        sheets.filter((_, i) => i % 3 === part),
      ),
    )
    const ofPart = (name: 'concentration_cm3' | 'dose_cm2' | 'concentrationSensitivity' | 'doseSensitivity') =>
      sheets.map((_, i) => single[i % 3][name][Math.floor(i / 3)])
    expect(largestRelativeDifference(table.concentration_cm3, ofPart('concentration_cm3'))).toBeLessThan(3e-10)
    expect(largestRelativeDifference(table.dose_cm2, ofPart('dose_cm2'))).toBeLessThan(3e-10)
    expect(largestRelativeDifference(table.concentrationSensitivity, ofPart('concentrationSensitivity'))).toBeLessThan(
      1e-6,
    )
    expect(largestRelativeDifference(table.doseSensitivity, ofPart('doseSensitivity'))).toBeLessThan(1e-6)
    // Not in the gap that a jump of the model leaves: no concentration gives a resistance inside it.
    const back = table.concentration_cm3.map((n) => layer.forward(n))
    const missed = back.filter((sheet, i) => Math.abs(sheet / sheets[i] - 1) > 3e-10).length
    const hasGap = settings.mobility.id === 'mf723' && settings.dopant === 'arsenic' && settings.profile === 'uniform'
    expect(missed).toBeLessThanOrEqual(hasGap ? 1 : 0)
  })

  it('has sensitivities that are the slopes of its own results', () => {
    const layer = dopedLayer.prepare(monitor)
    const sheets = between(layer.range_ohm_sq.min * 1.01, layer.range_ohm_sq.max / 1.01, 100)
    const at = inverted(layer, sheets)
    const [above, below] = [1e-4, -1e-4].map((step) =>
      inverted(
        layer,
        sheets.map((sheet) => sheet * Math.exp(step)),
      ),
    )
    sheets.forEach((_, i) => {
      const slope = (name: 'concentration_cm3' | 'dose_cm2') => Math.log(above[name][i] / below[name][i]) / 2e-4
      expect(slope('concentration_cm3') / at.concentrationSensitivity[i]).toBeCloseTo(1, 5)
      expect(slope('dose_cm2') / at.doseSensitivity[i]).toBeCloseTo(1, 5)
    })
  })

  it('depends on sheet resistance times depth alone', () => {
    const shallow = inverted(dopedLayer.prepare(monitor), [92.1])
    const deep = inverted(dopedLayer.prepare({ ...monitor, depth_um: 3.5 }), [9.21])
    expect(deep.concentration_cm3[0] / shallow.concentration_cm3[0]).toBeCloseTo(1, 11)
    expect(deep.dose_cm2[0] / shallow.dose_cm2[0]).toBeCloseTo(10, 10)
  })

  it('covers its range to both ends, and no more', () => {
    const layer = dopedLayer.prepare(monitor)
    const { min, max } = layer.range_ohm_sq
    for (const count of [1, 100]) {
      const sheets = Array.from({ length: count }).flatMap(() => [min, max, min / 1.0001, max * 1.0001, NaN, -5, 0])
      const found = inverted(layer, sheets)
      expect(found.concentration_cm3[0] / 1e21).toBeCloseTo(1, 9)
      expect(found.concentration_cm3[1] / 1.01e15).toBeCloseTo(1, 9)
      for (const i of [2, 3, 4, 5, 6]) {
        expect(found.concentration_cm3[i]).toBeNaN()
        expect(found.dose_cm2[i]).toBeNaN()
        expect(found.concentrationSensitivity[i]).toBeNaN()
        expect(found.doseSensitivity[i]).toBeNaN()
      }
      expect(found.resistivity_ohm_cm[3] / (max * 1.0001 * 0.35e-4)).toBeCloseTo(1, 12)
      expect(found.resistivity_ohm_cm[4]).toBeNaN()
      expect(found.thickness_um.every(Number.isNaN)).toBe(true)
    }
    expect(layer.forward(1e21) / min).toBeCloseTo(1, 12)
  })
})

describe('the working of a doped layer', () => {
  it('leads from sheet resistance to the same results, numbers filled in', () => {
    const layer = dopedLayer.prepare(monitor)
    const steps = layer.explain(92.1)
    const found = inverted(layer, [92.1])
    expect(steps.map(({ symbol }) => symbol)).toEqual(['R_s · x_j', 'ρ̄', 'N_s', 'Q', 'd ln N_s / d ln R_s'])
    expect(steps.map(({ value }) => value)).toEqual([
      92.1 * 0.35,
      92.1 * 0.35 * 1e-4,
      found.concentration_cm3[0],
      found.dose_cm2[0],
      found.concentrationSensitivity[0],
    ])
    expect(steps[0].formula).toBe('92.10 Ω/sq × 0.3500 µm')
    expect(steps[2].formula).toContain('N_B = 1.00 × 10¹⁵ cm⁻³ phosphorus')
    expect(steps[2].source).toContain('Masetti')
  })

  it('says why there is no concentration outside the range', () => {
    const steps = dopedLayer.prepare(monitor).explain(1e9)
    expect(steps[2].value).toBeNaN()
    expect(steps[2].formula).toMatch(/^none: the layer covers /)
  })
})

describe('a doped layer refuses', () => {
  const refused = (settings: Partial<DopedLayerSettings>) =>
    problemOf(() => dopedLayer.prepare({ ...monitor, ...settings }))

  it('a background of its own type: no junction', () => {
    const background = { dopant: 'boron', concentration_cm3: 1e15 } as const
    expect(refused({ background })).toMatchObject({ kind: 'not-applicable' })
    expect(refused({ dopant: 'arsenic' })).toMatchObject({ kind: 'not-applicable' })
  })

  it('quantities out of range', () => {
    const background = (concentration_cm3: number) => ({ dopant: 'phosphorus', concentration_cm3 }) as const
    expect(refused({ background: background(0) })).toMatchObject({ quantity: 'background concentration' })
    expect(refused({ background: background(1e21) })).toMatchObject({ quantity: 'background concentration' })
    expect(refused({ depth_um: 0 })).toMatchObject({ quantity: 'junction depth' })
    expect(refused({ depth_um: NaN })).toMatchObject({ quantity: 'junction depth' })
    expect(refused({ mobility: modelOf('arora'), temperature_K: 77 })).toMatchObject({ quantity: 'temperature' })
  })

  it('a dopant its model does not know, a profile nobody knows', () => {
    const mobility = { ...modelOf('masetti'), dopants: ['arsenic'] } as const
    expect(refused({ mobility })).toMatchObject({ kind: 'not-applicable' })
    expect(refused({ profile: 'linear' as 'erfc' })).toMatchObject({ kind: 'unknown-id' })
  })

  it('a surface concentration outside its range', () => {
    const layer = dopedLayer.prepare(monitor)
    for (const value of [1e15, 1.1e21, NaN]) {
      expect(problemOf(() => layer.forward(value))).toMatchObject({ quantity: 'surface concentration' })
    }
  })
})
