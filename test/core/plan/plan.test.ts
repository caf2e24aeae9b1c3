import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { fQuantile } from '../../../core/numeric/distributions'
import { noncentralFProbability, powerOfF } from '../../../core/numeric/noncentral-f'
import { normalProbability, normalQuantile } from '../../../core/numeric/normal'
import { seededRandom } from '../../../core/numeric/random'
import { assess, candidatePlans, recommended } from '../../../core/plan/candidates'
import { EFFECT_IDS, EFFECTS } from '../../../core/plan/effects'
import { detectionPower, meanBias, smallestDetectable } from '../../../core/plan/power'
import { diePlan, equalAreaPlan, onWafer, polarPlan } from '../../../core/wafer/area-plans'
import { usableDies } from '../../../core/wafer/die-grid'
import { concentricPlan } from '../../../core/wafer/site-patterns'

const OUTLINE = { shape: 'disc', diameter_mm: 200, fiducial: 'notch' } as const

describe('the noncentral F distribution', () => {
  it('is the central one without an effect', () => {
    for (const [f, a, b] of [[0.5, 1, 10], [3, 4, 20], [10, 2, 5]] as const) {
      const p = noncentralFProbability(f, a, b, 0)
      expect(fQuantile(p, a, b)).toBeCloseTo(f, 8)
    }
  })

  it('gives the power of the two-sample t test: 64 a group find half a standard deviation in 80 % (J. Cohen, Statistical Power Analysis, 1988, table 2.4.1, from memory)', () => {
    expect(powerOfF({ numerator: 1, denominator: 126, lambda: (64 * 0.25) / 2, alpha: 0.05 })).toBeCloseTo(0.8, 2)
    expect(powerOfF({ numerator: 1, denominator: 50, lambda: (26 * 0.64) / 2, alpha: 0.05 })).toBeCloseTo(0.81, 2)
  })

  it('is the normal power for many degrees of freedom', () => {
    for (const lambda of [1, 4, 10.5, 30]) {
      const z = normalQuantile(0.975)
      const expected = normalProbability(Math.sqrt(lambda) - z) + normalProbability(-Math.sqrt(lambda) - z)
      expect(powerOfF({ numerator: 1, denominator: 1e7, lambda, alpha: 0.05 })).toBeCloseTo(expected, 5)
    }
  })

  it('is that of a seeded simulation', () => {
    const random = seededRandom(12)
    const [a, b, lambda] = [3, 12, 7]
    const draws = Array.from({ length: 40_000 }, () => {
      let above = (random.normal() + Math.sqrt(lambda)) ** 2
      for (let k = 1; k < a; k++) above += random.normal() ** 2
      let below = 0
      for (let k = 0; k < b; k++) below += random.normal() ** 2
      return above / a / (below / b)
    })
    for (const f of [1, 3, 6]) {
      const share = draws.filter((draw) => draw <= f).length / draws.length
      expect(Math.abs(share - noncentralFProbability(f, a, b, lambda))).toBeLessThan(0.009)
    }
  })
}) // prettier-ignore

describe('the equal-area plan', () => {
  it('gives every site as much area: its ring holds 8 k of N parts, halved by its circle', () => {
    for (const circles of [1, 2, 3, 5]) {
      const plan = equalAreaPlan({ circles, usableRadius_mm: 95 })
      const n = 1 + 4 * circles * (circles + 1)
      expect(plan.count).toBe(n)
      const radii = [...new Set(plan.x_mm.map((x, i) => Number(Math.hypot(x, plan.y_mm[i]).toFixed(9))))].sort((x, y) => x - y)
      let inner = 95 / Math.sqrt(n)
      radii.slice(1).forEach((radius, k) => {
        const outer = Math.sqrt(inner ** 2 + (8 * (k + 1) * 95 ** 2) / n)
        expect(radius ** 2).toBeCloseTo((inner ** 2 + outer ** 2) / 2, 6)
        inner = outer
      })
      expect(inner).toBeCloseTo(95, 9)
    }
  })

  it('has the area’s mean of a bowl as its plain mean, which the concentric plan misses', () => {
    for (const circles of [2, 3, 6]) {
      const bias = (plan: { count: number; x_mm: Float64Array; y_mm: Float64Array }) => meanBias({ plan, usableRadius_mm: 95, effect: 'bowl' })
      // All but the centre, which stands at 0 for a disc whose mean is half of its edge's: 1/(2 N^2).
      const n = 1 + 4 * circles * (circles + 1)
      expect(bias(equalAreaPlan({ circles, usableRadius_mm: 95 }))).toBeCloseTo(-1 / (2 * n * n), 5)
      expect(bias(concentricPlan({ circles, outerRadius_mm: 95 }))).toBeGreaterThan(0.03)
    }
  })
}) // prettier-ignore

