/** Where on a wafer values count, as far as areas go. */
import type { Outline } from '../wafer/outline'

/** Where values count, about the wafer's centre: a disc or a rectangle. A flat is not taken off. */
export type UsableRegion =
  | { readonly shape: 'disc'; readonly radius_mm: number }
  | { readonly shape: 'rectangle'; readonly width_mm: number; readonly height_mm: number }

/** Sites may lie outside the region by rounding of their coordinates. */
const OUTSIDE_SHARE = 1e-3

/** The outline less its edge exclusion; null where it has no edges or nothing is left. */
export function usableRegion(outline: Outline, edgeExclusion_mm: number): UsableRegion | null {
  switch (outline.shape) {
    case 'infinite':
      return null
    case 'disc': {
      const radius_mm = outline.diameter_mm / 2 - edgeExclusion_mm
      return radius_mm > 0 ? { shape: 'disc', radius_mm } : null
    }
    case 'rectangle': {
      const [width_mm, height_mm] = [outline.width_mm - 2 * edgeExclusion_mm, outline.height_mm - 2 * edgeExclusion_mm]
      return width_mm > 0 && height_mm > 0 ? { shape: 'rectangle', width_mm, height_mm } : null
    }
  }
}

/** Whether a place lies in the region, its rim and the rounding of coordinates included. */
export function isInRegion(region: UsableRegion, x_mm: number, y_mm: number): boolean {
  const [halfWidth, halfHeight] = halfSize(region).map((half_mm) => half_mm * (1 + OUTSIDE_SHARE))
  if (region.shape === 'disc') return Math.hypot(x_mm, y_mm) <= halfWidth
  return Math.abs(x_mm) <= halfWidth && Math.abs(y_mm) <= halfHeight
}

export function halfSize(region: UsableRegion): [number, number] {
  return region.shape === 'disc' ? [region.radius_mm, region.radius_mm] : [region.width_mm / 2, region.height_mm / 2]
}
