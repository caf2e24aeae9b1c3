/** The report's own drawings, made for the window. */
import type { Drawing } from '../../../core/report/drawing'
import { histogram } from '../../../core/report/figures/histogram'
import { radialProfile } from '../../../core/report/figures/radial-profile'
import { waferMap } from '../../../core/report/figures/wafer-map'
import { waferMeans } from '../../../core/report/figures/wafer-means'
import { verdictCode } from '../../../core/conformity/verdict'
import type { WaferAnalysis } from '../../../core/analysis/lot-analysis'
import { waferTitle } from '../../../core/report/report-context'
import type { LotPictures } from './lot-pictures'

/** Small on paper is large on the screen: the window sets a drawing as wide as its column. */
const LEAF = { width_pt: 264, height_pt: 190 } as const
const WIDE = { width_pt: 400, height_pt: 200 } as const

export function lotFigure({ analysis, wafers, meanLimits }: LotPictures): Drawing {
  return waferMeans({
    title: `Wafer means of ${analysis.lot.name}`,
    quantity: analysis.quantity,
    names: wafers.map(({ id }) => id),
    mean: wafers.map(({ statistics }) => statistics.mean),
    spread: wafers.map(({ statistics }) => statistics.standardDeviation),
    verdict: wafers.map(({ verdict }) => verdictCode(verdict)),
    limits: meanLimits,
    ...WIDE,
  })
}

export function radialFigure(pictures: LotPictures, wafer: WaferAnalysis): Drawing {
  const { analysis, siteLimits, sitesOf } = pictures
  const { outline } = analysis
  return radialProfile({
    title: `Radial profile of ${waferTitle(wafer.id).toLowerCase()}`,
    quantity: analysis.quantity,
    sites: sitesOf(wafer),
    limits: siteLimits,
    edgeRadius_mm: outline.shape === 'disc' ? outline.diameter_mm / 2 : NaN,
    edgeExclusion_mm: analysis.procedure.wafer.edgeExclusionMm,
    ...LEAF,
  })
}

export function histogramFigure({ analysis, siteLimits, sitesOf }: LotPictures, wafer: WaferAnalysis): Drawing {
  return histogram({
    title: `Histogram of ${waferTitle(wafer.id).toLowerCase()}`,
    quantity: analysis.quantity,
    values: sitesOf(wafer).value,
    limits: siteLimits,
    ...LEAF,
  })
}

/** For export: the map as the report prints it. */
export function mapFigure(pictures: LotPictures, wafer: WaferAnalysis): Drawing | null {
  const { analysis, siteLimits, sitesOf, scale, surfaceOf } = pictures
  if (!scale) return null
  const sites = sitesOf(wafer)
  return waferMap({
    title: `Map of ${waferTitle(wafer.id).toLowerCase()}`,
    outline: analysis.outline,
    edgeExclusion_mm: analysis.procedure.wafer.edgeExclusionMm,
    quantity: analysis.quantity,
    sites,
    limits: siteLimits,
    scale,
    contours: surfaceOf(sites, 'large')?.contours ?? null,
    diesOut: null,
    width_pt: 420,
    height_pt: 400,
  })
}
