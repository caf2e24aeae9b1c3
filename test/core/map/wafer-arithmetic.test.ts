import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { lotMap } from '../../../core/map/lot-map'
import { matchSites, SAME_PLACE_MM } from '../../../core/map/matching-sites'
import { compareWafers } from '../../../core/map/wafer-arithmetic'
import { CoreError } from '../../../core/problems/problem'
import { concentricPlan } from '../../../core/wafer/site-patterns'
import { bumpy, changed, columnOf, spiral } from './patterns'

const plan = concentricPlan({ circles: 3, outerRadius_mm: 90 })
const grid = spiral(60, 98)
const other = spiral(60, 93)
const plane = (x: number, y: number) => 90 + 0.05 * x - 0.02 * y
const shuffled = (order: readonly number[], column: Float64Array) => Float64Array.from(order, (i) => column[i])
const orders = fc.shuffledSubarray(Array.from({ length: 49 }, (_, i) => i), { minLength: 49 }) // prettier-ignore

describe('sites of two wafers', () => {
  it('match in any order, also when some lie at one place', () => {
    const doubled = { x_mm: changed(plan.x_mm, 5, plan.x_mm[6]), y_mm: changed(plan.y_mm, 5, plan.y_mm[6]) }
    for (const sites of [plan, doubled, { x_mm: plan.x_mm, y_mm: new Float64Array(49) }]) {
      fc.assert(
        fc.property(orders, (order) => {
          const mixed = { x_mm: shuffled(order, sites.x_mm), y_mm: shuffled(order, sites.y_mm) }
          const partner = matchSites(sites, mixed)
          expect(partner).not.toBeNull()
          expect(new Set(partner).size).toBe(49)
          partner?.forEach((j, i) => {
            expect(Math.hypot(mixed.x_mm[j] - sites.x_mm[i], mixed.y_mm[j] - sites.y_mm[i])).toBeLessThanOrEqual(
              SAME_PLACE_MM,
            )
          })
        }),
        { numRuns: 40 },
      )
    }
  })

  it('a nanometre apart are the same, two are not', () => {
    const shifted = (d: number) => ({ x_mm: plan.x_mm.map((x) => x + d).reverse(), y_mm: plan.y_mm.slice().reverse() })
    expect(matchSites(plan, shifted(0.9e-6))).not.toBeNull()
    expect(matchSites(plan, shifted(2e-6))).toBeNull()
  })

  it('do not match where one is missing or moved', () => {
    expect(matchSites(plan, { x_mm: plan.x_mm.slice(1), y_mm: plan.y_mm.slice(1) })).toBeNull()
    expect(matchSites(plan, { x_mm: changed(plan.x_mm, 7, 1), y_mm: plan.y_mm })).toBeNull()
    const twice = { x_mm: changed(plan.x_mm, 5, plan.x_mm[6]), y_mm: changed(plan.y_mm, 5, plan.y_mm[6]) }
    expect(matchSites(plan, twice)).toBeNull()
  })
})

