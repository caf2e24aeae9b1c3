/** A wafer's map made ready to paint: everything that stays the same while one zooms and pans, in millimetres. */
import type { WaferAnalysis } from '../../../core/analysis/lot-analysis'
import { SITE_FLAGS } from '../../../core/analysis/flags'
import type { BandScale } from '../../../core/report/figures/band-scale'
import { bandOf } from '../../../core/report/figures/band-scale'
import { markOf, type MarkKind } from '../../../core/report/figures/marks'
import { drawnExtent, outlineRing, type Extent } from '../../../core/report/figures/outline-path'
import type { MapSites } from '../../../core/report/figures/wafer-map'
import { surfacesFor, type MapDetail, type WaferSurface } from '../../../core/report/surface'
import type { Outline } from '../../../core/wafer/outline'
import type { MapLayer } from './layers'
import type { LotPictures } from './lot-pictures'
import { siteGrid, type SiteGrid } from './site-grid'

export interface MapModel {
  readonly extent: Extent
  /** Null without edges. */
  readonly outline: Path2D | null
  readonly exclusion: Path2D | null
  readonly bands: readonly MapBand[] | null
  readonly method: string | null
  readonly dies: MapDies | null
  readonly places: MapPlaces
  readonly grid: SiteGrid
  readonly scale: BandScale
}

export interface MapBand {
  readonly path: Path2D
  readonly colour: string
}

export interface MapPlaces {
  /** Row of the lot's site columns; of no meaning where a map is made of several wafers. */
  readonly site: ArrayLike<number>
  readonly x_mm: Float64Array
  readonly y_mm: Float64Array
  readonly value: Float64Array
  readonly kind: readonly MarkKind[]
  readonly isExcluded: Uint8Array
}

export interface MapDies {
  /** Rows of the lot's die columns. */
  readonly row: readonly number[]
  readonly x_mm: readonly number[]
  readonly y_mm: readonly number[]
  readonly verdict: readonly number[]
  readonly pitchX_mm: number
  readonly pitchY_mm: number
}

export function mapModel(pictures: LotPictures, wafer: WaferAnalysis, layer: MapLayer): MapModel {
  const places = waferPlaces(pictures, wafer, layer)
  const { outline } = pictures.analysis
  const surface = surfaceMaker(outline, layer.scale)(surfaceSites(places), 'large')
  return {
    ...frameOf(pictures, places),
    ...painted(surface, layer.scale, places.value.length),
    dies: waferDies(pictures, wafer),
    places,
    grid: siteGrid(places.x_mm, places.y_mm),
    scale: layer.scale,
  }
}

/** A surface of values that belong to no single wafer: a difference, or the mean of a lot. */
export function surfaceModel(pictures: LotPictures, x_mm: Float64Array, y_mm: Float64Array, value: Float64Array, scale: BandScale): MapModel {
  const kind = Array.from(value, (v): MarkKind => (Number.isNaN(v) ? 'not-assessed' : 'in-spec'))
  const places = { site: value.map((_, i) => i), x_mm, y_mm, value, kind, isExcluded: new Uint8Array(value.length) }
  const surface = surfaceMaker(pictures.analysis.outline, scale)(surfaceSites(places), 'large')
  return {
    ...frameOf(pictures, places),
    ...painted(surface, scale, value.length),
    dies: null,
    places,
    grid: siteGrid(x_mm, y_mm),
    scale,
  }
} // prettier-ignore

function frameOf({ analysis }: LotPictures, { x_mm, y_mm }: MapPlaces) {
  const { outline, procedure } = analysis
  const edge = outlineRing(outline)
  const inset = procedure.wafer.edgeExclusionMm
  const exclusion = inset > 0 ? outlineRing(outline, inset) : []
  return {
    extent: drawnExtent(outline, x_mm, y_mm),
    outline: edge.length > 0 ? ringPath([edge]) : null,
    exclusion: exclusion.length > 0 ? ringPath([exclusion]) : null,
  }
}

type SurfaceOf = ReturnType<typeof surfacesFor>
const makers = new WeakMap<BandScale, { readonly outline: Outline; readonly make: SurfaceOf }>()

