/** What all wafers of a lot share, and where they differ: the mean map and the map of the standard deviation. */
import type { WaferAnalysis } from '../../analysis/lot-analysis'
import { lotMap, type LotMap } from '../../map/lot-map'
import type { SiteColumnsOfWafer } from '../../map/profiles'
import type { Block } from '../document'
import { scaledMap } from '../figures/scaled-map'
import type { ReportContext } from '../report-context'

const GAP_PT = 14
const HEIGHT_PT = 148
/** A lot of more would take longer than its two small figures are worth. */
const MOST_READINGS = 200_000

/** Nothing for one wafer, without places, or where wafers were measured at different places. */
export function lotMapsSection(context: ReportContext): Block[] {
  const map = mapOf(context)
  if (!map) return []
  const { outline, quantity } = context.analysis
  const size = { width_pt: (context.width_pt - GAP_PT) / 2, height_pt: HEIGHT_PT }
  const over = `over ${map.wafers} wafers`
  const figure = (title: string, symbol: string, value: Float64Array) =>
    scaledMap({
      title: `${title} ${over}`,
      caption: `${title} ${over}`,
      outline,
      quantity: { ...quantity, symbol },
      sites: { x_mm: map.x_mm, y_mm: map.y_mm, value },
      ...size,
    })
  return [
    { kind: 'heading', level: 2, text: 'Mean and standard deviation, place by place' },
    {
      kind: 'figures',
      figures: [
        figure('Mean', quantity.symbol, map.mean),
        figure('Standard deviation', `s(${quantity.symbol})`, map.standardDeviation),
      ],
    },
    {
      kind: 'paragraph',
      text: 'Each on its own colour scale. The mean is what all wafers share; s (divisor wafers − 1) is where they differ, from wafer to wafer.',
      quiet: true,
    },
  ]
}

function mapOf(context: ReportContext): LotMap | null {
  const { analysis, hasPositions } = context
  const measured = context.wafers.filter(({ statistics }) => statistics.count > 0)
  if (!hasPositions || measured.length < 2 || analysis.sites.count > MOST_READINGS) return null
  const columns = sharedColumns(measured, context)
  if (!columns || columns.some(({ value }) => !value.some(Number.isFinite))) return null
  const map = lotMap(columns, { x_mm: new Float64Array(0), y_mm: new Float64Array(0) })
  return map.places === 'common-sites' && map.standardDeviation.some(Number.isFinite) ? map : null
}

/**
 * All wafers at the places of the one with most sites, NaN where a wafer lacks one (a rejected row); null where a wafer
 * has a site elsewhere, or two at one place.
 */
function sharedColumns(wafers: readonly WaferAnalysis[], context: ReportContext): SiteColumnsOfWafer[] | null {
  const fullest = wafers.reduce((most, wafer) => (wafer.sites.length > most.sites.length ? wafer : most))
  const { x_mm, y_mm } = context.sitesOf(fullest)
  const placeOf = (x: number, y: number): string => `${x.toFixed(6)} ${y.toFixed(6)}`
  const rows = new Map(Array.from({ length: x_mm.length }, (_, i) => [placeOf(x_mm[i], y_mm[i]), i]))
  if (rows.size !== x_mm.length) return null
  const columns: SiteColumnsOfWafer[] = []
  for (const wafer of wafers) {
    const sites = context.sitesOf(wafer)
    const value = new Float64Array(x_mm.length).fill(NaN)
    for (let i = 0; i < sites.value.length; i++) {
      const row = rows.get(placeOf(sites.x_mm[i], sites.y_mm[i]))
      if (row === undefined) return null
      if (sites.excluded?.[i] !== 1) value[row] = sites.value[i]
    }
    columns.push({ x_mm: Float64Array.from(x_mm), y_mm: Float64Array.from(y_mm), value })
  }
  return columns
}
