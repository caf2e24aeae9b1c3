/** Where the figures of a wafer's page come from, for the list of sources. */
import type { LotAnalysis } from '../../analysis/lot-analysis'
import { waferDetails } from '../../analysis/wafer-details'
import type { SourceUse } from '../source-list'

const HANDBOOK = 'NIST/SEMATECH e-Handbook of Statistical Methods'

/** Of those figures that some wafer has. */
export function statisticsUses(analysis: LotAnalysis): SourceUse[] {
  const all = analysis.wafers.map((wafer) => waferDetails(analysis, wafer))
  const some = (has: (details: (typeof all)[number]) => boolean, reference: string, use: string): SourceUse[] =>
    all.some(has) ? [{ reference, use }] : []
  return [
    ...some(({ figures }) => figures.meanInterval !== null, `${HANDBOOK}, 1.3.5.2 and 1.3.5.8`, 'Intervals of mean and s'),
    ...some(({ figures }) => figures.areaWeighted !== null, AREA_WEIGHTED, 'Area-weighted mean and s'),
    ...some(({ figures }) => figures.outliers !== null, `B. Rosner, Technometrics 25 (1983) 165; ${HANDBOOK}, 1.3.5.17.3`, 'Outliers: generalized ESD test'),
    ...some(({ figures }) => figures.capability !== null, `A. F. Bissell, Appl. Stat. 39 (1990) 331 (from memory); ${HANDBOOK}, 6.1.6`, 'Capability Cp, Cpk and their intervals'),
    ...some(({ figures }) => figures.normality !== null, NORMALITY, 'Normality: Anderson–Darling test'),
    ...some(({ figures }) => figures.radialVariation !== null, 'SEMI MF81 (formula from memory; standard’s text not read)', 'Radial variation'),
    ...some(({ patterns }) => patterns !== null, TREND, 'Trend surface of the patterns'),
  ] // prettier-ignore
}

const AREA_WEIGHTED = 'M. Galassi et al., GNU Scientific Library Reference Manual, weighted samples (from memory)'
const NORMALITY = "R. B. D'Agostino, M. A. Stephens, Goodness-of-Fit Techniques (1986) tables 4.7 and 4.9 (from memory)"
const TREND =
  'N. R. Draper, H. Smith, Applied Regression Analysis, 3rd ed. (1998) ch. 6 (from memory); Zernike polynomials'
