/** The scale beside a map: its bands, and labels that don't crowd. */
import type { BandScale } from '../../../core/report/figures/band-scale'
import { formatFixed, formatScientific } from '../../../core/units/format'

export interface ColourBar {
  readonly bands: readonly { readonly colour: string; readonly from: number; readonly to: number }[]
  readonly labels: readonly { readonly at: number; readonly text: string }[]
}

const LEAST_GAP = 17

/** From 0 at the top to `height` at the bottom. */
export function colourBar({ edges, colours, decimals, goesOn }: BandScale, unit: string, height: number): ColourBar {
  const step = height / colours.length
  const every = Math.max(1, Math.ceil(LEAST_GAP / step))
  const isDecade = unit === 'cm⁻³' || unit === 'cm⁻²'
  const words = (value: number): string => (isDecade ? formatScientific(value, 3) : formatFixed(value, decimals))
  const last = edges.length - 1
  const sign = (i: number): string => (i === 0 && goesOn.below ? '≤ ' : i === last && goesOn.above ? '≥ ' : '')
  return {
    bands: colours.map((colour, i) => ({ colour, from: height - (i + 1) * step, to: height - i * step })),
    labels: edges
      .map((edge, i) => ({ at: height - i * step, text: `${sign(i)}${words(edge)}` }))
      .filter((_, i) => i % every === 0),
  }
}

/** How high on the bar a value stands; null beyond its ends. */
export function heightOnBar({ edges }: BandScale, value: number, height: number): number | null {
  const [low, high] = [edges[0], edges[edges.length - 1]]
  return value >= low && value <= high ? height * (1 - (value - low) / (high - low)) : null
}
