/** A wafer's map on a canvas. */
import type { MarkKind } from '../../../core/report/figures/marks'
import { bandOf, isDark } from '../../../core/report/figures/band-scale'
import type { MapModel } from './map-model'
import type { ScreenPlane } from './plane'

/** Inks of the page, read from its style sheet. */
export interface Inks {
  readonly ground: string
  readonly ink: string
  readonly quiet: string
  readonly rule: string
  readonly blank: string
}

export interface MapShows {
  readonly contours: boolean
  readonly sites: boolean
  readonly dies: boolean
}

const ALERT = '#b3261e'
const LIGHT = '#ffffff'
const DARK = '#1c1b19'
/** More dots than this in view would be a veil: then only what says something is drawn. */
const MOST_DOTS = 6000
const MOST_MARKS = 20_000

export function paintMap(context: CanvasRenderingContext2D, model: MapModel, plane: ScreenPlane, inks: Inks, shows: MapShows): void {
  const ratio = context.canvas.width / plane.width
  context.setTransform(ratio, 0, 0, ratio, 0, 0)
  context.clearRect(0, 0, plane.width, plane.height)
  paintSurface(context, model, plane, ratio, inks, shows.contours)
  context.setTransform(ratio, 0, 0, ratio, 0, 0)
  if (shows.dies) paintDies(context, model, plane)
  if (shows.sites) paintSites(context, model, plane, inks)
} // prettier-ignore

/** Painted in millimetres under a transformation, so that a wafer's paths are made once. */
function paintSurface(context: CanvasRenderingContext2D, model: MapModel, plane: ScreenPlane, ratio: number, inks: Inks, withLines: boolean): void {
  const { outline, exclusion, bands } = model
  const scale = plane.scale * ratio
  context.save()
  context.setTransform(scale, 0, 0, -scale, plane.x(0) * ratio, plane.y(0) * ratio)
  const hair = 1 / plane.scale
  context.save()
  if (outline) context.clip(outline)
  if (outline && !bands) fill(context, outline, inks.blank)
  for (const { path, colour } of bands ?? []) {
    fill(context, path, colour)
    if (withLines) stroke(context, path, 'rgba(20, 20, 20, 0.32)', 0.6 * hair, [])
  }
  if (exclusion) {
    stroke(context, exclusion, 'rgba(255, 255, 255, 0.75)', 1.4 * hair, [])
    stroke(context, exclusion, DARK, 0.9 * hair, [3 * hair, 4 * hair])
  }
  context.restore()
  if (outline) stroke(context, outline, inks.ink, 1.4 * hair, [])
  context.restore()
} // prettier-ignore

function fill(context: CanvasRenderingContext2D, path: Path2D, colour: string): void {
  context.fillStyle = colour
  context.fill(path, 'evenodd')
}

function stroke(context: CanvasRenderingContext2D, path: Path2D, colour: string, width: number, dash: readonly number[]): void {
  context.strokeStyle = colour
  context.lineWidth = width
  context.setLineDash([...dash])
  context.stroke(path)
} // prettier-ignore

/** Dies in spec as hairlines; out of spec framed, undecided dashed. */
function paintDies(context: CanvasRenderingContext2D, { dies }: MapModel, plane: ScreenPlane): void {
  if (!dies) return
  const width = dies.pitchX_mm * plane.scale
  const height = dies.pitchY_mm * plane.scale
  if (width < 2 || height < 2) return
  const { left_mm, right_mm, bottom_mm, top_mm } = plane.window
  for (const pass of [0, 1] as const) {
    for (let i = 0; i < dies.row.length; i++) {
      const isCalm = dies.verdict[i] === 0 || dies.verdict[i] === 3
      if (isCalm !== (pass === 0)) continue
      if (dies.x_mm[i] < left_mm - dies.pitchX_mm || dies.x_mm[i] > right_mm + dies.pitchX_mm) continue
      if (dies.y_mm[i] < bottom_mm - dies.pitchY_mm || dies.y_mm[i] > top_mm + dies.pitchY_mm) continue
      const x = plane.x(dies.x_mm[i]) - width / 2
      const y = plane.y(dies.y_mm[i]) - height / 2
      frameDie(context, x, y, width, height, dies.verdict[i])
    }
  }
  context.setLineDash([])
}

