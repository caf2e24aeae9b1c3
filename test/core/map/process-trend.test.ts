import { Matrix, determinant, inverse } from 'ml-matrix'
import { describe, expect, it } from 'vitest'
import { fillTrend, matern52, trendTerms, type TrendDegree } from '../../../core/map/gaussian-process'
import { processFitter } from '../../../core/map/process-surface'
import { trendDegreeFor } from '../../../core/map/process-trend'
import { seededRandom } from '../../../core/numeric/random'
import { concentricPlan } from '../../../core/wafer/site-patterns'

const RADIUS_MM = 95
type Places = readonly (readonly [number, number])[]

const ring = (count: number, radius_mm: number): Places =>
  Array.from({ length: count }, (_, i) => {
    const angle = 0.1 + (2 * Math.PI * i) / count
    return [radius_mm * Math.cos(angle), radius_mm * Math.sin(angle)] as const
  })
const line = (count: number, angle: number, offset_mm = 0): Places =>
  Array.from({ length: count }, (_, i) => {
    const along_mm = -90 + (180 * i) / (count - 1)
    return [
      along_mm * Math.cos(angle) - offset_mm * Math.sin(angle),
      along_mm * Math.sin(angle) + offset_mm * Math.cos(angle),
    ] as const
  })
const columns = (places: Places) => ({
  x_mm: Float64Array.from(places, ([x]) => x),
  y_mm: Float64Array.from(places, ([, y]) => y),
})
const lattice = (from: number, step: number): Places =>
  Array.from({ length: 25 }, (_, i) => [from + step * (i % 5), from + step * Math.floor(i / 5)] as const)

const degreeOf = (places: Places, scale = 1 / RADIUS_MM): TrendDegree => {
  const { x_mm, y_mm } = columns(places)
  return trendDegreeFor({ x: x_mm.map((x) => x * scale), y: y_mm.map((y) => y * scale), count: places.length })
}

/** Sites that tell a plane and no second order: one circle, with its centre too, two lines crossed or side by side. */
const FLAT: readonly (readonly [string, Places])[] = [
  ['one circle', ring(24, 90)],
  ['one circle and its centre', [...ring(24, 90), [0, 0]]],
  ['two lines crossed', [...line(21, 0), ...line(20, Math.PI / 2)]],
  ['two lines crossed and turned', [...line(21, 0.4), ...line(20, 0.4 + Math.PI / 2)]],
  ['two lines side by side', [...line(12, 0, 20), ...line(12, 0, -20)]],
  ['two lines side by side and turned', [...line(12, 0.4, 20), ...line(12, 0.4, -20)]],
]

describe('the degree that the sites can tell', () => {
  it.each(FLAT)('a plane: %s', (_, places) => expect(degreeOf(places)).toBe(1))

  it('the second order on circles and lattices, wherever they lie and in whatever unit', () => {
    expect(degreeOf([...ring(12, 90), ...ring(12, 45)])).toBe(2)
    for (const places of [lattice(-60, 30), lattice(20, 10), lattice(70, 1)]) {
      for (const scale of [1 / RADIUS_MM, 1, 1000]) expect(degreeOf(places, scale)).toBe(2)
    }
  })

  it('the mean alone where one site tells of everything off a line, or where there are few', () => {
    expect(degreeOf([...line(20, 0), [0, 60]])).toBe(0)
    expect(degreeOf([...line(20, 0), [0, 1]])).toBe(0)
    expect(degreeOf(ring(8, 90))).toBe(0)
  })
})

describe('a surface through sites that tell no second order', () => {
  const truth = (x_mm: number, y_mm: number): number =>
    90 + 2 * Math.sin((2.2 * x_mm) / RADIUS_MM) * Math.cos((1.7 * y_mm) / RADIUS_MM) + x_mm / RADIUS_MM
  const between = columns([[0, 0], [30, 10], [60, -40], [20, 50]]) // prettier-ignore

  it.each([...FLAT, ['a line and one site', [...line(20, 0), [0, 60]]] as const])('is near the truth: %s', (_, places) => {
    const random = seededRandom(5)
    const { x_mm, y_mm } = columns(places)
    const values = x_mm.map((x, i) => truth(x, y_mm[i]) + 0.05 * random.normal())
    const surface = processFitter()(x_mm, y_mm, values, new Float64Array(x_mm.length).fill(0.05))!
    const at = { value: new Float64Array(4), standardError: new Float64Array(4) }
    surface.at(between, at)
    at.value.forEach((value, t) => {
      expect(at.standardError[t]).toBeLessThan(2)
      expect(Math.abs(value - truth(between.x_mm[t], between.y_mm[t]))).toBeLessThan(4 * at.standardError[t] + 0.05)
    })
    // NaN where the others can't tell of a site.
    for (const z of surface.leaveOneOut().standardised) expect(Math.abs(z)).toBeLessThan(4)
  })
}) // prettier-ignore

/** -2 ln of the restricted likelihood up to a constant, by determinants and a dense inverse. */
function densely(x: Float64Array, y: Float64Array, values: Float64Array, degree: TrendDegree) {
  const trend = new Matrix(
    Array.from(x, (_, i) => {
      const row = new Float64Array(trendTerms(degree))
      fillTrend(degree, x[i], y[i], row, 0)
      return [...row]
    }),
  )
  const measured = Matrix.columnVector([...values])
  return (length: number, noiseRatio: number): number => {
    const k = new Matrix(
      Array.from(x, (_, i) =>
        Array.from(x, (_, j) => matern52(Math.hypot(x[i] - x[j], y[i] - y[j]) / length) + (i === j ? noiseRatio : 0)),
      ),
    )
    const inverted = inverse(k)
    const told = trend.transpose().mmul(inverted).mmul(trend)
    const beta = inverse(told).mmul(trend.transpose()).mmul(inverted).mmul(measured)
    const left = Matrix.sub(measured, trend.mmul(beta))
    const free = x.length - trendTerms(degree)
    const amplitude = left.transpose().mmul(inverted).mmul(left).get(0, 0) / free
    return free * Math.log(amplitude) + Math.log(determinant(k)) + Math.log(determinant(told))
  }
}

describe('the largest restricted likelihood', () => {
  const plan = concentricPlan({ circles: 2, outerRadius_mm: RADIUS_MM })
  const x = plan.x_mm.map((place) => place / RADIUS_MM)
  const y = plan.y_mm.map((place) => place / RADIUS_MM)

  it.each([[1, 0.5], [2, 0.5], [3, 0.2], [4, 0.2]])('is found, to what no interval would tell: seed %d, noise %d', (seed, noise) => {
    const random = seededRandom(seed)
    const values = x.map((place, i) => 90 + 2 * Math.sin(4 * place) * Math.cos(3 * y[i]) + noise * random.normal())
    const surface = processFitter()(plan.x_mm, plan.y_mm, values, new Float64Array(plan.count))!
    const devianceAt = densely(x, y, values, surface.degree)
    const found = devianceAt(surface.lengthScale_mm / RADIUS_MM, (surface.nugget / surface.standardDeviation) ** 2)
    expect(surface.deviance).toBeCloseTo(found, 4)
    let least = Infinity
    for (let length = 0.12; length < 3.4; length *= 1.12) {
      for (let ratio = 1e-6; ratio < 6; ratio *= 1.8) least = Math.min(least, devianceAt(length, ratio))
    }
    // 3.84 more would lie at the end of a 95 % interval.
    expect(found - least).toBeLessThan(0.4)
  })
}) // prettier-ignore
