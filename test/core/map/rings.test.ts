import { describe, expect, it } from 'vitest'
import { ringMeans, ringsOf } from '../../../core/map/rings'
import { CoreError } from '../../../core/problems/problem'
import { concentricPlan } from '../../../core/wafer/site-patterns'
import { bumpy, columnOf, spiral } from './patterns'

const plan = concentricPlan({ circles: 3, outerRadius_mm: 90, startAngle_deg: 90 })
const wafer = { ...plan, value: columnOf(plan, bumpy) }

describe('rings', () => {
  it('of a concentric plan are its circles', () => {
    expect(ringsOf(wafer, 1).map((ring) => ring.length)).toEqual([1, 8, 16, 24])
    const { r_mm, count } = ringMeans(wafer, 1)
    expect([...count]).toEqual([1, 8, 16, 24])
    ;[0, 30, 60, 90].forEach((radius, k) => expect(r_mm[k]).toBeCloseTo(radius, 10))
  })

  it('hold every site with a value once, and none wider than asked for', () => {
    const sites = spiral(200)
    const columns = { ...sites, value: columnOf(sites, bumpy).fill(NaN, 3, 5) }
    const rings = ringsOf(columns, 7)
    expect(rings.flatMap((ring) => [...ring]).sort((a, b) => a - b)).toEqual(
      Array.from({ length: 200 }, (_, i) => i).filter((i) => i !== 3 && i !== 4),
    )
    for (const ring of rings) {
      const radii = Array.from(ring, (i) => Math.hypot(sites.x_mm[i], sites.y_mm[i]))
      expect(Math.max(...radii) - Math.min(...radii)).toBeLessThanOrEqual(7)
    }
  })

  it('mean and its standard error', () => {
    const cross = { x_mm: Float64Array.of(0, 50, 0, -50, 0), y_mm: Float64Array.of(0, 0, 50, 0, -50) }
    const { mean, standardError } = ringMeans({ ...cross, value: Float64Array.of(7, 1, 2, 3, 6) }, 1)
    expect([...mean]).toEqual([7, 3])
    expect(standardError[0]).toBeNaN()
    // Deviations -2, -1, 0, 3: s^2 = 14 / 3, over 4 sites.
    expect(standardError[1]).toBeCloseTo(Math.sqrt(14 / 3 / 4), 14)
  })

  it('without sites there are none', () => {
    const nothing = { x_mm: Float64Array.of(1), y_mm: Float64Array.of(1), value: Float64Array.of(NaN) }
    expect(ringsOf(nothing, 1)).toEqual([])
    expect(ringMeans(nothing, 1).mean).toHaveLength(0)
  })

  it.each([0, -1, NaN])('refuse a width of %s', (width) => expect(() => ringsOf(wafer, width)).toThrow(CoreError))
})
