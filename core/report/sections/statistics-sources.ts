/** Where the figures of a wafer's page come from, for the list of sources. */
import type { LotAnalysis } from '../../analysis/lot-analysis'
import { waferDetails, type WaferDetails } from '../../analysis/wafer-details'
import { TREND } from '../../map/formulas'
import {
  AREA_WEIGHTED, CAPABILITY, INTERVALS, NORMALITY, OUTLIERS, RADIAL_VARIATION,
} from '../../statistics/formulas' // prettier-ignore
import type { Formula } from '../../units/formula'
import type { SourceUse } from '../source-list'

/** Of those figures that some wafer has. */
export function statisticsUses(analysis: LotAnalysis): SourceUse[] {
  const all = analysis.wafers.map((wafer) => waferDetails(analysis, wafer))
  const some = (has: (details: WaferDetails) => boolean, { source, title }: Formula): SourceUse[] =>
    all.some(has) ? [{ reference: source, use: title }] : []
  return [
    ...some(({ figures }) => figures.meanInterval !== null, INTERVALS),
    ...some(({ figures }) => figures.areaWeighted !== null, AREA_WEIGHTED),
    ...some(({ figures }) => figures.outliers !== null, OUTLIERS),
    ...some(({ figures }) => figures.capability !== null, CAPABILITY),
    ...some(({ figures }) => figures.normality !== null, NORMALITY),
    ...some(({ figures }) => figures.radialVariation !== null, RADIAL_VARIATION),
    ...some(({ patterns }) => patterns !== null, TREND),
  ]
}