describe('a plan of die centres', () => {
  const dies = usableDies({ outline: OUTLINE, edgeExclusion_mm: 5 }, { pitchX_mm: 10, pitchY_mm: 8, offsetX_mm: 0, offsetY_mm: 0 })

  it('takes the middle first, then spreads, and all where all are wanted', () => {
    const plan = diePlan(dies, 13)
    expect(plan.count).toBe(13)
    expect(Math.hypot(plan.x_mm[0], plan.y_mm[0])).toBeLessThan(7)
    const nearest = (count: number): number => {
      const { x_mm, y_mm } = diePlan(dies, count)
      let least = Infinity
      for (let i = 0; i < count; i++) for (let j = 0; j < i; j++) least = Math.min(least, Math.hypot(x_mm[i] - x_mm[j], y_mm[i] - y_mm[j]))
      return least
    }
    // 13 sites over 95 mm: an even spread keeps some 45 mm; a crowd would not.
    expect(nearest(13)).toBeGreaterThan(35)
    expect(new Set(diePlan(dies, 1e6).dieX.map((x, i) => 1000 * x + diePlan(dies, 1e6).dieY[i])).size).toBe(dies.count)
  })

  it('leaves out what stands off the wafer, and says how many', () => {
    const { plan, leftOut } = onWafer(polarPlan({ rings: [{ sites: 8, radius_mm: 90 }, { sites: 8, radius_mm: 99.5 }] }), OUTLINE, 1.5)
    expect([plan.count, leftOut]).toEqual([9, 8])
  })
}) // prettier-ignore

