import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { dopedLayer } from '../../../core/layer/doped-layer'
import type { DopedLayerSettings } from '../../../core/layer/doped-layer'
import { junctionDepth_um } from '../../../core/layer/junction-depth'
import { DOPANTS } from '../../../core/silicon/dopants'
import { mobilityIds } from '../../../core/silicon/mobility/registry'
import { irvinLayers, junctionDepths } from '../../reference/irvin-layers'
import { between, inverted, largestRelativeDifference, modelOf, oppositeOf, problemOf } from './layer-fixtures'

/** A boron drive-in of the Tern Bay pilot line: its furnace recipe gives sqrt(D t). */
const driveIn: DopedLayerSettings = {
  dopant: 'boron',
  mobility: modelOf('masetti'),
  temperature_K: 300,
  profile: 'gaussian',
  diffusionLength_um: 0.06,
  background: { dopant: 'phosphorus', concentration_cm3: 1e15 },
}
const diffused = ['gaussian', 'erfc', 'exponential'] as const

const everyLayer = mobilityIds.flatMap((id) =>
  DOPANTS.flatMap((dopant) =>
    diffused.map((profile): [string, DopedLayerSettings] => {
      const background = { dopant: oppositeOf(dopant), concentration_cm3: 1e14 }
      return [`${id} ${dopant} ${profile}`, { ...driveIn, mobility: modelOf(id), dopant, profile, background }]
    }),
  ),
)

describe('a layer of known diffusion length', () => {
  it('finds the surface concentration of each reference layer from the length that gives its depth', () => {
    const rows = irvinLayers.filter(({ profile }) => profile !== 'uniform')
    expect(rows.length).toBeGreaterThan(30)
    for (const { dopant, profile, surface_cm3, background_cm3, mobility, product_ohm_um } of rows) {
      const perLength = junctionDepth_um({ profile, surface_cm3, background_cm3, length_um: 1 })
      const background = { dopant: oppositeOf(dopant), concentration_cm3: background_cm3 }
      const settings = { ...driveIn, dopant, mobility: modelOf(mobility), profile, background }
      const layer = dopedLayer.prepare({ ...settings, diffusionLength_um: 0.35 / perLength })
      const found = inverted(layer, [product_ohm_um / 0.35])
      expect(Math.abs(found.concentration_cm3[0] / surface_cm3 - 1)).toBeLessThan(1e-10)
      expect(found.resistivity_ohm_cm[0] / (product_ohm_um * 1e-4)).toBeCloseTo(1, 10)
    }
  })

  it('solves the junction depths of the reference sheet', () => {
    for (const { profile, depthInLengths } of junctionDepths) {
      const layer = dopedLayer.prepare({ ...driveIn, profile, diffusionLength_um: 1 })
      const depth = layer.explain(layer.forward(5e18)).find(({ symbol }) => symbol === 'x_j')!
      expect(depth.value).toBeCloseTo(depthInLengths, 8)
    }
  })

  it('holds the dose of the diffusion where the background is negligible', () => {
    const background = { dopant: 'phosphorus', concentration_cm3: 1e10 } as const
    const doseAt = (profile: (typeof diffused)[number]): number => {
      const layer = dopedLayer.prepare({ ...driveIn, profile, background })
      return inverted(layer, [layer.forward(1e20)]).dose_cm2[0]
    }
    // Crank 1975, in terms of sqrt(D t): N_s sqrt(pi D t) and 2 N_s sqrt(D t / pi).
    expect(doseAt('gaussian') / (1e20 * Math.sqrt(Math.PI) * 0.06e-4)).toBeCloseTo(1, 8)
    expect(doseAt('erfc') / ((2 * 1e20 * 0.06e-4) / Math.sqrt(Math.PI))).toBeCloseTo(1, 8)
    expect(doseAt('exponential') / (1e20 * 0.06e-4)).toBeCloseTo(1, 8)
  })

  it.each(everyLayer)('falls throughout and returns what it was given, table and single sites alike: %s', (_, own) => {
    const layer = dopedLayer.prepare(own)
    const { min, max } = layer.range_ohm_sq
    const densities = between(1.02e14, 0.99e21, 400)
    const forward = densities.map((n) => layer.forward(n))
    const arsenicJump = own.mobility.id === 'mf723' && own.dopant === 'arsenic'
    if (!arsenicJump) expect(forward.slice(1).every((sheet, i) => sheet < forward[i])).toBe(true)
    const sheets = between(min, max, 90)
    const table = inverted(layer, sheets)
    const single = [0, 1].map((part) => inverted(layer, sheets.filter((_, i) => i % 2 === part))) // prettier-ignore
    type Column = 'concentration_cm3' | 'dose_cm2' | 'resistivity_ohm_cm' | 'resistivitySensitivity'
    const ofPart = (name: Column) => sheets.map((_, i) => single[i % 2][name][Math.floor(i / 2)])
    expect(largestRelativeDifference(table.concentration_cm3, ofPart('concentration_cm3'))).toBeLessThan(3e-10)
    expect(largestRelativeDifference(table.dose_cm2, ofPart('dose_cm2'))).toBeLessThan(3e-10)
    expect(largestRelativeDifference(table.resistivity_ohm_cm, ofPart('resistivity_ohm_cm'))).toBeLessThan(3e-10)
    expect(largestRelativeDifference(table.resistivitySensitivity, ofPart('resistivitySensitivity'))).toBeLessThan(1e-6)
    const back = table.concentration_cm3.map((n) => layer.forward(n))
    expect(largestRelativeDifference(back, sheets)).toBeLessThan(3e-10)
  })

  it('agrees with a layer of the depth that it solves', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...diffused),
        fc.double({ min: 15.5, max: 20.9, noNaN: true }).map((power) => 10 ** power),
        (profile, surface_cm3) => {
          const byLength = dopedLayer.prepare({ ...driveIn, profile })
          const sheet = byLength.forward(surface_cm3)
          const depth_um = junctionDepth_um({ profile, surface_cm3, background_cm3: 1e15, length_um: 0.06 })
          const byDepth = dopedLayer.prepare({ ...driveIn, profile, depth_um, diffusionLength_um: undefined })
          const [a, b] = [byLength, byDepth].map((layer) => inverted(layer, [sheet]))
          for (const column of ['concentration_cm3', 'dose_cm2', 'resistivity_ohm_cm'] as const) {
            expect(Math.abs(a[column][0] / b[column][0] - 1)).toBeLessThan(1e-9)
          }
        },
      ),
      { numRuns: 60 },
    )
  })

  it('depends on sheet resistance times length alone', () => {
    const thin = inverted(dopedLayer.prepare(driveIn), [92.1])
    const thick = inverted(dopedLayer.prepare({ ...driveIn, diffusionLength_um: 0.6 }), [9.21])
    expect(thick.concentration_cm3[0] / thin.concentration_cm3[0]).toBeCloseTo(1, 11)
    expect(thick.resistivity_ohm_cm[0] / thin.resistivity_ohm_cm[0]).toBeCloseTo(1, 11)
    expect(thick.dose_cm2[0] / thin.dose_cm2[0]).toBeCloseTo(10, 10)
  })

  it.each(diffused)('%s: has sensitivities that are the slopes of its own results', (profile) => {
    const layer = dopedLayer.prepare({ ...driveIn, profile })
    const sheets = between(layer.range_ohm_sq.min * 1.01, layer.range_ohm_sq.max / 1.01, 80)
    const at = inverted(layer, sheets)
    const [above, below] = [1e-4, -1e-4].map((step) => inverted(layer, sheets.map((sheet) => sheet * Math.exp(step)))) // prettier-ignore
    sheets.forEach((_, i) => {
      const slope = (name: 'concentration_cm3' | 'dose_cm2' | 'resistivity_ohm_cm') =>
        Math.log(above[name][i] / below[name][i]) / 2e-4
      expect(slope('concentration_cm3') / at.concentrationSensitivity[i]).toBeCloseTo(1, 5)
      expect(slope('dose_cm2') / at.doseSensitivity[i]).toBeCloseTo(1, 5)
      expect(slope('resistivity_ohm_cm') / at.resistivitySensitivity[i]).toBeCloseTo(1, 4)
    })
  })

  it('has no answer of any kind outside its range: the depth is not known there', () => {
    const layer = dopedLayer.prepare(driveIn)
    for (const count of [1, 40]) {
      const found = inverted(layer, Array.from({ length: count }).flatMap(() => [layer.range_ohm_sq.max * 1.001, NaN])) // prettier-ignore
      for (const column of Object.values(found)) expect(column.every(Number.isNaN)).toBe(true)
    }
  })
})

