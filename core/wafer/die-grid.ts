/** The dies of a wafer: which lie wholly in its usable area, and which one a place belongs to. */
import { CoreError, requireRange } from '../problems/problem'
import { flatDistance_mm } from './fiducial'
import type { Outline } from './outline'

export interface DieGrid {
  readonly pitchX_mm: number
  readonly pitchY_mm: number
  /** Centre of die (0, 0). */
  readonly offsetX_mm: number
  readonly offsetY_mm: number
}

/** Where dies may lie: the outline less its edge exclusion. */
export interface UsableArea {
  readonly outline: Outline
  readonly edgeExclusion_mm: number
}

/** One entry a die, by rows from the bottom, in a row from the left. */
export interface Dies {
  readonly count: number
  readonly dieX: Int32Array
  readonly dieY: Int32Array
  /** Die centres. */
  readonly x_mm: Float64Array
  readonly y_mm: Float64Array
}

/** More dies than this on a wafer are a wrong pitch, not a product. */
export const MAX_DIES = 1_000_000

/** A die that misses the usable area by less than a rounding error is in it. */
const ROUNDING_MM = 1e-9

/** Whether a place lies in the usable area, its rim included. A flat of known length bounds it too, a notch doesn't. */
export function isUsable({ outline, edgeExclusion_mm }: UsableArea, x_mm: number, y_mm: number): boolean {
  switch (outline.shape) {
    case 'infinite':
      return true
    case 'rectangle': {
      const halfWidth_mm = outline.width_mm / 2 - edgeExclusion_mm + ROUNDING_MM
      const halfHeight_mm = outline.height_mm / 2 - edgeExclusion_mm + ROUNDING_MM
      return Math.abs(x_mm) <= halfWidth_mm && Math.abs(y_mm) <= halfHeight_mm
    }
    case 'disc': {
      const flat_mm = flatDistance_mm(outline)
      if (flat_mm !== null && y_mm < edgeExclusion_mm - flat_mm - ROUNDING_MM) return false
      return Math.hypot(x_mm, y_mm) <= outline.diameter_mm / 2 - edgeExclusion_mm + ROUNDING_MM
    }
  }
}

/** Whether all four corners of that die are usable. The usable area is convex, so then the whole die is. */
export function isDieUsable(area: UsableArea, grid: DieGrid, dieX: number, dieY: number): boolean {
  const { x_mm, y_mm } = dieCentre(grid, dieX, dieY)
  const [dx, dy] = [grid.pitchX_mm / 2, grid.pitchY_mm / 2]
  return (
    isUsable(area, x_mm - dx, y_mm - dy) &&
    isUsable(area, x_mm + dx, y_mm - dy) &&
    isUsable(area, x_mm - dx, y_mm + dy) &&
    isUsable(area, x_mm + dx, y_mm + dy)
  )
}

export function dieCentre(grid: DieGrid, dieX: number, dieY: number): { readonly x_mm: number; readonly y_mm: number } {
  return { x_mm: grid.offsetX_mm + dieX * grid.pitchX_mm, y_mm: grid.offsetY_mm + dieY * grid.pitchY_mm }
}

/** The die that covers a place, usable or not. On a street between two dies: the one to the right, or above. */
export function dieAt(grid: DieGrid, x_mm: number, y_mm: number): { readonly dieX: number; readonly dieY: number } {
  return {
    dieX: Math.floor((x_mm - grid.offsetX_mm) / grid.pitchX_mm + 0.5),
    dieY: Math.floor((y_mm - grid.offsetY_mm) / grid.pitchY_mm + 0.5),
  }
}

/**
 * Every die of the grid that lies wholly in the usable area.
 *
 * @throws CoreError not-applicable for an outline without edges; out-of-range for a pitch outside 0.001 to 10 000 mm or
 * so fine that it makes more than MAX_DIES
 */
export function usableDies(area: UsableArea, grid: DieGrid): Dies {
  const { halfWidth_mm, halfHeight_mm } = extent(area.outline)
  requireRange('die pitch in x', grid.pitchX_mm, 'mm', 1e-3, 1e4)
  requireRange('die pitch in y', grid.pitchY_mm, 'mm', 1e-3, 1e4)
  const low = dieAt(grid, -halfWidth_mm, -halfHeight_mm)
  const high = dieAt(grid, halfWidth_mm, halfHeight_mm)
  requireRange('dies', (high.dieX - low.dieX + 1) * (high.dieY - low.dieY + 1), '', 0, MAX_DIES)
  const dieX: number[] = []
  const dieY: number[] = []
  for (let row = low.dieY; row <= high.dieY; row++) {
    for (let column = low.dieX; column <= high.dieX; column++) {
      if (!isDieUsable(area, grid, column, row)) continue
      dieX.push(column)
      dieY.push(row)
    }
  }
  return {
    count: dieX.length,
    dieX: Int32Array.from(dieX),
    dieY: Int32Array.from(dieY),
    x_mm: Float64Array.from(dieX, (die) => dieCentre(grid, die, 0).x_mm),
    y_mm: Float64Array.from(dieY, (die) => dieCentre(grid, 0, die).y_mm),
  }
}

/** Finds a die's row in the columns; -1 for a die that isn't among them. */
export function dieLookup({ dieX, dieY, count }: Dies): (dieX: number, dieY: number) => number {
  const rows = new Map<string, number>()
  for (let i = 0; i < count; i++) rows.set(`${dieX[i]} ${dieY[i]}`, i)
  return (x, y) => rows.get(`${x} ${y}`) ?? -1
}

function extent(outline: Outline): { halfWidth_mm: number; halfHeight_mm: number } {
  switch (outline.shape) {
    case 'disc':
      return { halfWidth_mm: outline.diameter_mm / 2, halfHeight_mm: outline.diameter_mm / 2 }
    case 'rectangle':
      return { halfWidth_mm: outline.width_mm / 2, halfHeight_mm: outline.height_mm / 2 }
    case 'infinite':
      throw new CoreError({ kind: 'not-applicable', what: 'die grid', why: 'the edges of the wafer are not known' })
  }
}
