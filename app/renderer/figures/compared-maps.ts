/** Maps of more than one wafer: the difference of two, and the mean of a lot. */
import type { WaferAnalysis } from '../../../core/analysis/lot-analysis'
import { NOT_JUDGED } from '../../../core/analysis/flags'
import { rasterGrid } from '../../../core/map/grid'
import { lotMap } from '../../../core/map/lot-map'
import type { SiteColumnsOfWafer } from '../../../core/map/profiles'
import { compareWafers, COMMON_PLACES_TITLES } from '../../../core/map/wafer-arithmetic'
import { waferTitle } from '../../../core/report/report-context'
import { divergingScale } from './layers'
import { extremes } from './map-layer'
import type { LotPictures } from './lot-pictures'
import { surfaceModel, type MapModel } from './map-model'

export interface ComparedMap {
  readonly title: string
  readonly unit: string
  readonly model: MapModel
  readonly isWafer: false
}

const GRID_ACROSS = 61

/** Null where either has no place or value to compare. */
export function differenceMap(pictures: LotPictures, wafer: WaferAnalysis, other: WaferAnalysis): ComparedMap | null {
  const [first, second] = [columnsOf(pictures, wafer), columnsOf(pictures, other)]
  if (!first || !second) return null
  const { x_mm, y_mm, difference, places } = compareWafers(first, second, targets(pictures))
  const { min, max } = extremes(difference)
  const scale = divergingScale(Math.max(Math.abs(min), Math.abs(max), 1e-9))
  const title = `${waferTitle(wafer.id)} less ${waferTitle(other.id).toLowerCase()}, ${COMMON_PLACES_TITLES[places]}`
  return { title, unit: pictures.analysis.quantity.unit, model: surfaceModel(pictures, x_mm, y_mm, difference, scale), isWafer: false }
} // prettier-ignore

export function lotMeanMap(pictures: LotPictures): ComparedMap | null {
  const columns = pictures.wafers.flatMap((wafer) => columnsOf(pictures, wafer) ?? [])
  if (columns.length === 0 || !pictures.scale) return null
  const { x_mm, y_mm, mean, wafers, places } = lotMap(columns, targets(pictures))
  const title = `Mean of ${wafers} wafers, ${COMMON_PLACES_TITLES[places]}`
  return { title, unit: pictures.analysis.quantity.unit, model: surfaceModel(pictures, x_mm, y_mm, mean, pictures.scale), isWafer: false }
} // prettier-ignore

/** A wafer's sites that count; null without places or values. */
export function columnsOf({ analysis, positions }: LotPictures, wafer: WaferAnalysis): SiteColumnsOfWafer | null {
  const { value, flags } = analysis.sites
  if (!positions) return null
  const sites = wafer.sites.filter((site) => (flags[site] & NOT_JUDGED) === 0 && Number.isFinite(value[site]))
  return sites.length > 0 ? { x_mm: positions.x_mm, y_mm: positions.y_mm, value, sites } : null
}

function targets({ analysis, positions }: LotPictures): { x_mm: Float64Array; y_mm: Float64Array } {
  if (analysis.outline.shape !== 'infinite') return rasterGrid(analysis.outline, GRID_ACROSS).targets
  return positions ?? { x_mm: new Float64Array(0), y_mm: new Float64Array(0) }
}
