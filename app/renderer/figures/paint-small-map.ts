/** One wafer a few centimetres wide: bands and edge, or dots where there are no bands. */
import type { WaferAnalysis } from '../../../core/analysis/lot-analysis'
import { colourOf } from '../../../core/report/figures/band-scale'
import { drawnExtent, outlineRing, SMALL_MAP_EDGES } from '../../../core/report/figures/outline-path'
import type { MapLayer } from './map-layer'
import type { LotPictures } from './lot-pictures'
import { painted, ringPath, waferPlaces, waferSurface } from './map-model'
import type { Inks } from './paint-map'

const MOST_DOTS = 400

/** Fills the square canvas. */
export function paintSmallMap(context: CanvasRenderingContext2D, pictures: LotPictures, wafer: WaferAnalysis, layer: MapLayer, inks: Inks): void {
  const size = context.canvas.width
  const { outline } = pictures.analysis
  const places = waferPlaces(pictures, wafer, layer)
  const extent = drawnExtent(outline, places.x_mm, places.y_mm)
  const scale = (size / 2 - 1.5) / Math.max(extent.halfWidth_mm, extent.halfHeight_mm)
  const ring = outlineRing(outline, 0, SMALL_MAP_EDGES)
  const edge = ring.length > 0 ? ringPath([ring]) : null
  const { bands } = painted(waferSurface(pictures, places, layer, 'small'), layer.scale, places.value.length, 'small')
  context.setTransform(1, 0, 0, 1, 0, 0)
  context.clearRect(0, 0, size, size)
  context.setTransform(scale, 0, 0, -scale, size / 2, size / 2)
  context.save()
  if (edge) context.clip(edge)
  if (edge && !bands) paintWhole(context, edge, inks.blank)
  for (const { path, colour } of bands ?? []) paintWhole(context, path, colour)
  context.restore()
  if (!bands) paintDots(context, places, layer, scale)
  if (edge) {
    context.lineWidth = Math.max(1, size / 110) / scale
    context.strokeStyle = inks.ink
    context.stroke(edge)
  }
} // prettier-ignore

function paintWhole(context: CanvasRenderingContext2D, path: Path2D, colour: string): void {
  context.fillStyle = colour
  context.fill(path, 'evenodd')
}

function paintDots(context: CanvasRenderingContext2D, places: ReturnType<typeof waferPlaces>, layer: MapLayer, scale: number): void {
  const every = Math.ceil(places.value.length / MOST_DOTS)
  const radius = Math.max(1.2, Math.min(4, 40 / Math.sqrt(Math.max(1, places.value.length / every)))) / scale
  for (let i = 0; i < places.value.length; i += every) {
    if (!Number.isFinite(places.value[i]) || !Number.isFinite(places.x_mm[i])) continue
    context.beginPath()
    context.arc(places.x_mm[i], places.y_mm[i], radius, 0, 2 * Math.PI)
    context.fillStyle = colourOf(layer.scale, places.value[i])
    context.fill()
  }
} // prettier-ignore
