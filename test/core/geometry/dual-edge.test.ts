import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { dualEdgeError, dualEdgeErrors } from '../../../core/geometry/dual-edge'
import { thinSheetFactor } from '../../../core/geometry/thin-sheet'
import { CoreError } from '../../../core/problems/problem'
import type { Outline } from '../../../core/wafer/outline'
import { MF1529_COEFFICIENTS, MF1529_PITCHES_FROM_EDGE, RIM_ERRORS_PERCENT } from '../../reference/semi-mf1529-dual'

const OUTLINE: Outline = { shape: 'disc', diameter_mm: 200, fiducial: 'notch' }
const SPACINGS = [1, 1, 1] as const
const C_INFINITE = Math.PI / Math.LN2

interface Place {
  readonly x_mm: number
  readonly y_mm: number
  readonly orientation: { readonly angleDeg: number }
}

/** A probe on the x axis whose nearest pin stands so far from the rim, its line so turned from the radius. */
function placeAt(fromRim_mm: number, angleDeg: number): Place {
  const reach = 100 - fromRim_mm
  const [c, s] = [Math.cos((angleDeg * Math.PI) / 180), Math.sin((angleDeg * Math.PI) / 180)]
  // |x + 1.5 e^(i angle)| = reach
  return { x_mm: Math.sqrt(reach ** 2 - (1.5 * s) ** 2) - 1.5 * c, y_mm: 0, orientation: { angleDeg } }
}

const place = { outline: OUTLINE, spacings_mm: SPACINGS }
const resistance = (configuration: 'A' | 'B', at: Place) =>
  1 / thinSheetFactor({ ...place, configuration, ...at }).value
const single = (at: Place) => resistance('A', at) * C_INFINITE - 1
/** Written out, because it is tabulated beyond its domain too. */
const quadratic = (at: Place) => {
  const [c0, c1, c2] = MF1529_COEFFICIENTS
  const ratio = resistance('A', at) / resistance('B', at)
  return (c0 + c1 * ratio + c2 * ratio * ratio) * resistance('A', at) - 1
}
const exact = (at: Place) => dualEdgeError({ ...place, ...at })

describe('near the rim of a 200 mm disc, independently computed', () => {
  const cases = [
    ['radial: single, uncorrected', 0, single, RIM_ERRORS_PERCENT.radialSingle],
    ['radial: quadratic', 0, quadratic, RIM_ERRORS_PERCENT.radialQuadratic],
    ['tangential: single, uncorrected', 90, single, RIM_ERRORS_PERCENT.tangentialSingle],
    ['tangential: dual', 90, exact, RIM_ERRORS_PERCENT.tangentialDual],
    ['tangential: quadratic', 90, quadratic, RIM_ERRORS_PERCENT.tangentialQuadratic],
    ['45 degrees: dual', 45, exact, RIM_ERRORS_PERCENT.diagonalDual],
  ] as const

  it.each(cases)('%s', (_title, angleDeg, errorOf, percents) => {
    percents.forEach((percent, index) => {
      const found = 100 * errorOf(placeAt(RIM_ERRORS_PERCENT.nearestPinFromRim_mm[index]!, angleDeg))
      const lastDigit = 10 ** -(percent.split('.')[1]?.length ?? 0)
      expect(Math.abs(found - Number(percent))).toBeLessThan(0.51 * lastDigit)
    })
  })

  it('the distances of SEMI MF1529 for 0.1 % hold along a radius and across it', () => {
    expect(Math.abs(quadratic(placeAt(MF1529_PITCHES_FROM_EDGE.radial, 0)))).toBeLessThan(0.001)
    expect(Math.abs(exact(placeAt(MF1529_PITCHES_FROM_EDGE.tangential, 90)))).toBeLessThan(0.001)
  })
})

describe('limits', () => {
  it('a line lying on a straight edge reads twice the sheet resistance, with the ratio of the infinite sheet', () => {
    const outline: Outline = { shape: 'rectangle', width_mm: 4000, height_mm: 4000 }
    const at = { x_mm: 0, y_mm: 2000, orientation: { angleDeg: 0 }, spacings_mm: SPACINGS }
    expect(dualEdgeError({ outline, ...at })).toBeCloseTo(1, 4)
    const ratio =
      thinSheetFactor({ outline, configuration: 'B', ...at }).value / thinSheetFactor({ outline, configuration: 'A', ...at }).value // prettier-ignore
    expect(ratio).toBeCloseTo(1.261859507, 5)
  })
})

