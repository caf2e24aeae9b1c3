import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../core/problems/problem'
import { DOPANTS } from '../../../core/silicon/dopants'
import type { Dopant } from '../../../core/silicon/dopants'
import type { MobilityModel } from '../../../core/silicon/mobility-model'
import { mobilityIds, mobilityModel } from '../../../core/silicon/mobility/registry'
import {
  concentration_cm3,
  concentrationSensitivity,
  concentrationsFromResistivities,
  resistivity_ohm_cm,
} from '../../../core/silicon/resistivity'
import { MF723_DENSITY_RANGE_CM3 } from '../../../core/silicon/mf723'
import { HAND_CALCULATION } from '../../reference/intrinsic-density'
import { MASETTI_OVER_MF723_PERCENT, MF723_DECADES } from '../../reference/semi-mf723'

const T = 296.15
const models: readonly MobilityModel[] = mobilityIds.map((id) => mobilityModel(id, HAND_CALCULATION))
const cases = models.flatMap((mobility) => DOPANTS.map((dopant) => ({ id: mobility.id, mobility, dopant })))
const topOf = (mobility: MobilityModel, dopant: Dopant) =>
  mobility.id === 'mf723' ? MF723_DENSITY_RANGE_CM3[dopant].max : 1e21
const anywhere = fc.double({ min: 0, max: 1, noNaN: true })
const anyCase = fc.constantFrom(...cases)
const densityAt = (u: number, top: number) => Math.min(top, 1e12 * Math.pow(top / 1e12, u))

describe('published values', () => {
  it('common practice, no source: the round numbers of a calculation by hand', () => {
    const material = {
      mobility: mobilityModel('constant', HAND_CALCULATION),
      temperature_K: 300,
      intrinsicDensity_cm3: HAND_CALCULATION.intrinsicDensity_cm3,
    }
    const rho = (dopant: Dopant, concentration_cm3: number) =>
      resistivity_ohm_cm({ ...material, dopant, concentration_cm3 })
    // Three and two digits are usual.
    expect(Math.abs(rho('boron', 0) / HAND_CALCULATION.intrinsicResistivity_ohm_cm - 1)).toBeLessThan(0.003)
    expect(rho('phosphorus', 0)).toBe(rho('boron', 0))
    expect(rho('phosphorus', 1e16)).toBeCloseTo(HAND_CALCULATION.donors1e16_ohm_cm, 2)
    expect(rho('boron', 1e16)).toBeCloseTo(HAND_CALCULATION.acceptors1e16_ohm_cm, 2)
  })

  it.each(MF723_DECADES)(
    'SEMI MF723 at %d passes through unchanged, at any temperature',
    (concentration, phosphorus, boron) => {
      const material = { mobility: mobilityModel('mf723'), temperature_K: 310, concentration_cm3: concentration }
      expect(Math.abs(resistivity_ohm_cm({ ...material, dopant: 'boron' }) / boron - 1)).toBeLessThan(5e-4)
      if (!Number.isNaN(phosphorus)) {
        expect(Math.abs(resistivity_ohm_cm({ ...material, dopant: 'phosphorus' }) / phosphorus - 1)).toBeLessThan(5e-4)
      }
    },
  )

  it.each(['phosphorus', 'boron'] as const)('Masetti over SEMI MF723, %s, 1e13 to 1e20', (dopant) => {
    MASETTI_OVER_MF723_PERCENT[dopant].forEach((percent, i) => {
      const query = { dopant, concentration_cm3: 10 ** (13 + i), temperature_K: 300 }
      const ratio =
        resistivity_ohm_cm({ ...query, mobility: mobilityModel('masetti') }) /
        resistivity_ohm_cm({ ...query, mobility: mobilityModel('mf723') })
      expect(Math.abs((ratio - 1) * 100 - percent)).toBeLessThan(0.06)
    })
  })
})

describe('limits', () => {
  it('is intrinsic at no doping, by both carriers', () => {
    const mobility = mobilityModel('klaassen')
    const rho = resistivity_ohm_cm({ dopant: 'boron', concentration_cm3: 0, mobility, temperature_K: 300 })
    expect(Math.abs(rho / (1 / (1.602177e-19 * 9.6956e9 * (1414 + 470.5))) - 1)).toBeLessThan(1e-5)
  })

  it('rises at first in p-type, to its top at ni (sqrt b - 1/sqrt b), and only falls in n-type', () => {
    const ni = 1e10
    const material = {
      mobility: mobilityModel('constant', HAND_CALCULATION),
      temperature_K: 300,
      intrinsicDensity_cm3: ni,
    }
    const b = 1300 / 500
    const top = ni * (Math.sqrt(b) - 1 / Math.sqrt(b))
    const rho = (dopant: Dopant, concentration_cm3: number) =>
      resistivity_ohm_cm({ ...material, dopant, concentration_cm3 })
    expect(rho('boron', top)).toBeGreaterThan(rho('boron', 0))
    expect(rho('boron', top)).toBeGreaterThan(rho('boron', top * 1.02))
    expect(rho('boron', top)).toBeGreaterThan(rho('boron', top * 0.98))
    for (let n = 0; n < 10; n++) expect(rho('phosphorus', (n + 1) * 1e9)).toBeLessThan(rho('phosphorus', n * 1e9))
  })
})