describe('one wafer against another', () => {
  it('at common sites, whatever their order', () => {
    const order = Array.from({ length: 49 }, (_, i) => (i * 11) % 49)
    const second = {
      x_mm: shuffled(order, plan.x_mm),
      y_mm: shuffled(order, plan.y_mm),
      value: shuffled(order, columnOf(plan, plane)),
    }
    const result = compareWafers({ ...plan, value: columnOf(plan, bumpy) }, second, grid)
    expect(result.places).toBe('common-sites')
    expect(result.extrapolated.every((flag) => flag === 0)).toBe(true)
    result.difference.forEach((difference, k) => {
      const [x, y] = [result.x_mm[k], result.y_mm[k]]
      expect(difference).toBeCloseTo(bumpy(x, y) - plane(x, y), 10)
      expect(result.ratio[k]).toBeCloseTo(bumpy(x, y) / plane(x, y), 12)
      expect(second.x_mm[result.sites!.second[k]]).toBe(x)
    })
  })

  it('a site without a value in either is left out and counted; the pattern still agrees', () => {
    const first = { ...plan, value: columnOf(plan, bumpy).fill(NaN, 0, 2) }
    const second = { ...plan, value: columnOf(plan, plane).fill(NaN, 1, 3) }
    const result = compareWafers(first, second, grid)
    expect(result.places).toBe('common-sites')
    expect(result.withoutValue).toBe(3)
    expect([...result.sites!.first]).toEqual(Array.from({ length: 46 }, (_, i) => i + 3))
  })

  it('of other patterns on a grid, saying so and where it is a guess', () => {
    const result = compareWafers(
      { ...plan, value: columnOf(plan, plane) },
      { ...other, value: columnOf(other, (x, y) => plane(x, y) / 2) },
      grid,
    )
    expect(result.places).toBe('common-grid')
    expect(result.sites).toBeNull()
    expect(result.x_mm).toBe(grid.x_mm)
    result.ratio.forEach((ratio) => expect(ratio).toBeCloseTo(2, 9))
    expect(result.extrapolated).toContain(1)
    result.extrapolated.forEach((flag, t) => {
      const r = Math.hypot(grid.x_mm[t], grid.y_mm[t])
      if (r > 93) expect(flag).toBe(1)
      if (r < 80) expect(flag).toBe(0)
    })
  })

  it('turned round: the difference has the other sign, the ratio is its inverse; a wafer against itself is nothing', () => {
    const [a, b] = [
      { ...plan, value: columnOf(plan, bumpy) },
      { ...other, value: columnOf(other, plane) },
    ]
    const [there, back] = [compareWafers(a, b, grid), compareWafers(b, a, grid)]
    there.difference.forEach((difference, t) => {
      expect(back.difference[t]).toBe(-difference)
      expect(back.ratio[t] * there.ratio[t]).toBeCloseTo(1, 12)
    })
    expect(compareWafers(a, a, grid).difference.every((difference) => difference === 0)).toBe(true)
  })

  it('has no ratio to zero', () => {
    const zero = columnOf(plan, plane).fill(0, 4, 5)
    expect(compareWafers({ ...plan, value: columnOf(plan, plane) }, { ...plan, value: zero }, grid).ratio[4]).toBeNaN()
  })

  it('refuses a wafer without values', () => {
    const empty = { ...plan, value: new Float64Array(49).fill(NaN) }
    expect(() => compareWafers({ ...plan, value: columnOf(plan, plane) }, empty, grid)).toThrow(CoreError)
  })
})

describe('the mean wafer of a lot', () => {
  const wafers = [0, 1, 5].map((shift) => ({ ...plan, value: columnOf(plan, (x, y) => plane(x, y) + shift) }))

  it('at the sites: mean and standard deviation over wafers', () => {
    const map = lotMap(wafers, grid)
    expect(map.places).toBe('common-sites')
    map.mean.forEach((mean, i) => {
      expect(mean).toBeCloseTo(plane(plan.x_mm[i], plan.y_mm[i]) + 2, 10)
      // Deviations -2, -1, 3.
      expect(map.standardDeviation[i]).toBeCloseTo(Math.sqrt(7), 10)
      expect(map.count[i]).toBe(3)
    })
  })

  it('counts the wafers that have a value, and gives no spread of one', () => {
    const gaps = wafers.map((wafer, w) => ({
      ...wafer,
      value: changed(changed(wafer.value, 3, w === 0 ? 90 : NaN), 4, NaN),
    }))
    const map = lotMap(gaps, grid)
    expect([...map.count.subarray(2, 6)]).toEqual([3, 1, 0, 3])
    expect(map.mean[3]).toBe(90)
    expect(map.standardDeviation[3]).toBeNaN()
    expect(map.mean[4]).toBeNaN()
  })

  it('of other patterns on the grid, without what is extrapolated', () => {
    const wide = spiral(300, 97)
    const map = lotMap([...wafers, { ...wide, value: columnOf(wide, plane) }], grid)
    expect(map.places).toBe('common-grid')
    map.mean.forEach((mean, t) => {
      const [x, y] = [grid.x_mm[t], grid.y_mm[t]]
      if (map.count[t] === 4) expect(mean).toBeCloseTo(plane(x, y) + 1.5, 9)
      if (map.count[t] === 1) expect(mean).toBeCloseTo(plane(x, y), 9)
      if (map.count[t] === 0) expect(mean).toBeNaN()
      if (Math.hypot(x, y) > 97) expect(map.count[t]).toBe(0)
    })
    expect(map.count).toContain(4)
    expect(map.count).toContain(1)
  })

  it('refuses no wafers', () => expect(() => lotMap([], grid)).toThrow(CoreError))
})
