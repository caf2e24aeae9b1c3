import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { pinPositions } from '../../../core/geometry/pin-line'
import { CoreError } from '../../../core/problems/problem'

describe('pinPositions', () => {
  it('puts the pins along the line, the site midway between the outer ones', () => {
    const pins = pinPositions({ x_mm: 10, y_mm: 5, orientation: { angleDeg: 0 }, spacings_mm: [1, 2, 3] })
    expect(pins.map((pin) => pin.x_mm)).toEqual([7, 8, 10, 13])
    expect(pins.every((pin) => pin.y_mm === 5)).toBe(true)
  })

  it('turns counter-clockwise from +x', () => {
    const pins = pinPositions({ x_mm: 0, y_mm: 0, orientation: { angleDeg: 90 }, spacings_mm: [1, 1, 1] })
    expect(pins[3]!.y_mm).toBeCloseTo(1.5, 14)
    expect(pins[3]!.x_mm).toBeCloseTo(0, 14)
  })

  it('radial points outwards, tangential a quarter turn further; at the centre +x and +y', () => {
    const at = (x_mm: number, y_mm: number, orientation: 'radial' | 'tangential') =>
      pinPositions({ x_mm, y_mm, orientation, spacings_mm: [1, 1, 1] })[3]!
    expect(at(0, -10, 'radial').y_mm).toBeCloseTo(-11.5, 14)
    expect(at(0, -10, 'tangential').x_mm).toBeCloseTo(1.5, 14)
    expect(at(0, 0, 'radial')).toEqual({ x_mm: 1.5, y_mm: 0 })
    expect(at(0, 0, 'tangential').y_mm).toBe(1.5)
  })

  it('keeps the spacings in every direction', () => {
    const spacing = fc.double({ min: 0.1, max: 3, noNaN: true })
    fc.assert(
      fc.property(fc.double({ min: -720, max: 720, noNaN: true }), spacing, spacing, spacing, (angleDeg, ...s) => {
        const pins = pinPositions({ x_mm: 3, y_mm: -4, orientation: { angleDeg }, spacings_mm: s })
        s.forEach((expected, n) => {
          const [a, b] = [pins[n]!, pins[n + 1]!]
          expect(Math.hypot(b.x_mm - a.x_mm, b.y_mm - a.y_mm)).toBeCloseTo(expected, 12)
        })
        expect((pins[0]!.x_mm + pins[3]!.x_mm) / 2).toBeCloseTo(3, 12)
        expect((pins[0]!.y_mm + pins[3]!.y_mm) / 2).toBeCloseTo(-4, 12)
      }),
    )
  })

  it.each([0, -1, NaN, Infinity])('refuses a spacing of %f', (bad) => {
    const at = { x_mm: 0, y_mm: 0, orientation: 'radial' } as const
    expect(() => pinPositions({ ...at, spacings_mm: [1, 1, bad] })).toThrow(CoreError)
  })
})
