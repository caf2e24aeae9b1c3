/** Whether a wafer departs at its outermost ring only: a step there against a bowl, which begins at the centre. */
import { prepareLeastSquares } from './least-squares'
import { ringsOf } from './rings'
import type { Targets } from './thin-plate-spline'
import { zernikeColumn } from './zernike'

export interface EdgeStep {
  /** Outermost ring less the rest, beyond tilt, in the unit of the values. */
  readonly step: number
  /** Share of the variance that the step explains beyond tilt, and F of it. */
  readonly share: number
  readonly f: number
  /** F of the step beyond tilt and bowl, and of the bowl beyond tilt and step: which of the two the other makes needless. */
  readonly fBeyondBowl: number
  readonly fOfBowlBeyond: number
  /** Of every F: 1 above the line, this below. */
  readonly degreesOfFreedom: number
}

/** As for the shapes of a trend surface. */
const TELLING_SHARE = 0.01

/**
 * Least squares of mean, tilt, a step at the outermost ring and a bowl, the two latter in either order.
 *
 * @param sites, values  finite, one value a site
 * @param ringWidth_mm   as for `ringsOf`
 * @returns null where the sites can't tell a step from a bowl (it takes a centre or two rings inside the outermost),
 *          where there are fewer than six of them, or where the values don't vary
 */
export function edgeStep(
  sites: Targets,
  values: Float64Array,
  { radius_mm, ringWidth_mm }: { readonly radius_mm: number; readonly ringWidth_mm: number },
): EdgeStep | null {
  if (values.length < 6) return null
  const [x, y] = [sites.x_mm.map((place) => place / radius_mm), sites.y_mm.map((place) => place / radius_mm)]
  const tilt = [{ n: 0, m: 0 }, { n: 1, m: 1 }, { n: 1, m: -1 }].map((index) => zernikeColumn(index, x, y)) // prettier-ignore
  const bowl = zernikeColumn({ n: 2, m: 0 }, x, y)
  const step = new Float64Array(values.length)
  for (const site of ringsOf({ ...sites, value: values }, ringWidth_mm).at(-1) ?? []) step[site] = 1
  const stepFirst = prepareLeastSquares([...tilt, step, bowl])
  const bowlFirst = prepareLeastSquares([...tilt, bowl, step])
  const isTold = (share: number) => share >= TELLING_SHARE
  if (!stepFirst.independence.every(isTold) || !bowlFirst.independence.every(isTold)) return null
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length
  const deviations = values.map((value) => value - mean)
  const total = deviations.reduce((sum, deviation) => sum + deviation * deviation, 0)
  if (total <= values.length * (1e-13 * mean) ** 2) return null
  const fit = stepFirst.fit(deviations)
  const meanSquare = fit.residualSumOfSquares / fit.degreesOfFreedom
  const fOf = (sumOfSquares: number) => (sumOfSquares > 0 ? sumOfSquares / meanSquare : 0)
  const [, , , ofStep, ofBowlBeyond] = fit.sequentialSumsOfSquares
  return {
    step: prepareLeastSquares([...tilt, step]).fit(deviations).coefficients[3],
    share: ofStep / total,
    f: fOf(ofStep),
    fBeyondBowl: fOf(bowlFirst.fit(deviations).sequentialSumsOfSquares[4]),
    fOfBowlBeyond: fOf(ofBowlBeyond),
    degreesOfFreedom: fit.degreesOfFreedom,
  }
}
