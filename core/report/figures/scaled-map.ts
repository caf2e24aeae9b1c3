/** A small map with a title and a colour scale of its own, for what isn't on the scale of the lot's maps. */
import type { Outline } from '../../wafer/outline'
import type { Drawing } from '../drawing'
import { group, text } from '../drawing'
import { formatNumber } from '../../units/format'
import { surfacesFor } from '../surface'
import { bandScale } from './band-scale'
import { colourBar } from './colour-bar'
import { AXIS_PT, INK } from './ink'
import { NO_LIMITS } from './marks'
import { smallMap } from './small-map'
import type { MapQuantity, MapSites } from './map-input'

export interface ScaledMapInput {
  readonly title: string
  /** Over the map; shorter than the title. */
  readonly caption: string
  readonly outline: Outline
  readonly quantity: MapQuantity
  /** Some of them with a value. */
  readonly sites: Pick<MapSites, 'x_mm' | 'y_mm' | 'value'>
  readonly width_pt: number
  readonly height_pt: number
}

const CAPTION_PT = 16
const BANDS = 12
const BAR_GAP_PT = 22

export function scaledMap(input: ScaledMapInput): Drawing {
  const { outline, quantity, width_pt, height_pt } = input
  const sites: MapSites = { ...input.sites, verdict: new Uint8Array(input.sites.value.length) }
  const values = Array.from(sites.value).filter(Number.isFinite)
  const min = values.reduce((least, value) => Math.min(least, value), Infinity)
  const max = values.reduce((most, value) => Math.max(most, value), -Infinity)
  const scale = bandScale(min, max, BANDS)
  const size_pt = Math.min(height_pt - CAPTION_PT, width_pt - 70)
  const contours = surfacesFor(outline, scale)(sites, 'large')?.contours ?? null
  const range = `${formatNumber(min, quantity.unit)} to ${formatNumber(max, quantity.unit)} ${quantity.unit}`
  return {
    width_pt,
    height_pt,
    title: input.title,
    description: `${input.caption}: map of ${quantity.title}, from ${range} at ${values.length} places, on a colour scale of its own.`,
    shapes: [
      text(0, 8, input.caption, { size_pt: AXIS_PT, fill: INK, font: 'bold' }),
      group(0, CAPTION_PT, smallMap({ outline, scale, sites, contours, size_pt })),
      colourBar({
        x_pt: size_pt + BAR_GAP_PT,
        y_pt: CAPTION_PT + 14,
        height_pt: size_pt - 22,
        scale,
        limits: NO_LIMITS,
        quantity,
      }),
    ],
  }
}
