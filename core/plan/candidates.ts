/** The usual plans of a wafer, each asked what it would see. */
import { equalAreaPlan, onWafer, polarPlan } from '../wafer/area-plans'
import type { Outline } from '../wafer/outline'
import { cartesianPlan, concentricPlan, diameterPlan, type SitePlan } from '../wafer/site-patterns'
import { detectionPower, meanBias, smallestDetectable } from './power'
import type { EffectId } from './effects'

export interface Candidate {
  readonly id: string
  readonly title: string
  readonly plan: SitePlan
  readonly source: string
}

const MF1618 = 'SEMI MF1618-1104'
const OURS = 'equal areas, derived'
const COMMON = 'common practice, no source'

/** In the order of their number of sites; those whose probe would stand off the wafer lose these sites. */
export function candidatePlans(usableRadius_mm: number, outline: Outline, margin_mm: number): readonly Candidate[] {
  const outerRadius_mm = usableRadius_mm
  const ring = (sites: number, share: number) => ({ sites, radius_mm: share * usableRadius_mm })
  const made: readonly Candidate[] = [
    { id: 'polar-5', title: 'centre and 4', plan: polarPlan({ rings: [ring(4, 1)] }), source: COMMON },
    { id: 'polar-9', title: 'centre, 4 half way, 4 at the edge', plan: polarPlan({ rings: [ring(4, 0.5), ring(4, 1)] }), source: COMMON },
    { id: 'polar-13', title: 'centre, 4 half way, 8 at the edge', plan: polarPlan({ rings: [ring(4, 0.5), ring(8, 1)] }), source: COMMON },
    { id: 'diameter-25', title: '25 along a diameter', plan: diameterPlan({ count: 25, outerRadius_mm }), source: MF1618 },
    ...[2, 3, 4, 5].map((circles) => ({ id: `equal-area-${circles}`, title: `${circles} rings of equal areas`, plan: equalAreaPlan({ circles, usableRadius_mm }), source: OURS })),
    ...[2, 3, 4, 5].map((circles) => ({ id: `circles-${circles}`, title: `${circles} circles`, plan: concentricPlan({ circles, outerRadius_mm }), source: MF1618 })),
    ...[7, 9, 11, 13].map((rows) => ({ id: `rows-${rows}`, title: `lattice of ${rows} rows`, plan: cartesianPlan({ rows, outerRadius_mm }), source: MF1618 })),
  ]
  return made.map((entry) => ({ ...entry, plan: onWafer(entry.plan, outline, margin_mm).plan })).sort((a, b) => a.plan.count - b.plan.count)
} // prettier-ignore

export interface Need {
  readonly effect: EffectId
  /** Relative. */
  readonly size: number
  readonly repeatability: number
  readonly power: number
  readonly alpha: number
}

export interface Assessed extends Candidate {
  /** Of seeing the effect of the size that is asked for. */
  readonly detection: number
  /** The size that is seen with the wanted power. */
  readonly smallest: number
  /** Of the plain mean, over the effect. */
  readonly bias: number
  readonly isEnough: boolean
}

export function assess(candidates: readonly Candidate[], usableRadius_mm: number, { effect, size, repeatability, power, alpha }: Need): readonly Assessed[] {
  return candidates.map((candidate) => {
    const question = { plan: candidate.plan, usableRadius_mm, effect, repeatability, alpha }
    const detection = detectionPower(question, size)
    return { ...candidate, detection, smallest: smallestDetectable(question, power), bias: meanBias(question), isEnough: detection >= power }
  })
} // prettier-ignore

/** The one with the fewest sites that is enough; null where none is. */
export function recommended(assessed: readonly Assessed[]): Assessed | null {
  return assessed.find(({ isEnough }) => isEnough) ?? null
}
