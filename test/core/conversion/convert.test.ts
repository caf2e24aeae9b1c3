import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { Conversion, ConversionQuery, ConversionStart } from '../../../core/conversion/conversion'
import { convert } from '../../../core/conversion/convert'
import { CoreError, type Problem } from '../../../core/problems/problem'
import { DOPANTS, type Dopant } from '../../../core/silicon/dopants'
import { MF723_DENSITY_RANGE_CM3 } from '../../../core/silicon/mf723'
import { mobilityIds, mobilityModel } from '../../../core/silicon/mobility/registry'
import { EMIS_RESISTIVITIES } from '../../reference/emis-1999'
import { HAND_CALCULATION } from '../../reference/intrinsic-density'
import { PAPER_MOBILITIES } from '../../reference/mobility-papers'
import { mf1527DiscFactor } from '../../reference/semi-mf1527'
import { MF723_ARSENIC, MF723_DECADES } from '../../reference/semi-mf723'

const ROOM_K = 296.15
const masetti = mobilityModel('masetti')
const mf723 = mobilityModel('mf723')
const byHand = {
  mobility: mobilityModel('constant', HAND_CALCULATION),
  intrinsicDensity_cm3: HAND_CALCULATION.intrinsicDensity_cm3,
}
const middle = { x_mm: 0, y_mm: 0, angle_deg: 0, back: 'insulating' } as const

type Rest = Partial<Omit<ConversionQuery, 'start'>>
const from = (start: ConversionStart, rest: Rest = {}): Conversion =>
  convert({ start, mobility: masetti, temperature_K: ROOM_K, ...rest })
const fromConcentration = (concentration_cm3: number, rest: Rest = {}) =>
  from({ from: 'concentration', concentration_cm3 }, rest)
const fromResistivity = (resistivity_ohm_cm: number, rest: Rest = {}) =>
  from({ from: 'resistivity', resistivity_ohm_cm }, rest)

const relative = (value: number | null, expected: number) => Math.abs((value ?? NaN) / expected - 1)

function problemOf(call: () => unknown): Problem | undefined {
  try {
    call()
  } catch (error) {
    if (error instanceof CoreError) return error.problem
    throw error
  }
  return undefined
}

