/** What can be laid over a wafer's map. */
import type { LotAnalysis } from '../../../core/analysis/lot-analysis'
import { colorScale, type ColorMapId } from '../../../core/map/color-scale'
import { bandScale, type BandScale } from '../../../core/report/figures/band-scale'
import { concentrationTitle } from '../../../core/report/sections/layer-words'
import { capital } from '../formats/words'
import type { LotPictures } from './lot-pictures'
import { mapErrorLayer } from './map-error-layer'
import { extremes, LAYER_IDS, recoloured, type LayerId, type MapLayer } from './map-layer'

const BANDS = 18

/** The layers that this lot has anything to show of, the judged value first. */
export function mapLayers(pictures: LotPictures): readonly MapLayer[] {
  return LAYER_IDS.flatMap((id) => mapLayer(pictures, id) ?? [])
}

export function mapLayer(pictures: LotPictures, id: LayerId): MapLayer | null {
  const { analysis, scale } = pictures
  if (!scale) return null
  const { sites, quantity, procedure } = analysis
  switch (id) {
    case 'value':
      return { id, title: quantity.title, unit: quantity.unit, column: sites.value, scale, isJudged: true }
    case 'deviation':
      return deviationLayer(pictures)
    case 'concentration':
      return spanned(id, capital(concentrationTitle(procedure.layer)), 'cm⁻³', sites.concentration_cm3, 'cividis')
    case 'dose':
      return spanned(id, 'Active dose', 'cm⁻²', sites.dose_cm2, 'cividis')
    case 'thickness':
      return spanned(id, 'Film thickness', 'µm', sites.thickness_um, 'cividis')
    case 'probability':
      return probabilityLayer(analysis)
    case 'uncertainty':
      return spanned(id, 'Standard uncertainty', quantity.unit, sites.u, 'cividis')
    case 'map-error':
      return mapErrorLayer(pictures)
  }
}

/** From the target of the limits, else from the mean of the lot, in percent of it. */
function deviationLayer({ analysis, siteLimits }: LotPictures): MapLayer | null {
  const hasTarget = Number.isFinite(siteLimits.target)
  const centre = hasTarget ? siteLimits.target : analysis.lot.statistics.mean
  if (!(centre > 0)) return null
  const column = analysis.sites.value.map((value) => (100 * (value - centre)) / centre)
  const title = hasTarget ? 'Deviation from target' : 'Deviation from the lot’s mean'
  const reach = Math.max(Math.abs(extremes(column).min), Math.abs(extremes(column).max))
  if (!Number.isFinite(reach)) return null
  return { id: 'deviation', title, unit: '%', column, scale: divergingScale(reach), isJudged: false }
}

export function divergingScale(reach: number): BandScale {
  const bands = bandScale(-reach, reach, BANDS)
  const { color } = colorScale('deviation', {
    min: bands.edges[0],
    max: bands.edges[bands.edges.length - 1],
    centre: 0,
  })
  return { ...bands, colours: bands.colours.map((_, i) => color((bands.edges[i] + bands.edges[i + 1]) / 2)) }
}

function probabilityLayer({ sites }: LotAnalysis): MapLayer | null {
  if (!sites.conformanceProbability.some(Number.isFinite)) return null
  const scale = recoloured(bandScale(0, 1, 10), 'cividis')
  return { id: 'probability', title: 'Probability to conform', unit: '', column: sites.conformanceProbability, scale, isJudged: false }
} // prettier-ignore

function spanned(id: LayerId, title: string, unit: string, column: Float64Array, map: ColorMapId): MapLayer | null {
  const { min, max } = extremes(column)
  if (!Number.isFinite(min) || (id === 'uncertainty' && max === 0)) return null
  return { id, title, unit, column, scale: recoloured(bandScale(min, max, BANDS), map), isJudged: false }
}