describe('a strip narrow against the pitch', () => {
  it('is not mistaken for a good place', () => {
    const outline: Outline = { shape: 'rectangle', width_mm: 100, height_mm: 0.01 }
    const at = { x_mm: 0, y_mm: 0, orientation: { angleDeg: 0 }, spacings_mm: SPACINGS }
    expect(dualEdgeError({ outline, ...at })).toBeGreaterThan(1)
  })
})

describe('laws', () => {
  const unit = fc.double({ min: 0, max: 1, noNaN: true })
  const spacing = fc.double({ min: 0.5, max: 2, noNaN: true })

  it('no error along a diameter, at any spacings and distance', () => {
    fc.assert(
      fc.property(unit, unit, spacing, spacing, spacing, (share, turn, ...spacings_mm) => {
        const reach = 100 - (spacings_mm[0] + spacings_mm[1] + spacings_mm[2]) / 2
        const angle = 2 * Math.PI * turn
        const [x_mm, y_mm] = [share * reach * Math.cos(angle), share * reach * Math.sin(angle)]
        const inwards = 1 - 1e-9
        const site = { x_mm: x_mm * inwards, y_mm: y_mm * inwards, orientation: 'radial' as const }
        expect(Math.abs(dualEdgeError({ outline: OUTLINE, spacings_mm, ...site }))).toBeLessThan(1e-10)
      }),
    )
  })

  it('no error perpendicular to the side of a large rectangle nor on the infinite sheet', () => {
    const outline: Outline = { shape: 'rectangle', width_mm: 1e5, height_mm: 2e5 }
    const at = { y_mm: 0, orientation: { angleDeg: 0 }, spacings_mm: [1, 1.3, 0.8] as const }
    expect(Math.abs(dualEdgeError({ outline, x_mm: 5e4 - 2, ...at }))).toBeLessThan(1e-7)
    expect(Math.abs(dualEdgeError({ outline: { shape: 'infinite' }, x_mm: 0, ...at }))).toBeLessThan(1e-14)
  })

  it('current pair 1-2 and voltage pair 4-3 read RA - RB (images written out)', () => {
    const at = placeAt(1, 30)
    const [a, b] = [resistance('A', at), resistance('B', at)]
    expect(a - b).toBeCloseTo(resistanceC(at), 12)
  })

  it('columns hold NaN where a pin is off the outline', () => {
    const x_mm = Float64Array.of(0, 99, 97)
    const sites = { x_mm, y_mm: new Float64Array(3), orientation: { angleDeg: 90 } }
    const errors = dualEdgeErrors({ ...place, ...sites })
    expect(errors[1]).toBeCloseTo(exact({ x_mm: 99, y_mm: 0, orientation: { angleDeg: 90 } }), 14)
    expect(dualEdgeErrors({ ...place, ...sites, orientation: 'radial' })[1]).toBeNaN()
  })
})

/** Current 1-2, voltage 4-3 on the disc, from images written out. */
function resistanceC({ x_mm, y_mm, orientation }: Place): number {
  const angle = (orientation.angleDeg * Math.PI) / 180
  const pins = [-1.5, -0.5, 0.5, 1.5].map((t) => [x_mm + t * Math.cos(angle), y_mm + t * Math.sin(angle)] as const)
  const potential = ([px, py]: readonly [number, number], [qx, qy]: readonly [number, number]) => {
    const square = qx * qx + qy * qy
    const [ix, iy] = [(qx * 1e4) / square, (qy * 1e4) / square]
    return -(Math.log(Math.hypot(px - qx, py - qy)) + Math.log(Math.hypot(px - ix, py - iy))) / (2 * Math.PI)
  }
  const [one, two, three, four] = pins as [(typeof pins)[0], (typeof pins)[0], (typeof pins)[0], (typeof pins)[0]]
  return potential(four, one) - potential(four, two) - potential(three, one) + potential(three, two)
}

describe('refusals', () => {
  it('refuses a place off the wafer and bad spacings', () => {
    expect(() => exact({ x_mm: 99, y_mm: 0, orientation: { angleDeg: 0 } })).toThrow(CoreError)
    const at = { x_mm: 0, y_mm: 0, orientation: 'radial' } as const
    expect(() => dualEdgeError({ outline: OUTLINE, spacings_mm: [1, 0, 1], ...at })).toThrow(CoreError)
  })
})
