import { describe, expect, it } from 'vitest'
import { unitOf } from '../../../core/procedure/allowed'
import { procedureKeys } from '../../../core/procedure/keys'
import { procedureSchema } from '../../../core/procedure/schema'

const keys = procedureKeys()
const named = (key: string) => keys.find((entry) => entry.key === key)

describe('procedureKeys', () => {
  it('has every section of the schema, each key once and with a meaning', () => {
    expect(new Set(keys.map(({ key }) => key.split('.')[0]))).toEqual(new Set(Object.keys(procedureSchema.shape)))
    expect(new Set(keys.map(({ key }) => key)).size).toBe(keys.length)
    expect(keys.filter(({ meaning }) => meaning === '')).toEqual([])
  })

  it('says unit, range and default', () => {
    expect(named('temperature.referenceC')).toEqual({
      key: 'temperature.referenceC',
      meaning: 'temperature that results are reported at',
      unit: '°C',
      allowed: 'a number from 18 to 28 °C',
      default: '23',
      layerKinds: [],
    })
    expect(named('wafer.diameterMm')?.default).toBeNull()
  })

  it('says which layer kinds have a key', () => {
    expect(named('layer.dopant')?.layerKinds).toEqual(['bulk', 'doped-layer', 'implant'])
    expect(named('layer.kind')?.allowed).toBe('"sheet", "bulk", "doped-layer", "implant", "film"')
  })
})

describe('unitOf', () => {
  it.each([
    ['dieGrid.pitchXMm', 'mm'],
    ['layer.depthUm', 'µm'],
    ['limits.waferMeanOhmSq.lower', 'Ω/sq'],
    ['limits.resistivityOhmCm.target', 'Ω·cm'],
    ['layer.constantMobility.holesCm2Vs', 'cm²/(V·s)'],
    ['temperature.coefficientPercentPerC', '%/°C'],
    ['limits.uniformityPercent.upper', '%'],
    ['uncertainty.currentRel', ''],
    ['limits.allowedSitesOut', ''],
    ['title', ''],
  ])('of %s is %j', (key, unit) => {
    expect(unitOf(key.split('.'))).toBe(unit)
  })
})
