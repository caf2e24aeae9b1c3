import { describe, expect, it } from 'vitest'
import { mobilityComparison } from '../../../core/analysis/mobility-comparison'
import { resultJson } from '../../../core/analysis/result-json'
import { mobilityIds } from '../../../core/silicon/mobility/registry'
import { irvinLayers } from '../../reference/irvin-layers'
import { analyzeText, sampleLot } from './lots'

const layerOf = (mobility: 'masetti' | 'mf723' | 'arora') =>
  ({
    kind: 'doped-layer',
    dopant: 'boron',
    profile: 'exponential',
    depthUm: 1,
    mobility,
    background: { dopant: 'phosphorus', concentrationCm3: 1e16 },
  }) as const

describe('the comparison of mobility models', () => {
  it('finds the same concentration under two models where the reference layers of both have it', () => {
    // Boron exponential 1e20 over 1e16: 95.59 ohm um under Masetti, 94.30 under MF723.
    for (const mobility of ['masetti', 'mf723'] as const) {
      const row = irvinLayers.find((layer) => layer.dopant === 'boron' && layer.profile === 'exponential' && layer.surface_cm3 === 1e20 && layer.mobility === mobility)! // prettier-ignore
      const lot = analyzeText(`sheet_resistance_ohm_sq\n${row.product_ohm_um}\n`, { layer: layerOf('arora') })
      const model = mobilityComparison(lot)!.models.find(({ id }) => id === mobility)!
      expect(model.concentration_cm3 / 1e20).toBeCloseTo(1, 9)
    }
  })

  it('has every model once, in the order of the register, and the procedure as the measure', () => {
    const { models, basis, value } = mobilityComparison(sampleLot('TB-0417'))!
    expect(models.map(({ id }) => id)).toEqual(mobilityIds)
    const own = models.filter(({ isProcedures }) => isProcedures)
    expect(own).toHaveLength(1)
    expect(own[0]).toMatchObject({ relativeConcentration: 0, relativeDose: 0, why: '' })
    expect(basis).toBe('mean-sheet-resistance')
    expect(value).toBeCloseTo(sampleLot('TB-0417').lot.statistics.mean, 9)
  })

  it('agrees with whole runs under each model, and with the spread between them', () => {
    const csv = 'wafer,sheet_resistance_ohm_sq\n1,95\n1,97\n2,90\n'
    const comparison = mobilityComparison(analyzeText(csv, { layer: layerOf('masetti') }))!
    const single = `sheet_resistance_ohm_sq\n${(96 + 90) / 2}\n`
    for (const id of ['masetti', 'mf723', 'arora'] as const) {
      const lot = analyzeText(single, { layer: layerOf(id) })
      const model = comparison.models.find((entry) => entry.id === id)!
      expect(model.concentration_cm3 / lot.sites.concentration_cm3[0]).toBeCloseTo(1, 9)
      expect(model.dose_cm2 / lot.sites.dose_cm2[0]).toBeCloseTo(1, 9)
    }
    const valid = comparison.models.filter(({ isInRange }) => isInRange).map((model) => model.concentration_cm3)
    expect(valid.length).toBeGreaterThan(2)
    expect(comparison.concentrationSpread).toBeCloseTo(Math.max(...valid) / Math.min(...valid) - 1, 12)
    expect(comparison.concentrationSpread).toBeGreaterThan(0.01)
  })

  it('of bulk silicon inverts the mean resistivity, also where the file reports it', () => {
    const layer = { kind: 'bulk', dopant: 'boron', mobility: 'mf723' } as const
    const { basis, value, models, doseSpread } = mobilityComparison(analyzeText('resistivity_ohm_cm\n10\n', { layer }))!
    expect([basis, value]).toEqual(['mean-resistivity', 10])
    // MF723: 10 ohm cm of boron is 1.3e15 (EMIS 1999: 13.1 ohm cm at 1e15).
    expect(models.find(({ id }) => id === 'mf723')!.concentration_cm3 / 1.33e15).toBeCloseTo(1, 1)
    expect(doseSpread).toBeNaN()
  })

  it('leaves out of the spread what lies outside a model, and says why one gives nothing', () => {
    const { models } = mobilityComparison(sampleLot('TB-0417'))!
    expect(models.find(({ id }) => id === 'constant')!.why).toMatch(/two numbers/)
    // So low that the surface is beyond what several models were fitted over, and the least beyond all.
    const low = mobilityComparison(analyzeText('sheet_resistance_ohm_sq\n30\n', { layer: layerOf('masetti') }))!
    const outside = low.models.filter(({ isInRange, why }) => !isInRange && why === '')
    expect(outside.length).toBeGreaterThan(0)
    const none = mobilityComparison(analyzeText('sheet_resistance_ohm_sq\n0.001\n', { layer: layerOf('masetti') }))!
    expect(none.models.every(({ why }) => why !== '')).toBe(true)
    expect(none.concentrationSpread).toBeNaN()
  })

  it('takes the constant mobilities where the procedure has them', () => {
    const layer = { ...layerOf('masetti'), mobility: 'constant', constantMobility: { electronsCm2Vs: 1000, holesCm2Vs: 60 } } as const // prettier-ignore
    const { models } = mobilityComparison(analyzeText('sheet_resistance_ohm_sq\n95\n', { layer }))!
    expect(models.find(({ id }) => id === 'constant')).toMatchObject({ isProcedures: true, why: '' })
    expect(models.find(({ id }) => id === 'masetti')!.why).toBe('')
  })

  it('is null without silicon, and stands in result.json', () => {
    expect(mobilityComparison(analyzeText('sheet_resistance_ohm_sq\n95\n', {}))).toBeNull()
    const film = { kind: 'film', resistivityOhmCm: 1.7e-6 } as const
    expect(mobilityComparison(analyzeText('sheet_resistance_ohm_sq\n0.03\n', { layer: film }))).toBeNull()
    const result = JSON.parse(resultJson(sampleLot('TB-0417'), { program: 'p', version: '1' }))
    expect(result.layer.kind).toBe('doped-layer')
    expect(result.layer.mobilityComparison.models).toHaveLength(mobilityIds.length)
    expect(result.layer.profile).toBeNull()
  })
})
