/** The colours of value maps: bands of equal width with round edges, one scale for all the wafers of a lot. */
import { colorScale } from '../../map/color-scale'
import { fromStep, niceStep, stepDecimals } from './ticks'

export interface BandScale {
  /** Ascending; band i reaches from edge i to edge i + 1. */
  readonly edges: readonly number[]
  /** One a band, `#rrggbb`. */
  readonly colours: readonly string[]
  readonly decimals: number
  /** Values lie beyond that end and have its colour. */
  readonly goesOn: { readonly below: boolean; readonly above: boolean }
}

/** About `count` bands that cover [min, max]. */
export function bandScale(min: number, max: number, count = 11): BandScale {
  const flat = !(max > min)
  const low = flat ? min - Math.max(1e-3, Math.abs(min) * 1e-3) : min
  const high = flat ? max + Math.max(1e-3, Math.abs(max) * 1e-3) : max
  const step = niceStep((high - low) / count)
  const first = Math.floor(low / step + 1e-9)
  const last = Math.max(first + 1, Math.ceil(high / step - 1e-9))
  const edges: number[] = []
  for (let i = first; i <= last; i++) edges.push(fromStep(i, step))
  const bands = edges.length - 1
  const { color } = colorScale('viridis', { min: 0, max: bands })
  const colours = Array.from({ length: bands }, (_, i) => color(i + 0.5))
  return { edges, colours, decimals: stepDecimals(step), goesOn: { below: false, above: false } }
}

/** The band a value lies in; values beyond the ends belong to the end bands. */
export function bandOf(scale: BandScale, value: number): number {
  const { edges, colours } = scale
  let low = 0
  let high = colours.length - 1
  while (low < high) {
    const middle = (low + high + 1) >> 1
    if (value >= edges[middle]) low = middle
    else high = middle - 1
  }
  return low
}

export function colourOf(scale: BandScale, value: number): string {
  return scale.colours[bandOf(scale, value)]
}

/** Whether ink or paper reads better on a colour: relative luminance of WCAG 2 (2008). */
export function isDark(colour: string): boolean {
  const channel = (at: number) => {
    const c = parseInt(colour.slice(at, at + 2), 16) / 255
    return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4
  }
  return 0.2126 * channel(1) + 0.7152 * channel(3) + 0.0722 * channel(5) < 0.18
}
