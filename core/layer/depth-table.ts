/** A tabulated profile as straight lines of ln N over depth, scaled by a factor: where it ends, what it holds. */
import { CoreError, requireRange } from '../problems/problem'
import type { DepthTable } from './layer-kind'

export const LEAST_POINTS = 4
/** Of ln N. */
const FLAT = 1e-9

/** Lines from the surface to the deepest point, each from ln N / N_max `upper` to `lower` of its two ends, in 0..-infinity. */
export interface ProfileLines {
  readonly count: number
  /** Depth at which each line begins, and its length [um]. */
  readonly from_um: Float64Array
  readonly length_um: Float64Array
  /** ln of N over the table's peak, at the line's shallow and deep end; at most 0. */
  readonly shallow: Float64Array
  readonly deep: Float64Array
  /** The table's largest concentration [cm^-3]. */
  readonly peak_cm3: number
}

/**
 * From the surface to the first point the profile keeps the first value.
 *
 * @throws CoreError not-applicable: fewer than four points, or columns of unequal length; out-of-range: depths that
 * don't rise or lie above the surface, concentrations that are not above 0
 */
export function profileLines({ depth_um, concentration_cm3 }: DepthTable): ProfileLines {
  const points = depth_um.length
  if (points < LEAST_POINTS || concentration_cm3.length !== points) {
    const why = `it needs at least ${LEAST_POINTS} points, each with depth and concentration`
    throw new CoreError({ kind: 'not-applicable', what: 'the tabulated profile', why })
  }
  for (let i = 0; i < points; i++) {
    const above = i === 0 ? 0 : depth_um[i - 1]
    requireRange('depth of a tabulated profile', depth_um[i], 'um', i === 0 ? 0 : above * (1 + Number.EPSILON), 1000)
    requireRange('tabulated concentration', concentration_cm3[i], 'cm^-3', Number.MIN_VALUE, 1e24)
  }
  const peak_cm3 = concentration_cm3.reduce((most, n) => Math.max(most, n), 0)
  const level = concentration_cm3.map((n) => Math.log(n / peak_cm3))
  const isBuried = depth_um[0] > 0
  const from_um = isBuried ? Float64Array.of(0, ...depth_um.subarray(0, -1)) : depth_um.slice(0, -1)
  const shallow = isBuried ? Float64Array.of(level[0], ...level.subarray(0, -1)) : level.slice(0, -1)
  const ends_um = isBuried ? depth_um : depth_um.subarray(1)
  const deep = isBuried ? level : level.slice(1)
  return { count: deep.length, from_um, length_um: ends_um.map((end, i) => end - from_um[i]), shallow, deep, peak_cm3 }
}

/** The layer's end: where the profile last comes down to the level, or the end of the table. */
export interface ProfileEnd {
  readonly depth_um: number
  /** d ln(depth) / d ln(scale); 0 at the end of the table. */
  readonly response: number
  readonly isTableEnd: boolean
}

/** `level` is ln of background over peak, below 0. */
export function profileEnd({ count, from_um, length_um, shallow, deep }: ProfileLines, level: number): ProfileEnd {
  const last = count - 1
  if (deep[last] > level) return { depth_um: from_um[last] + length_um[last], response: 0, isTableEnd: true }
  let i = last
  while (i > 0 && shallow[i] <= level) i--
  const perLog_um = length_um[i] / (shallow[i] - deep[i])
  const depth_um = from_um[i] + perLog_um * (shallow[i] - level)
  return { depth_um, response: perLog_um / depth_um, isTableEnd: false }
}

/**
 * Integral over depth of what the profile has more than its background, over the background [um]: times N_B it is the
 * dose. Exact for the lines.
 *
 * @param level ln of background over peak, below 0
 */
export function excessIntegral_um({ count, length_um, shallow, deep }: ProfileLines, level: number): number {
  let total_um = 0
  for (let i = 0; i < count; i++) {
    const upper = Math.max(shallow[i], deep[i]) - level
    const lower = Math.min(shallow[i], deep[i]) - level
    if (upper > 0) total_um += length_um[i] * meanExcess(upper, lower)
  }
  return total_um
}

/** Mean of e^u - 1 along u from upper to lower, 0 where u is below 0. */
function meanExcess(upper: number, lower: number): number {
  const width = upper - lower
  if (lower >= 0) {
    const growth = width > 0 ? Math.expm1(width) / width : 1
    return Math.exp(lower) * growth - 1
  }
  return (Math.expm1(upper) - upper) / width
}

/** Levels of the lines along which the profile hardly falls: a whole length of it reaches a given density at once. */
export function flatLevels({ count, shallow, deep }: ProfileLines): readonly number[] {
  const levels = new Set<number>()
  for (let i = 0; i < count; i++) {
    if (Math.abs(shallow[i] - deep[i]) < FLAT) levels.add(Math.round((shallow[i] + deep[i]) / (2 * FLAT)) * FLAT)
  }
  return [...levels]
}
