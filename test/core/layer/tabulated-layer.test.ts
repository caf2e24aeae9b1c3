import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { dopedLayer } from '../../../core/layer/doped-layer'
import type { DopedLayerSettings } from '../../../core/layer/doped-layer'
import type { DepthTable } from '../../../core/layer/layer-kind'
import { ELEMENTARY_CHARGE_C } from '../../../core/units/constants'
import { between, inverted, largestRelativeDifference, modelOf, problemOf, tanhSinh } from './layer-fixtures'

function tableOf(count: number, depth_um: number, at: (x_um: number) => number): DepthTable {
  const depths = Float64Array.from({ length: count }, (_, i) => (depth_um * i) / (count - 1))
  return { depth_um: depths, concentration_cm3: depths.map(at) }
}

/** sqrt(D t) of 0.06 um and 1e20 at the surface: at 1e15 at 0.407 um. */
const gaussianAt = (x_um: number): number => 1e20 * Math.exp(-((x_um / 0.12) ** 2))
const monitor: DopedLayerSettings = {
  dopant: 'boron',
  mobility: modelOf('masetti'),
  temperature_K: 300,
  profile: 'tabulated',
  table: tableOf(51, 0.5, gaussianAt),
  background: { dopant: 'phosphorus', concentration_cm3: 1e15 },
}
const byLength: DopedLayerSettings = { ...monitor, profile: 'gaussian', table: undefined, diffusionLength_um: 0.06 }

/** Buried, with a dip below the background before its peak, a plateau and a step of a hundredth of its depth. */
const rugged: DepthTable = {
  depth_um: Float64Array.of(0.01, 0.05, 0.1, 0.15, 0.25, 0.252, 0.4, 0.6),
  concentration_cm3: Float64Array.of(3e16, 1e13, 8e18, 2e19, 2e19, 4e18, 1e16, 1e15),
}

/** Sheet resistance of ln N in straight lines, by another rule, line by line, cut where the background is crossed. */
function byTanhSinh({ depth_um, concentration_cm3 }: DepthTable, scale: number, background_cm3: number): number {
  const mobility = monitor.mobility
  const x = depth_um[0] > 0 ? [0, ...depth_um] : [...depth_um]
  const n = [...(depth_um[0] > 0 ? [concentration_cm3[0]] : []), ...concentration_cm3].map((value) => value * scale)
  let sum = 0
  for (let i = 1; i < x.length; i++) {
    const lnAt = (place: number): number => Math.log(n[i - 1]) + place * Math.log(n[i] / n[i - 1])
    const crossing = Math.log(background_cm3 / n[i - 1]) / Math.log(n[i] / n[i - 1])
    if (Math.max(n[i - 1], n[i]) <= background_cm3) continue
    const from = n[i - 1] < background_cm3 ? crossing : 0
    const to = n[i] < background_cm3 ? crossing : 1
    sum += (x[i] - x[i - 1]) * tanhSinh((place) => {
      const density = Math.exp(lnAt(place))
      const query = { carrier: 'hole', dopant: 'boron', temperature_K: 300 } as const
      const mu = mobility.mobility_cm2_per_Vs({ ...query, impurity_cm3: density + background_cm3 })
      return ELEMENTARY_CHARGE_C * mu * (density - background_cm3)
    }, from, to) // prettier-ignore
  }
  return 1e4 / sum
}

