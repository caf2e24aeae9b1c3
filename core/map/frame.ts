/** Coordinates centred on the sites and scaled to about 1, so that nothing solved with them depends on mm or on where zero is. */
import { CoreError, requireRange } from '../problems/problem'

export interface Frame {
  readonly centreX_mm: number
  readonly centreY_mm: number
  /** Root mean square distance of the sites from their centre; 1 for a single place. */
  readonly scale_mm: number
  /** All sites lie on one line, or in one place. */
  readonly isCollinear: boolean
}

/** Sites this much narrower across than along lie on a line. */
const COLLINEAR_RATIO = 1e-6

export function frameOf(x_mm: Float64Array, y_mm: Float64Array): Frame {
  const count = x_mm.length
  let [sumX, sumY] = [0, 0]
  for (let i = 0; i < count; i++) {
    sumX += x_mm[i]!
    sumY += y_mm[i]!
  }
  const [centreX_mm, centreY_mm] = [sumX / count, sumY / count]
  let [xx, xy, yy] = [0, 0, 0]
  for (let i = 0; i < count; i++) {
    const [x, y] = [x_mm[i]! - centreX_mm, y_mm[i]! - centreY_mm]
    xx += x * x
    xy += x * y
    yy += y * y
  }
  const scale_mm = Math.sqrt((xx + yy) / count) || 1
  const angle = Math.atan2(2 * xy, xx - yy) / 2
  const isCollinear = acrossRatio(x_mm, y_mm, { centreX_mm, centreY_mm, angle }) < COLLINEAR_RATIO
  return { centreX_mm, centreY_mm, scale_mm, isCollinear }
}

/** Throws CoreError unless there is a site, x and y have equal lengths and every coordinate is finite. */
export function requireSites(x_mm: Float64Array, y_mm: Float64Array): void {
  const what = 'interpolation'
  if (x_mm.length === 0) throw new CoreError({ kind: 'not-applicable', what, why: 'there are no sites' })
  if (x_mm.length !== y_mm.length) {
    throw new CoreError({ kind: 'not-applicable', what, why: `${x_mm.length} x for ${y_mm.length} y` })
  }
  for (const column of [x_mm, y_mm]) {
    for (const value of column) requireRange('site coordinate', value, 'mm', -1e9, 1e9)
  }
}

/** Largest distance from the line through the centre at that angle, over the largest distance along it. */
function acrossRatio(
  x_mm: Float64Array,
  y_mm: Float64Array,
  line: { readonly centreX_mm: number; readonly centreY_mm: number; readonly angle: number },
): number {
  const [cos, sin] = [Math.cos(line.angle), Math.sin(line.angle)]
  let [along, across] = [0, 0]
  for (let i = 0; i < x_mm.length; i++) {
    const [x, y] = [x_mm[i]! - line.centreX_mm, y_mm[i]! - line.centreY_mm]
    along = Math.max(along, Math.abs(cos * x + sin * y))
    across = Math.max(across, Math.abs(cos * y - sin * x))
  }
  return along === 0 ? 0 : across / along
}
