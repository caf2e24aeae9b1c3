import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { rackColumns } from '../../../app/renderer/figures/lot-pictures'
import { centralRow, neighbour } from '../../../app/renderer/figures/neighbours'
import { moved, screenPlane, WHOLE, zoomedAt } from '../../../app/renderer/figures/plane'
import { siteGrid } from '../../../app/renderer/figures/site-grid'

const extent = { halfWidth_mm: 100, halfHeight_mm: 100 }
const frame = { width: 740, height: 500, extent }
const coordinate = fc.double({ min: -100, max: 100, noNaN: true })
const places = fc.array(fc.tuple(coordinate, coordinate), { minLength: 1, maxLength: 120 })

describe('sites by place', () => {
  it('the nearest is the nearest of all', () => {
    fc.assert(
      fc.property(places, coordinate, coordinate, (list, x, y) => {
        const [xs, ys] = [list.map(([a]) => a), list.map(([, b]) => b)]
        const found = siteGrid(xs, ys).nearest(x, y, 40)
        const distances = list.map(([a, b]) => Math.hypot(a - x, b - y))
        const least = Math.min(...distances)
        if (least > 40) expect(found).toBe(-1)
        else expect(distances[found]).toBe(least)
      }),
      { numRuns: 200 },
    )
  })

  it('a window holds those in it and no others', () => {
    fc.assert(
      fc.property(places, coordinate, coordinate, (list, left, bottom) => {
        const [xs, ys] = [list.map(([a]) => a), list.map(([, b]) => b)]
        const window = { left_mm: left, right_mm: left + 50, bottom_mm: bottom, top_mm: bottom + 30 }
        const inside = list.flatMap(([a, b], i) =>
          a >= left && a <= left + 50 && b >= bottom && b <= bottom + 30 ? i : [],
        )
        expect(
          siteGrid(xs, ys)
            .within(window)
            .sort((a, b) => a - b),
        ).toEqual(inside)
      }),
      { numRuns: 200 },
    )
  })

  it('sites without a place are nowhere', () => {
    expect(siteGrid([NaN, 0], [0, 0]).nearest(0, 0, 10)).toBe(1)
    expect(siteGrid([NaN], [NaN]).nearest(0, 0, 10)).toBe(-1)
  })
})

describe('arrow keys', () => {
  const x = [0, 10, 20, 0, 10]
  const y = [0, 0, 0, 10, 10]

  it('go by place, and stay where there is nothing', () => {
    expect(neighbour(x, y, 0, 'right')).toBe(1)
    expect(neighbour(x, y, 0, 'up')).toBe(3)
    expect(neighbour(x, y, 4, 'down')).toBe(1)
    expect(neighbour(x, y, 0, 'left')).toBe(0)
    expect(centralRow(x, y)).toBe(0)
    expect(centralRow([NaN], [NaN])).toBe(-1)
  })
})

describe('the plane', () => {
  it('goes there and back', () => {
    const plane = screenPlane(frame, { zoom: 7, x_mm: 20, y_mm: -30 })
    expect(plane.x_mm(plane.x(12.5))).toBeCloseTo(12.5, 9)
    expect(plane.y_mm(plane.y(-7.5))).toBeCloseTo(-7.5, 9)
  })

  it('keeps what is under the pointer when zooming in, and never leaves the wafer', () => {
    const plane = screenPlane(frame, WHOLE)
    const [x, y] = [plane.x(30), plane.y(20)]
    const view = zoomedAt(WHOLE, plane, 3, x, y, extent)
    const after = screenPlane(frame, view)
    expect([after.x(30), after.y(20)].map(Math.round)).toEqual([x, y].map(Math.round))
    const far = moved(view, after, -1e6, 0, extent)
    expect(far.x_mm).toBeLessThanOrEqual(extent.halfWidth_mm)
    expect(zoomedAt(view, after, 1e-6, x, y, extent)).toEqual(WHOLE)
  })
})

describe('the rack', () => {
  it('shows 25 wafers without scrolling where it can', () => {
    expect(rackColumns(25, 540, 510)).toBe(7)
    expect(rackColumns(25, 900, 860)).toBe(6)
    expect(rackColumns(1, 540, 510)).toBe(1)
    expect(rackColumns(200, 300, 300)).toBe(4)
  })
})
