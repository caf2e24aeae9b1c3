import { describe, expect, it } from 'vitest'
import { lineProfile } from '../../../core/map/line-profile'
import { trendSurface } from '../../../core/map/trend-surface'
import { CoreError } from '../../../core/problems/problem'
import { concentricPlan } from '../../../core/wafer/site-patterns'
import { bumpy, columnOf } from './patterns'

const plan = concentricPlan({ circles: 3, outerRadius_mm: 90, startAngle_deg: 90 })
const plane = (x: number, y: number) => 92 + 0.03 * x - 0.01 * y
const line = { direction_deg: 30, radius_mm: 95, points: 39, nearness_mm: 0.5 } as const

describe('a line over the wafer', () => {
  const profile = lineProfile({ ...plan, value: columnOf(plan, plane) }, line)

  it('is evenly stepped from end to end through the centre', () => {
    expect(profile.position_mm).toHaveLength(39)
    profile.position_mm.forEach((position, k) => expect(position).toBeCloseTo(5 * k - 95, 12))
    expect(profile.position_mm[19]).toBe(0)
    expect(profile.x_mm[38]).toBeCloseTo(95 * Math.cos(Math.PI / 6), 12)
    expect(profile.y_mm[38]).toBeCloseTo(95 / 2, 12)
  })

  it('has the values of the surface there', () => {
    profile.value.forEach((value, k) => expect(value).toBeCloseTo(plane(profile.x_mm[k], profile.y_mm[k]), 9))
    expect(profile.source).toContain('spline')
  })

  it('says where it goes beyond the sites', () => {
    profile.extrapolated.forEach((flag, k) => expect(flag).toBe(Math.abs(profile.position_mm[k]) > 90 + 1e-9 ? 1 : 0))
  })

  it('marks the sites near it, by their place along it', () => {
    // From 90 degrees on in steps of 45, 22.5 and 15: of the circles only the outermost has sites at 30 and 210.
    expect([...profile.near.position_mm].map((p) => Math.round(p))).toEqual([-90, 0, 90])
    profile.near.site.forEach((site, k) => {
      expect(profile.near.value[k]).toBeCloseTo(plane(plan.x_mm[site], plan.y_mm[site]), 12)
      expect(Math.abs(profile.near.offset_mm[k])).toBeLessThan(1e-9)
    })
  })

  it('offsets are positive to the left', () => {
    const wide = lineProfile({ ...plan, value: columnOf(plan, plane) }, { ...line, direction_deg: 0, nearness_mm: 95 })
    wide.near.site.forEach((site, k) => expect(wide.near.offset_mm[k]).toBeCloseTo(plan.y_mm[site], 12))
    expect(wide.near.site).toHaveLength(49)
  })

  it('turned by half a turn it runs the other way', () => {
    const columns = { ...plan, value: columnOf(plan, bumpy) }
    const [there, back] = [30, 210].map((direction_deg) => lineProfile(columns, { ...line, direction_deg }))
    there.value.forEach((value, k) => expect(back.value[38 - k]).toBeCloseTo(value, 8))
  })

  it('takes a surface that is given', () => {
    const values = columnOf(plan, bumpy)
    const trend = trendSurface(plan, values, { radius_mm: 95, order: 'bowl' })
    const smooth = lineProfile({ ...plan, value: values }, line, { title: 'plane and bowl', evaluate: trend.evaluate })
    expect(smooth.source).toBe('plane and bowl')
    expect([...smooth.value]).toEqual([...trend.evaluate(smooth)])
    expect([...smooth.extrapolated]).toEqual([...profile.extrapolated])
  })
})

describe('refusals', () => {
  const columns = { ...plan, value: columnOf(plan, plane) }
  it.each([
    ['no direction', { direction_deg: NaN }],
    ['one point', { points: 1 }],
    ['half a point', { points: 2.5 }],
    ['no length', { radius_mm: 0 }],
    ['nearness below 0', { nearness_mm: -1 }],
  ])('%s', (_, change) => expect(() => lineProfile(columns, { ...line, ...change })).toThrow(CoreError))

  it('no value', () => {
    expect(() => lineProfile({ ...plan, value: new Float64Array(49).fill(NaN) }, line)).toThrow(CoreError)
  })
})
