/** Places on a map that are no sites: the die under the pointer, the ends of a diameter. */
import type { Extent } from '../../../core/report/figures/outline-path'
import type { MapDies } from './map-model'
import type { ScreenPlane } from './plane'

/** Row of the lot's die columns; null between dies. */
export function dieAtPlace(dies: MapDies | null, x_mm: number, y_mm: number): number | null {
  if (!dies) return null
  const at = dies.row.findIndex(
    (_, i) =>
      Math.abs(dies.x_mm[i] - x_mm) <= dies.pitchX_mm / 2 && Math.abs(dies.y_mm[i] - y_mm) <= dies.pitchY_mm / 2,
  )
  return at < 0 ? null : dies.row[at]
}

/** The two ends on the screen of the diameter in a direction, anticlockwise from +x. */
export function diameterOn(plane: ScreenPlane, { halfWidth_mm, halfHeight_mm }: Extent, angle_deg: number) {
  const angle = (angle_deg * Math.PI) / 180
  const reach = Math.min(halfWidth_mm, halfHeight_mm)
  const [dx, dy] = [reach * Math.cos(angle), reach * Math.sin(angle)]
  return { x1: plane.x(-dx), y1: plane.y(-dy), x2: plane.x(dx), y2: plane.y(dy) }
}
