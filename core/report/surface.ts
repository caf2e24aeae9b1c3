/** The interpolated surface of a wafer as contours for its maps. */
import { contourBands } from '../map/contours'
import { cellsWithMargin, rasterGrid, type RasterGrid } from '../map/grid'
import { interpolatorsFor, METHOD_TITLES, type InterpolationMethod } from '../map/interpolator'
import { processFitter } from '../map/process-surface'
import type { Outline } from '../wafer/outline'
import type { BandScale } from './figures/band-scale'
import type { MapContour, MapSites } from './figures/map-input'

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
  interpolation: 'thin-plate-spline' | 'gaussian-process' = 'thin-plate-spline',
): (sites: MapSites, detail: MapDetail) => WaferSurface | null {
  if (outline.shape === 'infinite' || !scale) return () => null
  const rasters = { large: prepared(outline, 'large'), small: prepared(outline, 'small') }
  const fit = interpolation === 'gaussian-process' ? processFitter() : null
  return (sites, detail) => {
    const { grid, interpolatorOf } = rasters[detail]
    const { x_mm, y_mm, value, u } = withValue(sites)
    if (value.length === 0) return null
    const surface = fit?.(x_mm, y_mm, value, u)
    if (surface) {
      const contours = contoursOf(grid, surface.values(grid.targets), scale)
      return { contours, method: METHOD_TITLES['gaussian-process'] }
    }
    const interpolator = interpolatorOf(x_mm, y_mm)
    // One colour all over would look like a measured flat wafer.
    if (interpolator.method === 'mean') return null
    const values = interpolator.evaluate(value)
    const method = METHOD_TITLES[interpolator.method satisfies InterpolationMethod]
    return { contours: contoursOf(grid, values, scale), method }
  }
}

/** From one value a target of the raster. */
export function contoursOf(grid: RasterGrid, values: Float64Array, scale: BandScale): readonly MapContour[] {
  const { min, max } = rangeOf(values)
  // A band that covers everything or nothing needs no tracing: the first one painted has the lowest value's colour.
  const crossed = scale.edges.slice(1, -1).filter((threshold) => threshold > min && threshold <= max)
  return contourBands(grid, cellsWithMargin(grid, values), crossed).map((band): MapContour => ({
    threshold: Math.max(band.lower, min),
    rings_mm: band.polygons.flat(),
  }))
}

/** The raster that a map of this size is drawn from. */
export function mapRaster(outline: Outline, detail: MapDetail): RasterGrid {
  return rasterGrid(outline, ACROSS[detail])
}

function prepared(outline: Outline, detail: MapDetail) {
  const grid = mapRaster(outline, detail)
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

function withValue({ x_mm, y_mm, value, excluded, u }: MapSites) {
  const rows: number[] = []
  for (let i = 0; i < value.length; i++) {
    if (excluded?.[i] === 1) continue
    if (Number.isFinite(value[i]) && Number.isFinite(x_mm[i]) && Number.isFinite(y_mm[i])) rows.push(i)
  }
  return {
    x_mm: Float64Array.from(rows, (i) => x_mm[i]),
    y_mm: Float64Array.from(rows, (i) => y_mm[i]),
    value: Float64Array.from(rows, (i) => value[i]),
    u: Float64Array.from(rows, (i) => u?.[i] ?? 0),
  }
}
