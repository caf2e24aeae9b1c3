import { describe, expect, it } from 'vitest'
import { cellAreas_mm2 } from '../../../core/statistics/site-cells'
import type { UsableRegion } from '../../../core/statistics/usable-region'

const wafer: UsableRegion = { shape: 'disc', radius_mm: 100 }
const plate: UsableRegion = { shape: 'rectangle', width_mm: 100, height_mm: 40 }
const cells = (region: UsableRegion, ...sites: [number, number][]) => [
  ...cellAreas_mm2(Float64Array.from(sites, ([x]) => x), Float64Array.from(sites, ([, y]) => y), region),
] // prettier-ignore

describe('limits', () => {
  it('one site has the region, two have it to the line midway', () => {
    expect(cells(plate, [-3, 11])[0]).toBeCloseTo(4000, 6)
    const [left, right] = cells(plate, [-30, 0], [10, 0])
    expect([left, right]).toEqual([expect.closeTo(1600, 2), expect.closeTo(2400, 2)])
  })

  it('sites on one line, upright, level or slanted, have strips', () => {
    for (const at of [(d: number) => [d, 0], (d: number) => [0, d], (d: number) => [d * 0.6, d * 0.8]]) {
      const [a, b, c] = cells(wafer, ...([-70, 10, 40].map(at) as [number, number][]))
      const beyond = (d: number) => 1e4 * Math.acos(d / 100) - d * Math.sqrt(1e4 - d * d)
      expect(a).toBeCloseTo(beyond(30), 2)
      expect(b).toBeCloseTo(beyond(-30) - beyond(25), 2)
      expect(c).toBeCloseTo(beyond(25), 2)
    }
  })

  it('three sites nearly in one place share the wafer by their directions', () => {
    const near = [0, 1, 2].map((k) => [Math.cos((2 * k * Math.PI) / 3) / 100, Math.sin((2 * k * Math.PI) / 3) / 100])
    for (const area of cells(wafer, ...(near as [number, number][])))
      expect(area / (1e4 * Math.PI)).toBeCloseTo(1 / 3, 2)
  })

  it('sites in one place share its cell', () => {
    expect(cells(plate, [-30, 0], [10, 0], [-30, 0], [-30, 1e-9])).toEqual([
      expect.closeTo(1600 / 3, 2),
      expect.closeTo(2400, 2),
      expect.closeTo(1600 / 3, 2),
      expect.closeTo(1600 / 3, 2),
    ])
  })

  it('sites on the corners of the region', () => {
    for (const area of cells(plate, [50, 20], [-50, 20], [50, -20], [-50, -20])) expect(area).toBeCloseTo(1000, 3)
  })
})
