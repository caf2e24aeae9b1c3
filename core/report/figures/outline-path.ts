/** The wafer's edge as a ring x, y, x, y... in mm, y up. */
import { flatDistance_mm, outlinePath } from '../../wafer/fiducial'
import type { Outline } from '../../wafer/outline'

/** Two degrees an edge: within 0.03 pt of the true arc on the largest map. A small map does with fewer. */
const EDGES = 180
export const SMALL_MAP_EDGES = 72

export interface Extent {
  readonly halfWidth_mm: number
  readonly halfHeight_mm: number
}

/** The ring that lies `inset_mm` inside the edge; empty where there is no edge or nothing is left of it. */
export function outlineRing(outline: Outline, inset_mm = 0, edges = EDGES): readonly number[] {
  const shape = inset_mm > 0 ? insetOutline(outline, inset_mm) : outline
  if (!shape || shape.shape === 'infinite') return []
  return outlinePath(shape, edges).flatMap(({ x_mm, y_mm }) => [x_mm, y_mm])
}

/** The usable area's edge: a flat bounds it too, a notch doesn't. */
function insetOutline(outline: Outline, inset_mm: number): Outline | null {
  switch (outline.shape) {
    case 'infinite':
      return null
    case 'rectangle': {
      const width_mm = outline.width_mm - 2 * inset_mm
      const height_mm = outline.height_mm - 2 * inset_mm
      return width_mm > 0 && height_mm > 0 ? { shape: 'rectangle', width_mm, height_mm } : null
    }
    case 'disc': {
      const diameter_mm = outline.diameter_mm - 2 * inset_mm
      if (!(diameter_mm > 0)) return null
      const flat = (flatDistance_mm(outline) ?? Infinity) - inset_mm
      if (!(flat > 0 && flat < diameter_mm / 2)) return { shape: 'disc', diameter_mm, fiducial: 'none' }
      const flatLength_mm = 2 * Math.sqrt((diameter_mm / 2) ** 2 - flat ** 2)
      return { shape: 'disc', diameter_mm, fiducial: 'flat', flatLength_mm }
    }
  }
}

/** Half the drawn region: the wafer, or, without an edge, what holds all sites. */
export function drawnExtent(outline: Outline, x_mm: ArrayLike<number>, y_mm: ArrayLike<number>): Extent {
  if (outline.shape === 'disc') return { halfWidth_mm: outline.diameter_mm / 2, halfHeight_mm: outline.diameter_mm / 2 }
  if (outline.shape === 'rectangle') {
    return { halfWidth_mm: outline.width_mm / 2, halfHeight_mm: outline.height_mm / 2 }
  }
  let reach = 0
  for (let i = 0; i < x_mm.length; i++) reach = Math.max(reach, Math.abs(x_mm[i]) || 0, Math.abs(y_mm[i]) || 0)
  const half = reach > 0 ? reach * 1.1 : 1
  return { halfWidth_mm: half, halfHeight_mm: half }
}
