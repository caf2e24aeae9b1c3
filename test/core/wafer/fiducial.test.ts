import { describe, expect, it } from 'vitest'
import { CoreError } from '../../../core/problems/problem'
import { chordDistance_mm, flatDistance_mm, outlinePath, type Place } from '../../../core/wafer/fiducial'
import { FLATS, FLAT_DIAMETER_200_MM, NOTCH } from '../../reference/semi-m1-m20'

const radiusOf = ({ x_mm, y_mm }: Place) => Math.hypot(x_mm, y_mm)
const disc = (fiducial: 'notch' | 'flat' | 'none', diameter_mm = 200) => ({ shape: 'disc', diameter_mm, fiducial }) as const // prettier-ignore

/** Positive where the path runs anticlockwise. */
function area(path: readonly Place[]): number {
  return path.reduce((sum, a, i) => {
    const b = path[(i + 1) % path.length]!
    return sum + (a.x_mm * b.y_mm - b.x_mm * a.y_mm) / 2
  }, 0)
}

describe('published values', () => {
  it.each(FLATS)('SEMI M1: the flat of a $diameter_mm mm wafer', ({ diameter_mm, flat_mm, distance_mm }) => {
    expect(chordDistance_mm(diameter_mm, flat_mm)).toBeCloseTo(distance_mm, 3)
    expect(flatDistance_mm(disc('flat', diameter_mm))).toBeCloseTo(distance_mm, 3)
  })

  it('SEMI M1: the flat of a 200 mm wafer by its flat diameter', () => {
    expect(flatDistance_mm(disc('flat'))).toBeCloseTo(FLAT_DIAMETER_200_MM - 100, 10)
  })

  it('SEMI M1 and M20: the notch lies on -y, 1 mm deep, its walls at 90 degrees', () => {
    const path = outlinePath(disc('notch'))
    const apex = path.reduce((a, b) => (radiusOf(a) < radiusOf(b) ? a : b))
    expect(apex).toEqual({ x_mm: 0, y_mm: -(100 - NOTCH.depth_mm) })
    const [before, after] = [path[path.length - 2]!, path[0]!]
    const wall = (end: Place) => Math.atan2(end.y_mm - apex.y_mm, end.x_mm - apex.x_mm)
    expect(((wall(after) - wall(before)) * 180) / Math.PI).toBeCloseTo(NOTCH.angle_deg, 9)
    expect(radiusOf(before)).toBeCloseTo(100, 10)
    expect(radiusOf(after)).toBeCloseTo(100, 10)
  })
})

describe('limits', () => {
  it('the area of each shape', () => {
    expect(area(outlinePath(disc('none'), 3600))).toBeCloseTo(Math.PI * 1e4, 0)
    expect(area(outlinePath({ shape: 'rectangle', width_mm: 20, height_mm: 30 }))).toBe(600)
    // A circular segment: R^2 acos(d / R) - d sqrt(R^2 - d^2).
    const d = FLATS[1].distance_mm
    const segment = 75 ** 2 * Math.acos(d / 75) - d * Math.sqrt(75 ** 2 - d ** 2)
    expect(area(outlinePath(disc('flat', 150), 3600))).toBeCloseTo(Math.PI * 75 ** 2 - segment, 0)
  })

  it('a flat is straight: no point below it, its two ends on it', () => {
    const path = outlinePath({ ...disc('flat', 100), flatLength_mm: 32.5 })
    expect(Math.min(...path.map(({ y_mm }) => y_mm))).toBeCloseTo(-47.286, 3)
    expect(path[0]!.y_mm).toBeCloseTo(path[path.length - 1]!.y_mm, 10)
    expect(path[0]!.x_mm - path[path.length - 1]!.x_mm).toBeCloseTo(32.5, 10)
  })

  it('within 4 um of the true edge', () => {
    const path = outlinePath(disc('none'))
    const sagitta = path.map((a, i) => {
      const b = path[(i + 1) % path.length]!
      return 100 - Math.hypot((a.x_mm + b.x_mm) / 2, (a.y_mm + b.y_mm) / 2)
    })
    expect(Math.max(...sagitta)).toBeLessThan(0.004)
  })

  it('a small piece gets a small notch', () => {
    const path = outlinePath(disc('notch', 10))
    expect(Math.min(...path.map(radiusOf))).toBeCloseTo(4.75, 12)
  })

  it('a flat whose length nobody knows is drawn round', () => {
    expect(flatDistance_mm(disc('flat', 160))).toBeNull()
    expect(outlinePath(disc('flat', 160))).toEqual(outlinePath(disc('none', 160)))
    expect(flatDistance_mm(disc('notch'))).toBeNull()
  })
})

describe('refusals', () => {
  it.each([0, -1, 100, 120, NaN])('a flat of %s mm on a 100 mm wafer', (flat) => {
    expect(() => chordDistance_mm(100, flat)).toThrow(CoreError)
  })

  it('an outline without edges', () => expect(() => outlinePath({ shape: 'infinite' })).toThrow(CoreError))
})
