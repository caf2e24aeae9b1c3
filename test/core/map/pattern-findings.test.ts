import { describe, expect, it } from 'vitest'
import { edgeStep } from '../../../core/map/edge-step'
import { mostOutlyingSite } from '../../../core/map/outlying-site'
import { findPatterns, type PatternKind } from '../../../core/map/pattern-findings'
import { patternWords } from '../../../core/map/pattern-words'
import { trendSurface } from '../../../core/map/trend-surface'
import { concentricPlan } from '../../../core/wafer/site-patterns'
import { noisy } from './noise'
import { columnOf } from './patterns'

const plan = concentricPlan({ circles: 3, outerRadius_mm: 95, startAngle_deg: 90 })
const search = { radius_mm: 100, order: 'zernike-4', ringWidth_mm: 1 } as const
const waferOf = (valueAt: (x: number, y: number) => number, seed = 1, sigma = 0.1) =>
  noisy(columnOf(plan, valueAt), sigma, seed)
const kindsOf = (values: Float64Array): PatternKind[] =>
  findPatterns(plan, values, search).findings.map(({ kind }) => kind)
const rho = (x: number, y: number) => Math.hypot(x, y) / 100
const folds = (count: number) => (x: number, y: number) => 92 + rho(x, y) ** count * Math.cos(count * Math.atan2(y, x))
const isOutermost = (x: number, y: number) => Math.hypot(x, y) > 90

describe('what a wafer shows', () => {
  it.each<[PatternKind, (x: number, y: number) => number]>([
    ['tilt', (x, y) => 92 + 0.006 * x + 0.008 * y],
    ['bowl', (x, y) => 92 - 1.5 * rho(x, y) ** 2],
    ['higher-radial', (x, y) => 92 + 6 * rho(x, y) ** 4 - 6 * rho(x, y) ** 2],
    ['two-fold', folds(2)],
    ['three-fold', folds(3)],
    ['rest', folds(4)],
    ['edge-only', (x, y) => 92 - (isOutermost(x, y) ? 1.5 : 0)],
    ['single-site', (x, y) => 92 + (Math.hypot(x - 30, y) < 12 ? 3 : 0)],
    ['nothing', () => 92],
  ])('%s alone, on ten wafers', (kind, valueAt) => {
    for (let seed = 1; seed <= 10; seed++) expect(kindsOf(waferOf(valueAt, seed))).toEqual([kind])
  })

  it('two at once, the stronger first', () => {
    expect(kindsOf(waferOf((x, y) => 92 + 0.02 * x - 3 * rho(x, y) ** 2))).toEqual(['tilt', 'bowl'])
    expect(kindsOf(waferOf((x, y) => 92 + 0.007 * x - 3 * rho(x, y) ** 2))).toEqual(['bowl'])
  })

  it('noise speaks on about a hundredth of wafers a test, and no more', () => {
    const spoken = Array.from({ length: 300 }, (_, seed) => kindsOf(waferOf(() => 92, seed + 100))).filter(
      ([kind]) => kind !== 'nothing',
    )
    // Eight tests at 1 % would be 24; those that also explain a fifth of the variance are fewer.
    expect(spoken.length).toBeLessThan(24)
  })

  it('an outlying site does not make a pattern of the rest', () => {
    const { findings, trend } = findPatterns(
      plan,
      waferOf(() => 92).map((v, i) => (i === 40 ? v + 5 : v)),
      search,
    )
    expect(findings).toHaveLength(1)
    expect(findings[0]).toMatchObject({ kind: 'single-site', site: 40 })
    expect(findings[0].amount).toBeCloseTo(5, 0)
    expect(trend.fitted).toHaveLength(48)
  })

  it('few sites take the order that they allow', () => {
    const five = { x_mm: Float64Array.of(0, 90, 0, -90, 0), y_mm: Float64Array.of(0, 0, 90, 0, -90) }
    expect(findPatterns(five, Float64Array.of(92, 93, 92, 91, 92), search).trend.order).toBe('bowl')
    expect(findPatterns(five, Float64Array.of(92, 92, 92, 92, 92), search).findings[0].kind).toBe('nothing')
  })
})

describe('a step at the edge', () => {
  it('has its size, and makes the bowl needless', () => {
    const values = waferOf((x, y) => 92 - (isOutermost(x, y) ? 1.5 : 0))
    const edge = edgeStep(plan, values, search)!
    expect(edge.step).toBeCloseTo(-1.5, 1)
    expect(edge.f).toBeGreaterThan(100)
    expect(edge.fBeyondBowl).toBeGreaterThan(20)
    expect(edge.fOfBowlBeyond).toBeLessThan(7)
    expect(edge.degreesOfFreedom).toBe(44)
  })

  it('F of each is what leaving it out costs', () => {
    const values = waferOf((x, y) => 92 - rho(x, y) ** 3)
    const edge = edgeStep(plan, values, search)!
    const left = (extra: Float64Array[]) =>
      residualsOf([columnOf(plan, () => 1), plan.x_mm, plan.y_mm, ...extra], values)
    const bowl = columnOf(plan, (x, y) => rho(x, y) ** 2)
    const step = columnOf(plan, (x, y) => (isOutermost(x, y) ? 1 : 0))
    const whole = left([bowl, step])
    expect(edge.fBeyondBowl).toBeCloseTo(((left([bowl]) - whole) * 44) / whole, 6)
    expect(edge.fOfBowlBeyond).toBeCloseTo(((left([step]) - whole) * 44) / whole, 6)
    expect(edge.f).toBeCloseTo(((left([]) - left([step])) * 44) / whole, 6)
  })

  it('cannot be told from a bowl by a centre and one circle', () => {
    const one = concentricPlan({ circles: 1, outerRadius_mm: 95 })
    expect(
      edgeStep(
        one,
        columnOf(one, (x) => x),
        search,
      ),
    ).toBeNull()
    expect(
      edgeStep(
        plan,
        columnOf(plan, () => 92),
        search,
      ),
    ).toBeNull()
  })
})

