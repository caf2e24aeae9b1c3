import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { prepareTrendSurface, trendSurface, type TrendSurface } from '../../../core/map/trend-surface'
import {
  highestTrendOrder,
  TREND_ORDERS,
  trendGroupOf,
  trendTerms,
  type TrendOrder,
} from '../../../core/map/trend-terms'
import type { Targets } from '../../../core/map/thin-plate-spline'
import { zernike } from '../../../core/map/zernike'
import { CoreError, type Problem } from '../../../core/problems/problem'
import { concentricPlan } from '../../../core/wafer/site-patterns'
import { exactLeastSquares } from './exact-least-squares'
import { noisy } from './noise'
import { bumpy, changed, columnOf, largestDifference, spiral } from './patterns' // prettier-ignore

const plan = concentricPlan({ circles: 3, outerRadius_mm: 95, startAngle_deg: 90 })
const finer = concentricPlan({ circles: 5, outerRadius_mm: 95 })
const group = (trend: TrendSurface, id: string) => trend.groups.find((found) => found.id === id)!
const turned = ({ x_mm, y_mm }: Targets, angle_deg: number): Targets => {
  const [cos, sin] = [Math.cos((angle_deg * Math.PI) / 180), Math.sin((angle_deg * Math.PI) / 180)]
  return { x_mm: x_mm.map((x, i) => cos * x - sin * y_mm[i]), y_mm: x_mm.map((x, i) => sin * x + cos * y_mm[i]) }
}
const problemOf = (act: () => unknown): Problem => {
  try {
    act()
  } catch (error) {
    if (error instanceof CoreError) return error.problem
  }
  throw new Error('nothing was refused')
}

describe('the shapes of an order', () => {
  it('are as many as they should be, the mean first, group after group', () => {
    expect(TREND_ORDERS.map((order) => trendTerms(order).length)).toEqual([3, 4, 6, 10, 15, 28])
    expect(trendTerms('zernike-3').map((index) => (index.n === 0 ? 'mean' : trendGroupOf(index)))).toEqual([
      'mean', 'tilt', 'tilt', 'bowl', 'two-fold', 'two-fold', 'three-fold', 'three-fold', 'rest', 'rest',
    ]) // prettier-ignore
  })

  it('the highest that a number of sites allows leaves a degree of freedom', () => {
    expect([3, 4, 5, 7, 9, 11, 16, 28, 29].map(highestTrendOrder)).toEqual([
      null, 'plane', 'bowl', 'zernike-2', 'zernike-2', 'zernike-3', 'zernike-4', 'zernike-4', 'zernike-6',
    ]) // prettier-ignore
  })
})

