/** One wafer a few millimetres wide: bands and edge, no labels; the sites as coloured dots where there are no bands. */
import type { Outline } from '../../wafer/outline'
import type { Shape } from '../drawing'
import { circle, group, polygon } from '../drawing'
import { colourOf, type BandScale } from './band-scale'
import { FAINT, INK } from './ink'
import { drawnExtent, outlineRing, SMALL_MAP_EDGES } from './outline-path'
import type { MapContour, MapSites, Plane } from './map-input'
import { bandShapes, ringToPoints } from './wafer-map'

export interface SmallMapInput {
  readonly outline: Outline
  readonly scale: BandScale
  readonly sites: MapSites
  readonly contours: readonly MapContour[] | null
  /** Of the square it fills. */
  readonly size_pt: number
}

const MOST_DOTS = 400

export function smallMap(input: SmallMapInput): Shape[] {
  const { sites, size_pt } = input
  const extent = drawnExtent(input.outline, sites.x_mm, sites.y_mm)
  const half = Math.max(extent.halfWidth_mm, extent.halfHeight_mm)
  const scale = (size_pt - 1) / (2 * half)
  const plane: Plane = { scale_pt_per_mm: scale, x: (x) => size_pt / 2 + x * scale, y: (y) => size_pt / 2 - y * scale }
  const ring = ringToPoints(outlineRing(input.outline, 0, SMALL_MAP_EDGES), plane)
  const edge: Shape[] = ring.length > 0 ? [polygon(ring, { stroke: INK, lineWidth_pt: 0.5 })] : []
  if (input.contours) {
    const bands = bandShapes(input.contours, input.scale, plane)
    return ring.length > 0 ? [{ ...group(0, 0, bands), clip: [ring] }, ...edge] : [...bands]
  }
  const every = Math.ceil(sites.value.length / MOST_DOTS)
  const radius = Math.max(0.6, Math.min(2.2, (0.4 * size_pt) / Math.sqrt(Math.max(1, sites.value.length / every))))
  const dots: Shape[] = []
  for (let i = 0; i < sites.value.length; i += every) {
    if (!Number.isFinite(sites.value[i]) || !Number.isFinite(sites.x_mm[i])) continue
    dots.push(
      circle(plane.x(sites.x_mm[i]), plane.y(sites.y_mm[i]), radius, {
        fill: colourOf(input.scale, sites.value[i]),
      }),
    )
  }
  return ring.length > 0 ? [polygon(ring, { fill: FAINT }), ...dots, ...edge] : dots
}