describe('laws', () => {
  it('falls from 1e12 to 1e21, every model and dopant', () => {
    for (const { mobility, dopant } of cases) {
      const top = topOf(mobility, dopant)
      let last = Infinity
      for (let i = 0; i <= 400; i++) {
        const rho = resistivity_ohm_cm({
          dopant,
          mobility,
          temperature_K: T,
          concentration_cm3: densityAt(i / 400, top),
        })
        expect(rho, `${mobility.id} ${dopant} ${i}`).toBeLessThan(last)
        last = rho
      }
    }
  })

  it('comes back to its concentration within 1e-12', () => {
    fc.assert(
      fc.property(anyCase, anywhere, ({ mobility, dopant }, u) => {
        const material = { dopant, mobility, temperature_K: T }
        const start = densityAt(u, topOf(mobility, dopant))
        const rho = resistivity_ohm_cm({ ...material, concentration_cm3: start })
        expect(Math.abs(concentration_cm3({ ...material, resistivity_ohm_cm: rho }) / start - 1)).toBeLessThan(1e-12)
      }),
      { numRuns: 200 },
    )
  })

  it('gives the least and the greatest concentration back exactly', () => {
    for (const { mobility, dopant } of cases) {
      const material = { dopant, mobility, temperature_K: T }
      for (const end of [1e12, topOf(mobility, dopant)]) {
        const rho = resistivity_ohm_cm({ ...material, concentration_cm3: end })
        expect(concentration_cm3({ ...material, resistivity_ohm_cm: rho })).toBe(end)
      }
    }
  })

  it('is as sensitive as two neighbouring inversions say', () => {
    fc.assert(
      fc.property(anyCase, fc.double({ min: 0.01, max: 0.99, noNaN: true }), ({ mobility, dopant }, u) => {
        const material = { dopant, mobility, temperature_K: T }
        const start = densityAt(u, topOf(mobility, dopant))
        // Two neighbours must not stand on either side of arsenic's jump.
        if (mobility.id === 'mf723' && dopant === 'arsenic' && Math.abs(start / 1e19 - 1) < 0.1) return
        const rho = resistivity_ohm_cm({ ...material, concentration_cm3: start })
        const at = (step: number) =>
          Math.log(concentration_cm3({ ...material, resistivity_ohm_cm: rho * Math.exp(step) }))
        const expected = (at(1e-4) - at(-1e-4)) / 2e-4
        const found = concentrationSensitivity({ ...material, resistivity_ohm_cm: rho })
        expect(Math.abs(found / expected - 1)).toBeLessThan(2e-5)
      }),
      { numRuns: 150 },
    )
  })

  it('takes compensation off the carriers and adds it to the scatterers', () => {
    const material = { dopant: 'phosphorus', mobility: mobilityModel('masetti'), temperature_K: T } as const
    const query = { ...material, concentration_cm3: 3e16, otherImpurity_cm3: 1e16 }
    const mobility = mobilityModel('masetti').mobility_cm2_per_Vs({
      carrier: 'electron',
      dopant: 'phosphorus',
      impurity_cm3: 4e16,
      temperature_K: T,
    })
    const rho = resistivity_ohm_cm(query)
    expect(Math.abs(rho * 1.602177e-19 * 2e16 * mobility - 1)).toBeLessThan(1e-6)
    expect(concentration_cm3({ ...query, resistivity_ohm_cm: rho }) / 3e16).toBeCloseTo(1, 12)
    expect(concentrationSensitivity({ ...query, resistivity_ohm_cm: rho })).toBeGreaterThan(-1)
    const standard = { ...query, mobility: mobilityModel('mf723') }
    const byStandard = resistivity_ohm_cm(standard)
    // The standard's resistivity at 4e16, of which only half the carriers are left.
    const uncompensated = resistivity_ohm_cm({ ...material, mobility: mobilityModel('mf723'), concentration_cm3: 4e16 })
    expect(byStandard / uncompensated).toBeCloseTo(2, 12)
    expect(concentration_cm3({ ...standard, resistivity_ohm_cm: byStandard }) / 3e16).toBeCloseTo(1, 12)
  })
})