describe('limits', () => {
  it.each(['plane', 'bowl', 'zernike-2', 'zernike-4', 'zernike-6'] as const)(
    'a surface of order %s comes back whole',
    (order) => {
      const indices = trendTerms(order)
      const made = indices.map((_, k) => (k === 0 ? 92 : Math.cos(3 * k) / (1 + k)))
      const values = columnOf(finer, (x, y) =>
        indices.reduce((sum, index, k) => sum + made[k] * zernike(index, x / 100, y / 100), 0),
      )
      const trend = trendSurface(finer, values, { radius_mm: 100, order })
      expect(trend.order).toBe(order)
      expect(trend.loweredBecause).toBeNull()
      trend.terms.forEach((term, k) => expect(Math.abs(term.coefficient - made[k])).toBeLessThan(1e-12))
      expect(trend.mean).toBeCloseTo(92, 11)
      expect(trend.rSquared).toBeCloseTo(1, 13)
      expect(trend.residualStandardDeviation).toBeLessThan(1e-12)
      expect(largestDifference(trend.evaluate(finer), values)).toBeLessThan(1e-11)
    },
  )

  it('tilt, bowl and saddle in the terms people use', () => {
    // Up by 3 along 120 degrees over 100 mm; 2 higher at the edge than in the middle; 1.5 up along 30, down along 120.
    const [alongX, alongY] = [3 * Math.cos((120 * Math.PI) / 180), 3 * Math.sin((120 * Math.PI) / 180)]
    const values = columnOf(plan, (x, y) => {
      const [r2, theta] = [(x * x + y * y) / 1e4, Math.atan2(y, x)]
      return 200 + (alongX * x + alongY * y) / 100 + 2 * r2 + 1.5 * r2 * Math.cos(2 * (theta - Math.PI / 6))
    })
    const { mean, tilt, bowl, saddle } = trendSurface(plan, values, { radius_mm: 100, order: 'zernike-4' })
    // The mean of a bowl lies half way up over the area.
    expect(mean).toBeCloseTo(201, 10)
    expect(tilt.perRadius).toBeCloseTo(3, 10)
    expect(tilt.perRadius_pct).toBeCloseTo(300 / 201, 10)
    expect(tilt.direction_deg).toBeCloseTo(120, 9)
    expect(bowl?.edgeMinusCentre).toBeCloseTo(2, 10)
    expect(bowl?.edgeMinusCentre_pct).toBeCloseTo(200 / 201, 10)
    expect(bowl?.radialEdgeMinusCentre).toBeCloseTo(2, 10)
    expect(saddle?.amplitude).toBeCloseTo(1.5, 10)
    expect(saddle?.axis_deg).toBeCloseTo(30, 9)
  })

  it('edge minus centre counts the rings of degree 6, and those of degree 4 not', () => {
    const values = columnOf(finer, (x, y) => 50 + ((x * x + y * y) / 1e4) ** 3)
    const { bowl } = trendSurface(finer, values, { radius_mm: 100, order: 'zernike-6' })
    expect(bowl?.radialEdgeMinusCentre).toBeCloseTo(1, 10)
    expect(bowl?.edgeMinusCentre).not.toBeCloseTo(1, 1)
  })

  it('values that do not vary have nothing to explain', () => {
    const trend = trendSurface(plan, new Float64Array(49).fill(91.7), { radius_mm: 100, order: 'zernike-4' })
    expect(trend.rSquared).toBe(0)
    expect(trend.adjustedRSquared).toBe(0)
    expect(trend.groups.every(({ share, f }) => share === 0 && f === 0)).toBe(true)
  })

  it('about a mean of zero there are no per cents', () => {
    const trend = trendSurface(
      plan,
      columnOf(plan, (x) => x / 100 - 5),
      { radius_mm: 100, order: 'bowl' },
    )
    expect(trend.tilt.perRadius).toBeCloseTo(1, 12)
    expect(trend.tilt.perRadius_pct).toBeNull()
    expect(trend.bowl?.edgeMinusCentre_pct).toBeNull()
  })
})

