/** The colour scale beside a map: bands with their edges, the quantity with its unit, and where the limits lie. */
import type { Shape } from '../drawing'
import { group, line, polygon, rectangle, text } from '../drawing'
import { formatFixed } from '../../units/format'
import type { BandScale } from './band-scale'
import { AXIS_PT, INK, LABEL_PT, QUIET_INK } from './ink'
import type { SiteLimits } from './marks'
import type { MapQuantity } from './map-input'

export interface ColourBarInput {
  readonly x_pt: number
  readonly y_pt: number
  readonly height_pt: number
  readonly scale: BandScale
  readonly limits: SiteLimits
  readonly quantity: MapQuantity
}

const BAR_WIDTH_PT = 9

export function colourBar(input: ColourBarInput): Shape {
  const { scale, height_pt } = input
  const first = scale.edges[0]
  const last = scale.edges[scale.edges.length - 1]
  const yOf = (value: number) => height_pt * (1 - (value - first) / (last - first))
  const shapes: Shape[] = [
    text(0, -9, `${input.quantity.symbol} / ${input.quantity.unit}`, { size_pt: AXIS_PT, fill: INK }),
  ]
  scale.colours.forEach((fill, i) => {
    const top = yOf(scale.edges[i + 1])
    shapes.push(rectangle(0, top, BAR_WIDTH_PT, yOf(scale.edges[i]) - top, { fill }))
  })
  shapes.push(...openEnds(scale, height_pt))
  const every = Math.ceil(scale.edges.length / Math.max(2, Math.floor(height_pt / 10)))
  scale.edges.forEach((edge, i) => {
    if (i % every !== 0) return
    shapes.push(line(BAR_WIDTH_PT, yOf(edge), BAR_WIDTH_PT + 2, yOf(edge), { stroke: QUIET_INK, lineWidth_pt: 0.4 }))
    shapes.push(
      text(BAR_WIDTH_PT + 4, yOf(edge) + 2.3, formatFixed(edge, scale.decimals), {
        size_pt: LABEL_PT,
        fill: QUIET_INK,
      }),
    )
  })
  for (const [value, filled] of [[input.limits.lower, true], [input.limits.upper, true], [input.limits.target, false]] as const) {
    if (value >= first && value <= last) shapes.push(pointer(yOf(value), filled))
  } // prettier-ignore
  return group(input.x_pt, input.y_pt, shapes)
}

/** A point at an end of the bar: values beyond it have its colour. */
function openEnds({ goesOn, colours }: BandScale, height: number): Shape[] {
  const tip = (y: number, by: number, fill: string) =>
    polygon([0, y, BAR_WIDTH_PT / 2, y + by, BAR_WIDTH_PT, y], { fill })
  return [
    ...(goesOn.above ? [tip(0, -5, colours[colours.length - 1])] : []),
    ...(goesOn.below ? [tip(height, 5, colours[0])] : []),
  ]
}

/** A small pointer at the bar's left: filled at a limit, hollow at the target. */
function pointer(y: number, filled: boolean): Shape {
  const points = [-1, y, -5.5, y - 2.4, -5.5, y + 2.4]
  return polygon(points, filled ? { fill: INK } : { stroke: INK, lineWidth_pt: 0.5 })
}
