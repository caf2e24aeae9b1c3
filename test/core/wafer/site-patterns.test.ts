import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../core/problems/problem'
import {
  cartesianPlan,
  concentricPlan,
  diameterPlan,
  outerRadius_mm,
  roundedSites,
} from '../../../core/wafer/site-patterns'
import { CARTESIAN_PLANS, CONCENTRIC_PLANS } from '../../reference/semi-mf1618'

const radii = ({ x_mm, y_mm }: { x_mm: Float64Array; y_mm: Float64Array }) =>
  Array.from(x_mm, (x, i) => Math.hypot(x, y_mm[i]!))

describe('published values', () => {
  it.each(CONCENTRIC_PLANS)('SEMI MF1618: %s circles make %s sites', (circles, sites) => {
    expect(concentricPlan({ circles, outerRadius_mm: 95 }).count).toBe(sites)
  })

  it.each(CARTESIAN_PLANS)('SEMI MF1618: %s rows make %s sites', (rows, sites) => {
    expect(cartesianPlan({ rows, outerRadius_mm: 95 }).count).toBe(sites)
  })

  it('method B: half the diameter less the edge exclusion', () => {
    expect(outerRadius_mm({ diameter_mm: 200, edgeExclusion_mm: 5 })).toBe(95)
  })

  it('method A: the outermost spot touches the fixed quality area from inside', () => {
    const spot_mm = 1.5
    const radius_mm = outerRadius_mm({ diameter_mm: 200, edgeExclusion_mm: 5, spot_mm })
    expect(radius_mm + spot_mm / 2).toBe(95)
  })
})

describe('laws', () => {
  it('circle k lies at k Ro / K and has 8 k sites; the centre comes first', () => {
    const plan = concentricPlan({ circles: 3, outerRadius_mm: 90, startAngle_deg: 90 })
    const r = radii(plan)
    expect(r[0]).toBe(0)
    for (const [circle, radius] of [[1, 30], [2, 60], [3, 90]] as const) {
      expect(r.filter((site) => Math.abs(site - radius) < 1e-9)).toHaveLength(8 * circle)
    } // prettier-ignore
    // Every circle starts at the same angle: here +y.
    for (const first of [1, 9, 25]) expect(Math.abs(plan.x_mm[first]!)).toBeLessThan(1e-12)
  })

  it('every plan is distinct sites about the centre, none beyond the outermost radius', () => {
    const sizes = fc.record({
      circles: fc.integer({ min: 1, max: 9 }),
      radius: fc.double({ min: 1, max: 150, noNaN: true }),
    })
    fc.assert(
      fc.property(sizes, ({ circles, radius }) => {
        for (const plan of [
          concentricPlan({ circles, outerRadius_mm: radius }),
          cartesianPlan({ rows: 2 * circles + 1, outerRadius_mm: radius }),
          diameterPlan({ count: 2 * circles + 1, outerRadius_mm: radius, angle_deg: 30 }),
        ]) {
          expect(Math.max(...radii(plan))).toBeLessThanOrEqual(radius * (1 + 1e-12))
          expect(Math.abs(plan.x_mm.reduce((a, b) => a + b, 0))).toBeLessThan(1e-9 * radius)
          expect(Math.abs(plan.y_mm.reduce((a, b) => a + b, 0))).toBeLessThan(1e-9 * radius)
          expect(new Set(Array.from(plan.x_mm, (x, i) => `${x.toFixed(9)} ${plan.y_mm[i]!.toFixed(9)}`)).size).toBe(plan.count)
        }
      }),
      { numRuns: 40 },
    ) // prettier-ignore
  })

  it('rounded to a nanometre both forms name one place; axes are exact, 360 is 0, no zero is negative', () => {
    const plan = concentricPlan({ circles: 5, outerRadius_mm: 95 })
    const { x_mm, y_mm, r_mm, theta_deg } = roundedSites(plan)
    for (let i = 0; i < plan.count; i++) {
      expect(Math.abs(x_mm[i] - plan.x_mm[i])).toBeLessThan(5.1e-7)
      expect(Math.abs(y_mm[i] - plan.y_mm[i])).toBeLessThan(5.1e-7)
      const angle = (theta_deg[i] * Math.PI) / 180
      expect(Math.hypot(r_mm[i] * Math.cos(angle) - x_mm[i], r_mm[i] * Math.sin(angle) - y_mm[i])).toBeLessThan(3e-6)
    }
    expect([...theta_deg.slice(1, 9)]).toEqual([0, 45, 90, 135, 180, 225, 270, 315])
    for (const column of [x_mm, y_mm, r_mm, theta_deg]) expect(column.some((value) => Object.is(value, -0))).toBe(false)
    expect(Math.max(...theta_deg)).toBeLessThan(360)
  })

  it('along a diameter: evenly spaced, 2 Ro / (N - 1), end to end', () => {
    const { x_mm, y_mm, count } = diameterPlan({ count: 25, outerRadius_mm: 96 })
    expect(count).toBe(25)
    expect([x_mm[0], x_mm[12], x_mm[24]]).toEqual([-96, 0, 96])
    for (let i = 1; i < 25; i++) expect(x_mm[i]! - x_mm[i - 1]!).toBeCloseTo(8, 12)
    expect(Math.max(...y_mm.map(Math.abs))).toBeLessThan(1e-12)
  })
})

describe('refusals', () => {
  it.each([
    ['no circle', () => concentricPlan({ circles: 0, outerRadius_mm: 95 })],
    ['half a circle', () => concentricPlan({ circles: 2.5, outerRadius_mm: 95 })],
    ['no radius', () => concentricPlan({ circles: 3, outerRadius_mm: 0 })],
    ['an even number of rows', () => cartesianPlan({ rows: 8, outerRadius_mm: 95 })],
    ['one site on a diameter', () => diameterPlan({ count: 1, outerRadius_mm: 95 })],
    ['a spot of nothing', () => outerRadius_mm({ diameter_mm: 200, edgeExclusion_mm: 5, spot_mm: 0 })],
    ['a spot as wide as the wafer', () => outerRadius_mm({ diameter_mm: 200, edgeExclusion_mm: 5, spot_mm: 190 })],
    ['a negative exclusion', () => outerRadius_mm({ diameter_mm: 200, edgeExclusion_mm: -1 })],
    ['an exclusion as wide as the wafer', () => outerRadius_mm({ diameter_mm: 200, edgeExclusion_mm: 100 })],
  ])('%s', (_, call) => expect(call).toThrow(CoreError))
})