describe('what a plan can see', () => {
  const plan = concentricPlan({ circles: 3, outerRadius_mm: 95 })
  const question = (effect: (typeof EFFECT_IDS)[number], repeatability = 0.002) => ({ plan, usableRadius_mm: 95, effect, repeatability, alpha: 0.05 })

  /** Found by trying: every direction by the half degree, or every place. */
  function worstShape(effect: (typeof EFFECT_IDS)[number]): Float64Array {
    const { family, shapes } = EFFECTS[effect]
    const columns = shapes.map((shape) => plan.x_mm.map((x, i) => shape(x / 95, plan.y_mm[i] / 95)))
    const turned = (degrees: number): Float64Array => {
      const a = (degrees * Math.PI) / 180
      return columns[0].map((value, i) => Math.cos(a) * value + (columns[1] ? Math.sin(a) * columns[1][i] : 0))
    }
    const tried = family === 'placed' ? columns : columns[1] ? Array.from({ length: 360 }, (_, k) => turned(k / 2)) : columns
    const squares = (column: Float64Array): number => {
      const mean = column.reduce((sum, value) => sum + value, 0) / column.length
      return column.reduce((sum, value) => sum + (value - mean) ** 2, 0)
    }
    return tried.reduce((worst, column) => (squares(column) < squares(worst) ? column : worst))
  }

  it.each(EFFECT_IDS)('%s: the power is that of a seeded simulation of the test itself', (effect) => {
    const size = smallestDetectable(question(effect), 0.7)
    const random = seededRandom(9)
    const shape = worstShape(effect)
    const mean = shape.reduce((sum, value) => sum + value, 0) / plan.count
    const squares = shape.reduce((sum, value) => sum + (value - mean) ** 2, 0)
    const critical = fQuantile(0.95, 1, plan.count - 2)
    let found = 0
    for (let trial = 0; trial < 1500; trial++) {
      const y = shape.map((value) => 1 + size * value + 0.002 * random.normal())
      const level = y.reduce((sum, value) => sum + value, 0) / plan.count
      const slope = y.reduce((sum, value, i) => sum + (value - level) * (shape[i] - mean), 0) / squares
      const left = y.reduce((sum, value, i) => sum + (value - level - slope * (shape[i] - mean)) ** 2, 0)
      if ((slope * slope * squares) / (left / (plan.count - 2)) > critical) found++
    }
    expect(Math.abs(found / 1500 - 0.7)).toBeLessThan(0.04)
  })

  it('grows with the effect, falls with the noise, and the smallest detectable is just found', () => {
    fc.assert(
      fc.property(fc.constantFrom(...EFFECT_IDS), fc.double({ min: 0.0005, max: 0.02, noNaN: true }), fc.double({ min: 0.2, max: 0.99, noNaN: true }), (effect, repeatability, power) => {
        const smallest = smallestDetectable(question(effect, repeatability), power)
        expect(detectionPower(question(effect, repeatability), smallest)).toBeCloseTo(power, 6)
        expect(detectionPower(question(effect, repeatability), 1.2 * smallest)).toBeGreaterThan(power)
        expect(detectionPower(question(effect, 1.2 * repeatability), smallest)).toBeLessThan(power)
      }),
      { numRuns: 40, seed: 2 },
    )
  })

  it('sees no tilt across a diameter that lies along its contour, and nothing with two sites', () => {
    const line = { count: 5, x_mm: new Float64Array(5), y_mm: Float64Array.of(-90, -45, 0, 45, 90) }
    expect(smallestDetectable({ ...question('tilt'), plan: line }, 0.9)).toBe(Infinity)
    expect(detectionPower({ ...question('tilt'), plan: line }, 0.5)).toBeCloseTo(0.05, 9)
    expect(detectionPower({ ...question('tilt'), plan: { count: 2, x_mm: line.x_mm.slice(0, 2), y_mm: line.y_mm.slice(0, 2) } }, 1)).toBeNaN()
  })

  it('counts the worst direction: a diameter is blind to a tilt across it, four sites on the axes to a pattern between them', () => {
    const along = { count: 25, x_mm: Float64Array.from({ length: 25 }, (_, k) => -84 + 7 * k), y_mm: new Float64Array(25) }
    expect(smallestDetectable({ ...question('tilt'), plan: along }, 0.9)).toBe(Infinity)
    const cross = polarPlan({ rings: [{ sites: 4, radius_mm: 47 }, { sites: 4, radius_mm: 95 }] })
    expect(smallestDetectable({ ...question('two-fold'), plan: cross }, 0.9)).toBe(Infinity)
    expect(smallestDetectable({ ...question('tilt'), plan: cross }, 0.9)).toBeLessThan(0.02)
    // A spot that lies between the sites of so coarse a plan is not seen.
    expect(smallestDetectable({ ...question('spot'), plan: cross }, 0.9)).toBeGreaterThan(1)
  })

  it('sees nothing more surely than by chance: a power no greater than the false alarms needs no effect', () => {
    expect(smallestDetectable({ ...question('edge'), alpha: 0.2 }, 0.1)).toBe(0)
    expect(meanBias({ plan, usableRadius_mm: 95, effect: 'tilt' })).toBe(0)
  })

  it('recommends the smallest of the usual plans that is enough', () => {
    const need = { effect: 'edge', size: 0.01, repeatability: 0.002, power: 0.9, alpha: 0.05 } as const
    const assessed = assess(candidatePlans(95, OUTLINE, 5), 95, need)
    const best = recommended(assessed)!
    expect(best.detection).toBeGreaterThanOrEqual(0.9)
    for (const { plan: other, isEnough } of assessed) if (other.count < best.plan.count) expect(isEnough).toBe(false)
    expect(recommended(assess(candidatePlans(95, OUTLINE, 5), 95, { ...need, size: 1e-5 }))).toBeNull()
    expect(assessed.map(({ plan: { count } }) => count)).toEqual([...assessed.map(({ plan: { count } }) => count)].sort((a, b) => a - b))
  })
}) // prettier-ignore
