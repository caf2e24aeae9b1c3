import { describe, expect, it } from 'vitest'
import {
  extrapolationOf,
  MAX_SPLINE_SITES,
  interpolatorsFor,
  prepareInterpolator,
} from '../../../core/map/interpolator'
import { rasterGrid } from '../../../core/map/grid'
import { CoreError } from '../../../core/problems/problem'
import { concentricPlan } from '../../../core/wafer/site-patterns'
import { bumpy, columnOf, largestDifference, spiral } from './patterns'

const plan = concentricPlan({ circles: 3, outerRadius_mm: 95 })
const dense = spiral(900)
const line = { x_mm: Float64Array.of(-90, -30, 30, 90), y_mm: new Float64Array(4) }
const targets = spiral(80, 99)
const plane = (x: number, y: number) => 92 + 0.05 * x - 0.02 * y

describe('the method', () => {
  it.each([
    ['a site plan', plan, 'thin-plate-spline'],
    ['more sites than a spline takes', dense, 'linear'],
    ['a line', line, 'mean'],
    ['two sites', { x_mm: Float64Array.of(0, 1), y_mm: Float64Array.of(0, 1) }, 'mean'],
    ['one site', { x_mm: Float64Array.of(0), y_mm: Float64Array.of(0) }, 'mean'],
    ['one place, twice', { x_mm: Float64Array.of(5, 5), y_mm: Float64Array.of(5, 5) }, 'mean'],
  ])('%s', (_, sites, method) => {
    expect(prepareInterpolator(sites.x_mm, sites.y_mm, targets).method).toBe(method)
    expect(dense.x_mm.length).toBeGreaterThan(MAX_SPLINE_SITES)
  })
})

describe.each([
  ['spline', plan],
  ['linear', dense],
  ['mean', line],
])('laws of every method: %s', (_, sites) => {
  const interpolator = prepareInterpolator(sites.x_mm, sites.y_mm, targets)

  it('a constant stays a constant', () => {
    const constant = interpolator.evaluate(columnOf(sites, () => 92))
    expect(
      largestDifference(
        constant,
        columnOf(targets, () => 92),
      ),
    ).toBeLessThan(1e-10)
  })

  it('is linear in the values', () => {
    const [a, b] = [columnOf(sites, bumpy), columnOf(sites, (x) => Math.cos(x / 30))]
    const sum = interpolator.evaluate(a.map((value, i) => 2 * value - 3 * b[i]!))
    const parts = interpolator.evaluate(a).map((value, t) => 2 * value - 3 * interpolator.evaluate(b)[t]!)
    expect(largestDifference(sum, parts)).toBeLessThan(1e-9)
  })

  it('uncertainty: what the values do when each site moves by its own u, in quadrature', () => {
    const u = columnOf(sites, (x) => 0.5 + 0.001 * x)
    const squares = new Float64Array(targets.x_mm.length)
    for (let site = 0; site < u.length; site++) {
      const moved = new Float64Array(u.length)
      moved[site] = u[site]!
      interpolator.evaluate(moved).forEach((change, t) => (squares[t]! += change * change))
    }
    expect(largestDifference(interpolator.propagate(u), squares.map(Math.sqrt))).toBeLessThan(1e-9)
  })
})

describe('linear between the sites', () => {
  const interpolator = prepareInterpolator(dense.x_mm, dense.y_mm, targets)

  it('reproduces a plane inside the hull and extrapolates nothing outside', () => {
    const values = columnOf(dense, plane)
    const surface = interpolator.evaluate(values)
    const [low, high] = [Math.min(...values), Math.max(...values)]
    expect(interpolator.inside).toContain(0)
    expect(interpolator.inside).toContain(1)
    surface.forEach((value, t) => {
      if (interpolator.inside[t]) expect(value).toBeCloseTo(plane(targets.x_mm[t]!, targets.y_mm[t]!), 10)
      expect(value).toBeGreaterThanOrEqual(low - 1e-12)
      expect(value).toBeLessThanOrEqual(high + 1e-12)
    })
  })

  it('passes through the sites', () => {
    const values = columnOf(dense, bumpy)
    const atSites = prepareInterpolator(dense.x_mm, dense.y_mm, dense)
    expect(largestDifference(atSites.evaluate(values), values)).toBeLessThan(1e-9)
    expect(atSites.inside.every((inside) => inside === 1)).toBe(true)
  })

  it('a smooth wafer comes out the same as by spline, to the bend of a triangle', () => {
    const few = spiral(650)
    const spline = prepareInterpolator(few.x_mm, few.y_mm, targets)
    const difference = spline.evaluate(columnOf(few, bumpy)).map((value, t) => {
      return spline.inside[t] && interpolator.inside[t] ? value - interpolator.evaluate(columnOf(dense, bumpy))[t]! : 0
    })
    // Curvature about 0.007 a mm^2 at most, spacing about 6 mm: h^2 / 8 times curvature, with room for slivers at the rim.
    expect(Math.max(...difference.map(Math.abs))).toBeLessThan(0.1)
  })

  it('has no leave-one-out', () => expect(interpolator.leaveOneOut(columnOf(dense, bumpy))).toBeNull())
})

