/** The interpolated surface of a wafer as contours for its maps. */
import { contourBands } from '../map/contours'
import { cellsWithMargin, rasterGrid, type RasterGrid } from '../map/grid'
import { interpolatorsFor, METHOD_TITLES, type InterpolationMethod } from '../map/interpolator'
import type { Outline } from '../wafer/outline'
import type { BandScale } from './figures/band-scale'
import type { MapContour, MapSites } from './figures/wafer-map'

export type MapDetail = 'large' | 'small'

/** Raster points across the wafer: as fine as the eye can tell at the size the map is printed. */
const ACROSS: Readonly<Record<MapDetail, number>> = { large: 61, small: 29 }

export interface WaferSurface {
  readonly contours: readonly MapContour[]
  readonly method: string
}

/**
 * Gives a wafer's contours from its sites; null where no surface can be drawn: no edges, or too few sites. One
 * interpolation is prepared for each site pattern, since a lot mostly has one.
 */
export function surfacesFor(
  outline: Outline,
  scale: BandScale | null,
): (sites: MapSites, detail: MapDetail) => WaferSurface | null {
  if (outline.shape === 'infinite' || !scale) return () => null
  const rasters = { large: prepared(outline, 'large'), small: prepared(outline, 'small') }
  const thresholds = scale.edges.slice(1, -1)
  return (sites, detail) => {
    const { grid, interpolatorOf } = rasters[detail]
    const { x_mm, y_mm, value } = withValue(sites)
    if (value.length === 0) return null
    const interpolator = interpolatorOf(x_mm, y_mm)
    // One colour all over would look like a measured flat wafer.
    if (interpolator.method === 'mean') return null
    const values = interpolator.evaluate(value)
    const { min, max } = rangeOf(values)
    // A band that covers everything or nothing needs no tracing: the first one painted has the lowest value's colour.
    const crossed = thresholds.filter((threshold) => threshold > min && threshold <= max)
    const contours = contourBands(grid, cellsWithMargin(grid, values), crossed).map((band): MapContour => ({
      threshold: Math.max(band.lower, min),
      rings_mm: band.polygons.flat(),
    }))
    return { contours, method: METHOD_TITLES[interpolator.method satisfies InterpolationMethod] }
  }
}

function prepared(outline: Outline, detail: MapDetail) {
  const grid: RasterGrid = rasterGrid(outline, ACROSS[detail])
  return { grid, interpolatorOf: interpolatorsFor(grid.targets) }
}

function rangeOf(values: Float64Array): { min: number; max: number } {
  let min = Infinity
  let max = -Infinity
  for (const value of values) {
    if (value < min) min = value
    if (value > max) max = value
  }
  return { min, max }
}

function withValue({ x_mm, y_mm, value, excluded }: MapSites) {
  const rows: number[] = []
  for (let i = 0; i < value.length; i++) {
    if (excluded?.[i] === 1) continue
    if (Number.isFinite(value[i]) && Number.isFinite(x_mm[i]) && Number.isFinite(y_mm[i])) rows.push(i)
  }
  return {
    x_mm: Float64Array.from(rows, (i) => x_mm[i]),
    y_mm: Float64Array.from(rows, (i) => y_mm[i]),
    value: Float64Array.from(rows, (i) => value[i]),
  }
}
