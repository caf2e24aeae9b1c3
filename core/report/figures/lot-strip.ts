/** All the wafers of a lot side by side as small maps on one colour scale. */
import type { Outline } from '../../wafer/outline'
import type { Drawing, Shape } from '../drawing'
import { group, polygon, text } from '../drawing'
import type { BandScale } from './band-scale'
import { colourBar } from './colour-bar'
import { INK, LABEL_PT } from './ink'
import type { MarkKind, SiteLimits } from './marks'
import { mark } from './marks'
import { smallMap } from './small-map'
import type { MapContour, MapQuantity, MapSites } from './map-input'

export interface StripWafer {
  readonly name: string
  readonly sites: MapSites
  readonly contours: readonly MapContour[] | null
  /** Shown beside the name; in spec shows none. */
  readonly mark: MarkKind
}

export interface LotStripInput {
  readonly title: string
  readonly outline: Outline
  readonly quantity: MapQuantity
  readonly scale: BandScale
  readonly limits: SiteLimits
  readonly wafers: readonly StripWafer[]
  readonly width_pt: number
}

const BAR_SPACE_PT = 56
const GAP_PT = 5
const NAME_PT = 11
const MOST_CELL_PT = 64
const LEAST_CELL_PT = 24

export function lotStrip(input: LotStripInput): Drawing {
  const room = input.width_pt - BAR_SPACE_PT
  const columns = columnsFor(input.wafers.length, room)
  const cell = Math.min(MOST_CELL_PT, (room - (columns - 1) * GAP_PT) / columns)
  const rows = Math.ceil(input.wafers.length / columns)
  const height_pt = Math.max(84, rows * (cell + NAME_PT + GAP_PT) - GAP_PT + 2)
  const shapes: Shape[] = input.wafers.map((wafer, i) => {
    const x = (i % columns) * (cell + GAP_PT)
    const y = Math.floor(i / columns) * (cell + NAME_PT + GAP_PT)
    return group(x, y, [...nameAndMark(wafer, cell), group(0, NAME_PT, mapIn(input, wafer, cell))])
  })
  const out = input.wafers.filter((wafer) => wafer.mark !== 'in-spec').map((wafer) => wafer.name)
  return {
    width_pt: input.width_pt,
    height_pt,
    title: input.title,
    description:
      `${input.wafers.length} small maps of ${input.quantity.title} on one colour scale, in slot order. ` +
      (out.length > 0 ? `Marked: wafers ${out.join(', ')}.` : 'None is marked.'),
    shapes: [
      ...shapes,
      colourBar({
        x_pt: input.width_pt - BAR_SPACE_PT + 14,
        y_pt: 14,
        height_pt: Math.min(130, height_pt - 18),
        scale: input.scale,
        limits: input.limits,
        quantity: input.quantity,
      }),
    ],
  }
}

/** As many a row as stay legible, and rows about equally full. */
function columnsFor(count: number, room_pt: number): number {
  const most = Math.max(1, Math.floor((room_pt + GAP_PT) / (28 + GAP_PT)))
  const rows = Math.max(1, Math.ceil(count / most))
  const columns = Math.max(1, Math.ceil(count / rows))
  return Math.min(columns, Math.floor((room_pt + GAP_PT) / (LEAST_CELL_PT + GAP_PT)))
}

function nameAndMark(wafer: StripWafer, cell: number): Shape[] {
  const most = Math.max(3, Math.floor((cell - 8) / (LABEL_PT * 0.57)))
  const name = wafer.name.length > most ? `…${wafer.name.slice(1 - most)}` : wafer.name
  const shapes: Shape[] = [text(0, 7, name, { size_pt: LABEL_PT, fill: INK })]
  if (wafer.mark !== 'in-spec') shapes.push(mark(wafer.mark, cell - 4, 4.8, 2.8))
  return shapes
}

function mapIn(input: LotStripInput, wafer: StripWafer, cell: number): Shape[] {
  const { outline, scale } = input
  return wafer.sites.value.length > 0
    ? smallMap({ outline, scale, sites: wafer.sites, contours: wafer.contours, size_pt: cell })
    : [polygon([0, 0, cell, 0, cell, cell, 0, cell], { stroke: INK, lineWidth_pt: 0.3, dash_pt: [1, 2] })]
}