function frameDie(context: CanvasRenderingContext2D, x: number, y: number, width: number, height: number, verdict: number): void {
  context.setLineDash([])
  if (verdict === 0 || verdict === 3) {
    context.strokeStyle = 'rgba(255, 255, 255, 0.28)'
    context.lineWidth = 0.6
    context.strokeRect(x, y, width, height)
    return
  }
  context.strokeStyle = LIGHT
  context.lineWidth = 2.6
  context.strokeRect(x + 1.5, y + 1.5, width - 3, height - 3)
  context.strokeStyle = verdict === 1 ? ALERT : DARK
  context.lineWidth = 1.3
  if (verdict === 2) context.setLineDash([3, 2])
  context.strokeRect(x + 1.5, y + 1.5, width - 3, height - 3)
} // prettier-ignore

function paintSites(context: CanvasRenderingContext2D, model: MapModel, plane: ScreenPlane, inks: Inks): void {
  const { places, grid, bands, scale } = model
  const seen = grid.within(plane.window)
  const withDots = seen.length <= MOST_DOTS
  // On a very large screen marks grow with the map.
  const most = Math.max(7, Math.min(plane.width, plane.height) / 90)
  const size = Math.min(most, Math.max(2.5, 260 / Math.sqrt(Math.max(1, seen.length))))
  let drawn = 0
  for (const i of seen) {
    const kind = places.kind[i]
    if (kind === 'in-spec' && !withDots && !places.isExcluded[i]) continue
    if (++drawn > MOST_MARKS) break
    const colour = scale.colours[bandOf(scale, places.value[i])]
    const ink = bands ? (isDark(colour) ? LIGHT : DARK) : inks.ink
    const [x, y] = [plane.x(places.x_mm[i]), plane.y(places.y_mm[i])]
    if (!bands && kind === 'in-spec') paintDisc(context, x, y, size * 0.6, colour, inks.ink)
    else if (places.isExcluded[i]) paintHatch(context, x, y, size)
    else paintMark(context, kind, x, y, size, ink)
  }
}

function paintDisc(context: CanvasRenderingContext2D, x: number, y: number, radius: number, colour: string, rim: string): void {
  context.beginPath()
  context.arc(x, y, radius, 0, 2 * Math.PI)
  context.fillStyle = colour
  context.fill()
  context.lineWidth = 0.5
  context.strokeStyle = rim
  context.stroke()
} // prettier-ignore

/** A site that a person took out: a hatched square, so that nobody takes it for one that was never judged. */
function paintHatch(context: CanvasRenderingContext2D, x: number, y: number, size: number): void {
  const s = size * 1.05
  context.fillStyle = 'rgba(255, 255, 255, 0.85)'
  context.fillRect(x - s, y - s, 2 * s, 2 * s)
  context.strokeStyle = DARK
  context.lineWidth = 1
  context.beginPath()
  context.rect(x - s, y - s, 2 * s, 2 * s)
  for (const k of [-1, 0, 1]) {
    const shift = k * s
    context.moveTo(x - s + Math.max(0, shift), y + s + Math.min(0, shift))
    context.lineTo(x + s + Math.min(0, shift), y - s + Math.max(0, shift))
  }
  context.stroke()
}

export function paintMark(context: CanvasRenderingContext2D, kind: MarkKind, x: number, y: number, s: number, ink: string): void {
  context.beginPath()
  switch (kind) {
    case 'in-spec':
      context.arc(x, y, Math.max(1, s * 0.32), 0, 2 * Math.PI)
      context.fillStyle = ink
      context.fill()
      return
    case 'above':
      return paintTriangle(context, x, y, s, -1)
    case 'below':
      return paintTriangle(context, x, y, s, 1)
    case 'undecided':
      context.moveTo(x, y - s * 1.1)
      context.lineTo(x + s, y)
      context.lineTo(x, y + s * 1.1)
      context.lineTo(x - s, y)
      context.closePath()
      break
    case 'not-assessed':
      context.moveTo(x - s * 0.7, y - s * 0.7)
      context.lineTo(x + s * 0.7, y + s * 0.7)
      context.moveTo(x - s * 0.7, y + s * 0.7)
      context.lineTo(x + s * 0.7, y - s * 0.7)
  }
  context.lineWidth = 1.4
  context.strokeStyle = ink
  context.stroke()
} // prettier-ignore

function paintTriangle(context: CanvasRenderingContext2D, x: number, y: number, s: number, way: 1 | -1): void {
  context.moveTo(x - s, y - way * s * 0.8)
  context.lineTo(x, y + way * s)
  context.lineTo(x + s, y - way * s * 0.8)
  context.closePath()
  context.lineWidth = 2
  context.strokeStyle = LIGHT
  context.stroke()
  context.fillStyle = ALERT
  context.fill()
}
