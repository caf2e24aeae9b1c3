/** Filled bands of equal value, in mm, and round values to draw them at. */
import { contours } from 'd3-contour'
import { requireRange } from '../problems/problem'
import type { RasterGrid } from './grid'

/** x and y in turn, closed without repeating the first point. */
export type Ring = readonly number[]

/**
 * Where the value is at least `lower`. Bands are painted in order, each over the one before, and clipped to the outline
 * of the wafer: so neighbours never leave a gap between them.
 */
export interface ContourBand {
  /** -Infinity for the first band, which covers everything. */
  readonly lower: number
  /** Infinity for the last. */
  readonly upper: number
  /** Each polygon's outer ring and then its holes. */
  readonly polygons: readonly (readonly Ring[])[]
}

/**
 * @param grid        the raster
 * @param cells       one value a cell of it, NaN where there is none (`cellsWithMargin`)
 * @param thresholds  finite, ascending
 * @returns one band more than thresholds
 */
export function contourBands(grid: RasterGrid, cells: Float64Array, thresholds: readonly number[]): ContourBand[] {
  const tracer = contours().size([grid.columns, grid.rows])
  // The tracer only reads by index, which a typed array serves as well.
  const values = cells as unknown as number[]
  const traced = thresholds.map((threshold, i) => {
    requireRange('contour threshold', threshold, '', -1e300, 1e300)
    const polygons = tracer.contour(values, threshold).coordinates
    const inMm = polygons.map((rings) => rings.map((ring) => ringInMm(grid, ring)))
    return { lower: threshold, upper: thresholds[i + 1] ?? Infinity, polygons: inMm }
  })
  return [{ lower: -Infinity, upper: thresholds[0] ?? Infinity, polygons: [[wholeRaster(grid)]] }, ...traced]
}

/**
 * Round values that cut the range into about `count` bands: multiples of 1, 2 or 5 times a power of ten, strictly
 * between min and max. None where max isn't above min.
 */
export function niceThresholds(min: number, max: number, count: number): number[] {
  requireRange('number of bands', count, '', 1, 1000)
  if (!(max > min) || !Number.isFinite(max - min)) return []
  const { mantissa, exponent } = niceStep((max - min) / count)
  // Divided by a whole power, 0.3 stays 0.3 where multiplied by 0.1 it would be 0.30000000000000004.
  const at = (k: number) => (exponent < 0 ? (k * mantissa) / 10 ** -exponent : k * mantissa * 10 ** exponent)
  const step = at(1)
  const thresholds: number[] = []
  for (let k = Math.floor(min / step); k <= Math.ceil(max / step); k++) {
    if (at(k) > min && at(k) < max) thresholds.push(at(k))
  }
  return thresholds
}

/** The largest of 1, 2, 5 times a power of ten that isn't much above the wanted step. */
function niceStep(wanted: number): { readonly mantissa: number; readonly exponent: number } {
  const exponent = Math.floor(Math.log10(wanted))
  const ratio = wanted / 10 ** exponent
  // Geometric means of neighbours: 1 | 2 | 5 | 10.
  if (ratio < Math.SQRT2) return { mantissa: 1, exponent }
  if (ratio < Math.sqrt(10)) return { mantissa: 2, exponent }
  if (ratio < Math.sqrt(50)) return { mantissa: 5, exponent }
  return { mantissa: 1, exponent: exponent + 1 }
}

/** The tracer counts cells from their corners and repeats the first point; ours are points at cell centres. */
function ringInMm(grid: RasterGrid, ring: readonly (readonly number[])[]): Ring {
  const places: number[] = []
  for (let i = 0; i < ring.length - 1; i++) {
    const [column, row] = ring[i]! as readonly [number, number]
    places.push(grid.x_mm[0]! + (column - 0.5) * grid.step_mm, grid.y_mm[0]! + (row - 0.5) * grid.step_mm)
  }
  return places
}

function wholeRaster({ x_mm, y_mm, step_mm }: RasterGrid): Ring {
  const [left, right] = [x_mm[0]! - step_mm / 2, x_mm[x_mm.length - 1]! + step_mm / 2]
  const [bottom, top] = [y_mm[0]! - step_mm / 2, y_mm[y_mm.length - 1]! + step_mm / 2]
  return [left, bottom, right, bottom, right, top, left, top]
}