describe('its working', () => {
  it('shows the junction depth solved with the surface concentration', () => {
    const layer = dopedLayer.prepare(driveIn)
    const steps = layer.explain(92.1)
    const found = inverted(layer, [92.1])
    expect(steps.map(({ symbol }) => symbol)).toEqual(['N_s', 'x_j', 'R_s · x_j', 'ρ̄', 'Q', 'd ln N_s / d ln R_s'])
    expect(steps[0].value).toBe(found.concentration_cm3[0])
    expect(steps[0].formula).toContain('x_j = 2 √(D t) · √ln(N_s/N_B)')
    expect(steps[1].formula).toMatch(/√\(D t\) = 0\.06000 µm, N_s = \d/)
    expect(steps[2].value).toBeCloseTo(92.1 * steps[1].value, 12)
    expect(steps[3].value).toBeCloseTo(found.resistivity_ohm_cm[0], 15)
  })

  it('says why there is none outside the range', () => {
    const steps = dopedLayer.prepare(driveIn).explain(1e15)
    expect(steps[0].formula).toMatch(/^none: the layer covers /)
    expect(steps.every(({ value }) => Number.isNaN(value))).toBe(true)
  })
})

describe('it refuses', () => {
  const refused = (settings: Partial<DopedLayerSettings>) =>
    problemOf(() => dopedLayer.prepare({ ...driveIn, ...settings }))

  it('both depth and length, and neither', () => {
    expect(refused({ depth_um: 0.35 })).toMatchObject({ kind: 'not-applicable', what: expect.stringContaining('both') })
    expect(refused({ diffusionLength_um: undefined })).toMatchObject({ what: expect.stringContaining('neither') })
  })

  it('a length for a uniform profile, a table for a named one', () => {
    expect(refused({ profile: 'uniform' })).toMatchObject({ kind: 'not-applicable' })
    const table = { depth_um: new Float64Array(4), concentration_cm3: new Float64Array(4) }
    expect(refused({ table })).toMatchObject({ kind: 'not-applicable', what: 'table for a gaussian profile' })
  })

  it('a length out of range', () => {
    for (const diffusionLength_um of [0, -1, NaN, 2000]) {
      expect(refused({ diffusionLength_um })).toMatchObject({ quantity: 'diffusion length' })
    }
  })
})