it('agrees with a second implementation: bisection on Masetti written out, electrons alone', () => {
  const masetti = (n: number) => 68.5 + 1345.5 / (1 + (n / 9.2e16) ** 0.711) - 56.1 / (1 + (3.41e20 / n) ** 1.98)
  for (const rho of [0.001, 0.01, 0.1, 1, 10]) {
    let [low, high] = [1e12, 1e21]
    for (let i = 0; i < 200; i++) {
      const middle = Math.sqrt(low * high)
      if (1 / (1.602176634e-19 * middle * masetti(middle)) > rho) low = middle
      else high = middle
    }
    const found = concentration_cm3({
      dopant: 'phosphorus',
      mobility: mobilityModel('masetti'),
      temperature_K: T,
      resistivity_ohm_cm: rho,
    })
    // Holes, left out here, carry at most (ni/N)^2 of the current: 1e-9 at 10 ohm cm.
    expect(Math.abs(found / low - 1)).toBeLessThan(1e-9)
  }
})

describe("the gap in arsenic's curve", () => {
  it('gives 1e19 for a resistivity that the standard gives to no concentration', () => {
    const material = { dopant: 'arsenic', mobility: mobilityModel('mf723'), temperature_K: T } as const
    for (const rho of [5.56e-3, 5.7e-3, 5.77e-3]) {
      expect(concentration_cm3({ ...material, resistivity_ohm_cm: rho })).toBe(1e19)
      expect(concentrationSensitivity({ ...material, resistivity_ohm_cm: rho })).toBeLessThan(-0.5)
    }
  })
})

describe('the column function', () => {
  it('fills as the single functions would, and NaN outside', () => {
    const settings = { dopant: 'boron', mobility: mobilityModel('masetti'), temperature_K: T } as const
    const column = Float64Array.of(10, NaN, 1e-5, 0.01, 1e6, 0, -1, Infinity)
    const into = { concentration_cm3: new Float64Array(8), sensitivity: new Float64Array(8) }
    concentrationsFromResistivities(column, settings, into)
    for (const row of [0, 3]) {
      const query = { ...settings, resistivity_ohm_cm: column[row] ?? NaN }
      expect(Math.abs((into.concentration_cm3[row] ?? NaN) / concentration_cm3(query) - 1)).toBeLessThan(1e-10)
      expect(Math.abs((into.sensitivity[row] ?? NaN) / concentrationSensitivity(query) - 1)).toBeLessThan(1e-7)
    }
    for (const row of [1, 2, 4, 5, 6, 7]) {
      expect(into.concentration_cm3[row]).toBeNaN()
      expect(into.sensitivity[row]).toBeNaN()
    }
  })
})

describe('refusals', () => {
  const material = { dopant: 'boron', mobility: mobilityModel('masetti'), temperature_K: T } as const
  it.each([NaN, -1, 1.1e22])('concentration %d', (concentration) => {
    expect(() => resistivity_ohm_cm({ ...material, concentration_cm3: concentration })).toThrow(CoreError)
  })
  it.each([NaN, 0, -1, 1e-5, 1e6])('resistivity %d', (resistivity) => {
    expect(() => concentration_cm3({ ...material, resistivity_ohm_cm: resistivity })).toThrow(CoreError)
  })
  it('more compensation than dopant', () => {
    expect(() => resistivity_ohm_cm({ ...material, concentration_cm3: 1e15, otherImpurity_cm3: 2e15 })).toThrow(
      CoreError,
    )
  })
  it('concentrations the standard does not cover, intrinsic silicon among them', () => {
    for (const concentration of [0, 1e11, 6e20]) {
      const query = { dopant: 'phosphorus', mobility: mobilityModel('mf723'), temperature_K: T } as const
      expect(() => resistivity_ohm_cm({ ...query, concentration_cm3: concentration })).toThrow(CoreError)
    }
  })
  it('an intrinsic density at which a resistivity has two concentrations', () => {
    const hot = { ...material, temperature_K: 450, intrinsicDensity_cm3: 5e13, resistivity_ohm_cm: 10 }
    expect(() => concentration_cm3(hot)).toThrow(
      expect.objectContaining({ problem: expect.objectContaining({ kind: 'not-applicable' }) }),
    )
  })
  it('a temperature without an intrinsic density', () => {
    expect(() => resistivity_ohm_cm({ ...material, temperature_K: 400, concentration_cm3: 1e15 })).toThrow(CoreError)
    expect(
      resistivity_ohm_cm({ ...material, temperature_K: 400, intrinsicDensity_cm3: 5e12, concentration_cm3: 1e15 }),
    ).toBeGreaterThan(0)
  })
})
