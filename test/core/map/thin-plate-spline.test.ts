import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { thinPlateSpline, type Targets } from '../../../core/map/thin-plate-spline'
import { CoreError } from '../../../core/problems/problem'
import { concentricPlan } from '../../../core/wafer/site-patterns'
import { bumpy, columnOf, largestDifference, spiral } from './patterns'

const plan = concentricPlan({ circles: 3, outerRadius_mm: 95 })
const places = spiral(60, 90)

function fit(sites: Targets, values: Float64Array, targets: Targets): Float64Array {
  const spline = thinPlateSpline(sites.x_mm, sites.y_mm)
  return spline.evaluatorAt(targets)(spline.coefficients(values), new Float64Array(targets.x_mm.length))
}

const without = (column: Float64Array, site: number) => column.filter((_, i) => i !== site)

/**
 * The same surface in plain mm: Gaussian elimination with pivoting on the saddle system, kernel r^2 ln r. No scaling,
 * no library, rows in the other order.
 */
function byElimination(sites: Targets, values: Float64Array, targets: Targets): number[] {
  const count = values.length
  const kernel = (ax: number, ay: number, bx: number, by: number) => {
    const r = Math.hypot(ax - bx, ay - by)
    return r === 0 ? 0 : r ** 2 * Math.log(r)
  }
  const row = (x: number, y: number) => [
    1,
    x,
    y,
    ...Array.from(sites.x_mm, (sx, j) => kernel(x, y, sx, sites.y_mm[j]!)),
  ]
  const system = [
    [0, 0, 0, ...Array<number>(count).fill(1), 0],
    [0, 0, 0, ...sites.x_mm, 0],
    [0, 0, 0, ...sites.y_mm, 0],
    ...Array.from(values, (value, i) => [...row(sites.x_mm[i]!, sites.y_mm[i]!), value]),
  ]
  const solution = eliminate(system)
  return Array.from(targets.x_mm, (x, t) => row(x, targets.y_mm[t]!).reduce((sum, b, i) => sum + b * solution[i]!, 0))
}

function eliminate(system: number[][]): number[] {
  const size = system.length
  for (let k = 0; k < size; k++) {
    let pivot = k
    for (let i = k + 1; i < size; i++) if (Math.abs(system[i]![k]!) > Math.abs(system[pivot]![k]!)) pivot = i
    ;[system[k], system[pivot]] = [system[pivot]!, system[k]!]
    for (let i = k + 1; i < size; i++) {
      const factor = system[i]![k]! / system[k]![k]!
      for (let j = k; j <= size; j++) system[i]![j]! -= factor * system[k]![j]!
    }
  }
  const solution = Array<number>(size).fill(0)
  for (let i = size - 1; i >= 0; i--) {
    let sum = system[i]![size]!
    for (let j = i + 1; j < size; j++) sum -= system[i]![j]! * solution[j]!
    solution[i] = sum / system[i]![i]!
  }
  return solution
}

describe('limits', () => {
  it('three sites make a plane', () => {
    const three = { x_mm: Float64Array.of(0, 50, 0), y_mm: Float64Array.of(0, 0, 50) }
    const plane = (x: number, y: number) => 92 + 0.1 * x - 0.2 * y
    expect(largestDifference(fit(three, columnOf(three, plane), places), columnOf(places, plane))).toBeLessThan(1e-11)
  })
})

