import { describe, expect, it } from 'vitest'
import type { ConversionQuery } from '../../../core/conversion/conversion'
import { convert } from '../../../core/conversion/convert'
import { temperatureModels, temperatureSeries_K } from '../../../core/conversion/over-temperature'
import { CoreError } from '../../../core/problems/problem'
import { misiakosTsamakisDensity_cm3 } from '../../../core/silicon/intrinsic-density'
import { mobilityModel } from '../../../core/silicon/mobility/registry'

const resistor: ConversionQuery = {
  start: { from: 'concentration', concentration_cm3: 1e17 },
  dopant: 'boron',
  mobility: mobilityModel('arora'),
  temperature_K: 300,
  thickness_um: 1,
  resistor: { length_um: 200, width_um: 10 },
}
const rowsOf = (query: Partial<ConversionQuery>) => {
  const { temperatures } = convert({ ...resistor, temperatures_K: [275, 300, 325], ...query })
  return temperatures ?? []
}

describe('published values', () => {
  it('N. D. Arora et al. 1982: holes in 1e17 boron at 300 K; Misiakos and Tsamakis 1993 at each temperature', () => {
    const rows = rowsOf({})
    expect(rows[1].mobility_cm2_per_Vs).toBeCloseTo(330.87, 3)
    for (const row of rows) expect(row.intrinsicDensity_cm3).toBe(misiakosTsamakisDensity_cm3(row))
  })

  it('Klaassen 1992: lattice mobility of lightly doped silicon falls as T^-2.247 (holes)', () => {
    const rows = rowsOf({ mobility: mobilityModel('klaassen'), start: { from: 'concentration', concentration_cm3: 1e13 } })
    const exponent = Math.log((rows[2].mobility_cm2_per_Vs ?? NaN) / (rows[0].mobility_cm2_per_Vs ?? NaN)) / Math.log(325 / 275)
    expect(exponent).toBeCloseTo(-2.247, 1)
  }) // prettier-ignore
})

describe('laws', () => {
  it('the row at the piece’s own temperature is the piece, from either end', () => {
    for (const start of [resistor.start, { from: 'resistance', resistance_ohm: 37750 } as const]) {
      const piece = convert({ ...resistor, start, temperatures_K: [300] })
      const row = piece.temperatures?.[0]
      expect(row?.electrons_cm3).toBe(piece.electrons_cm3)
      expect(row?.resistivity_ohm_cm).toBeCloseTo(piece.resistivity_ohm_cm ?? NaN, 13)
      expect(Math.abs((row?.resistance_ohm ?? NaN) / (piece.resistance_ohm ?? NaN) - 1)).toBeLessThan(1e-12)
    }
  })

  it('by hand: R = L / (q p μ W t), the piece’s dopant the same at every temperature', () => {
    for (const row of rowsOf({})) {
      expect(Math.abs(row.holes_cm3 / 1e17 - 1)).toBeLessThan(1e-6)
      const byHand = 200e-4 / (1.602176634e-19 * 1e17 * (row.mobility_cm2_per_Vs ?? NaN) * 10e-4 * 1e-4)
      expect(Math.abs((row.resistance_ohm ?? NaN) / byHand - 1)).toBeLessThan(1e-6)
    }
  })

  it('rises while mobility rules and falls once intrinsic carriers do', () => {
    const start = { from: 'concentration', concentration_cm3: 1e13 } as const
    const rho = rowsOf({ start, temperatures_K: [275, 300, 325, 350, 400, 450, 500] }).map((row) => row.resistivity_ohm_cm)
    expect(rho[1]).toBeGreaterThan(rho[0])
    expect(rho[2]).toBeGreaterThan(rho[1])
    expect(rho[5]).toBeLessThan(rho[4])
    expect(rho[6]).toBeLessThan(rho[5])
  }) // prettier-ignore

  it('tells where intrinsic density is carried on beyond 340 K', () => {
    expect(rowsOf({ temperatures_K: [340, 341] }).map((row) => row.isIntrinsicCarriedOn)).toEqual([false, true])
  })

  it('a series counts both ends, without the noise of sums', () => {
    expect(temperatureSeries_K({ low_C: -50, high_C: 50, step_C: 50 })).toEqual([223.15, 273.15, 323.15])
    expect(temperatureSeries_K({ low_C: 0, high_C: 1, step_C: 0.1 })).toHaveLength(11)
    expect(temperatureSeries_K({ low_C: 20, high_C: 29, step_C: 5 })).toEqual([293.15, 298.15])
    expect(temperatureModels.map(({ id }) => id)).toEqual(['arora', 'klaassen'])
  })
})

describe('refusals', () => {
  it.each([
    ['a model made at one temperature', () => rowsOf({ mobility: mobilityModel('masetti') })],
    ['constant mobilities', () => rowsOf({ mobility: mobilityModel('constant', { electrons_cm2_per_Vs: 1, holes_cm2_per_Vs: 1 }) })],
    ['an intrinsic density held fixed', () => rowsOf({ intrinsicDensity_cm3: 1e10 })],
    ['a temperature out of the model’s range', () => rowsOf({ temperatures_K: [300, 249] })],
    ['a piece of unknown dopant', () => convert({
      start: { from: 'resistivity', resistivity_ohm_cm: 1 }, mobility: mobilityModel('arora'), temperature_K: 300, temperatures_K: [300],
    })],
    ['no step', () => temperatureSeries_K({ low_C: 0, high_C: 100, step_C: 0 })],
    ['a step that is no number', () => temperatureSeries_K({ low_C: 0, high_C: 100, step_C: NaN })],
    ['a series that runs backwards', () => temperatureSeries_K({ low_C: 100, high_C: 0, step_C: 10 })],
    ['a million rows', () => temperatureSeries_K({ low_C: 0, high_C: 100, step_C: 0.001 })],
  ])('%s', (_, call) => expect(call).toThrow(CoreError)) // prettier-ignore
})
