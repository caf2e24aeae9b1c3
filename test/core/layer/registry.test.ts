import { describe, expect, it } from 'vitest'
import { layerKind, layerKinds } from '../../../core/layer/registry'
import type { LayerColumns, LayerQuantity, PreparedLayer } from '../../../core/layer/layer-kind'
import { inverted, modelOf, problemOf } from './layer-fixtures'

const silicon = { dopant: 'boron', mobility: modelOf('masetti'), temperature_K: 300 } as const
const background = { dopant: 'phosphorus', concentration_cm3: 1e15 } as const

/** One prepared layer of each kind, and a sheet resistance it covers. */
const examples: Record<(typeof layerKinds)[number]['id'], { layer: PreparedLayer; sheet: number }> = {
  sheet: { layer: layerKind('sheet').prepare(), sheet: 100 },
  bulk: { layer: layerKind('bulk').prepare({ ...silicon, thickness_um: 725 }), sheet: 184 },
  'doped-layer': {
    layer: layerKind('doped-layer').prepare({ ...silicon, profile: 'erfc', depth_um: 0.35, background }),
    sheet: 92,
  },
  implant: { layer: layerKind('implant').prepare({ ...silicon, range_um: 0.1, straggle_um: 0.04 }), sheet: 200 },
  film: { layer: layerKind('film').prepare({ resistivity_ohm_cm: 2.7e-6 }), sheet: 0.05 },
}

const columnOf: Record<LayerQuantity, keyof LayerColumns> = {
  resistivity: 'resistivity_ohm_cm',
  concentration: 'concentration_cm3',
  dose: 'dose_cm2',
  thickness: 'thickness_um',
}

describe('layer kinds', () => {
  it('are the five of the procedure, once each', () => {
    expect(layerKinds.map(({ id }) => id)).toEqual(['sheet', 'bulk', 'doped-layer', 'implant', 'film'])
  })

  it.each(layerKinds)('$id: fills what it says it gives, leaves the rest NaN, touches every entry', (kind) => {
    const { layer, sheet } = examples[kind.id]
    const found = inverted(layer, [sheet, NaN])
    for (const [quantity, column] of Object.entries(columnOf)) {
      const isGiven = (kind.gives as readonly string[]).includes(quantity)
      expect(Number.isFinite(found[column][0])).toBe(isGiven)
      expect(found[column][1]).toBeNaN()
    }
    for (const column of Object.values(found)) expect([...column]).not.toContain(-1)
    const hasResistivity = (kind.gives as readonly string[]).includes('resistivity')
    expect(Number.isFinite(found.resistivitySensitivity[0])).toBe(hasResistivity)
  })

  it.each(layerKinds)('$id: names its concentration and its sources where it has any', (kind) => {
    const gives = kind.gives as readonly string[]
    expect(kind.title).not.toBe('')
    expect(kind.concentrationMeans !== '').toBe(gives.includes('concentration'))
    expect(kind.sources.length > 0).toBe(gives.length > 0)
  })

  it.each(layerKinds)('$id: its working ends in finite values, each with formula, unit and source', (kind) => {
    const { layer, sheet } = examples[kind.id]
    const steps = layer.explain(sheet)
    expect(steps.length > 0).toBe(kind.id !== 'sheet')
    for (const step of steps) {
      expect(Number.isFinite(step.value)).toBe(true)
      expect([step.symbol, step.title, step.formula, step.source]).not.toContain('')
    }
  })

  it('sheet: has no way back', () => {
    expect(problemOf(() => examples.sheet.layer.forward(1))).toMatchObject({ kind: 'not-applicable' })
  })

  it('refuses an id it does not know', () => {
    expect(problemOf(() => layerKind('stack' as 'film'))).toMatchObject({ kind: 'unknown-id', id: 'stack' })
  })
})
