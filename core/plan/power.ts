/**
 * What a site plan can see: the power of the F test of one shape against the spread of single sites, and the smallest
 * effect that it finds as surely as wanted.
 *
 * Values y_i = mean + delta s(x_i) + e_i, e of standard deviation sigma: the test of delta has 1 and n - 2 degrees of
 * freedom and the noncentrality delta^2 sum (s_i - s mean)^2 / sigma^2.
 *
 * Source: H. Scheffe, The Analysis of Variance (1959), 2.8 and appendix IV (power of the F test; from memory).
 */
import { findRoot } from '../numeric/find-root'
import { powerOfF } from '../numeric/noncentral-f'
import { requireRange } from '../problems/problem'
import type { SitePlan } from '../wafer/site-patterns'
import { EFFECTS, type EffectId } from './effects'

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

/** Sum of squares of the shape about its mean over the sites. */
function shapeSquares({ plan, usableRadius_mm, effect }: PlanQuestion): number {
  const { shape } = EFFECTS[effect]
  const values = plan.x_mm.map((x, i) => shape(x / usableRadius_mm, plan.y_mm[i] / usableRadius_mm))
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length
  return values.reduce((sum, value) => sum + (value - mean) ** 2, 0)
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

/** The size that is seen with this power; Infinity where the plan doesn't meet the shape, NaN with fewer than three sites. */
export function smallestDetectable(question: PlanQuestion, power: number): number {
  const { plan, alpha, repeatability } = question
  requireRange('power', power, '', 0.05, 0.9999)
  if (plan.count < 3) return NaN
  const squares = shapeSquares(question)
  if (!(squares > 1e-12)) return Infinity
  const missing = (lambda: number): number => powerOfF({ numerator: 1, denominator: plan.count - 2, lambda, alpha }) - power
  let high = 10
  while (missing(high) < 0 && high < 5e4) high *= 2
  const lambda = findRoot({ f: missing, low: 0, high, tolerance: 1e-9 * high })
  return repeatability * Math.sqrt(lambda / squares)
} // prettier-ignore

/** By how much the plain mean of the sites is off the mean over the usable area, over the size of the effect. */
export function meanBias({ plan, usableRadius_mm, effect }: Pick<PlanQuestion, 'plan' | 'usableRadius_mm' | 'effect'>): number {
  const { shape } = EFFECTS[effect]
  let sites = 0
  for (let i = 0; i < plan.count; i++) sites += shape(plan.x_mm[i] / usableRadius_mm, plan.y_mm[i] / usableRadius_mm)
  return sites / plan.count - areaMean(shape)
} // prettier-ignore

const RADII = 400
const ANGLES = 360

/** Midpoints of cells of equal area. */
function areaMean(shape: (x: number, y: number) => number): number {
  let sum = 0
  for (let i = 0; i < RADII; i++) {
    const radius = Math.sqrt((i + 0.5) / RADII)
    for (let j = 0; j < ANGLES; j++) {
      const angle = (2 * Math.PI * (j + 0.5)) / ANGLES
      sum += shape(radius * Math.cos(angle), radius * Math.sin(angle))
    }
  }
  return sum / (RADII * ANGLES)
}
