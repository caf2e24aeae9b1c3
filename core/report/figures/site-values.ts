/** The sites' values, printed small on a map. */
import { edgeDistance_mm, type Outline } from '../../wafer/outline'
import { formatFixed } from '../../units/format'
import type { Shape } from '../drawing'
import { rectangle, text } from '../drawing'
import { bandOf, isDark } from './band-scale'
import { FAINT, INK, PAPER } from './ink'
import { placeLabels, type LabelWish, type PlacedLabel } from './label-places'
import type { MarkKind } from './marks'
import type { Plane, WaferMapInput } from './map-input'

export interface MarkedSite {
  /** Row of the site columns. */
  readonly key: number
  readonly kind: MarkKind
}

const VALUE_PT = 5.2

/** With more sites than this, only those that say something have their value printed. */
const MOST_VALUES = 130

export function siteValues(
  sites: readonly MarkedSite[],
  markHalf: number,
  input: WaferMapInput,
  plane: Plane,
): Shape[] {
  const { x_mm, y_mm, value } = input.sites
  const decimals = siteDecimals(value)
  const ends = extremeSites(value)
  const room = roomOnWafer(input, plane)
  const wishes = sites.map(({ key, kind }): LabelWish => {
    const isTold = sites.length <= MOST_VALUES || kind !== 'in-spec' || ends.includes(key)
    return {
      x: plane.x(x_mm[key]),
      y: plane.y(y_mm[key]),
      text: formatFixed(value[key], decimals),
      empty: !isTold || Number.isNaN(value[key]),
      preferAbove: y_mm[key] < 0,
      markHalf,
      room,
      key,
    }
  })
  return placeLabels(wishes, VALUE_PT).flatMap((label) => valueLabel(label, input, plane))
}

/** Between two heights, how far the wafer reaches to either side. */
function roomOnWafer({ outline }: WaferMapInput, plane: Plane): LabelWish['room'] {
  const heightOf_mm = (y_pt: number) => (plane.y(0) - y_pt) / plane.scale_pt_per_mm
  return (top, bottom) => {
    const reach_mm = Math.min(reachAt(outline, heightOf_mm(top)), reachAt(outline, heightOf_mm(bottom)))
    return { left: plane.x(-reach_mm) + 1.5, right: plane.x(reach_mm) - 1.5 }
  }
}

function reachAt(outline: Outline, y_mm: number): number {
  if (outline.shape === 'infinite') return 1e6
  if (outline.shape === 'rectangle') return Math.abs(y_mm) <= outline.height_mm / 2 ? outline.width_mm / 2 : 0
  return Math.sqrt(Math.max(0, (outline.diameter_mm / 2) ** 2 - y_mm ** 2))
}

function extremeSites(values: ArrayLike<number>): readonly [lowest: number, highest: number] {
  let lowest = -1
  let highest = -1
  for (let i = 0; i < values.length; i++) {
    if (Number.isNaN(values[i])) continue
    if (lowest < 0 || values[i] < values[lowest]) lowest = i
    if (highest < 0 || values[i] > values[highest]) highest = i
  }
  return [lowest, highest]
}

/** A label that would lie on a thin line gets a patch of its site's colour behind it. */
function valueLabel(label: PlacedLabel, input: WaferMapInput, plane: Plane): Shape[] {
  const ground = input.contours ? input.scale.colours[bandOf(input.scale, input.sites.value[label.key])] : FAINT
  const ink = isDark(ground) ? PAPER : INK
  const shape = text(label.x, label.baseline, label.text, { size_pt: VALUE_PT, fill: ink, anchor: 'middle' })
  if (!liesOnLine(label, input, plane)) return [shape]
  const patch = rectangle(
    label.x - label.halfWidth,
    label.baseline - 0.8 * VALUE_PT,
    2 * label.halfWidth,
    0.88 * VALUE_PT,
    { fill: ground },
  )
  return [patch, shape]
}

function liesOnLine(label: PlacedLabel, { outline, edgeExclusion_mm, diesOut }: WaferMapInput, plane: Plane): boolean {
  const scale = plane.scale_pt_per_mm
  const x_mm = (label.x - plane.x(0)) / scale
  const y_mm = (plane.y(0) - label.baseline + 0.4 * VALUE_PT) / scale
  const reach_mm = label.halfWidth / scale
  const isOnRing = Math.abs(edgeDistance_mm(outline, x_mm, y_mm) - edgeExclusion_mm) < reach_mm + 1
  if (edgeExclusion_mm > 0 && isOnRing) return true
  if (!diesOut) return false
  return diesOut.centreX_mm.some(
    (x, i) =>
      Math.abs(x - x_mm) < diesOut.pitchX_mm / 2 + reach_mm &&
      Math.abs(diesOut.centreY_mm[i] - y_mm) < diesOut.pitchY_mm / 2 + VALUE_PT / scale,
  )
}

/** Four significant digits at the largest value, the same decimals for all. */
export function siteDecimals(values: ArrayLike<number>): number {
  let largest = 0
  for (let i = 0; i < values.length; i++) if (Math.abs(values[i]) > largest) largest = Math.abs(values[i])
  return largest > 0 ? Math.max(0, Math.min(8, 3 - Math.floor(Math.log10(largest)))) : 0
}
