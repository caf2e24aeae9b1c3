import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { criticalEdgeDistance_mm, productError } from '../../../core/geometry/edge-and-thickness'
import { halfPlaneFactor } from '../../../core/geometry/half-plane'
import { thicknessFactor } from '../../../core/geometry/thickness'
import { CoreError } from '../../../core/problems/problem'

const BACK = 'insulating' as const
const errorAt = (thicknessRatio: number, edgeDistanceRatio: number, angleDeg: number) =>
  productError({ thicknessRatio, edgeDistanceRatio, angleDeg, back: BACK })
const critical = (ratio: number, tolerance = 0.001) =>
  criticalEdgeDistance_mm({ thickness_um: 1000 * ratio, spacing_mm: 1, tolerance, back: BACK })

/** C of the slab with one edge by its point images, in depth and in the edge, summed one by one. */
function byPointImages(w: number, distance: number, angleDeg: number): number {
  const angle = (angleDeg * Math.PI) / 180
  const pins = [0, 1, 2, 3].map((n) => [n * Math.cos(angle), distance + n * Math.sin(angle)] as const)
  const squares = (i: number, j: number) => {
    const [[xi, yi], [xj, yj]] = [pins[i]!, pins[j]!]
    return [(xi - xj) ** 2 + (yi - yj) ** 2, (xi - xj) ** 2 + (yi + yj) ** 2]
  }
  const terms = [
    [1, squares(1, 0)],
    [1, squares(2, 3)],
    [-1, squares(1, 3)],
    [-1, squares(2, 0)],
  ] as const
  const sum = (count: number) => {
    let total = 0
    for (let n = -count; n <= count; n++) {
      for (const [sign, both] of terms) for (const square of both) total += sign / Math.sqrt(square + (2 * n * w) ** 2)
    }
    return total
  }
  const [few, many] = [1500, 3000]
  const weight = (few + 0.5) ** 2 / ((many + 0.5) ** 2 - (few + 0.5) ** 2)
  return (2 * Math.PI) / (w * (sum(many) + weight * (sum(many) - sum(few))))
}

describe('productError', () => {
  it.each([
    [0.5, 1, -0.07, 0.005],
    [0.5, 5, -0.005, 0.0005],
    [0.7, 1, -0.46, 0.005],
    [0.7, 5, -0.04, 0.005],
    [1, 1, -1.9, 0.05],
    [1, 5, -0.16, 0.005],
  ])('w/S = %f, parallel at %f pitches, independently computed', (ratio, distance, percent, tolerance) => {
    expect(Math.abs(100 * errorAt(ratio, distance, 0) - percent)).toBeLessThan(tolerance)
  })

  it('is below 1e-5 from one pitch on at w/S = 0.3, and nothing for a thin slab, far away, or lying on the edge', () => {
    for (const distance of [1, 2, 5]) expect(Math.abs(errorAt(0.3, distance, 0))).toBeLessThan(1e-5)
    expect(errorAt(0.01, 1, 30)).toBe(0)
    expect(Math.abs(errorAt(2, 1e4, 0))).toBeLessThan(1e-8)
    expect(Math.abs(errorAt(2, 0, 0))).toBeLessThan(1e-14)
  })

  it('a second route: point images summed one by one, with the half plane and F', () => {
    for (const ratio of [0.6, 1, 2.5]) {
      const { value: F } = thicknessFactor({ thickness_um: 1000 * ratio, spacing_mm: 1, back: BACK })
      for (const edgeDistanceRatio of [0.3, 1, 4]) {
        for (const [direction, angle] of [
          ['parallel', 0],
          ['perpendicular', 90],
        ] as const) {
          const product = halfPlaneFactor({ edgeDistanceRatio, direction }) * F
          const expected = product / byPointImages(ratio, edgeDistanceRatio, angle) - 1
          expect(Math.abs(errorAt(ratio, edgeDistanceRatio, angle) - expected)).toBeLessThan(1e-8)
        }
      }
    }
  })

  it('refuses what is out of range', () => {
    expect(() => errorAt(0, 1, 0)).toThrow(CoreError)
    expect(() => errorAt(1, -1, 0)).toThrow(CoreError)
    expect(() => errorAt(1, 1, 91)).toThrow(CoreError)
  })
})

describe('criticalEdgeDistance_mm', () => {
  it('flags nothing up to w/S = 0.5 and ever more above, at 0.1 %', () => {
    for (const ratio of [0.01, 0.1, 0.3, 0.5]) expect(critical(ratio)).toBe(0)
    const distances = [0.55, 0.6, 0.7, 1, 2, 4, 10, 100].map((ratio) => critical(ratio))
    expect(distances).toEqual([...distances].sort((a, b) => a - b))
    expect(distances[0]).toBeGreaterThan(1)
  })

  it('no direction and no place beyond it is off by more than the tolerance', () => {
    const ratio = fc.double({ min: 0.4, max: 10, noNaN: true })
    const beyond = fc.double({ min: 1, max: 40, noNaN: true })
    const angle = fc.double({ min: 0, max: 90, noNaN: true })
    fc.assert(
      fc.property(ratio, beyond, angle, (thicknessRatio, times, angleDeg) => {
        const tolerance = 0.001
        const distance = Math.max(critical(thicknessRatio), 0.01) * times
        expect(Math.abs(errorAt(thicknessRatio, distance, angleDeg))).toBeLessThan(tolerance * 1.001)
      }),
      { numRuns: 100 },
    )
  })

  it('just inside it some direction is', () => {
    for (const ratio of [0.55, 0.7, 1, 3]) {
      const errors = [0, 15, 30, 45, 60, 75, 90].map((angle) =>
        Math.abs(errorAt(ratio, critical(ratio) * 0.998, angle)),
      )
      expect(Math.max(...errors)).toBeGreaterThan(0.001)
    }
  })

  it('scales with the pitch, and flags the whole edge correction on a conducting back', () => {
    const scaled = criticalEdgeDistance_mm({ thickness_um: 635, spacing_mm: 0.635, tolerance: 0.001, back: BACK })
    expect(scaled).toBeCloseTo(0.635 * critical(1), 9)
    const grounded = { thickness_um: 500, spacing_mm: 1, tolerance: 0.001, back: 'conducting' } as const
    expect(criticalEdgeDistance_mm(grounded)).toBeGreaterThan(20)
  })

  it('refuses what is out of range', () => {
    expect(() => critical(101)).toThrow(CoreError)
    expect(() => critical(1, 0)).toThrow(CoreError)
    expect(() => critical(NaN)).toThrow(CoreError)
  })
})
