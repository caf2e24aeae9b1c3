import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { meanConductivity } from '../../../core/layer/conductivity-integral'
import { conductivityOf } from '../../../core/layer/doped-silicon'
import { DOPANTS } from '../../../core/silicon/dopants'
import { mobilityIds } from '../../../core/silicon/mobility/registry'
import { modelOf, tanhSinh } from './layer-fixtures'

const BOTTOM = Math.log(1e15)
const silicon = { dopant: 'boron', mobility: modelOf('masetti'), temperature_K: 300 } as const

describe('mean conductivity along a straight line of ln N', () => {
  it('of a constant mobility is in closed form', () => {
    const mean = meanConductivity({ ...silicon, mobility: modelOf('constant') }, 1e15)
    // q mu N_B ((e^a - e^b) / (a - b) - 1), boron with 250 cm^2/Vs.
    const exact = (a: number, b: number): number =>
      1.602176634e-19 * 250 * 1e15 * ((Math.exp(b) * Math.expm1(a - b)) / (a - b) - 1)
    for (const [a, b] of [[9, 0.5], [3, 2.9], [1, 0.9999], [8, 8 - 1e-7], [0.02, 0.01]]) {
      expect(Math.abs(mean(BOTTOM + a, BOTTOM + b) / exact(a, b) - 1)).toBeLessThan(1e-11)
    }
  }) // prettier-ignore

  it('of a point is the conductivity there, at and under the background nothing', () => {
    const mean = meanConductivity(silicon, 1e15)
    expect(mean(BOTTOM + 5, BOTTOM + 5) / conductivityOf(silicon)(1e15 * Math.expm1(5), 1e15 * (Math.exp(5) + 1))).toBeCloseTo(1, 12) // prettier-ignore
    expect(mean(BOTTOM, BOTTOM - 3)).toBe(0)
    expect(mean(BOTTOM - 1, BOTTOM - 1)).toBe(0)
  })

  it.each(mobilityIds.flatMap((id) => DOPANTS.map((dopant) => [id, dopant] as const)))('%s %s: agrees with tanh-sinh', (id, dopant) => {
    const settings = { dopant, mobility: modelOf(id), temperature_K: 300 }
    const mean = meanConductivity(settings, 1e15)
    const at = conductivityOf(settings)
    // Without the jumps of MF723, over which that rule has no digits; the sums over them are in the next test.
    for (const [a, b] of [[1.5, 0.1], [0.4, -3], [13, 12.9992], ...(id === 'mf723' ? [] : [[13.2, 0.3], [8, -8]])]) {
      const exact = tanhSinh((u) => at(1e15 * Math.expm1(u), 1e15 * (Math.exp(u) + 1)), Math.max(0, b), a) / (a - b)
      expect(Math.abs(mean(BOTTOM + a, BOTTOM + b) / exact - 1)).toBeLessThan(2e-11)
    }
  }) // prettier-ignore

  it('of a line is that of its parts, jumps of the model or not', () => {
    for (const id of ['mf723', 'klaassen'] as const) {
      const mean = meanConductivity({ ...silicon, dopant: 'arsenic', mobility: modelOf(id) }, 1e15)
      const place = fc.integer({ min: -2000, max: 13_500 }).map((u) => u / 1000)
      fc.assert(
        fc.property(place, place, place, (...places) => {
          const [low, middle, high] = places.sort((a, b) => a - b).map((u) => BOTTOM + u)
          fc.pre(middle > low && high > middle)
          const parts = mean(high, middle) * (high - middle) + mean(middle, low) * (middle - low)
          const whole = mean(high, low) * (high - low)
          // A width is the difference of two numbers near BOTTOM: their last digit is all that a narrow one is known to.
          const ends =
            4 *
            Number.EPSILON *
            Math.max(Math.abs(high), Math.abs(low)) *
            Math.max(mean(high, middle), mean(middle, low))
          expect(Math.abs(parts - whole)).toBeLessThanOrEqual(1e-12 * whole + ends)
        }),
      )
    }
  })
})
