import type { LotAnalysis, WaferAnalysis } from '../../core/analysis/lot-analysis'
import { mapFit, type MapFit } from '../../core/analysis/map-fit'
import { acceptanceWords } from '../../core/conformity/acceptance'
import { formatFixed, formatSignificant } from '../../core/units/format'
import { aligned } from './text-table'

/** The lot as a short table for a terminal: its sentence, a row a wafer, a row for the lot, the reasons. */
export function lotTable(analysis: LotAnalysis): string {
  const { wafers, lot, quantity, dies } = analysis
  const header = [
    'wafer',
    'sites',
    `mean ${quantity.unit}`,
    'u(mean)',
    'SUP %',
    'HLV %',
    'min',
    'max',
    'left out',
    'sites out',
    'dies out',
    'verdict',
  ]
  const fits = wafers.map((wafer) => mapFit(analysis, wafer))
  const rows = wafers.map((wafer, k) => waferRow(wafer, leftOut(fits[k]), dies !== null))
  const { statistics } = lot
  const lotRow = [
    'lot',
    String(wafers.length),
    four(statistics.mean),
    '',
    two(statistics.nonuniformityPercent),
    two(statistics.rangePercent),
    four(statistics.min),
    four(statistics.max),
    '',
    '',
    '',
    lot.verdict,
  ]
  const toRight = header.map((_, column) => column > 0 && column < header.length - 1)
  const table = aligned([header, ...rows, lotRow], toRight)
  const rule = '-'.repeat(Math.max(...table.map((line) => line.length)))
  const [head, ...body] = table
  return [
    lot.sentence,
    '',
    head,
    rule,
    ...body.slice(0, -1),
    rule,
    body.at(-1),
    '',
    ...(analysis.procedure.acceptance.rule === 'simple' ? [] : [acceptanceWords(analysis.procedure.acceptance)]),
    'SUP = 100 s/mean, HLV = 200 (max - min)/(max + min): SEMI MF1618; the lot row is over wafer means',
    `left out = root mean square of each site less what the ${surfaceWords(analysis, fits)} through the others says`,
  ].join('\n')
}

const SURFACES = { 'thin-plate-spline': 'spline', 'gaussian-process': 'Gaussian process' } as const

/** Where no process could be fitted, the plain surface stands in. */
function surfaceWords({ procedure }: LotAnalysis, fits: readonly (MapFit | null)[]): string {
  const chosen = SURFACES[procedure.map.interpolation]
  if (chosen === SURFACES['thin-plate-spline'] || fits.every((fit) => fit?.process)) return chosen
  return `${chosen} (or, where none could be fitted, the spline)`
}

/** Of the surface that the maps are drawn by. */
function leftOut(fit: MapFit | null): number {
  return fit?.process?.leaveOneOut ?? fit?.plainLeaveOneOut ?? NaN
}

function waferRow(wafer: WaferAnalysis, missed: number, hasDies: boolean): string[] {
  const { statistics, dieCounts } = wafer
  return [
    wafer.id,
    String(statistics.count),
    four(statistics.mean),
    formatSignificant(wafer.uMean, 2),
    two(statistics.nonuniformityPercent),
    two(statistics.rangePercent),
    four(statistics.min),
    four(statistics.max),
    formatSignificant(missed, 2),
    String(wafer.sitesOut),
    hasDies && dieCounts ? String(dieCounts['out-of-spec']) : '',
    wafer.verdict,
  ]
}

const four = (value: number): string => formatSignificant(value, 4)
const two = (value: number): string => formatFixed(value, 2)
