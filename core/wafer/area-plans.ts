/** Site plans by area and by die, beside those of SEMI MF1618: every site stands for as much of the wafer as any other. */
import { CoreError, requireRange } from '../problems/problem'
import type { Outline } from './outline'
import type { SitePlan } from './site-patterns'
import { isUsable, type Dies } from './die-grid'

/**
 * The centre and K rings of 8 k sites, each site in the middle of its own N-th of the usable area, N = 1 + 4 K (K + 1).
 *
 * Rings of equal areas a site end at R (2 k + 1)/(2 K + 1); the circle that halves a ring's area has the radius
 *
 *   r_k = R root(4 k^2 + 1) / (2 K + 1)
 *
 * so that, other than in the concentric plan of SEMI MF1618, the outermost sites stand for no less than the others and
 * the plain mean is the mean over the area for anything that grows with r^2 (but for the centre itself: 1/(2 N^2)).
 *
 * @param usableRadius_mm  of the area that counts: the wafer's less the edge exclusion
 * @param circles          1 to 200
 * @throws CoreError out-of-range
 */
export function equalAreaPlan({ circles, usableRadius_mm, startAngle_deg = 0 }: { readonly circles: number; readonly usableRadius_mm: number; readonly startAngle_deg?: number }): SitePlan {
  requireRange('circles', circles, '', 1, 200)
  if (!Number.isInteger(circles)) throw new CoreError({ kind: 'not-applicable', what: 'plan of equal areas', why: `${circles} is no whole number of rings` })
  requireRange('usable radius', usableRadius_mm, 'mm', 1e-3, 1e4)
  const rings = Array.from({ length: circles }, (_, k) => {
    const circle = k + 1
    return { sites: 8 * circle, radius_mm: (usableRadius_mm * Math.sqrt(4 * circle * circle + 1)) / (2 * circles + 1) }
  })
  return polarPlan({ rings, startAngle_deg })
} // prettier-ignore

/** The centre and rings of any number of sites, all beginning at one angle. */
export function polarPlan({ rings, startAngle_deg = 0 }: { readonly rings: readonly { readonly sites: number; readonly radius_mm: number }[]; readonly startAngle_deg?: number }): SitePlan {
  const places = rings.flatMap(({ sites, radius_mm }) => {
    requireRange('sites of a ring', sites, '', 1, 100_000)
    requireRange('radius of a ring', radius_mm, 'mm', 1e-3, 1e4)
    return Array.from({ length: sites }, (_, j) => {
      const angle = ((startAngle_deg + (360 * j) / sites) * Math.PI) / 180
      return [radius_mm * Math.cos(angle), radius_mm * Math.sin(angle)] as const
    })
  })
  const all = [[0, 0] as const, ...places]
  return { count: all.length, x_mm: Float64Array.from(all, ([x]) => x), y_mm: Float64Array.from(all, ([, y]) => y) }
} // prettier-ignore

export interface DiePlan extends SitePlan {
  readonly dieX: Int32Array
  readonly dieY: Int32Array
}

/**
 * So many die centres, spread as evenly as can be: the one nearest the middle, then again and again the one farthest
 * from all that are taken (the nearer to the middle where several are as far).
 *
 * @param count  1 to the number of dies; more are all of them
 * @throws CoreError not-applicable where no die lies in the usable area
 */
export function diePlan(dies: Dies, count: number): DiePlan {
  if (dies.count === 0) {
    throw new CoreError({
      kind: 'not-applicable',
      what: 'a plan of die centres',
      why: 'no die lies in the usable area',
    })
  }
  const wanted = Math.min(Math.max(1, Math.round(count)), dies.count)
  const fromMiddle = dies.x_mm.map((x, i) => Math.hypot(x, dies.y_mm[i]))
  const distance = new Float64Array(dies.count).fill(Infinity)
  const taken: number[] = []
  let next = fromMiddle.indexOf(Math.min(...fromMiddle))
  while (taken.length < wanted) {
    taken.push(next)
    distance[next] = -1
    for (let i = 0; i < dies.count; i++) {
      if (distance[i] < 0) continue
      distance[i] = Math.min(distance[i], Math.hypot(dies.x_mm[i] - dies.x_mm[next], dies.y_mm[i] - dies.y_mm[next]))
    }
    next = farthest(distance, fromMiddle)
  }
  return {
    count: taken.length,
    x_mm: Float64Array.from(taken, (i) => dies.x_mm[i]),
    y_mm: Float64Array.from(taken, (i) => dies.y_mm[i]),
    dieX: Int32Array.from(taken, (i) => dies.dieX[i]),
    dieY: Int32Array.from(taken, (i) => dies.dieY[i]),
  }
}

const SAME_mm = 1e-9

function farthest(distance: Float64Array, fromMiddle: Float64Array): number {
  let best = 0
  for (let i = 1; i < distance.length; i++) {
    const isFarther = distance[i] > distance[best] + SAME_mm
    const isAsFar = Math.abs(distance[i] - distance[best]) <= SAME_mm
    if (isFarther || (isAsFar && fromMiddle[i] < fromMiddle[best])) best = i
  }
  return best
}

/** Sites whose probe stands whole on the wafer and outside the edge exclusion, and how many were left out. */
export function onWafer<Plan extends SitePlan>(plan: Plan, outline: Outline, margin_mm: number): { readonly plan: Plan; readonly leftOut: number } {
  const rows = Array.from(plan.x_mm.keys()).filter((i) => isUsable({ outline, edgeExclusion_mm: margin_mm - SAME_mm }, plan.x_mm[i], plan.y_mm[i]))
  const picked = Object.fromEntries(
    Object.entries(plan).map(([name, column]) => [name, pick(column as unknown, rows)]),
  ) as unknown as Plan
  return { plan: { ...picked, count: rows.length }, leftOut: plan.count - rows.length }
} // prettier-ignore

function pick(column: unknown, rows: readonly number[]): unknown {
  if (column instanceof Float64Array) return Float64Array.from(rows, (i) => column[i])
  if (column instanceof Int32Array) return Int32Array.from(rows, (i) => column[i])
  return column
}
