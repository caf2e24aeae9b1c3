import { describe, expect, it } from 'vitest'
import {
  NO_VALUE_COLOR, colorMap, colorMapIds, colorMaps, colorScale, colorTable,
} from '../../../core/map/color-scale' // prettier-ignore
import { CoreError } from '../../../core/problems/problem'

/** Relative luminance of WCAG 2. */
function luminance(hex: string): number {
  const [r, g, b] = [1, 3, 5].map((at) => {
    const c = parseInt(hex.slice(at, at + 2), 16) / 255
    return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4
  })
  return 0.2126 * r! + 0.7152 * g! + 0.0722 * b!
}

describe('colour scales', () => {
  it('have every id once, in the order of the ids', () =>
    expect(colorMaps.map(({ id }) => id)).toEqual([...colorMapIds]))

  it('viridis ends as it is known to: dark violet and yellow', () => {
    const { color } = colorScale('viridis', { min: 87, max: 97 })
    expect([color(87), color(97)]).toEqual(['#440154', '#fde725'])
    expect([color(0), color(1e9)]).toEqual([color(87), color(97)])
  })

  it.each(['viridis', 'cividis'] as const)('%s grows lighter all along', (id) => {
    const { color } = colorScale(id, { min: 0, max: 50 })
    const light = Array.from({ length: 51 }, (_, i) => luminance(color(i)))
    light.slice(1).forEach((l, i) => expect(l).toBeGreaterThan(light[i]!))
  })

  it('deviation is lightest on the target, blue below, red above, equally strong', () => {
    const { color, rgb, min, max } = colorScale('deviation', { min: 88, max: 95, centre: 92 })
    expect([min, max]).toEqual([88, 96])
    expect(luminance(color(92))).toBeGreaterThan(Math.max(luminance(color(91)), luminance(color(93))))
    const [lowRed, , lowBlue] = rgb(88)
    const [highRed, , highBlue] = rgb(96)
    expect(lowBlue > lowRed && highRed > highBlue).toBe(true)
    expect(colorScale('deviation', { min: 90, max: 94 }).color(92)).toBe(color(92))
  })

  it('a value that is none has its own colour; a flat wafer the middle one', () => {
    const { color } = colorScale('viridis', { min: 92, max: 92 })
    expect(color(NaN)).toBe(NO_VALUE_COLOR)
    expect(color(92)).toBe(colorScale('viridis', { min: 0, max: 1 }).color(0.5))
  })

  it.each(colorMapIds)('%s: table, rgb and hex agree', (id) => {
    const table = colorTable(id)
    const scale = colorScale(id, { min: 0, max: 255 })
    for (const i of [0, 1, 100, 254, 255]) {
      expect([...table.subarray(3 * i, 3 * i + 3)]).toEqual([...scale.rgb(i)])
      expect(scale.color(i)).toMatch(/^#[0-9a-f]{6}$/)
    }
  })

  it('know no other map', () => expect(() => colorMap('rainbow')).toThrow(CoreError))
})
