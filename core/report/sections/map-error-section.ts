/** How well the maps are known between their sites; where a Gaussian process was chosen, its standard error as a map. */
import { formatFixed, formatNumber, formatSignificant, NO_VALUE } from '../../units/format'
import { GAUSSIAN_PROCESS_SOURCE } from '../../map/gaussian-process'
import type { MapFit } from '../../analysis/map-fit'
import type { WaferAnalysis } from '../../analysis/lot-analysis'
import type { Block, TableRow } from '../document'
import type { Drawing } from '../drawing'
import { scaledMap } from '../figures/scaled-map'
import { waferTitle, type ReportContext } from '../report-context'
import { mapRaster } from '../surface'

/** Wafers with most to tell: the report shows the standard error of so many. */
const SHOWN = 2
const MAP_HEIGHT_PT = 170

export function mapErrorSection(context: ReportContext): Block[] {
  const { analysis, wafers, detailsOf } = context
  if (analysis.procedure.map.interpolation !== 'gaussian-process' || !context.hasPositions) return []
  const fits = wafers.flatMap((wafer) => {
    const { map } = detailsOf(wafer)
    return map ? [{ wafer, map }] : []
  })
  if (fits.length === 0) return []
  const { unit } = analysis.quantity
  const figures = fits
    .filter(({ map }) => map.process)
    .sort((a, b) => b.map.process!.leaveOneOut - a.map.process!.leaveOneOut)
    .slice(0, SHOWN)
    .flatMap(({ wafer, map }) => standardErrorMap(wafer, map, context) ?? [])
  return [
    { kind: 'heading', level: 1, text: 'Maps and their error' },
    {
      kind: 'paragraph',
      text: 'Between the sites the surface is the likeliest one: a Gaussian process about a trend, through the noise of the sites. Each site was left out in turn and predicted from the others; 95 of 100 should lie within 1.96 standard errors.',
    },
    {
      kind: 'table',
      summary: 'Fit of the surface of every wafer',
      columns: [
        { title: 'Wafer', align: 'left', share: 1 },
        { title: 'Length scale', unit: 'mm', align: 'decimal', share: 1 },
        { title: 's of the surface', unit, align: 'decimal', share: 1 },
        { title: 'Nugget', unit, align: 'decimal', share: 1 },
        { title: 'Left out, rms', unit, align: 'decimal', share: 1 },
        { title: 'of the spline', unit, align: 'decimal', share: 1 },
        { title: 'Within 95 %', unit: '%', align: 'decimal', share: 0.9 },
      ],
      rows: fits.map(({ wafer, map }) => fitRow(wafer, map)),
    },
    ...(figures.length > 0 ? [{ kind: 'figures', figures } as const] : []),
    { kind: 'paragraph', text: `Source: ${GAUSSIAN_PROCESS_SOURCE}.`, quiet: true },
  ]
} // prettier-ignore

function fitRow({ id }: WaferAnalysis, { process, plainLeaveOneOut }: MapFit): TableRow {
  const three = (value: number): string => formatSignificant(value, 3)
  if (!process) return { cells: [id, NO_VALUE, NO_VALUE, NO_VALUE, NO_VALUE, three(plainLeaveOneOut), NO_VALUE] }
  const { lengthScale_mm, standardDeviation, nugget } = process.surface
  return {
    cells: [
      id, three(lengthScale_mm), three(standardDeviation), three(nugget), three(process.leaveOneOut), three(plainLeaveOneOut),
      formatFixed(100 * process.coverage, 0),
    ],
  }
} // prettier-ignore

export function standardErrorMap(wafer: WaferAnalysis, { process }: MapFit, { analysis, width_pt }: Pick<ReportContext, 'analysis' | 'width_pt'>): Drawing | null {
  const { outline, quantity } = analysis
  if (!process || outline.shape === 'infinite') return null
  const { targets, onWafer } = mapRaster(outline, 'small')
  const error = { value: new Float64Array(onWafer.length), standardError: new Float64Array(onWafer.length) }
  process.surface.at(targets, error)
  const sites = { ...targets, value: error.standardError }
  const title = `${waferTitle(wafer.id)}: standard error of the map`
  const range = `${formatNumber(Math.min(...error.standardError), quantity.unit)} ${quantity.unit} at least`
  return scaledMap({
    title,
    caption: `${waferTitle(wafer.id)}: standard error, ${range}`,
    outline,
    quantity: { ...quantity, title: 'standard error', symbol: 'u' },
    sites,
    width_pt: width_pt / 2 - 10,
    height_pt: MAP_HEIGHT_PT,
  })
} // prettier-ignore