describe('laws', () => {
  it('passes through every site', () => {
    const values = columnOf(plan, bumpy)
    expect(largestDifference(fit(plan, values, plan), values)).toBeLessThan(1e-11)
  })

  it('reproduces any plane, everywhere', () => {
    const slope = fc.double({ min: -1, max: 1, noNaN: true })
    fc.assert(
      fc.property(slope, slope, fc.double({ min: -1e3, max: 1e3, noNaN: true }), (a, b, c) => {
        const plane = (x: number, y: number) => a * x + b * y + c
        expect(largestDifference(fit(plan, columnOf(plan, plane), places), columnOf(places, plane))).toBeLessThan(1e-10)
      }),
      { numRuns: 20 },
    )
  })

  it('is linear: the weights give the same values, and sum to 1', () => {
    const spline = thinPlateSpline(plan.x_mm, plan.y_mm)
    const values = columnOf(plan, bumpy)
    const weights = spline.weights(places)
    const direct = spline.evaluatorAt(places)(spline.coefficients(values), new Float64Array(60))
    for (let t = 0; t < places.x_mm.length; t++) {
      const row = weights.subarray(t * 49, (t + 1) * 49)
      expect(row.reduce((sum, weight) => sum + weight, 0)).toBeCloseTo(1, 11)
      expect(row.reduce((sum, weight, i) => sum + weight * values[i]!, 0)).toBeCloseTo(direct[t]!, 9)
    }
  })

  it('many places at once give what few at a time do', () => {
    // Beyond 4 000 000 entries the places are no longer kept in memory: 90 000 times 52 is more.
    const many = spiral(90_000)
    const values = columnOf(plan, bumpy)
    const some = { x_mm: many.x_mm.slice(500, 600), y_mm: many.y_mm.slice(500, 600) }
    expect(fit(plan, values, many).slice(500, 600)).toEqual(fit(plan, values, some))
  })

  it('at a site all weight is that site’s', () => {
    const weights = thinPlateSpline(plan.x_mm, plan.y_mm).weights(plan)
    const unit = Float64Array.from({ length: 49 * 49 }, (_, i) => (Math.floor(i / 49) === i % 49 ? 1 : 0))
    expect(largestDifference(weights, unit)).toBeLessThan(1e-11)
  })

  it('does not depend on the unit of length, a turn or a shift', () => {
    const values = columnOf(plan, bumpy)
    const before = fit(plan, values, places)
    const moved = (k: number, turn: number, dx: number, dy: number) => (sites: Targets) => ({
      x_mm: columnOf(sites, (x, y) => k * (x * Math.cos(turn) - y * Math.sin(turn)) + dx),
      y_mm: columnOf(sites, (x, y) => k * (x * Math.sin(turn) + y * Math.cos(turn)) + dy),
    })
    fc.assert(
      fc.property(fc.integer({ min: -6, max: 6 }), fc.double({ min: 0, max: 6, noNaN: true }), fc.integer({ min: -300, max: 300 }), (power, turn, shift) => {
        const move = moved(10 ** power, turn, shift * 10 ** power, -2 * shift * 10 ** power)
        expect(largestDifference(fit(move(plan), values, move(places)), before)).toBeLessThan(1e-9)
      }),
      { numRuns: 30 },
    ) // prettier-ignore
  })

  it('the bending coefficients carry no plane: their moments vanish', () => {
    const spline = thinPlateSpline(plan.x_mm, plan.y_mm)
    const bending = spline.coefficients(columnOf(plan, bumpy)).subarray(0, 49)
    for (const moment of [plan.x_mm.map(() => 1), plan.x_mm, plan.y_mm]) {
      expect(Math.abs(bending.reduce((sum, c, i) => sum + c * moment[i]!, 0))).toBeLessThan(1e-9)
    }
  })

  it('leaving a site out: the same as fitting without it, at every site', () => {
    const values = columnOf(plan, bumpy)
    const quick = thinPlateSpline(plan.x_mm, plan.y_mm).leaveOneOut(values)
    const slow = values.map((value, site) => {
      const others = { x_mm: without(plan.x_mm, site), y_mm: without(plan.y_mm, site) }
      const here = { x_mm: plan.x_mm.slice(site, site + 1), y_mm: plan.y_mm.slice(site, site + 1) }
      return value - fit(others, without(values, site), here)[0]!
    })
    expect(largestDifference(quick, slow)).toBeLessThan(1e-9)
    expect(Math.max(...slow.map(Math.abs))).toBeGreaterThan(0.1)
  })

  it('leaving a site out where the others make no surface has no answer', () => {
    const three = thinPlateSpline(Float64Array.of(0, 50, 0), Float64Array.of(0, 0, 50))
    expect([...three.leaveOneOut(Float64Array.of(1, 2, 3))]).toEqual([NaN, NaN, NaN])
    // Four on a line and one beside it: without that one there is no surface.
    const four = thinPlateSpline(Float64Array.of(-50, 0, 20, 50, 10), Float64Array.of(0, 0, 0, 0, 40))
    const residuals = four.leaveOneOut(Float64Array.of(1, 2, 3, 5, 4))
    expect(residuals[4]).toBeNaN()
    expect(Number.isFinite(residuals[0])).toBe(true)
  })
})

describe('a second implementation: Gaussian elimination in mm', () => {
  it.each([
    ['49 concentric sites', plan],
    ['30 on a spiral', spiral(30)],
    ['9 sites', concentricPlan({ circles: 1, outerRadius_mm: 60, startAngle_deg: 10 })],
  ])('%s', (_, sites) => {
    const values = columnOf(sites, bumpy)
    expect(largestDifference(fit(sites, values, places), byElimination(sites, values, places))).toBeLessThan(1e-9)
  })
})

describe('refusals', () => {
  it.each([
    ['two sites', [0, 1], [0, 1]],
    ['sites on a line', [-90, -45, 0, 45, 90], [-90, -45, 0, 45, 90]],
    ['two sites in one place', [0, 0, 50, 0], [0, 0, 0, 50]],
    ['a place that is no number', [0, 50, NaN], [0, 0, 50]],
    ['no sites', [], []],
    ['more x than y', [0, 50, 20, 10], [0, 0, 50]],
  ])('%s', (_, x, y) => {
    expect(() => thinPlateSpline(Float64Array.from(x), Float64Array.from(y))).toThrow(CoreError)
  })
})
