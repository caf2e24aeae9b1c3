import { describe, expect, it } from 'vitest'
import { azimuthalProfile, radialProfile } from '../../../core/map/profiles'
import { concentricPlan } from '../../../core/wafer/site-patterns'
import { columnOf } from './patterns'

const plan = concentricPlan({ circles: 3, outerRadius_mm: 90 })

describe('profiles', () => {
  it('along the radius: every site once, nearest first', () => {
    const { r_mm, value, site } = radialProfile({
      ...plan,
      value: columnOf(plan, (x, y) => 92 + (x * x + y * y) / 1000),
    })
    expect([...site].sort((a, b) => a - b)).toEqual(Array.from({ length: 49 }, (_, i) => i))
    r_mm.forEach((r, i) => expect(value[i]).toBeCloseTo(92 + (r * r) / 1000, 10))
    for (let i = 1; i < 49; i++) expect(r_mm[i]!).toBeGreaterThanOrEqual(r_mm[i - 1]!)
  })

  it('round the centre: by angle from +x anticlockwise, the fiducial at 270', () => {
    const cross = { x_mm: Float64Array.of(0, 0, -50, 0, 50), y_mm: Float64Array.of(0, -50, 0, 50, 0) }
    const { theta_deg, value, r_mm } = azimuthalProfile({ ...cross, value: Float64Array.of(9, 4, 3, 2, 1) }, 10)
    expect([...theta_deg]).toEqual([0, 90, 180, 270])
    expect([...value]).toEqual([1, 2, 3, 4])
    expect([...r_mm]).toEqual([50, 50, 50, 50])
  })

  it('angles stay below 360', () => {
    const hair = { x_mm: Float64Array.of(50), y_mm: Float64Array.of(-1e-30), value: Float64Array.of(1) }
    expect(azimuthalProfile(hair, 0).theta_deg[0]).toBeLessThan(360)
  })

  it('leave out what has no value or no place, and take only the sites asked for', () => {
    const x_mm = Float64Array.of(3, 2, NaN, 1)
    const y_mm = new Float64Array(4)
    const value = Float64Array.of(30, NaN, 20, 10)
    expect([...radialProfile({ x_mm, y_mm, value }).value]).toEqual([10, 30])
    expect([...radialProfile({ x_mm, y_mm, value, sites: Uint32Array.of(0, 1) }).value]).toEqual([30])
  })
})
