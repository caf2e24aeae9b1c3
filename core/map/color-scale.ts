/** From values to colours: perceptually even and safe for the colour-blind. */
import { interpolateCividis, interpolateRdBu, interpolateViridis } from 'd3-scale-chromatic'
import { CoreError } from '../problems/problem'

export const colorMapIds = ['viridis', 'cividis', 'deviation'] as const
export type ColorMapId = (typeof colorMapIds)[number]

export interface ColorMap {
  readonly id: ColorMapId
  readonly title: string
  /** Whether its middle means something and belongs on a target. */
  readonly isDiverging: boolean
  /** Any CSS form, for 0 <= share <= 1. */
  readonly color: (share: number) => string
}

export const colorMaps: readonly ColorMap[] = [
  { id: 'viridis', title: 'Viridis', isDiverging: false, color: interpolateViridis },
  { id: 'cividis', title: 'Cividis', isDiverging: false, color: interpolateCividis },
  // Turned round, so that red is high.
  {
    id: 'deviation',
    title: 'Blue to red about the target',
    isDiverging: true,
    color: (share) => interpolateRdBu(1 - share),
  },
]

/** What has no value. */
export const NO_VALUE_COLOR = '#c8c8c8'

export type Rgb = readonly [red: number, green: number, blue: number]

/** Throws CoreError 'unknown-id'. */
export function colorMap(id: string): ColorMap {
  const found = colorMaps.find((map) => map.id === id)
  if (!found) throw new CoreError({ kind: 'unknown-id', family: 'colour map', id, known: colorMapIds })
  return found
}

export interface ColorScale {
  readonly map: ColorMap
  /** The values at the two ends; beyond them the end's colour goes on. */
  readonly min: number
  readonly max: number
  /** `#rrggbb`; NaN gives NO_VALUE_COLOR. */
  readonly color: (value: number) => string
  readonly rgb: (value: number) => Rgb
}

/**
 * A scale from min to max. A diverging map is laid evenly about `centre` (absent: the middle), so that equal deviations
 * up and down are equally strong. Where min is max, everything has the middle colour.
 */
export function colorScale(
  id: ColorMapId,
  domain: { readonly min: number; readonly max: number; readonly centre?: number | undefined },
): ColorScale {
  const map = colorMap(id)
  const { min, max } = map.isDiverging ? evenAbout(domain) : domain
  const share = (value: number) => (max > min ? Math.min(1, Math.max(0, (value - min) / (max - min))) : 0.5)
  const rgb = (value: number) => parseRgb(Number.isNaN(value) ? NO_VALUE_COLOR : map.color(share(value)))
  return { map, min, max, rgb, color: (value) => hexOf(rgb(value)) }
}

/** 256 colours along a map as red, green, blue bytes in turn: for pictures of many cells. */
export function colorTable(id: ColorMapId): Uint8Array {
  const { color } = colorMap(id)
  const table = new Uint8Array(3 * 256)
  for (let i = 0; i < 256; i++) table.set(parseRgb(color(i / 255)), 3 * i)
  return table
}

function evenAbout(domain: { readonly min: number; readonly max: number; readonly centre?: number | undefined }): {
  min: number
  max: number
} {
  const centre = domain.centre ?? (domain.min + domain.max) / 2
  const reach = Math.max(domain.max - centre, centre - domain.min)
  return { min: centre - reach, max: centre + reach }
}

function parseRgb(color: string): Rgb {
  const isHex = color.startsWith('#')
  const parts = isHex ? color.slice(1).match(/../g) : color.match(/\d+/g)
  const [red = 0, green = 0, blue = 0] = (parts ?? []).map((part) => parseInt(part, isHex ? 16 : 10))
  return [red, green, blue]
}

function hexOf(rgb: Rgb): string {
  return `#${rgb.map((channel) => channel.toString(16).padStart(2, '0')).join('')}`
}