describe('published values', () => {
  it.each(MF723_DECADES)('SEMI MF723: resistivity of %d cm^-3, and back', (concentration, phosphorus, boron) => {
    const both: readonly (readonly [Dopant, number])[] = [['phosphorus', phosphorus], ['boron', boron]] // prettier-ignore
    for (const [dopant, rho] of both.filter(([, value]) => !Number.isNaN(value))) {
      const material = { dopant, mobility: mf723 }
      expect(relative(fromConcentration(concentration, material).resistivity_ohm_cm, rho)).toBeLessThan(5e-4)
      // Four printed digits of resistivity are up to two units more of concentration where the curve is flat; the ends may fall out.
      if (concentration > 1e12 && concentration < 1e21) {
        expect(relative(fromResistivity(rho, material).concentration_cm3, concentration)).toBeLessThan(1e-3)
      }
    }
  })

  it.each(MF723_ARSENIC)('SEMI MF723: arsenic, %d cm^-3', (concentration, rho) => {
    const found = fromConcentration(concentration, { dopant: 'arsenic', mobility: mf723 })
    expect(relative(found.resistivity_ohm_cm, rho)).toBeLessThan(1e-4)
  })

  it('EMIS datareview 1999: SEMI MF723 within 5 % of its table from 1e13 to 1e20', () => {
    for (const [concentration, phosphorus, boron] of EMIS_RESISTIVITIES.slice(1, 9)) {
      const rho = (dopant: Dopant) => fromConcentration(concentration, { dopant, mobility: mf723 }).resistivity_ohm_cm
      expect(relative(rho('phosphorus'), phosphorus)).toBeLessThan(0.02)
      expect(relative(rho('boron'), boron)).toBeLessThan(0.01)
    }
  })

  const papers = (['masetti', 'arora', 'klaassen', 'caughey-thomas'] as const).flatMap((id) =>
    (PAPER_MOBILITIES[id] ?? []).map(([carrier, dopant, impurity, mobility]) => ({ id, carrier, dopant, impurity, mobility })),
  ) // prettier-ignore
  it.each(papers)('$id: $carrier in $impurity $dopant is $mobility', ({ id, carrier, dopant, impurity, mobility }) => {
    const found = fromConcentration(impurity, { dopant, mobility: mobilityModel(id), temperature_K: 300 })
    const isMajority = (carrier === 'hole') === (dopant === 'boron')
    const step = found.steps.find(({ symbol }) => symbol === (carrier === 'hole' ? 'μ_p' : 'μ_n'))
    expect(relative(step?.value ?? null, mobility)).toBeLessThan(1e-5)
    if (isMajority) expect(found.mobility_cm2_per_Vs).toBe(step?.value)
  })

  it('common practice, no source: 231 kohm cm intrinsic, 0.48 and 1.25 ohm cm at 1e16, by hand numbers', () => {
    const intrinsic = fromConcentration(0, byHand)
    expect(relative(intrinsic.resistivity_ohm_cm, HAND_CALCULATION.intrinsicResistivity_ohm_cm)).toBeLessThan(0.003)
    expect([intrinsic.electrons_cm3, intrinsic.holes_cm3, intrinsic.intrinsicDensity_cm3]).toEqual([1.5e10, 1.5e10, 1.5e10])
    expect([intrinsic.concentration_cm3, intrinsic.mobility_cm2_per_Vs]).toEqual([0, null])
    const donors = fromConcentration(1e16, { ...byHand, dopant: 'phosphorus' })
    expect(donors.resistivity_ohm_cm).toBeCloseTo(HAND_CALCULATION.donors1e16_ohm_cm, 2)
    expect(relative(donors.holes_cm3, 2.25e4)).toBeLessThan(1e-9)
    const acceptors = fromConcentration(1e16, { ...byHand, dopant: 'boron' })
    expect(acceptors.resistivity_ohm_cm).toBeCloseTo(HAND_CALCULATION.acceptors1e16_ohm_cm, 2)
  }) // prettier-ignore

  it('SEMI MF1527 eq. R2-1 and R2-5: the infinite sheet and the centre of a disc', () => {
    const sheet = (place: Partial<typeof middle> & { diameter_mm?: number; spacing_mm?: number }) =>
      from({ from: 'v-over-i', vOverI_ohm: 20, place: { ...middle, ...place } }).sheetResistance_ohm_sq
    expect(relative(sheet({}), 20 * 4.53236014182719)).toBeLessThan(1e-14)
    for (const diameter_mm of [10, 50.8, 200]) {
      expect(relative(sheet({ diameter_mm, spacing_mm: 1.59 }), 20 * mf1527DiscFactor(diameter_mm / 1.59))).toBeLessThan(1e-12)
    }
  }) // prettier-ignore

  it('SEMI MF43-0705 table 1: thickness factor 0.921 at w = S, 0.634 at 2 S', () => {
    for (const [thickness_um, expected] of [[1000, 0.921], [2000, 0.634]] as const) {
      const place = { ...middle, spacing_mm: 1 }
      const found = from({ from: 'v-over-i', vOverI_ohm: 1, place }, { thickness_um })
      expect((found.sheetResistance_ohm_sq ?? NaN) / 4.53236014182719).toBeCloseTo(expected, 3)
    }
  }) // prettier-ignore
})

describe('limits', () => {
  it('a thin layer needs no spacing; the factor is 1', () => {
    const start = { from: 'v-over-i', vOverI_ohm: 20, place: middle } as const
    const with05mm = { ...start, place: { ...middle, spacing_mm: 0.5 } }
    const thin = from(start, { thickness_um: 100 }).sheetResistance_ohm_sq
    expect(relative(thin, from(with05mm, { thickness_um: 100 }).sheetResistance_ohm_sq ?? NaN)).toBeLessThan(1e-6)
  })

  it('stops at resistivity without a dopant, and says why', () => {
    const found = fromResistivity(5)
    expect([found.concentration_cm3, found.electrons_cm3, found.model]).toEqual([null, null, null])
    expect(found.conductivity_S_per_cm).toBe(0.2)
    const last = found.steps.at(-1)
    expect(last?.symbol).toBe('N')
    expect(last?.value).toBeNaN()
    expect(last?.formula).toMatch(/no dopant/)
  })

  it('stops at sheet resistance without a thickness, and says why', () => {
    const found = from({ from: 'sheet-resistance', sheetResistance_ohm_sq: 92 }, { dopant: 'boron' })
    expect([found.sheetResistance_ohm_sq, found.resistivity_ohm_cm, found.concentration_cm3]).toEqual([92, null, null])
    expect(found.steps.at(-1)?.formula).toMatch(/thickness/)
  })

  it('says what a model covers where it has no concentration for a resistivity', () => {
    const found = fromResistivity(1e-5, { dopant: 'boron' })
    expect(found.concentration_cm3).toBeNull()
    expect(found.steps.at(-1)?.formula).toMatch(/Masetti.*boron covers .* to .* Ω·cm/)
  })

  it('gives no concentration where intrinsic carriers let two have one resistivity, but the rest', () => {
    const found = fromResistivity(5, { dopant: 'boron', mobility: mobilityModel('arora'), temperature_K: 383.15 })
    expect([found.resistivity_ohm_cm, found.concentration_cm3]).toEqual([5, null])
    expect(found.steps.at(-1)?.formula).toMatch(/two concentrations/)
  })

  it('names the model beside each concentration, and says that one at 300 K is used as it stands', () => {
    for (const found of [fromResistivity(5, { dopant: 'boron' }), fromConcentration(1e16, { dopant: 'boron' })]) {
      const step = found.steps.find(({ symbol }) => symbol === 'N')
      expect(step?.formula).toMatch(/Masetti, Severi and Solmi, made at 300 K and used as it stands/)
    }
    const at300 = fromConcentration(1e16, { dopant: 'boron', temperature_K: 300 })
    expect(at300.steps.some(({ formula }) => formula.includes('as it stands'))).toBe(false)
    const beyond = fromConcentration(5e20, { dopant: 'boron', mobility: mobilityModel('arora') })
    expect(beyond.steps[0].formula).toMatch(/beyond the/)
  })
})

