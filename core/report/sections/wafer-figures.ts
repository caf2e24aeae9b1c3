/** The figures of a wafer's page: its map, the profile along the radius and the histogram. */
import { VERDICTS, type WaferAnalysis } from '../../analysis/lot-analysis'
import type { Drawing } from '../drawing'
import { histogram } from '../figures/histogram'
import { radialProfile } from '../figures/radial-profile'
import type { MapDies } from '../figures/map-input'
import { waferMap } from '../figures/wafer-map'
import { waferTitle, type ReportContext } from '../report-context'

export interface FigureSize {
  readonly width_pt: number
  readonly height_pt: number
}

export interface WaferMapFigure {
  readonly map: Drawing
  /** By which the surface between the sites was made; null where there is none. */
  readonly method: string | null
}

/** null without places, or where no site of the lot has a value. */
export function waferMapFigure(wafer: WaferAnalysis, size: FigureSize, context: ReportContext): WaferMapFigure | null {
  const { analysis, siteLimits, scale } = context
  const { quantity, outline, procedure } = analysis
  if (!context.hasPositions || !scale) return null
  const sites = context.sitesOf(wafer)
  const surface = context.surfaceOf(sites, 'large')
  const map = waferMap({
    title: `${waferTitle(wafer.id)}: map of ${quantity.title}`,
    outline,
    edgeExclusion_mm: procedure.wafer.edgeExclusionMm,
    quantity,
    sites,
    limits: siteLimits,
    scale,
    contours: surface?.contours ?? null,
    diesOut: diesOutOf(wafer, context),
    ...size,
  })
  return { map, method: surface?.method ?? null }
}

export function radialFigure(wafer: WaferAnalysis, size: FigureSize, context: ReportContext): Drawing {
  const { outline, quantity, procedure } = context.analysis
  const isDisc = outline.shape === 'disc'
  return radialProfile({
    title: `${waferTitle(wafer.id)}: radial profile`,
    quantity,
    sites: context.sitesOf(wafer),
    limits: context.siteLimits,
    edgeRadius_mm: isDisc ? outline.diameter_mm / 2 : NaN,
    edgeExclusion_mm: isDisc ? procedure.wafer.edgeExclusionMm : 0,
    ...size,
  })
}

export function histogramFigure(wafer: WaferAnalysis, size: FigureSize, context: ReportContext): Drawing {
  const { value } = context.sitesOf(wafer)
  const { quantity } = context.analysis
  const title = `${waferTitle(wafer.id)}: histogram`
  return histogram({ title, quantity, values: value, limits: context.siteLimits, ...size })
}

function diesOutOf(wafer: WaferAnalysis, { analysis }: ReportContext): MapDies | null {
  const { dies, procedure } = analysis
  if (!dies || !procedure.dieGrid) return null
  const centreX_mm: number[] = []
  const centreY_mm: number[] = []
  for (let i = 0; i < dies.count; i++) {
    if (dies.wafer[i] !== wafer.index || VERDICTS[dies.verdict[i]] !== 'out-of-spec') continue
    centreX_mm.push(dies.x_mm[i])
    centreY_mm.push(dies.y_mm[i])
  }
  return { centreX_mm, centreY_mm, pitchX_mm: procedure.dieGrid.pitchXMm, pitchY_mm: procedure.dieGrid.pitchYMm }
}
