/** A wafer's map made ready to paint: everything that stays the same while one zooms and pans, in millimetres. */
import type { WaferAnalysis } from '../../../core/analysis/lot-analysis'
import { SITE_FLAGS } from '../../../core/analysis/flags'
import type { BandScale } from '../../../core/report/figures/band-scale'
import { bandOf } from '../../../core/report/figures/band-scale'
import { markOf, type MarkKind } from '../../../core/report/figures/marks'
import { drawnExtent, outlineRing, type Extent } from '../../../core/report/figures/outline-path'
import type { MapSites } from '../../../core/report/figures/map-input'
import { surfacesFor, type MapDetail, type WaferSurface } from '../../../core/report/surface'
import type { Procedure } from '../../../core/procedure/schema'
import type { Outline } from '../../../core/wafer/outline'
import type { MapLayer } from './map-layer'
import type { LotPictures } from './lot-pictures'
import { siteGrid, type SiteGrid } from './site-grid'

export interface MapModel {
  readonly extent: Extent
  /** Null without edges. */
  readonly outline: Path2D | null
  readonly exclusion: Path2D | null
  readonly bands: readonly MapBand[] | null
  readonly method: string | null
  /** The sites that a worker must join into bands first: too many to do so here. */
  readonly toJoin: MapSites | null
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
  /** Standard uncertainty that each site has to itself. */
  readonly u: Float64Array
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
  return {
    ...frameOf(pictures, places),
    ...joined(pictures, places, layer.scale, layer),
    dies: waferDies(pictures, wafer),
    places,
    grid: siteGrid(places.x_mm, places.y_mm),
    scale: layer.scale,
  }
}

/** A surface of values that belong to no single wafer: a difference, or the mean of a lot. */
export function surfaceModel(pictures: LotPictures, x_mm: Float64Array, y_mm: Float64Array, value: Float64Array, scale: BandScale): MapModel {
  const kind = Array.from(value, (v): MarkKind => (Number.isNaN(v) ? 'not-assessed' : 'in-spec'))
  const places = { site: value.map((_, i) => i), x_mm, y_mm, value, u: new Float64Array(value.length), kind, isExcluded: new Uint8Array(value.length) }
  return {
    ...frameOf(pictures, places),
    ...joined(pictures, places, scale),
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

function joined({ analysis }: LotPictures, places: MapPlaces, scale: BandScale, layer?: MapLayer) {
  if (layer?.betweenSites && places.site.length > 0) {
    return { ...painted(layer.betweenSites(places.site[0], 'large'), scale, 0, 'large'), toJoin: null }
  }
  const sites = surfaceSites(places, 'large')
  if (sites.value.length > MOST_SITES_HERE) return { bands: null, method: null, toJoin: sites }
  const surface = surfaceMaker(analysis.outline, scale, analysis.procedure.map.interpolation)(sites, 'large')
  return { ...painted(surface, scale, places.value.length, 'large'), toJoin: null }
}

type SurfaceOf = ReturnType<typeof surfacesFor>
type Interpolation = Procedure['map']['interpolation']
const makers = new WeakMap<
  BandScale,
  { readonly outline: Outline; readonly interpolation: Interpolation; readonly make: SurfaceOf }
>()

/** One a scale, so that the interpolation of a site pattern is prepared once and serves every wafer. */
export function surfaceMaker(outline: Outline, scale: BandScale, interpolation: Interpolation): SurfaceOf {
  const known = makers.get(scale)
  if (known?.outline === outline && known.interpolation === interpolation) return known.make
  const make = surfacesFor(outline, scale, interpolation)
  makers.set(scale, { outline, interpolation, make })
  return make
}

export function painted(
  surface: WaferSurface | null,
  scale: BandScale,
  count: number,
  detail: MapDetail,
): Pick<MapModel, 'bands' | 'method'> {
  if (!surface) return { bands: null, method: null }
  const bands = surface.contours
    .filter(({ rings_mm }) => rings_mm.length > 0)
    .map(({ rings_mm, threshold }) => ({ path: ringPath(rings_mm), colour: scale.colours[bandOf(scale, threshold)] }))
  const every = strideOf(count, detail)
  return { bands, method: every === 1 ? surface.method : `${surface.method}, one of every ${every} sites` }
}

export function waferSurface(pictures: LotPictures, places: MapPlaces, layer: MapLayer, detail: MapDetail): WaferSurface | null {
  if (layer.betweenSites) return places.site.length > 0 ? layer.betweenSites(places.site[0], detail) : null
  const { outline, procedure } = pictures.analysis
  return surfaceMaker(outline, layer.scale, procedure.map.interpolation)(surfaceSites(places, detail), detail)
} // prettier-ignore

/** More sites than these tell a raster of a map nothing new. */
const MOST_SURFACE_SITES: Readonly<Record<MapDetail, number>> = { large: 5000, small: 800 }
/** Joining more of them takes longer than a person should wait for the window. */
const MOST_SITES_HERE = 800

/** Excluded sites don't shape the surface; of very many sites, every so-manieth does. */
function surfaceSites({ x_mm, y_mm, value, u, isExcluded }: MapPlaces, detail: MapDetail): MapSites {
  const every = strideOf(value.length, detail)
  if (every === 1) return { x_mm, y_mm, value, u, verdict: [], excluded: isExcluded }
  const rows = Uint32Array.from({ length: Math.ceil(value.length / every) }, (_, i) => i * every)
  const pick = (column: Float64Array): Float64Array => Float64Array.from(rows, (row) => column[row])
  const excluded = Uint8Array.from(rows, (row) => isExcluded[row])
  return { x_mm: pick(x_mm), y_mm: pick(y_mm), value: pick(value), u: pick(u), verdict: [], excluded }
}

/** Odd, so that it doesn't fall in step with the rows of a lattice. */
function strideOf(count: number, detail: MapDetail): number {
  const least = Math.ceil(count / MOST_SURFACE_SITES[detail])
  return least === 1 ? 1 : least + ((least + 1) % 2)
}

export function waferPlaces(pictures: LotPictures, wafer: WaferAnalysis, { column, isJudged }: MapLayer): MapPlaces {
  const { analysis, siteLimits, positions } = pictures
  const { sites } = wafer
  const { verdict, value, flags } = analysis.sites
  const kind: MarkKind[] = []
  const isExcluded = new Uint8Array(sites.length)
  for (let i = 0; i < sites.length; i++) {
    kind.push(markOf(verdict[sites[i]], value[sites[i]], siteLimits))
    isExcluded[i] = isExcludedSite(flags[sites[i]]) ? 1 : 0
  }
  return {
    site: sites,
    x_mm: picked(positions?.x_mm, sites),
    y_mm: picked(positions?.y_mm, sites),
    value: picked(isJudged ? value : column, sites),
    u: picked(isJudged ? analysis.sites.uIndependent : undefined, sites),
    kind,
    isExcluded,
  }
}

/** A plain loop: `Float64Array.from` with a function takes ten times as long, and wafers have a hundred thousand sites. */
function picked(column: Float64Array | undefined, sites: Uint32Array): Float64Array {
  const out = new Float64Array(sites.length).fill(NaN)
  if (column) for (let i = 0; i < sites.length; i++) out[i] = column[sites[i]]
  return out
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