describe('laws', () => {
  const orders = fc.constantFrom<TrendOrder>('bowl', 'zernike-2', 'zernike-3', 'zernike-4')
  const wafers = fc.tuple(orders, fc.integer({ min: 1, max: 1e6 }))

  it('the shares of the groups sum to R squared, all to the whole sum of squares', () => {
    fc.assert(
      fc.property(wafers, ([order, seed]) => {
        const sites = spiral(40)
        const values = noisy(columnOf(sites, bumpy), 0.5, seed)
        const trend = trendSurface(sites, values, { radius_mm: 100, order })
        const shares = trend.groups.reduce((sum, { share }) => sum + share, 0)
        expect(Math.abs(shares - trend.rSquared)).toBeLessThan(1e-12)
        const sums = trend.groups.reduce((sum, { sumOfSquares }) => sum + sumOfSquares, trend.residualSumOfSquares)
        expect(Math.abs(sums / trend.totalSumOfSquares - 1)).toBeLessThan(1e-12)
        expect(trend.adjustedRSquared).toBeLessThan(trend.rSquared)
      }),
      { numRuns: 60 },
    )
  })

  it('turning the wafer turns tilt and saddle, and nothing else', () => {
    const values = noisy(
      columnOf(plan, (x, y) => 92 + 0.02 * x - 0.05 * y + 2e-4 * x * y + 1e-4 * y * y),
      0.1,
      7,
    )
    const options = { radius_mm: 100, order: 'zernike-3' } as const
    const before = trendSurface(plan, values, options)
    fc.assert(
      fc.property(fc.double({ min: -180, max: 180, noNaN: true }), (angle_deg) => {
        const after = trendSurface(turned(plan, angle_deg), values, options)
        const turn = (to: number, from: number, period: number) => {
          const error = (((to - from - angle_deg) % period) + period) % period
          return Math.min(error, period - error)
        }
        expect(turn(after.tilt.direction_deg!, before.tilt.direction_deg!, 360)).toBeLessThan(1e-8)
        expect(turn(after.saddle!.axis_deg!, before.saddle!.axis_deg!, 180)).toBeLessThan(1e-8)
        expect(after.tilt.direction_deg).toBeGreaterThanOrEqual(0)
        expect(after.tilt.direction_deg).toBeLessThan(360)
        expect(after.tilt.perRadius).toBeCloseTo(before.tilt.perRadius, 10)
        expect(after.bowl!.edgeMinusCentre).toBeCloseTo(before.bowl!.edgeMinusCentre, 10)
        before.groups.forEach(({ share }, k) => expect(after.groups[k].share).toBeCloseTo(share, 10))
      }),
      { numRuns: 60 },
    )
  })

  it('twice the values: twice the coefficients and errors, the same shares; another radius: the same surface', () => {
    const values = noisy(columnOf(plan, bumpy), 0.2, 3)
    const options = { radius_mm: 100, order: 'zernike-4' } as const
    const [one, two] = [values, values.map((value) => 2 * value)].map((column) => trendSurface(plan, column, options))
    two.terms.forEach((term, k) => {
      expect(term.coefficient).toBeCloseTo(2 * one.terms[k].coefficient, 10)
      expect(term.standardError).toBeCloseTo(2 * one.terms[k].standardError, 10)
    })
    expect(group(two, 'bowl').share).toBeCloseTo(group(one, 'bowl').share, 12)
    const wider = trendSurface(plan, values, { ...options, radius_mm: 150 })
    expect(largestDifference(wider.fitted, one.fitted)).toBeLessThan(1e-10)
    expect(wider.rSquared).toBeCloseTo(one.rSquared, 12)
  })

  it('standard errors are the spread of the coefficients over many wafers', () => {
    const clean = columnOf(plan, (x, y) => 92 + 0.01 * x + 1e-4 * (x * x + y * y))
    const pattern = prepareTrendSurface(plan, { radius_mm: 100, order: 'zernike-2' })
    const fits = Array.from({ length: 400 }, (_, seed) => pattern.fit(noisy(clean, 0.3, seed + 1)))
    fits[0].terms.forEach((_, k) => {
      const coefficients = fits.map((trend) => trend.terms[k].coefficient)
      const mean = coefficients.reduce((a, b) => a + b) / 400
      const spread = Math.sqrt(coefficients.reduce((sum, c) => sum + (c - mean) ** 2, 0) / 399)
      const stated = Math.sqrt(fits.reduce((sum, trend) => sum + trend.terms[k].standardError ** 2, 0) / 400)
      // The standard deviation of 400 is known to 3.5 %; four times that.
      expect(Math.abs(spread / stated - 1)).toBeLessThan(0.14)
    })
  })
})

describe('a second implementation: powers of x and y by normal equations in whole numbers', () => {
  it.each([
    ['plane', 1],
    ['zernike-2', 2],
    ['zernike-3', 3],
  ] as const)('%s', (order, degree) => {
    // Places in eighths of a mm, so that their powers are whole.
    const eighth = (place: number) => Math.round(8 * place) / 8
    const sites = { x_mm: spiral(23).x_mm.map(eighth), y_mm: spiral(23).y_mm.map(eighth) }
    const values = noisy(columnOf(sites, bumpy), 0.3, 11)
    const powers = Array.from({ length: degree + 1 }, (_, n) =>
      Array.from({ length: n + 1 }, (_, k) => [n - k, k]),
    ).flat()
    const columns = powers.map(([p, q]) => columnOf(sites, (x, y) => x ** p * y ** q))
    const exact = exactLeastSquares(columns, values)
    const fitted = columns[0].map((_, i) => columns.reduce((sum, column, k) => sum + exact[k] * column[i], 0))
    expect(largestDifference(trendSurface(sites, values, { radius_mm: 100, order }).fitted, fitted)).toBeLessThan(1e-10)
  })
})