describe('a tabulated profile', () => {
  it('made from a Gaussian, gives what the Gaussian gives to the error of the lines', () => {
    const exact = dopedLayer.prepare(byLength)
    const sheets = between(exact.forward(8e20), exact.forward(1e18), 30)
    const wanted = inverted(exact, sheets)
    const errorOf = (count: number): number => {
      const found = inverted(dopedLayer.prepare({ ...monitor, table: tableOf(count, 0.5, gaussianAt) }), sheets)
      expect(largestRelativeDifference(found.resistivity_ohm_cm, wanted.resistivity_ohm_cm)).toBeLessThan(0.01)
      return Math.max(
        largestRelativeDifference(found.concentration_cm3, wanted.concentration_cm3),
        largestRelativeDifference(found.dose_cm2, wanted.dose_cm2),
      )
    }
    const [coarse, fine, finest] = [51, 201, 801].map(errorOf)
    expect(coarse).toBeLessThan(2e-3)
    // Straight lines err with the square of their length.
    expect(coarse / fine).toBeCloseTo(16, 0)
    expect(fine / finest).toBeCloseTo(16, 0)
  })

  it('made from an exponential, is that exponential: its lines are straight', () => {
    const table = tableOf(7, 0.6, (x_um) => 3e19 * Math.exp(-x_um / 0.04))
    const exact = dopedLayer.prepare({ ...byLength, profile: 'exponential', diffusionLength_um: 0.04 })
    const sheets = between(exact.forward(3e20), exact.range_ohm_sq.max, 100)
    const [found, wanted] = [dopedLayer.prepare({ ...monitor, table }), exact].map((layer) => inverted(layer, sheets))
    expect(largestRelativeDifference(found.concentration_cm3, wanted.concentration_cm3)).toBeLessThan(1e-9)
    expect(largestRelativeDifference(found.dose_cm2, wanted.dose_cm2)).toBeLessThan(1e-9)
    expect(largestRelativeDifference(found.resistivity_ohm_cm, wanted.resistivity_ohm_cm)).toBeLessThan(1e-9)
    expect(largestRelativeDifference(found.resistivitySensitivity, wanted.resistivitySensitivity)).toBeLessThan(1e-5)
  })

  it('that is flat to its end is the uniform layer of that depth', () => {
    const table = tableOf(4, 0.35, () => 1e17)
    const box = dopedLayer.prepare({ ...byLength, profile: 'uniform', diffusionLength_um: undefined, depth_um: 0.35 })
    const sheets = between(box.range_ohm_sq.min, box.range_ohm_sq.max, 40)
    const [found, wanted] = [dopedLayer.prepare({ ...monitor, table }), box].map((layer) => inverted(layer, sheets))
    for (const column of ['concentration_cm3', 'dose_cm2', 'resistivity_ohm_cm', 'resistivitySensitivity'] as const) {
      expect(largestRelativeDifference(found[column], wanted[column])).toBeLessThan(1e-10)
    }
  })

  it.each([
    ['Gaussian of 51 points', monitor.table!],
    ['rugged profile', rugged],
    ['noisy one', tableOf(200, 0.5, (x) => gaussianAt(x) * (1 + 0.1 * Math.sin(1e4 * x)))],
    ['nearly flat one', tableOf(9, 0.3, (x) => 1e19 * (1 - 1e-5 * x))],
  ])('%s: its integral is exact for the lines (tanh-sinh, line by line)', (_, table) => {
    const peak_cm3 = Math.max(...table.concentration_cm3)
    const layer = dopedLayer.prepare({ ...monitor, table })
    for (const peak of [1.3e15, 4e16, 1e18, 2e19, 9e20]) {
      expect(Math.abs(layer.forward(peak) / byTanhSinh(table, peak / peak_cm3, 1e15) - 1)).toBeLessThan(1e-10)
    }
  })

  it.each(['klaassen', 'mf723', 'arora', 'caughey-thomas', 'constant'] as const)('%s: returns what it was given', (id) => {
    const layer = dopedLayer.prepare({ ...monitor, mobility: modelOf(id) })
    const { min, max } = layer.range_ohm_sq
    const sheets = between(min, max, 60)
    const found = inverted(layer, sheets)
    expect(largestRelativeDifference(found.concentration_cm3.map((n) => layer.forward(n)), sheets)).toBeLessThan(3e-10)
  }) // prettier-ignore

  it.each([['Gaussian', monitor.table!], ['rugged', rugged]])('%s: many sites and single ones alike', (_, table) => {
    const layer = dopedLayer.prepare({ ...monitor, table })
    const { min, max } = layer.range_ohm_sq
    const sheets = between(min, max, 120)
    const many = inverted(layer, sheets)
    const single = [0, 1, 2].map((part) => inverted(layer, sheets.filter((_, i) => i % 3 === part)))
    const ofPart = (name: 'concentration_cm3' | 'dose_cm2' | 'concentrationSensitivity' | 'doseSensitivity') =>
      sheets.map((_, i) => single[i % 3][name][Math.floor(i / 3)])
    expect(largestRelativeDifference(many.concentration_cm3, ofPart('concentration_cm3'))).toBeLessThan(1e-9)
    expect(largestRelativeDifference(many.dose_cm2, ofPart('dose_cm2'))).toBeLessThan(1e-9)
    for (const name of ['concentrationSensitivity', 'doseSensitivity'] as const) {
      expect(largestRelativeDifference(many[name], ofPart(name))).toBeLessThan(1e-4)
    }
  }) // prettier-ignore

  it('has sensitivities that are the slopes of its own results', () => {
    const layer = dopedLayer.prepare({ ...monitor, table: rugged })
    const sheets = between(layer.range_ohm_sq.min * 1.01, layer.range_ohm_sq.max / 1.01, 40)
    const at = inverted(layer, sheets)
    const [above, below] = [1e-4, -1e-4].map((step) => inverted(layer, sheets.map((sheet) => sheet * Math.exp(step)))) // prettier-ignore
    sheets.forEach((_, i) => {
      const slope = (name: 'concentration_cm3' | 'dose_cm2' | 'resistivity_ohm_cm') =>
        Math.log(above[name][i] / below[name][i]) / 2e-4
      expect(slope('concentration_cm3') / at.concentrationSensitivity[i]).toBeCloseTo(1, 3)
      expect(slope('dose_cm2') / at.doseSensitivity[i]).toBeCloseTo(1, 3)
    })
  })

  it('does not care how the table is scaled, and scales with its depths', () => {
    fc.assert(
      fc.property(fc.double({ min: -3, max: 3, noNaN: true }), fc.double({ min: 0.1, max: 10, noNaN: true }), (power, stretch) => {
        const scaled = { depth_um: rugged.depth_um.map((x) => x * stretch), concentration_cm3: rugged.concentration_cm3.map((n) => n * 10 ** power) }
        const plain = inverted(dopedLayer.prepare({ ...monitor, table: rugged }), [300])
        const moved = inverted(dopedLayer.prepare({ ...monitor, table: scaled }), [300 / stretch])
        expect(moved.concentration_cm3[0] / plain.concentration_cm3[0]).toBeCloseTo(1, 9)
        expect(moved.dose_cm2[0] / plain.dose_cm2[0] / stretch).toBeCloseTo(1, 9)
        expect(moved.resistivity_ohm_cm[0] / plain.resistivity_ohm_cm[0]).toBeCloseTo(1, 9)
      }),
      { numRuns: 30 },
    )
  }) // prettier-ignore

  it('covers its range to both ends, and no more', () => {
    const layer = dopedLayer.prepare(monitor)
    const { min, max } = layer.range_ohm_sq
    for (const count of [1, 30]) {
      const found = inverted(layer, Array.from({ length: count }).flatMap(() => [min, max, min / 1.001, max * 1.001, NaN])) // prettier-ignore
      expect(found.concentration_cm3[0] / 1e21).toBeCloseTo(1, 9)
      expect(found.concentration_cm3[1] / 1.01e15).toBeCloseTo(1, 9)
      for (const column of Object.values(found)) {
        expect([...column.subarray(2, 5)].every(Number.isNaN)).toBe(true)
      }
    }
  })
})