describe('what is extrapolated', () => {
  const grid = rasterGrid({ shape: 'disc', diameter_mm: 200, fiducial: 'notch' }, 201)
  const square = { x_mm: Float64Array.of(-50, 50, 50, -50), y_mm: Float64Array.of(-50, -50, 50, 50) }

  it('is counted, and its share of the wafer is that of the area', () => {
    const { inside, extrapolated } = prepareInterpolator(square.x_mm, square.y_mm, grid.targets)
    expect(extrapolated.count).toBe(inside.filter((flag) => flag === 0).length)
    expect(extrapolated.share).toBe(extrapolated.count / inside.length)
    const onWafer = extrapolationOf(inside, grid.onWafer)
    expect(onWafer.count).toBeLessThan(extrapolated.count)
    // Rim points count whole: about 400 of 31 416.
    expect(Math.abs(onWafer.share - (1 - 1e4 / (Math.PI * 1e4)))).toBeLessThan(0.01)
  })

  it('is nothing within the sites, everything for a mean, nothing of nothing', () => {
    expect(prepareInterpolator(plan.x_mm, plan.y_mm, plan).extrapolated).toEqual({ count: 0, share: 0 })
    expect(prepareInterpolator(plan.x_mm.slice(0, 1), plan.y_mm.slice(0, 1), targets).extrapolated.share).toBe(1)
    expect(extrapolationOf(new Uint8Array(0))).toEqual({ count: 0, share: 0 })
  })
})

describe('a hundred thousand sites', () => {
  it('make a raster of 200 across', () => {
    const many = spiral(100_000, 97)
    const grid = rasterGrid({ shape: 'disc', diameter_mm: 200, fiducial: 'notch' }, 200)
    const interpolator = prepareInterpolator(many.x_mm, many.y_mm, grid.targets)
    const surface = interpolator.evaluate(columnOf(many, plane))
    const error = surface.map((value, t) =>
      interpolator.inside[t] ? Math.abs(value - plane(grid.targets.x_mm[t], grid.targets.y_mm[t])) : 0,
    )
    expect(error.reduce((a, b) => Math.max(a, b))).toBeLessThan(1e-9)
  })
})

describe('sites in one place', () => {
  const twice = {
    x_mm: Float64Array.of(...plan.x_mm, plan.x_mm[7]!),
    y_mm: Float64Array.of(...plan.y_mm, plan.y_mm[7]!),
  }
  const values = columnOf(twice, bumpy)

  it('count as one, at their mean', () => {
    const apart = values.slice()
    apart[7]! += 2
    apart[49]! -= 2
    const doubled = prepareInterpolator(twice.x_mm, twice.y_mm, targets)
    const single = prepareInterpolator(plan.x_mm, plan.y_mm, targets)
    expect(largestDifference(doubled.evaluate(apart), single.evaluate(values.subarray(0, 49)))).toBeLessThan(1e-10)
    expect(doubled.leaveOneOut(values)).toHaveLength(50)
  })

  it('are surer than one', () => {
    const at = { x_mm: plan.x_mm.slice(7, 8), y_mm: plan.y_mm.slice(7, 8) }
    const u = new Float64Array(50).fill(0.3)
    expect(prepareInterpolator(twice.x_mm, twice.y_mm, at).propagate(u)[0]).toBeCloseTo(0.3 / Math.SQRT2, 10)
  })

  it('a micrometre apart are two places, a tenth of one the same', () => {
    const near = (d: number) => ({ x_mm: Float64Array.of(0, d, 100, 0, 100), y_mm: Float64Array.of(0, 0, 0, 100, 100) })
    const spline = (d: number) => prepareInterpolator(near(d).x_mm, near(d).y_mm, near(d))
    const values = Float64Array.of(1, 2, 0, 0, 0)
    expect(spline(1e-3).evaluate(values)[0]).toBeCloseTo(1, 6)
    expect(spline(1e-5).evaluate(values)[0]).toBeCloseTo(1.5, 6)
  })
})

describe('the mean', () => {
  it('of a line: nothing but the line is inside', () => {
    const interpolator = prepareInterpolator(line.x_mm, line.y_mm, { x_mm: Float64Array.of(0, 0, 91, -90), y_mm: Float64Array.of(0, 1, 0, 0) }) // prettier-ignore
    expect([...interpolator.inside]).toEqual([1, 0, 0, 1])
    expect([...interpolator.evaluate(Float64Array.of(1, 2, 3, 6))]).toEqual([3, 3, 3, 3])
    // Each against the mean of the other three.
    expect([...interpolator.leaveOneOut(Float64Array.of(1, 2, 3, 6))!].map((r) => r.toFixed(6))).toEqual(
      [1 - 11 / 3, 2 - 10 / 3, 3 - 3, 6 - 2].map((r) => r.toFixed(6)),
    )
  })
})

describe('one interpolator a pattern', () => {
  it('is made once, whatever array carries the pattern, and made anew for another', () => {
    const prepare = interpolatorsFor(targets)
    const first = prepare(plan.x_mm, plan.y_mm)
    expect(prepare(plan.x_mm.slice(), plan.y_mm.slice())).toBe(first)
    const fewer = prepare(plan.x_mm.slice(1), plan.y_mm.slice(1))
    expect(fewer).not.toBe(first)
    expect(prepare(plan.x_mm, plan.y_mm)).toBe(first)
  })

  it('does not keep a pattern whose array is changed afterwards', () => {
    const prepare = interpolatorsFor(targets)
    const x_mm = plan.x_mm.slice()
    const first = prepare(x_mm, plan.y_mm)
    x_mm[0] = 3
    expect(prepare(x_mm, plan.y_mm)).not.toBe(first)
  })
})

describe('refusals', () => {
  it('no sites', () => {
    expect(() => prepareInterpolator(new Float64Array(0), new Float64Array(0), targets)).toThrow(CoreError)
  })
})
