import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { convexHull, insideHull } from '../../../core/map/convex-hull'
import { CoreError } from '../../../core/problems/problem'

const coordinate = fc.integer({ min: -100, max: 100 })
const places = fc.array(fc.tuple(coordinate, coordinate), { minLength: 1, maxLength: 40 })
const columns = (sites: readonly (readonly [number, number])[]) => ({
  x_mm: Float64Array.from(sites, ([x]) => x),
  y_mm: Float64Array.from(sites, ([, y]) => y),
})

/** In the hull: in some triangle of sites, tried one by one. Whole numbers, so exact. */
function isInSomeTriangle(sites: readonly (readonly [number, number])[], x: number, y: number): boolean {
  const side = (a: readonly [number, number], b: readonly [number, number], px: number, py: number) =>
    Math.sign((b[0] - a[0]) * (py - a[1]) - (b[1] - a[1]) * (px - a[0]))
  for (const a of sites) {
    for (const b of sites) {
      for (const c of sites) {
        const sides = [side(a, b, x, y), side(b, c, x, y), side(c, a, x, y)]
        if (side(a, b, c[0], c[1]) > 0 && sides.every((s) => s >= 0)) return true
      }
    }
  }
  // On a segment between two sites, where no triangle holds it.
  return sites.some((a) =>
    sites.some((b) => {
      const [ax, ay, bx, by] = [...a, ...b]
      const isOnLine = side(a, b, x, y) === 0
      return (
        isOnLine && x >= Math.min(ax, bx) && x <= Math.max(ax, bx) && y >= Math.min(ay, by) && y <= Math.max(ay, by)
      )
    }),
  )
}

describe('laws', () => {
  it('every site is inside', () => {
    fc.assert(
      fc.property(places, (sites) => {
        const { x_mm, y_mm } = columns(sites)
        expect(insideHull(convexHull(x_mm, y_mm), x_mm, y_mm).every((inside) => inside === 1)).toBe(true)
      }),
    )
  })

  it('a place is inside where it lies between sites (every triangle tried)', () => {
    const few = fc.array(fc.tuple(coordinate, coordinate), { minLength: 1, maxLength: 9 })
    fc.assert(
      fc.property(
        few,
        fc.array(fc.tuple(coordinate, coordinate), { minLength: 1, maxLength: 20 }),
        (sites, targets) => {
          const hull = convexHull(columns(sites).x_mm, columns(sites).y_mm)
          const inside = insideHull(hull, columns(targets).x_mm, columns(targets).y_mm)
          expect([...inside]).toEqual(targets.map(([x, y]) => (isInSomeTriangle(sites, x, y) ? 1 : 0)))
        },
      ),
    )
  })
})

describe('refusals', () => {
  it('no sites', () => expect(() => convexHull(new Float64Array(0), new Float64Array(0))).toThrow(CoreError))
})