describe('laws', () => {
  const models = mobilityIds.map((id) => mobilityModel(id, HAND_CALCULATION))
  const material = fc.record({ mobility: fc.constantFrom(...models), dopant: fc.constantFrom(...DOPANTS) })
  const share = fc.double({ min: 0, max: 1, noNaN: true })
  const dimensions = fc.record({
    thickness_um: fc.double({ min: 0.01, max: 900, noNaN: true }),
    length_um: fc.double({ min: 1, max: 1000, noNaN: true }),
    width_um: fc.double({ min: 1, max: 1000, noNaN: true }),
  })

  it('forwards, then backwards from each quantity, returns to the concentration', () => {
    fc.assert(
      fc.property(material, share, dimensions, ({ mobility, dopant }, u, { thickness_um, length_um, width_um }) => {
        const top = mobility.id === 'mf723' ? MF723_DENSITY_RANGE_CM3[dopant].max : 1e21
        const concentration = Math.min(0.999 * top, 1.001e12 * Math.pow(top / 1e12, u))
        const piece = { mobility, dopant, thickness_um, resistor: { length_um, width_um } }
        const forth = fromConcentration(concentration, piece)
        const starts: readonly ConversionStart[] = [
          { from: 'resistivity', resistivity_ohm_cm: forth.resistivity_ohm_cm ?? NaN },
          { from: 'sheet-resistance', sheetResistance_ohm_sq: forth.sheetResistance_ohm_sq ?? NaN },
          { from: 'resistance', resistance_ohm: forth.resistance_ohm ?? NaN },
        ]
        for (const start of starts) {
          const back = from(start, piece)
          expect(relative(back.concentration_cm3, concentration)).toBeLessThan(1e-11)
          expect(relative(back.resistance_ohm, forth.resistance_ohm ?? NaN)).toBeLessThan(1e-14)
          expect(relative(back.mobility_cm2_per_Vs, forth.mobility_cm2_per_Vs ?? NaN)).toBeLessThan(1e-10)
        }
      }),
      { numRuns: 100 },
    )
  })

  it('V/I of the sheet that a concentration makes returns to it, anywhere on a disc', () => {
    const places = fc.record({
      x_mm: fc.double({ min: -60, max: 60, noNaN: true }),
      y_mm: fc.double({ min: -60, max: 60, noNaN: true }),
      angle_deg: fc.double({ min: -180, max: 180, noNaN: true }),
      back: fc.constantFrom('insulating', 'conducting'),
    })
    fc.assert(
      fc.property(places, share, (place, u) => {
        const piece = { dopant: 'boron', thickness_um: 725 } as const
        const forth = fromConcentration(1e13 * Math.pow(1e7, u), piece)
        const probed = { ...place, diameter_mm: 200, spacing_mm: 1 } as const
        const unit = from({ from: 'v-over-i', vOverI_ohm: 1, place: probed }, { thickness_um: 725 })
        const vOverI_ohm = (forth.sheetResistance_ohm_sq ?? NaN) / (unit.sheetResistance_ohm_sq ?? NaN)
        const back = from({ from: 'v-over-i', vOverI_ohm, place: probed }, piece)
        expect(relative(back.concentration_cm3, forth.concentration_cm3 ?? NaN)).toBeLessThan(1e-11)
      }),
      { numRuns: 30 },
    )
  })

  it('n p = ni², n - p = ±N, σ = q (n μn + p μp) as the working shows them', () => {
    fc.assert(
      fc.property(material, share, ({ mobility, dopant }, u) => {
        if (mobility.id === 'mf723') return
        const concentration = 1e9 * Math.pow(1e12, u)
        const { electrons_cm3, holes_cm3, intrinsicDensity_cm3, conductivity_S_per_cm, steps } = fromConcentration(
          concentration,
          {
            mobility,
            dopant,
          },
        )
        const [n, p, ni] = [electrons_cm3 ?? NaN, holes_cm3 ?? NaN, intrinsicDensity_cm3 ?? NaN]
        expect(relative(n * p, ni * ni)).toBeLessThan(1e-12)
        expect(relative(dopant === 'boron' ? p - n : n - p, concentration)).toBeLessThan(
          1e-12 * (1 + ni / concentration),
        )
        const valueOf = (symbol: string) => steps.find((step) => step.symbol === symbol)?.value ?? NaN
        const sigma = 1.602176634e-19 * (n * valueOf('μ_n') + p * valueOf('μ_p'))
        expect(relative(conductivity_S_per_cm, sigma)).toBeLessThan(1e-12)
      }),
      { numRuns: 100 },
    )
  })

  it('each reported value stands in the working', () => {
    const found = fromConcentration(3e16, { dopant: 'arsenic', thickness_um: 2, resistor: { length_um: 50, width_um: 5 } })
    const valueOf = (symbol: string) => found.steps.find((step) => step.symbol === symbol)?.value
    expect(valueOf('N')).toBe(found.concentration_cm3)
    expect(valueOf('n')).toBe(found.electrons_cm3)
    expect(valueOf('p')).toBe(found.holes_cm3)
    expect(valueOf('n_i')).toBe(found.intrinsicDensity_cm3)
    expect(valueOf('σ')).toBe(found.conductivity_S_per_cm)
    expect(valueOf('ρ')).toBe(found.resistivity_ohm_cm)
    expect(valueOf('R_s')).toBe(found.sheetResistance_ohm_sq)
    expect(valueOf('R')).toBe(found.resistance_ohm)
    expect(relative(found.resistance_ohm, ((found.resistivity_ohm_cm ?? NaN) * 50e-4) / (5e-4 * 2e-4))).toBeLessThan(1e-14)
  }) // prettier-ignore
})

