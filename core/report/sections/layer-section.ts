/** What the layer's results rest on: its profile, and what the lot would say under every other mobility model. */
import { mobilityComparison, type ComparedModel, type MobilityComparison } from '../../analysis/mobility-comparison'
import { NO_VALUE, formatConcentration, formatNumber, formatPercent, formatQuantity } from '../../units/format'
import type { Block, KeyValue, TableColumn, TableRow } from '../document'
import type { ReportContext } from '../report-context'
import { concentrationTitle, layerWords } from './layer-words'

/** Nothing for a layer without silicon. */
export function layerSection({ analysis }: ReportContext): Block[] {
  const comparison = mobilityComparison(analysis)
  if (!comparison) return []
  const { layer } = analysis.procedure
  const withDose = comparison.models.some(({ dose_cm2 }) => Number.isFinite(dose_cm2))
  return [
    { kind: 'page-break' },
    { kind: 'heading', level: 1, text: 'Layer', aside: analysis.lot.name },
    {
      kind: 'key-values',
      columns: 1,
      entries: [{ key: 'Layer', value: layerWords(layer) }, ...profileEntries(analysis)],
    },
    { kind: 'heading', level: 2, text: 'The same lot under every mobility model' },
    { kind: 'paragraph', text: basisWords(comparison) },
    {
      kind: 'table',
      summary: 'Concentration and dose of the lot under every mobility model',
      columns: columnsOf(concentrationTitle(layer), withDose),
      rows: comparison.models.map((model) => rowOf(model, withDose)),
    },
    { kind: 'paragraph', text: spreadWords(comparison, withDose) },
  ]
}

function profileEntries({ profile }: ReportContext['analysis']): KeyValue[] {
  if (!profile) return []
  const points = profile.depth_um.length
  return [
    {
      key: 'Profile file',
      value: profile.file,
      note: `${points} points to ${formatQuantity(profile.depth_um[points - 1], 'µm')}; columns ${profile.headers.depth} and ${profile.headers.concentration}`,
    },
    { key: 'SHA-256', value: profile.sha256 || NO_VALUE },
  ]
}

function basisWords({ basis, value }: MobilityComparison): string {
  const what =
    basis === 'mean-resistivity'
      ? `mean resistivity of the lot, ${formatQuantity(value, 'Ω·cm')}`
      : `mean sheet resistance of the lot, ${formatQuantity(value, 'Ω/sq')}`
  return `Inverted is the ${what} (the mean of the wafer means over the sites that count), once under each model with everything else as in the procedure.`
}

function columnsOf(concentration: string, withDose: boolean): TableColumn[] {
  return [
    { title: 'Model', align: 'left', share: 2.4 },
    { title: concentration, unit: 'cm⁻³', align: 'right', share: 1.6 },
    ...(withDose ? ([{ title: 'Active dose', unit: 'cm⁻²', align: 'right', share: 1.4 }] as const) : []),
    { title: 'Differs by', unit: '%', align: 'decimal', share: 0.9 },
    { title: '', align: 'left', share: 2.8, quiet: true },
  ]
}

function rowOf(model: ComparedModel, withDose: boolean): TableRow {
  const { title, concentration_cm3, dose_cm2, relativeConcentration, isProcedures } = model
  const cells = [
    title,
    formatNumber(concentration_cm3, 'cm⁻³'),
    ...(withDose ? [formatNumber(dose_cm2, 'cm⁻²')] : []),
    formatNumber(100 * relativeConcentration, '%'),
    remarkOf(model),
  ]
  return isProcedures ? { cells, emphasis: 'strong' } : { cells }
}

function remarkOf({ isProcedures, isInRange, why }: ComparedModel): string {
  if (why !== '') return why
  const range = isInRange ? '' : 'outside the range it was fitted over'
  return [isProcedures ? "the procedure's" : '', range].filter(Boolean).join('; ')
}

/** The spread is what a reader needs before comparing with a number from elsewhere. */
function spreadWords({ models, concentrationSpread, doseSpread }: MobilityComparison, withDose: boolean): string {
  const valid = models.filter(({ isInRange }) => isInRange)
  if (Number.isNaN(concentrationSpread))
    return 'Fewer than two models are valid here, so that there is no spread to tell.'
  const all = valid.map((model) => model.concentration_cm3)
  const dose = withDose && !Number.isNaN(doseSpread) ? `, the dose by ${formatPercent(100 * doseSpread)}` : ''
  const span = `${formatConcentration(Math.min(...all))} to ${formatConcentration(Math.max(...all))}`
  return `The ${valid.length} models valid here span ${span}: the concentration differs by ${formatPercent(100 * concentrationSpread)} from the least to the greatest${dose}. A concentration means something only together with its model.`
}
