/** How far the map itself may be off between the sites: the standard error of the Gaussian process, as a layer. */
import { bandScale, type BandScale } from '../../../core/report/figures/band-scale'
import { contoursOf, mapRaster, type MapDetail, type WaferSurface } from '../../../core/report/surface'
import type { ProcessSurface } from '../../../core/map/process-surface'
import type { Targets } from '../../../core/map/thin-plate-spline'
import type { WaferAnalysis } from '../../../core/analysis/lot-analysis'
import type { LotPictures } from './lot-pictures'
import { extremes, recoloured, type MapLayer } from './map-layer'

/** Fitting more would halt the window. */
const MOST_SITES_OF_WAFER = 400
const MOST_SITES = 10_000
const BANDS = 12

const known = new WeakMap<LotPictures, MapLayer | null>()

/** null unless the procedure chooses the Gaussian process. Fitted when its scale or column is first read. */
export function mapErrorLayer(pictures: LotPictures): MapLayer | null {
  const made = known.get(pictures)
  if (made !== undefined) return made
  const layer = canBeFitted(pictures) ? lazyLayer(pictures) : null
  known.set(pictures, layer)
  return layer
}

function canBeFitted({ analysis, hasPositions, wafers }: LotPictures): boolean {
  const { procedure, outline, sites } = analysis
  if (procedure.map.interpolation !== 'gaussian-process' || !hasPositions || outline.shape === 'infinite') return false
  return sites.count <= MOST_SITES && wafers.every((wafer) => wafer.sites.length <= MOST_SITES_OF_WAFER)
}

function lazyLayer(pictures: LotPictures): MapLayer {
  let errors: Errors | null = null
  const fitted = (): Errors => (errors ??= errorsOf(pictures))
  return {
    id: 'map-error',
    title: 'Standard error of the map',
    unit: pictures.analysis.quantity.unit,
    isJudged: false,
    get column() {
      return fitted().column
    },
    get scale() {
      return fitted().scale
    },
    betweenSites: (row, detail) => surfaceOf(pictures, fitted(), row, detail),
  }
}

interface Errors {
  readonly column: MapLayer['column']
  readonly scale: MapLayer['scale']
}

function errorsOf(pictures: LotPictures): Errors {
  const { analysis, positions, wafers } = pictures
  const column = new Float64Array(analysis.sites.count).fill(NaN)
  const { targets } = mapRaster(analysis.outline, 'small')
  const ranges: { readonly min: number; readonly max: number }[] = []
  for (const wafer of wafers) {
    const surface = surfaceFor(pictures, wafer)
    if (!surface) continue
    const pick = (from: Float64Array): Float64Array => Float64Array.from(wafer.sites, (row) => from[row])
    const here = errorAt(surface, { x_mm: pick(positions!.x_mm), y_mm: pick(positions!.y_mm) })
    wafer.sites.forEach((row, k) => (column[row] = here[k]))
    ranges.push(extremes(errorAt(surface, targets)))
  }
  return { column, scale: recoloured(scaleOf(ranges), 'cividis') }
}

/** A wafer with a stray site is known so much worse than the others that its own range would flatten theirs. */
const FAR = 4

function scaleOf(ranges: readonly { readonly min: number; readonly max: number }[]): BandScale {
  if (ranges.length === 0) return bandScale(0, 1, BANDS)
  const largest = ranges.map(({ max }) => max).sort((a, b) => a - b)
  const max = largest.filter((one) => one <= FAR * largest[largest.length >> 1]).at(-1)!
  const min = Math.min(...ranges.map((range) => range.min))
  return { ...bandScale(min, max, BANDS), goesOn: { below: false, above: largest[largest.length - 1] > max } }
}

function surfaceOf(pictures: LotPictures, { scale }: Errors, row: number, detail: MapDetail): WaferSurface | null {
  const { readings, outline } = pictures.analysis
  const wafer = pictures.wafers.find(({ index }) => index === readings.wafer[row])
  const surface = wafer && surfaceFor(pictures, wafer)
  if (!surface) return null
  const grid = mapRaster(outline, detail)
  return { contours: contoursOf(grid, errorAt(surface, grid.targets), scale), method: 'Gaussian process' }
}

function surfaceFor({ detailsOf }: LotPictures, wafer: WaferAnalysis): ProcessSurface | null {
  return detailsOf(wafer).map?.process?.surface ?? null
}

function errorAt(surface: ProcessSurface, targets: Targets): Float64Array {
  const { length } = targets.x_mm
  const out = { value: new Float64Array(length), standardError: new Float64Array(length) }
  surface.at(targets, out)
  return out.standardError
}
