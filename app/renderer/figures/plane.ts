/** From millimetres on the wafer to pixels on the screen, and how zooming and panning change it. */
import type { Extent } from '../../../core/report/figures/outline-path'
import type { PlaceWindow } from './site-grid'

export interface View {
  /** 1 shows the whole wafer. */
  readonly zoom: number
  /** What stands in the middle. */
  readonly x_mm: number
  readonly y_mm: number
}

export const WHOLE: View = { zoom: 1, x_mm: 0, y_mm: 0 }
const MOST_ZOOM = 400

export interface ScreenPlane {
  readonly width: number
  readonly height: number
  /** Pixels a millimetre. */
  readonly scale: number
  readonly x: (x_mm: number) => number
  readonly y: (y_mm: number) => number
  readonly x_mm: (x: number) => number
  readonly y_mm: (y: number) => number
  readonly window: PlaceWindow
}

export interface Frame {
  readonly width: number
  readonly height: number
  readonly extent: Extent
}

/** Room around the wafer for its axes. */
const MARGIN = { left: 42, right: 14, top: 12, bottom: 32 }

export function screenPlane({ width, height, extent }: Frame, view: View): ScreenPlane {
  const across = Math.max(20, width - MARGIN.left - MARGIN.right)
  const up = Math.max(20, height - MARGIN.top - MARGIN.bottom)
  const fit = Math.min(across / (2.03 * extent.halfWidth_mm), up / (2.03 * extent.halfHeight_mm))
  const scale = fit * view.zoom
  const middleX = MARGIN.left + across / 2
  const middleY = MARGIN.top + up / 2
  const x = (x_mm: number): number => middleX + (x_mm - view.x_mm) * scale
  const y = (y_mm: number): number => middleY - (y_mm - view.y_mm) * scale
  const x_mm = (px: number): number => view.x_mm + (px - middleX) / scale
  const y_mm = (px: number): number => view.y_mm - (px - middleY) / scale
  const window = { left_mm: x_mm(0), right_mm: x_mm(width), bottom_mm: y_mm(height), top_mm: y_mm(0) }
  return { width, height, scale, x, y, x_mm, y_mm, window }
}

/** Zoomed so that the place under the pointer stays there. */
export function zoomedAt(view: View, plane: ScreenPlane, factor: number, x: number, y: number, extent: Extent): View {
  const zoom = Math.min(MOST_ZOOM, Math.max(1, view.zoom * factor))
  const kept = view.zoom / zoom
  const [placeX, placeY] = [plane.x_mm(x), plane.y_mm(y)]
  return within(
    { zoom, x_mm: placeX + (view.x_mm - placeX) * kept, y_mm: placeY + (view.y_mm - placeY) * kept },
    extent,
  )
}

export function moved(view: View, plane: ScreenPlane, dx: number, dy: number, extent: Extent): View {
  return within({ ...view, x_mm: view.x_mm - dx / plane.scale, y_mm: view.y_mm + dy / plane.scale }, extent)
}

/** Brings a place into view where it isn't. */
export function showing(view: View, plane: ScreenPlane, x_mm: number, y_mm: number, extent: Extent): View {
  const { left_mm, right_mm, bottom_mm, top_mm } = plane.window
  if (x_mm > left_mm && x_mm < right_mm && y_mm > bottom_mm && y_mm < top_mm) return view
  return within({ ...view, x_mm, y_mm }, extent)
}

/** The middle never leaves the wafer; the whole wafer stands centred. */
function within({ zoom, x_mm, y_mm }: View, { halfWidth_mm, halfHeight_mm }: Extent): View {
  const room = 1 - 1 / zoom
  const clamp = (value: number, half: number): number => Math.min(half * room, Math.max(-half * room, value))
  return { zoom, x_mm: clamp(x_mm, halfWidth_mm), y_mm: clamp(y_mm, halfHeight_mm) }
}