describe('an outlying site', () => {
  it('is the one without which the fit is best; its deviation is from the surface without it', () => {
    const values = waferOf((x, y) => 92 + 0.01 * x + rho(x, y) ** 2).map((value, i) => (i === 12 ? value + 1 : value))
    const outlying = mostOutlyingSite(trendSurface(plan, values, { radius_mm: 100, order: 'zernike-2' }))!
    const drop = (column: Float64Array, i: number) => column.filter((_, k) => k !== i)
    const fits = Array.from({ length: 49 }, (_, i) =>
      trendSurface({ x_mm: drop(plan.x_mm, i), y_mm: drop(plan.y_mm, i) }, drop(values, i), {
        radius_mm: 100,
        order: 'zernike-2',
      }),
    )
    const best = fits.reduce(
      (least, fit, i) => (fit.residualSumOfSquares < fits[least].residualSumOfSquares ? i : least),
      0,
    )
    expect(outlying.site).toBe(best)
    expect(best).toBe(12)
    const there = { x_mm: plan.x_mm.slice(12, 13), y_mm: plan.y_mm.slice(12, 13) }
    expect(outlying.deviation).toBeCloseTo(values[12] - fits[12].evaluate(there)[0], 10)
    expect(outlying.pValue).toBeLessThan(1e-6)
  })

  it('is not sought where nothing is left to judge by', () => {
    const five = { x_mm: Float64Array.of(0, 90, 0, -90, 0), y_mm: Float64Array.of(0, 0, 90, 0, -90) }
    const values = Float64Array.of(95, 92, 92.1, 92, 91.9)
    expect(mostOutlyingSite(trendSurface(five, values, { radius_mm: 100, order: 'bowl' }))).toBeNull()
  })
})

describe('the words', () => {
  const wordsOf = (values: Float64Array) => patternWords(findPatterns(plan, values, search), 'Ω/sq')

  it('say how much, which way, and where to look', () => {
    const [tilt] = wordsOf(waferOf((x, y) => 92 + 0.006 * x + 0.008 * y, 1, 0.001))
    expect(tilt.sentence).toMatch(
      /^It rises evenly across, by 1\.09 % of the mean from the centre to the edge, towards 53° \(\d+ % of the variance\)\.$/,
    )
    const [dome] = wordsOf(waferOf((x, y) => 92 - 1.84 * rho(x, y) ** 2, 1, 0.001))
    expect(dome.sentence).toMatch(/^The edge lies 2\.0\d % of the mean below the centre/)
    const [edge] = wordsOf(waferOf((x, y) => 92 + (isOutermost(x, y) ? 1.5 : 0)))
    expect(edge.sentence).toContain('above the rest')
    expect(edge.mayPointTo).toContain('edge exclusion')
  })

  it('never claim more than "may"; nothing points nowhere', () => {
    const shapes = [folds(2), folds(3), folds(4), () => 92, (x: number) => 92 + x / 50]
    for (const words of shapes.flatMap((shape) => wordsOf(waferOf(shape)))) {
      if (words.kind === 'nothing') expect(words.mayPointTo).toBeNull()
      else expect(words.mayPointTo).toMatch(/^May point to /)
      expect(words.sentence).toMatch(/\.$/)
    }
    expect(wordsOf(waferOf(() => 92))[0].sentence).toBe(
      'No pattern stands out of the noise: none explains more than 20 % of the variance at 1 % significance.',
    )
  })

  it('give amounts in the unit where the mean is not above zero', () => {
    const [tilt] = wordsOf(waferOf((x, y) => x / 50 - 1e-6 * y - 1, 1, 1e-6))
    expect(tilt.sentence).toContain('by 2.000 Ω/sq from')
    expect(tilt.sentence).toContain('towards 0°')
  })
})

/** By making each column orthogonal to those before it, twice over. */
function residualsOf(columns: readonly Float64Array[], values: Float64Array): number {
  const dot = (a: Float64Array, b: Float64Array) => a.reduce((sum, entry, i) => sum + entry * b[i], 0)
  const basis: Float64Array[] = []
  const cleared = (column: Float64Array) =>
    [...basis, ...basis].reduce((left, unit) => {
      const along = dot(left, unit)
      return left.map((entry, i) => entry - along * unit[i])
    }, column)
  for (const column of columns) {
    const own = cleared(column)
    basis.push(own.map((entry) => entry / Math.sqrt(dot(own, own))))
  }
  const left = cleared(values)
  return dot(left, left)
}
