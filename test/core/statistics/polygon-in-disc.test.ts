import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { areaInDisc_mm2 } from '../../../core/statistics/polygon-in-disc'

const square = (half: number, x = 0, y = 0): [number, number][] => [
  [x - half, y - half],
  [x + half, y - half],
  [x + half, y + half],
  [x - half, y + half],
]

describe('limits', () => {
  it('a polygon within the disc, one round it, one beside it', () => {
    expect(areaInDisc_mm2(square(1), 2)).toBeCloseTo(4, 13)
    expect(areaInDisc_mm2(square(3), 2)).toBeCloseTo(4 * Math.PI, 13)
    expect(areaInDisc_mm2(square(1, 10), 2)).toBeCloseTo(0, 13)
    expect(areaInDisc_mm2(square(1, 0, 1.5).slice(0, 1), 2)).toBe(0)
  })

  it('a half plane and a quarter', () => {
    expect(areaInDisc_mm2(square(5, 5), 2)).toBeCloseTo(2 * Math.PI, 12)
    expect(areaInDisc_mm2(square(5, 5, 5), 2)).toBeCloseTo(Math.PI, 12)
  })

  it('a segment: R^2 acos(d / R) - d sqrt(R^2 - d^2)', () => {
    const [r, d] = [100, 60]
    const segment = r * r * Math.acos(d / r) - d * Math.sqrt(r * r - d * d)
    expect(areaInDisc_mm2(square(300, d + 300), r)).toBeCloseTo(segment, 9)
  })
})

describe('laws', () => {
  it('a square cut in two has its area in both halves, in either sense of going round', () => {
    const at = fc.double({ min: -3, max: 3, noNaN: true })
    fc.assert(
      fc.property(at, at, fc.double({ min: 0.1, max: 3, noNaN: true }), (x, y, half) => {
        const [a, b, c, d] = square(half, x, y)
        const whole = areaInDisc_mm2([a, b, c, d], 2)
        expect(areaInDisc_mm2([a, b, c], 2) + areaInDisc_mm2([a, c, d], 2)).toBeCloseTo(whole, 10)
        expect(areaInDisc_mm2([d, c, b, a, d], 2)).toBeCloseTo(whole, 10)
        expect(whole).toBeLessThanOrEqual(Math.min(4 * half * half, 4 * Math.PI) + 1e-9)
      }),
    )
  })
})

describe('a second implementation: counting a fine lattice', () => {
  it.each([
    [0.5, 1.2, 1],
    [-1.5, 0.3, 0.8],
    [1.9, 1.9, 1.5],
  ])('square about %s, %s of half side %s', (x, y, half) => {
    const n = 1000
    let inside = 0
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < n; j++) {
        const [px, py] = [x + half * ((2 * i + 1) / n - 1), y + half * ((2 * j + 1) / n - 1)]
        if (px * px + py * py <= 4) inside++
      }
    }
    expect(areaInDisc_mm2(square(half, x, y), 2)).toBeCloseTo((inside * 4 * half * half) / n ** 2, 2)
  })
})
