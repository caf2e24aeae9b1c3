/** A layer of a wafer's map: a column a site, with its own scale, unit and words. */
import { colorScale, type ColorMapId } from '../../../core/map/color-scale'
import type { BandScale } from '../../../core/report/figures/band-scale'
import type { MapDetail, WaferSurface } from '../../../core/report/surface'

export const LAYER_IDS = [
  'value',
  'deviation',
  'concentration',
  'dose',
  'thickness',
  'probability',
  'uncertainty',
  'map-error',
] as const
export type LayerId = (typeof LAYER_IDS)[number]

export interface MapLayer {
  readonly id: LayerId
  readonly title: string
  readonly unit: string
  /** One entry a site of the lot. */
  readonly column: Float64Array
  readonly scale: BandScale
  /** Whether its values are those that the site limits are on. */
  readonly isJudged: boolean
  /** Where a layer knows itself between the sites: the surface of the wafer that a row of the lot's sites lies on. */
  readonly betweenSites?: (row: number, detail: MapDetail) => WaferSurface | null
}

export function recoloured(scale: BandScale, map: ColorMapId): BandScale {
  const { color } = colorScale(map, { min: 0, max: scale.colours.length })
  return { ...scale, colours: scale.colours.map((_, i) => color(i + 0.5)) }
}

export function extremes(column: ArrayLike<number>): { readonly min: number; readonly max: number } {
  let min = Infinity
  let max = -Infinity
  for (let i = 0; i < column.length; i++) {
    if (column[i] < min) min = column[i]
    if (column[i] > max) max = column[i]
  }
  return { min, max }
}
