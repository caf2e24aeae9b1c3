/** Confidence interval of a variance component that is estimated by a difference of two mean squares. */
import { chiSquareQuantile, fQuantile } from '../numeric/distributions'
import { requireRange } from '../problems/problem'
import { requireLevel, type ConfidenceInterval } from './intervals'

export interface MeanSquare {
  readonly meanSquare: number
  readonly degreesOfFreedom: number
}

/**
 * Interval of (theta1 - theta2) / divisor, theta the expectations of two independent mean squares, by the modified
 * large-sample method. Its lower limit is 0 exactly where the F test at that level just finds the component.
 *
 * @param larger   the mean square that holds the component, `divisor` times
 * @param smaller  the one without it
 * @param divisor  values a group, > 0
 * @returns limits >= 0: a variance can't be negative though its estimate may be, and a limit that comes out so is 0
 * @throws CoreError out-of-range
 *
 * Accuracy: approximate; coverage of the nominal level to a point or so of percent. Exact where theta2 is 0.
 * Sources: N. Ting, R. K. Burdick, F. A. Graybill, S. Jeyaratnam, T.-F. C. Lu, J. Stat. Comput. Simul. 35 (1990) 135;
 * R. K. Burdick, F. A. Graybill, Confidence Intervals on Variance Components (1992) ch. 3 (both from memory).
 */
export function componentInterval({
  larger,
  smaller,
  divisor,
  level,
}: {
  readonly larger: MeanSquare
  readonly smaller: MeanSquare
  readonly divisor: number
  readonly level: number
}): ConfidenceInterval {
  requireLevel(level)
  requireRange('divisor', divisor, '', Number.MIN_VALUE, Number.MAX_VALUE)
  requireRange('mean square', larger.meanSquare, '', 0, Number.MAX_VALUE)
  requireRange('mean square', smaller.meanSquare, '', 0, Number.MAX_VALUE)
  const difference = larger.meanSquare - smaller.meanSquare
  const below = Math.sqrt(spread((1 + level) / 2, larger, smaller))
  const above = Math.sqrt(spread((1 - level) / 2, larger, smaller))
  return {
    level,
    lower: Math.max(0, difference - below) / divisor,
    upper: Math.max(0, difference + above) / divisor,
  }
}

/**
 * The squared distance of a limit from the difference. With p above 1/2 the lower limit's G1, H2 and G12, below 1/2 the
 * upper limit's H1, G2 and H12: the same expressions, for both signs are lost in the squares.
 */
function spread(p: number, larger: MeanSquare, smaller: MeanSquare): number {
  const first = 1 - larger.degreesOfFreedom / chiSquareQuantile(p, larger.degreesOfFreedom)
  const second = smaller.degreesOfFreedom / chiSquareQuantile(1 - p, smaller.degreesOfFreedom) - 1
  const f = fQuantile(p, larger.degreesOfFreedom, smaller.degreesOfFreedom)
  const cross = ((f - 1) ** 2 - (first * f) ** 2 - second ** 2) / f
  const [a, b] = [larger.meanSquare, smaller.meanSquare]
  return Math.max(0, (first * a) ** 2 + (second * b) ** 2 + cross * a * b)
}