/** One a scale, so that the interpolation of a site pattern is prepared once and serves every wafer. */
export function surfaceMaker(outline: Outline, scale: BandScale): SurfaceOf {
  const known = makers.get(scale)
  if (known?.outline === outline) return known.make
  const make = surfacesFor(outline, scale)
  makers.set(scale, { outline, make })
  return make
}

export function painted(
  surface: WaferSurface | null,
  scale: BandScale,
  count: number,
): Pick<MapModel, 'bands' | 'method'> {
  if (!surface) return { bands: null, method: null }
  const bands = surface.contours
    .filter(({ rings_mm }) => rings_mm.length > 0)
    .map(({ rings_mm, threshold }) => ({ path: ringPath(rings_mm), colour: scale.colours[bandOf(scale, threshold)] }))
  const every = strideOf(count)
  return { bands, method: every === 1 ? surface.method : `${surface.method}, one of every ${every} sites` }
}

export function waferSurface(pictures: LotPictures, wafer: WaferAnalysis, layer: MapLayer, detail: MapDetail): WaferSurface | null {
  return surfaceMaker(pictures.analysis.outline, layer.scale)(surfaceSites(waferPlaces(pictures, wafer, layer)), detail)
} // prettier-ignore

/** More sites than this tell a raster of a map nothing new, and joining them would halt the window. */
const MOST_SURFACE_SITES = 5000

/** Excluded sites don't shape the surface; of very many sites, every so-manieth does. */
function surfaceSites({ x_mm, y_mm, value, isExcluded }: MapPlaces): MapSites {
  const every = strideOf(value.length)
  if (every === 1) return { x_mm, y_mm, value, verdict: [], excluded: isExcluded }
  const rows = Uint32Array.from({ length: Math.ceil(value.length / every) }, (_, i) => i * every)
  const pick = (column: Float64Array): Float64Array => Float64Array.from(rows, (row) => column[row])
  const excluded = Uint8Array.from(rows, (row) => isExcluded[row])
  return { x_mm: pick(x_mm), y_mm: pick(y_mm), value: pick(value), verdict: [], excluded }
}

/** Odd, so that it doesn't fall in step with the rows of a lattice. */
function strideOf(count: number): number {
  const least = Math.ceil(count / MOST_SURFACE_SITES)
  return least === 1 ? 1 : least + ((least + 1) % 2)
}

export function waferPlaces(pictures: LotPictures, wafer: WaferAnalysis, { column, isJudged }: MapLayer): MapPlaces {
  const { analysis, siteLimits, positions } = pictures
  const pick = (from: Float64Array | undefined): Float64Array =>
    Float64Array.from(wafer.sites, (site) => (from ? from[site] : NaN))
  const { verdict, value, flags } = analysis.sites
  return {
    site: wafer.sites,
    x_mm: pick(positions?.x_mm),
    y_mm: pick(positions?.y_mm),
    value: pick(isJudged ? value : column),
    kind: Array.from(wafer.sites, (site) => markOf(verdict[site], value[site], siteLimits)),
    isExcluded: Uint8Array.from(wafer.sites, (site) => (isExcludedSite(flags[site]) ? 1 : 0)),
  }
}

export function isExcludedSite(flags: number): boolean {
  return (flags & SITE_FLAGS.excludedByPerson.bit) !== 0
}

function waferDies({ analysis }: LotPictures, wafer: WaferAnalysis): MapDies | null {
  const { dies, procedure } = analysis
  if (!dies || !procedure.dieGrid) return null
  const row = Array.from({ length: dies.count }, (_, i) => i).filter((i) => dies.wafer[i] === wafer.index)
  return {
    row,
    x_mm: row.map((i) => dies.x_mm[i]),
    y_mm: row.map((i) => dies.y_mm[i]),
    verdict: row.map((i) => dies.verdict[i]),
    pitchX_mm: procedure.dieGrid.pitchXMm,
    pitchY_mm: procedure.dieGrid.pitchYMm,
  }
}

/** In millimetres, y up; painted under a transformation. */
export function ringPath(rings: readonly (readonly number[])[]): Path2D {
  const path = new Path2D()
  for (const ring of rings) {
    for (let i = 0; i + 1 < ring.length; i += 2) {
      if (i === 0) path.moveTo(ring[0], ring[1])
      else path.lineTo(ring[i], ring[i + 1])
    }
    path.closePath()
  }
  return path
}