describe('sites that cannot tell', () => {
  it('eight on every circle have no four-fold sine: the next lower order, saying why', () => {
    const eights = ring(8, 50)
    const sites = joined({ x_mm: Float64Array.of(0), y_mm: Float64Array.of(0) }, eights, ring(8, 95))
    const trend = trendSurface(sites, columnOf(sites, bumpy), { radius_mm: 100, order: 'zernike-4' })
    expect(trend.order).toBe('zernike-3')
    expect(trend.requestedOrder).toBe('zernike-4')
    expect(trend.loweredBecause).toContain('four-fold, diagonal')
  })

  it('nor when their places are rounded to hundredths', () => {
    const round = (place: number) => Math.round(100 * place) / 100
    const exact = joined({ x_mm: Float64Array.of(0), y_mm: Float64Array.of(0) }, ring(8, 50), ring(8, 95))
    const sites = { x_mm: exact.x_mm.map(round), y_mm: exact.y_mm.map(round) }
    expect(trendSurface(sites, columnOf(sites, bumpy), { radius_mm: 100, order: 'zernike-4' }).order).toBe('zernike-3')
  })

  it('a single circle has no bowl', () => {
    const trend = trendSurface(
      ring(8, 90),
      columnOf(ring(8, 90), (x) => 92 + x / 50),
      { radius_mm: 100, order: 'bowl' },
    )
    expect(trend.order).toBe('plane')
    expect(trend.loweredBecause).toContain('bowl')
    expect(trend.bowl).toBeNull()
    expect(trend.tilt.perRadius).toBeCloseTo(2, 12)
  })

  it('of a diameter not even a plane: refused', () => {
    const line = { x_mm: Float64Array.of(-90, -45, 0, 45, 90), y_mm: new Float64Array(5) }
    const problem = problemOf(() => trendSurface(line, new Float64Array(5), { radius_mm: 100, order: 'bowl' }))
    expect(problem).toMatchObject({ kind: 'not-applicable', what: 'trend surface' })
  })
})

describe('refusals', () => {
  const options = { radius_mm: 100, order: 'zernike-4' } as const

  it('more terms than sites allow, with both numbers', () => {
    const nine = spiral(9)
    const problem = problemOf(() => trendSurface(nine, new Float64Array(9), options))
    expect(problem).toMatchObject({ kind: 'not-applicable', why: '15 terms need at least 16 sites, and there are 9' })
  })

  it('a site beyond the radius', () => {
    expect(problemOf(() => prepareTrendSurface(plan, { ...options, radius_mm: 90 }))).toMatchObject({
      kind: 'out-of-range',
      max: 90,
    })
    expect(() => prepareTrendSurface(plan, { ...options, radius_mm: 95 })).not.toThrow()
  })

  it.each([
    ['a place that is no number', { x_mm: changed(plan.x_mm, 3, NaN), y_mm: plan.y_mm }],
    ['more x than y', { x_mm: plan.x_mm, y_mm: plan.y_mm.slice(1) }],
  ])('%s', (_, sites) => expect(() => prepareTrendSurface(sites, options)).toThrow(CoreError))

  it.each([0, -1, NaN, Infinity])('radius %s', (radius_mm) => {
    expect(() => prepareTrendSurface(plan, { ...options, radius_mm })).toThrow(CoreError)
  })

  it('a value that is no number, or missing', () => {
    const pattern = prepareTrendSurface(plan, options)
    expect(() => pattern.fit(columnOf(plan, bumpy).fill(NaN, 4, 5))).toThrow(CoreError)
    expect(() => pattern.fit(new Float64Array(48))).toThrow(CoreError)
  })
})

function ring(count: number, radius_mm: number): Targets {
  const angles = Array.from({ length: count }, (_, i) => (2 * Math.PI * i) / count)
  return {
    x_mm: Float64Array.from(angles, (angle) => radius_mm * Math.cos(angle)),
    y_mm: Float64Array.from(angles, (angle) => radius_mm * Math.sin(angle)),
  }
}

function joined(...parts: Targets[]): Targets {
  return {
    x_mm: Float64Array.from(parts.flatMap((part) => [...part.x_mm])),
    y_mm: Float64Array.from(parts.flatMap((part) => [...part.y_mm])),
  }
}
