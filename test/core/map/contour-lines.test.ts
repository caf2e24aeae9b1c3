import { describe, expect, it } from 'vitest'
import { contourLines, type ContourLine } from '../../../core/map/contour-lines'
import { cellsOnWafer, cellsWithMargin, rasterGrid } from '../../../core/map/grid'
import { CoreError } from '../../../core/problems/problem'
import { bumpy, columnOf } from './patterns'

const disc = { shape: 'disc', diameter_mm: 200, fiducial: 'notch' } as const
const grid = rasterGrid(disc, 81)
const labels = { outline: disc, margin_mm: 5 }
const linesOf = (valueAt: (x: number, y: number) => number, thresholds: readonly number[]) =>
  contourLines(grid, cellsWithMargin(grid, columnOf(grid.targets, valueAt)), thresholds, labels)
const placesOf = ({ places_mm }: ContourLine) =>
  Array.from({ length: places_mm.length / 2 }, (_, i) => [places_mm[2 * i], places_mm[2 * i + 1]] as const)
/** Anticlockwise above 0. */
const area = (line: ContourLine) =>
  placesOf(line).reduce((sum, [ax, ay], i, places) => {
    const [bx, by] = places[(i + 1) % places.length]
    return sum + (ax * by - bx * ay) / 2
  }, 0)

describe('contour lines', () => {
  it('of a bowl: one closed circle, the high side on the left', () => {
    const [line, ...others] = linesOf((x, y) => (x * x + y * y) / 100, [36])
    expect(others).toEqual([])
    expect(line.isClosed).toBe(true)
    // Between points 2.5 mm apart a parabola errs by h^2 / (8 R) in radius.
    for (const [x, y] of placesOf(line)) expect(Math.abs(Math.hypot(x, y) - 60)).toBeLessThan(0.05)
    expect(area(line)).toBeCloseTo(-Math.PI * 3600, -2)
    expect(area(linesOf((x, y) => -(x * x + y * y) / 100, [-36])[0])).toBeGreaterThan(0)
  })

  it('of a tilt: one open straight line to beyond the edge', () => {
    const [line, ...others] = linesOf((x, y) => 2 * x + y, [10])
    expect(others).toEqual([])
    expect(line.isClosed).toBe(false)
    const places = placesOf(line)
    for (const [x, y] of places) expect(2 * x + y).toBeCloseTo(10, 10)
    expect(Math.min(...[places[0], places.at(-1)!].map(([x, y]) => Math.hypot(x, y)))).toBeGreaterThan(100)
  })

  it('every place has the value; every neighbour is a step away; no place comes twice', () => {
    const thresholds = [91, 92, 93, 94, 95]
    const lines = linesOf(bumpy, thresholds)
    expect(new Set(lines.map(({ value }) => value))).toEqual(new Set(thresholds))
    for (const line of lines) {
      const places = placesOf(line)
      expect(new Set(places.map(([x, y]) => `${x} ${y}`)).size).toBe(places.length)
      for (const [i, [x, y]] of places.entries()) {
        // Curvature below 0.006 a mm^2, step 2.5 mm: h^2 / 8 of it.
        expect(Math.abs(bumpy(x, y) - line.value)).toBeLessThan(0.006)
        const next = places[line.isClosed ? (i + 1) % places.length : Math.min(i + 1, places.length - 1)]
        expect(Math.hypot(next[0] - x, next[1] - y)).toBeLessThan(2.5 * Math.SQRT2 + 1e-9)
      }
    }
  })

  it('cross as many raster edges as change side', () => {
    const cells = cellsOnWafer(grid, columnOf(grid.targets, bumpy))
    const onLines = contourLines(grid, cells, [93], labels).reduce(
      (sum, { places_mm }) => sum + places_mm.length / 2,
      0,
    )
    let crossings = 0
    const square = (corner: number) =>
      [0, 1, grid.columns, grid.columns + 1].every((k) => !Number.isNaN(cells[corner + k]))
    for (let cell = 0; cell < cells.length - grid.columns - 1; cell++) {
      const isHigh = (other: number) => cells[other] >= 93
      // An edge counts where it borders a whole square of values.
      if (isHigh(cell) !== isHigh(cell + 1) && (square(cell) || square(cell - grid.columns))) crossings++
      if (isHigh(cell) !== isHigh(cell + grid.columns) && (square(cell) || square(cell - 1))) crossings++
    }
    expect(onLines).toBe(crossings)
  })

  it('of a saddle cross the middle one way only', () => {
    // High in two opposite corners; the middle is at 0.
    const saddle = (value: number) => linesOf((x, y) => x * y, [value]).map(placesOf)
    for (const places of saddle(-1).flat()) expect(places[0] * places[1]).toBeLessThan(0)
    for (const places of saddle(1).flat()) expect(places[0] * places[1]).toBeGreaterThan(0)
    expect(saddle(1)).toHaveLength(2)
    expect(saddle(-1)).toHaveLength(2)
  })

  it('through a point of the raster have it once; a peak just as high is no line', () => {
    const [line] = linesOf((x, y) => x + 0.3 * y, [0])
    const atCentre = placesOf(line).filter(([x, y]) => Math.hypot(x, y) < 1e-9)
    expect(atCentre).toHaveLength(1)
    expect(linesOf((x, y) => -Math.hypot(x, y), [0])).toEqual([])
  })

  it('none where the values do not reach', () => {
    expect(linesOf(bumpy, [50])).toEqual([])
    expect(linesOf(bumpy, [])).toEqual([])
  })
})

describe('labels', () => {
  it('lie on their line, well within the edge, half way along', () => {
    const [line] = linesOf((x, y) => 2 * x + y, [10])
    const { x_mm, y_mm, angle_deg } = line.label!
    // The nearest to the centre: half way.
    expect(Math.abs(x_mm - 4)).toBeLessThan(2)
    expect(2 * x_mm + y_mm).toBeCloseTo(10, 9)
    expect(angle_deg).toBeCloseTo((Math.atan2(-2, 1) * 180) / Math.PI, 6)
  })

  it('stand upright', () => {
    for (const { label } of linesOf(bumpy, [91, 91.5, 92, 92.5, 93, 93.5, 94, 94.5, 95])) {
      if (!label) continue
      expect(label.angle_deg).toBeGreaterThan(-90)
      expect(label.angle_deg).toBeLessThanOrEqual(90)
      expect(Math.hypot(label.x_mm, label.y_mm)).toBeLessThanOrEqual(95)
    }
  })

  it('are left out where the line runs along the edge', () => {
    const [line] = linesOf((x, y) => x * x + y * y, [97 * 97])
    expect(line.label).toBeNull()
  })
})

describe('refusals', () => {
  it('a threshold that is no number', () => expect(() => linesOf(bumpy, [NaN])).toThrow(CoreError))
  it('a margin below zero', () => {
    expect(() =>
      contourLines(grid, new Float64Array(grid.columns * grid.rows), [1], { outline: disc, margin_mm: -1 }),
    ).toThrow(CoreError)
  })
})
