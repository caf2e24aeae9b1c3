import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { excessIntegral_um, flatLevels, profileEnd, profileLines } from '../../../core/layer/depth-table'
import { tanhSinh } from './layer-fixtures'

/** A peak of 1e19 at 0.2 um; falls to 1e15 at 0.6 um. */
const table = {
  depth_um: Float64Array.of(0.1, 0.2, 0.4, 0.6),
  concentration_cm3: Float64Array.of(1e18, 1e19, 1e17, 1e15),
}
const lines = profileLines(table)
const levelOf = (background_cm3: number): number => Math.log(background_cm3 / 1e19)

describe('a table as lines', () => {
  it('begins at the surface with its first value', () => {
    expect(lines.count).toBe(4)
    expect([...lines.from_um]).toEqual([0, 0.1, 0.2, 0.4])
    expect(lines.length_um.reduce((sum, length) => sum + length, 0)).toBeCloseTo(0.6, 15)
    expect(lines.shallow[0]).toBe(lines.deep[0])
    expect(lines.peak_cm3).toBe(1e19)
    expect(profileLines({ ...table, depth_um: Float64Array.of(0, 0.2, 0.4, 0.6) }).count).toBe(3)
  })

  it('ends where it last comes down to the background, halfway between points in ln N', () => {
    expect(profileEnd(lines, levelOf(1e16)).depth_um).toBeCloseTo(0.5, 12)
    expect(profileEnd(lines, levelOf(1e18)).depth_um).toBeCloseTo(0.3, 12)
    expect(profileEnd(lines, levelOf(1e15 / 1.001))).toEqual({ depth_um: expect.closeTo(0.6, 12), response: 0, isTableEnd: true }) // prettier-ignore
  })

  it('has an end whose response is the slope of its depth', () => {
    fc.assert(
      fc.property(fc.double({ min: -9, max: -0.1, noNaN: true }), (level) => {
        const [deeper, shallower] = [-1e-6, 1e-6].map((step) => profileEnd(lines, level + step).depth_um)
        const isKink = lines.deep.some((at) => Math.abs(at - level) < 2e-6)
        fc.pre(!isKink)
        expect(Math.log(deeper / shallower) / 2e-6).toBeCloseTo(profileEnd(lines, level).response, 6)
      }),
    )
  })

  it('holds above the background what an integral over depth says', () => {
    const at = (x_um: number): number => {
      const i = x_um < 0.1 ? -1 : table.depth_um.filter((depth) => depth <= x_um).length - 1
      if (i < 0) return 1e18
      const share = (x_um - table.depth_um[i]) / (table.depth_um[i + 1] - table.depth_um[i])
      return table.concentration_cm3[i] * (table.concentration_cm3[i + 1] / table.concentration_cm3[i]) ** share
    }
    for (const background of [2e15, 1e16, 1e17, 5e17, 2e18, 9e18]) {
      const level = levelOf(background)
      const rising = 0.1 + 0.1 * Math.log10(background / 1e18)
      const from = background > 1e18 ? rising : 0
      const end = profileEnd(lines, level).depth_um
      const cuts = [from, 0.1, 0.2, 0.4, end].filter((x) => x >= from && x <= end)
      const exact = cuts.slice(1).reduce((sum, to, i) => sum + tanhSinh((x) => at(x) / background - 1, cuts[i], to), 0)
      expect(excessIntegral_um(lines, level) / exact).toBeCloseTo(1, 9)
    }
  })

  it('knows where it is flat', () => {
    expect(flatLevels(lines)).toHaveLength(1)
    expect(flatLevels(lines)[0]).toBeCloseTo(Math.log(0.1), 8)
  })
})
