import { CoreError } from '../problems/problem'
import type { Outline } from '../wafer/outline'
import { disc } from './disc'
import { infiniteSheet } from './infinite-sheet'
import type { LogDistance, OutlineGeometry } from './outline-geometry'
import { rectangle } from './rectangle'

/** Every outline whose electrical geometry is known. */
export const outlineGeometries = [infiniteSheet, disc, rectangle] as const satisfies readonly OutlineGeometry[]

/** The entry of an outline. @throws CoreError unknown-id */
export function outlineGeometry(outline: Outline): OutlineGeometry {
  const entries: readonly OutlineGeometry[] = outlineGeometries
  const found = entries.find((entry) => entry.id === outline.shape)
  if (found) return found
  const known = entries.map((entry) => entry.id)
  throw new CoreError({ kind: 'unknown-id', family: 'outline', id: String(outline.shape), known })
}

/** The generalised log distance of an outline. @throws CoreError unknown-id, out-of-range */
export function logDistanceOf(outline: Outline): LogDistance {
  return outlineGeometry(outline).logDistance(outline)
}