describe('the working of a tabulated profile', () => {
  it('leads over the scale of the table to the results', () => {
    const layer = dopedLayer.prepare(monitor)
    const sheet = layer.forward(0.8e20)
    const steps = layer.explain(sheet)
    const found = inverted(layer, [sheet])
    expect(steps.map(({ symbol }) => symbol)).toEqual(['k', 'N_p', 'x_j', 'ρ̄', 'Q', 'd ln N_p / d ln R_s'])
    expect(steps[0].title).toBe('Scale of the table')
    expect(steps[0].value).toBeCloseTo(0.8, 9)
    expect(steps[0].formula).toContain('N_B = 1.00 × 10¹⁵ cm⁻³ phosphorus')
    expect(steps[1].value).toBe(found.concentration_cm3[0])
    // 0.12 um sqrt(ln 8e4), to the error of the lines.
    expect(steps[2].value).toBeCloseTo(0.12 * Math.sqrt(Math.log(0.8e5)), 3)
    expect(steps[3].value).toBeCloseTo(found.resistivity_ohm_cm[0], 15)
    expect(steps[4].value).toBe(found.dose_cm2[0])
  })

  it('says where the table ends before the profile does, and where there is no answer', () => {
    const layer = dopedLayer.prepare({ ...monitor, table: tableOf(20, 0.2, gaussianAt) })
    expect(layer.explain(layer.forward(1e20))[2]).toMatchObject({ value: 0.2, formula: expect.stringMatching(/^end of the table/) }) // prettier-ignore
    const outside = layer.explain(1e15)
    expect(outside[0].formula).toMatch(/^none: the layer covers /)
    expect(outside.every(({ value }) => Number.isNaN(value))).toBe(true)
  })
})

describe('a tabulated profile refuses', () => {
  const refused = (settings: Partial<DopedLayerSettings>) =>
    problemOf(() => dopedLayer.prepare({ ...monitor, ...settings }))

  it('no table, and a depth or a length beside it', () => {
    expect(refused({ table: undefined })).toMatchObject({ kind: 'not-applicable' })
    expect(refused({ depth_um: 0.35 })).toMatchObject({ kind: 'not-applicable' })
    expect(refused({ diffusionLength_um: 0.06 })).toMatchObject({ kind: 'not-applicable' })
  })

  it('a table of too few points, depths that do not rise, concentrations that are none', () => {
    const table = (depth_um: number[], concentration_cm3: number[]): DepthTable => ({ depth_um: Float64Array.from(depth_um), concentration_cm3: Float64Array.from(concentration_cm3) }) // prettier-ignore
    expect(refused({ table: table([0, 1, 2], [3, 2, 1]) })).toMatchObject({ kind: 'not-applicable' })
    expect(refused({ table: table([0, 1, 2, 3], [3, 2, 1]) })).toMatchObject({ kind: 'not-applicable' })
    expect(refused({ table: table([0, 1, 1, 2], [4, 3, 2, 1]) })).toMatchObject({ quantity: 'depth of a tabulated profile' }) // prettier-ignore
    expect(refused({ table: table([-1, 0, 1, 2], [4, 3, 2, 1]) })).toMatchObject({ quantity: 'depth of a tabulated profile' }) // prettier-ignore
    expect(refused({ table: table([0, 1, 2, 3], [4, 3, 0, 1]) })).toMatchObject({ quantity: 'tabulated concentration' })
    expect(refused({ table: table([0, 1, 2, 3], [4, 3, NaN, 1]) })).toMatchObject({
      quantity: 'tabulated concentration',
    })
  })

  it('a peak outside its range', () => {
    for (const value of [1e15, 1.1e21, NaN]) {
      expect(problemOf(() => dopedLayer.prepare(monitor).forward(value))).toMatchObject({ quantity: 'peak concentration' }) // prettier-ignore
    }
  })
})
