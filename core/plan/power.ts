/**
 * What a site plan can see: the power of the F test of one shape against the spread of single sites, and the smallest
 * effect that it finds as surely as wanted.
 *
 * Values y_i = mean + delta s(x_i) + e_i, e of standard deviation sigma: the test of delta has 1 and n - 2 degrees of
 * freedom and the noncentrality delta^2 sum (s_i - s mean)^2 / sigma^2. Of a shape that may be turned or may lie anywhere
 * the least of these sums counts: what a plan sees in its worst direction. The test is of that one shape, the most that
 * these sites could tell; the search for patterns of a report asks for more.
 *
 * Source: H. Scheffe, The Analysis of Variance (1959), 2.8 and appendix IV (power of the F test; from memory).
 */
import { findRoot } from '../numeric/find-root'
import { powerOfF } from '../numeric/noncentral-f'
import { requireRange } from '../problems/problem'
import type { SitePlan } from '../wafer/site-patterns'
import { EFFECTS, type EffectId, type Shape } from './effects'

export const POWER_SOURCE = 'H. Scheffe, The Analysis of Variance (1959), 2.8 (power of the F test)'

export interface PlanQuestion {
  readonly plan: SitePlan
  /** Of the area that counts. */
  readonly usableRadius_mm: number
  readonly effect: EffectId
  /** Of a single site, relative [-]. */
  readonly repeatability: number
  /** Chance of seeing the effect where there is none. */
  readonly alpha: number
}

type Asked = Pick<PlanQuestion, 'plan' | 'usableRadius_mm' | 'effect'>

/** Least sum of squares of the shape about its mean over the sites, of all its directions or places. */
function shapeSquares(asked: Asked): number {
  const { family, shapes } = EFFECTS[asked.effect]
  const columns = shapes.map((shape) => centred(valuesAt(asked, shape)))
  if (family === 'placed') return columns.reduce((least, column) => Math.min(least, dot(column, column)), Infinity)
  const [a, b] = columns
  if (!b) return dot(a, a)
  const half = (dot(a, a) + dot(b, b)) / 2
  // The smaller eigenvalue of the two shapes' products.
  return Math.max(0, half - Math.hypot((dot(a, a) - dot(b, b)) / 2, dot(a, b)))
}

function valuesAt({ plan, usableRadius_mm }: Asked, shape: Shape): Float64Array {
  return plan.x_mm.map((x, i) => shape(x / usableRadius_mm, plan.y_mm[i] / usableRadius_mm))
}

function centred(values: Float64Array): Float64Array {
  const mean = meanOf(values)
  return values.map((value) => value - mean)
}

function dot(a: Float64Array, b: Float64Array): number {
  return a.reduce((sum, value, i) => sum + value * b[i], 0)
}

function meanOf(values: Float64Array): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length
}

/**
 * @param size  of the effect, relative, as its words say
 * @returns 0 to 1; alpha where the plan doesn't meet the shape at all, NaN with fewer than three sites
 * @throws CoreError out-of-range for repeatability or alpha
 */
export function detectionPower(question: PlanQuestion, size: number): number {
  const { plan, repeatability, alpha } = question
  requireRange('repeatability', repeatability, '', 1e-9, 10)
  requireRange('alpha', alpha, '', 1e-6, 0.5)
  if (plan.count < 3) return NaN
  const lambda = (size * size * shapeSquares(question)) / repeatability ** 2
  return lambda > 9e4 ? 1 : powerOfF({ numerator: 1, denominator: plan.count - 2, lambda, alpha })
}

/** A sum of squares a site below this is rounding. */
const BLIND = 1e-12

/** The size that is seen with this power; Infinity where the plan doesn't meet the shape, NaN with fewer than three sites. */
export function smallestDetectable(question: PlanQuestion, power: number): number {
  const { plan, alpha, repeatability } = question
  requireRange('power', power, '', 0.05, 0.9999)
  if (plan.count < 3) return NaN
  // So often it is "seen" where it isn't.
  if (power <= alpha) return 0
  const squares = shapeSquares(question)
  if (!(squares > BLIND * plan.count)) return Infinity
  const missing = (lambda: number): number => powerOfF({ numerator: 1, denominator: plan.count - 2, lambda, alpha }) - power
  let high = 10
  while (missing(high) < 0 && high < 5e4) high *= 2
  const lambda = findRoot({ f: missing, low: 0, high, tolerance: 1e-9 * high })
  return repeatability * Math.sqrt(lambda / squares)
} // prettier-ignore

/**
 * By how much the plain mean of the sites is off the mean over the usable area, over the size of the effect: in the worst
 * direction or place.
 */
export function meanBias(asked: Asked): number {
  const { family, shapes } = EFFECTS[asked.effect]
  const biases = shapes.map((shape) => meanOf(valuesAt(asked, shape)) - areaMean(shape))
  const largest = biases.reduce((most, bias) => (Math.abs(bias) > Math.abs(most) ? bias : most), 0)
  const worst = family === 'turned' && biases.length > 1 ? Math.hypot(...biases) : largest
  // What the sums leave over is no bias.
  return Math.abs(worst) < 1e-9 ? 0 : worst
}

const RADII = 100
const ANGLES = 90

/** Midpoints of cells of equal area. */
const areaMeans = new WeakMap<Shape, number>()

function areaMean(shape: Shape): number {
  const known = areaMeans.get(shape)
  if (known !== undefined) return known
  let sum = 0
  for (let i = 0; i < RADII; i++) {
    const radius = Math.sqrt((i + 0.5) / RADII)
    for (let j = 0; j < ANGLES; j++) {
      const angle = (2 * Math.PI * (j + 0.5)) / ANGLES
      sum += shape(radius * Math.cos(angle), radius * Math.sin(angle))
    }
  }
  areaMeans.set(shape, sum / (RADII * ANGLES))
  return sum / (RADII * ANGLES)
}
