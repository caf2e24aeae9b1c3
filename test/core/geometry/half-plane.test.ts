import { describe, expect, it } from 'vitest'
import { halfPlaneFactor } from '../../../core/geometry/half-plane'
import { CoreError } from '../../../core/problems/problem'

describe('halfPlaneFactor', () => {
  it.each([
    [0.5, 3.90396253, 2.72875271],
    [1, 4.13414847, 3.38479347],
    [2, 4.33074366, 4.05677388],
    [3, 4.41075227, 4.29104318],
    [5, 4.47420618, 4.43864213],
    [10, 4.51380725, 4.5081221],
    [0, 3.38479347, 2.26618007],
  ])('nearest pin at %f pitches, by images in two ways', (edgeDistanceRatio, perpendicular, parallel) => {
    const off = (direction: 'parallel' | 'perpendicular', value: number) =>
      Math.abs(halfPlaneFactor({ edgeDistanceRatio, direction }) - value)
    expect(off('perpendicular', perpendicular)).toBeLessThan(5.1e-9)
    expect(off('parallel', parallel)).toBeLessThan(5.1e-9)
  })

  it('tends to the infinite sheet, to half of it on the edge, and rises with the distance', () => {
    for (const direction of ['parallel', 'perpendicular'] as const) {
      expect(halfPlaneFactor({ edgeDistanceRatio: 1e200, direction })).toBeCloseTo(Math.PI / Math.LN2, 14)
      let last = 0
      for (let edgeDistanceRatio = 0; edgeDistanceRatio < 20; edgeDistanceRatio += 0.1) {
        const value = halfPlaneFactor({ edgeDistanceRatio, direction })
        expect(value).toBeGreaterThan(last)
        last = value
      }
    }
    expect(halfPlaneFactor({ edgeDistanceRatio: 0, direction: 'parallel' })).toBeCloseTo(Math.PI / Math.LN2 / 2, 14)
  })

  it.each([-1, NaN, Infinity])('refuses a distance of %f', (edgeDistanceRatio) => {
    expect(() => halfPlaneFactor({ edgeDistanceRatio, direction: 'parallel' })).toThrow(CoreError)
  })
})
