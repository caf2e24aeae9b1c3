import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../../core/problems/problem'
import { DOPANTS, isAcceptor } from '../../../../core/silicon/dopants'
import type { Dopant } from '../../../../core/silicon/dopants'
import type { MobilityModel } from '../../../../core/silicon/mobility-model'
import { mobilityIds, mobilityModel, mobilityModels } from '../../../../core/silicon/mobility/registry'
import type { MobilityId } from '../../../../core/silicon/mobility/registry'
import { PAPER_MOBILITIES } from '../../../reference/mobility-papers'

const majorityOf = (dopant: Dopant) => (isAcceptor(dopant) ? 'hole' : 'electron')
const constants = { electrons_cm2_per_Vs: 1300, holes_cm2_per_Vs: 500 }
const models: readonly MobilityModel[] = mobilityIds.map((id) => mobilityModel(id, constants))
const problemOf = (act: () => unknown) => {
  try {
    act()
  } catch (error) {
    return error instanceof CoreError ? error.problem : error
  }
  return undefined
}

describe('mobilities of the papers', () => {
  for (const [id, rows] of Object.entries(PAPER_MOBILITIES)) {
    it.each(rows)(`${id}: %s among %s %d`, (carrier, dopant, impurity_cm3, expected) => {
      const found = mobilityModel(id as MobilityId).mobility_cm2_per_Vs({
        carrier,
        dopant,
        impurity_cm3,
        temperature_K: 300,
      })
      // The values are printed to five digits at least: half a unit in the last place, relative to 1e5 units.
      expect(Math.abs(found / expected - 1)).toBeLessThan(1e-5)
    })
  }
})

describe('every model of the register', () => {
  it('has an id of its own, a title, a source and a sensible range', () => {
    expect(new Set(mobilityIds).size).toBe(mobilityModels.length)
    expect(mobilityIds).toEqual(['masetti', 'arora', 'caughey-thomas', 'klaassen', 'constant', 'mf723'])
    for (const model of models) {
      expect(model.title.length * model.source.length).toBeGreaterThan(0)
      expect(model.range_cm3.max).toBeGreaterThan(model.range_cm3.min)
      expect(model.temperature_K.max).toBeGreaterThanOrEqual(model.temperature_K.min)
      expect(model.dopants).toEqual(DOPANTS)
    }
  })

  it('is positive and finite over its range, and no greater at greater impurity', () => {
    const density = fc.double({ min: 0, max: 1, noNaN: true })
    fc.assert(
      fc.property(fc.constantFrom(...models), fc.constantFrom(...DOPANTS), density, density, (model, dopant, a, b) => {
        const { min, max } = model.range_cm3
        const at = (u: number) => Math.max(min, 1e12) * Math.pow(max / Math.max(min, 1e12), u)
        const mobility = (impurity_cm3: number) =>
          model.mobility_cm2_per_Vs({ carrier: majorityOf(dopant), dopant, impurity_cm3, temperature_K: 300 })
        const [less, more] = [at(Math.min(a, b)), at(Math.max(a, b))]
        expect(mobility(less)).toBeGreaterThan(0)
        expect(mobility(less)).toBeLessThan(2000)
        // What SEMI MF723 implies rises a little: phosphorus by 0.3 % from 1e12 to 9e12; arsenic by 4 % where its curve starts, at 1e19.
        const slack = model.id !== 'mf723' ? 1e-12 : { boron: 1e-12, phosphorus: 0.0032, arsenic: 0.041 }[dopant]
        expect(mobility(more)).toBeLessThanOrEqual(mobility(less) * (1 + slack))
      }),
      { numRuns: 200 },
    )
  })

  it.each(models.filter(({ id }) => id !== 'mf723'))('$id reaches its lattice mobility in pure silicon', (model) => {
    for (const dopant of DOPANTS) {
      for (const carrier of ['electron', 'hole'] as const) {
        const at = (impurity_cm3: number) =>
          model.mobility_cm2_per_Vs({ carrier, dopant, impurity_cm3, temperature_K: 300 })
        expect(at(0)).toBeGreaterThan(0)
        expect(at(0) / at(1e8)).toBeCloseTo(1, 4)
      }
    }
  })
})

describe('asking the register', () => {
  it('gives each model by its id', () => {
    for (const model of mobilityModels) expect(mobilityModel(model.id, constants).id).toBe(model.id)
  })

  it('refuses an unknown id and names the known', () => {
    expect(problemOf(() => mobilityModel('irvin' as MobilityId))).toMatchObject({
      kind: 'unknown-id',
      id: 'irvin',
      known: mobilityIds,
    })
  })

  it('gives constant mobilities from two numbers and from nothing less', () => {
    const query = { dopant: 'boron', impurity_cm3: 1e20, temperature_K: 250 } as const
    const model = mobilityModel('constant', constants)
    expect(model.mobility_cm2_per_Vs({ carrier: 'electron', ...query })).toBe(1300)
    expect(model.mobility_cm2_per_Vs({ carrier: 'hole', ...query })).toBe(500)
    expect(problemOf(() => mobilityModel('constant'))).toMatchObject({ kind: 'not-applicable' })
    const bare = mobilityModels.find(({ id }) => id === 'constant') as MobilityModel
    expect(problemOf(() => bare.mobility_cm2_per_Vs({ carrier: 'hole', ...query }))).toMatchObject({
      kind: 'not-applicable',
    })
    for (const wrong of [0, -1, NaN, Infinity]) {
      expect(problemOf(() => mobilityModel('constant', { ...constants, holes_cm2_per_Vs: wrong }))).toMatchObject({
        kind: 'out-of-range',
        quantity: 'hole mobility',
      })
    }
  })
})
