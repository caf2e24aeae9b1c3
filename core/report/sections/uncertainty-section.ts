/** What the standard uncertainties are made of. */
import type { UncertaintyComponent } from '../../procedure/schema'
import { UNCERTAINTY_COMPONENTS } from '../../procedure/schema'
import { formatFixed, formatQuantity, formatSignificant } from '../../units/format'
import type { Block, KeyValue, TableRow } from '../document'
import type { Working } from '../../analysis/working'
import { waferTitle, type ReportContext } from '../report-context'

interface ComponentWords {
  readonly title: string
  /** '%' shows a relative uncertainty in percent. */
  readonly unit: string
}

const COMPONENTS: Readonly<Record<UncertaintyComponent, ComponentWords>> = {
  currentRel: { title: 'Current', unit: '%' },
  voltageRel: { title: 'Voltage', unit: '%' },
  spacingMm: { title: 'Each pin spacing', unit: 'mm' },
  thicknessUm: { title: 'Wafer thickness', unit: 'µm' },
  temperatureC: { title: 'Temperature', unit: '°C' },
  diameterMm: { title: 'Wafer diameter', unit: 'mm' },
  positionMm: { title: 'Place of the probe, in x and in y', unit: 'mm' },
  depthUm: { title: 'Layer depth', unit: 'µm' },
  mobilityRel: { title: 'Mobility model, concentration alone', unit: '%' },
  reportedRel: { title: 'Value as the file reports it', unit: '%' },
}

export function uncertaintySection(context: ReportContext): Block[] {
  const { uncertainty } = context.analysis.procedure
  const counted = UNCERTAINTY_COMPONENTS.filter((component) => uncertainty[component] > 0)
  const exact = UNCERTAINTY_COMPONENTS.filter((component) => !(uncertainty[component] > 0))
  const rows = counted.map((component): TableRow => {
    const { title, unit } = COMPONENTS[component]
    const value = unit === '%' ? 100 * uncertainty[component] : uncertainty[component]
    const shared = uncertainty.shared.includes(component)
    return {
      cells: [
        title,
        formatSignificant(value, 2),
        unit,
        shared ? 'shared' : 'independent',
        shared ? SHARED : INDEPENDENT,
      ],
    }
  })
  const exactWords = exact.map((component) => COMPONENTS[component].title.toLowerCase()).join('; ')
  return [
    { kind: 'heading', level: 1, text: 'Uncertainty' },
    {
      kind: 'paragraph',
      text: 'Standard uncertainties (one sigma), combined by the law of propagation of JCGM 100:2008, 5.1.2. What all sites share stays whole in the mean of a wafer; what is independent from site to site is averaged down with the number of sites.',
    },
    ...(rows.length > 0 ? [componentsTable(rows)] : []),
    ...(exactWords
      ? [{ kind: 'paragraph', text: `Taken as exactly known: ${exactWords}.`, quiet: true } as const]
      : []),
    { kind: 'key-values', columns: 1, entries: typicalSite(context) },
    ...budgetOf(context.input.working),
  ]
}

const SHARED = 'the same at every site'
const INDEPENDENT = 'new at every site'

function componentsTable(rows: readonly TableRow[]): Block {
  return {
    kind: 'table',
    summary: 'Uncertainty components',
    columns: [
      { title: 'Component', align: 'left', share: 2.4 },
      { title: 'u', align: 'decimal', share: 0.8 },
      { title: 'Unit', align: 'left', share: 0.6 },
      { title: 'Kind', align: 'left', share: 1 },
      { title: '', align: 'left', share: 2.6, quiet: true },
    ],
    rows,
  }
}

/** What one site's uncertainty is made of, largest first. */
function budgetOf(working: Working | null): Block[] {
  if (!working || working.budget.length === 0) return []
  const rows = working.budget.map(({ title, shared, relative, share }): TableRow => ({
    cells: [
      title,
      shared ? 'shared' : 'independent',
      formatSignificant(100 * relative, 2),
      formatFixed(100 * share, 1),
    ],
  }))
  return [
    { kind: 'heading', level: 2, text: `Budget at site ${working.site} of ${waferTitle(working.wafer).toLowerCase()}` },
    {
      kind: 'table',
      summary: 'Uncertainty budget of one site',
      columns: [
        { title: 'Component', align: 'left', share: 3 },
        { title: 'Kind', align: 'left', share: 1.2 },
        { title: 'Effect on the result', unit: '%', align: 'decimal', share: 1.4 },
        { title: 'Share of the variance', unit: '%', align: 'decimal', share: 1.6 },
      ],
      rows,
    },
  ]
}

function typicalSite({ analysis }: ReportContext): KeyValue[] {
  const { sites, quantity } = analysis
  const rows: readonly (readonly [string, Float64Array])[] = [
    ['Typical site, combined', sites.u],
    ['of that shared by all sites', sites.uShared],
    ["of that the site's own", sites.uIndependent],
  ]
  return rows.map(([key, column]) => ({
    key,
    value: formatQuantity(medianOf(column), quantity.unit),
    note: 'median over the sites',
  }))
}

function medianOf(column: Float64Array): number {
  const sorted = column.filter(Number.isFinite).sort()
  return sorted.length > 0 ? sorted[Math.floor((sorted.length - 1) / 2)] : NaN
}