describe('refusals', () => {
  const place = middle
  it.each<readonly [string, ConversionStart, Rest, Problem['kind']]>([
    ['a V/I of nothing', { from: 'v-over-i', vOverI_ohm: 0, place }, {}, 'out-of-range'],
    ['a negative sheet resistance', { from: 'sheet-resistance', sheetResistance_ohm_sq: -1 }, {}, 'out-of-range'],
    ['a resistivity that is no number', { from: 'resistivity', resistivity_ohm_cm: NaN }, {}, 'out-of-range'],
    ['a negative concentration', { from: 'concentration', concentration_cm3: -1e15 }, { dopant: 'boron' }, 'out-of-range'],
    ['more atoms than silicon has', { from: 'concentration', concentration_cm3: 1e23 }, { dopant: 'boron' }, 'out-of-range'],
    ['a concentration of nothing named', { from: 'concentration', concentration_cm3: 1e15 }, {}, 'not-applicable'],
    ['a thickness of nothing', { from: 'resistivity', resistivity_ohm_cm: 1 }, { thickness_um: 0 }, 'out-of-range'],
    ['a temperature below all', { from: 'resistivity', resistivity_ohm_cm: 1 }, { temperature_K: 20 }, 'out-of-range'],
    ['a resistor without width', { from: 'resistivity', resistivity_ohm_cm: 1 }, { resistor: { length_um: 1, width_um: 0 } }, 'out-of-range'],
    ['an intrinsic density of nothing', { from: 'resistivity', resistivity_ohm_cm: 1 }, { intrinsicDensity_cm3: 0 }, 'out-of-range'],
    ['a resistance of no resistor', { from: 'resistance', resistance_ohm: 1 }, {}, 'not-applicable'],
    ['pins off the wafer', { from: 'v-over-i', vOverI_ohm: 1, place: { ...middle, diameter_mm: 100, spacing_mm: 1, x_mm: 49.9 } }, {}, 'not-applicable'],
    ['a disc without a spacing', { from: 'v-over-i', vOverI_ohm: 1, place: { ...middle, diameter_mm: 100 } }, {}, 'not-applicable'],
    ['a thick wafer without a spacing', { from: 'v-over-i', vOverI_ohm: 1, place }, { thickness_um: 725 }, 'not-applicable'],
    ['arora at -50 C', { from: 'concentration', concentration_cm3: 1e15 }, { dopant: 'boron', mobility: mobilityModel('arora'), temperature_K: 223 }, 'out-of-range'],
    ['intrinsic silicon by the standard', { from: 'concentration', concentration_cm3: 0 }, { mobility: mf723 }, 'out-of-range'],
  ])('%s', (_, start, rest, kind) => {
    expect(problemOf(() => from(start, rest))?.kind).toBe(kind)
  }) // prettier-ignore
})
