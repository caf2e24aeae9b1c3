/** The lot report: one analysis as a document to print, sign and hand over. */
import type { Working } from '../analysis/working'
import type { ReportDocument } from './document'
import { reportContext, type LotReportInput } from './report-context'
import { findingsSection } from './sections/findings-section'
import { gaugeSection } from './sections/gauge-section'
import { inputSection } from './sections/input-section'
import { layerSection } from './sections/layer-section'
import { mapErrorSection } from './sections/map-error-section'
import { planSection } from './sections/plan-section'
import { procedureSection } from './sections/procedure-section'
import { statisticsUses } from './sections/statistics-sources'
import { riskSection } from './sections/risk-section'
import { sourcesSection } from './sections/sources-section'
import { summarySection } from './sections/summary-section'
import { uncertaintySection } from './sections/uncertainty-section'
import { waferSection } from './sections/wafer-section'
import { workingSection } from './sections/working-section'
import { sourceList, type SourceUse } from './source-list'

export type { LotReportInput } from './report-context'

/** What a report without a date carries in its file, where a date must stand: the same input makes the same bytes. */
const UNDATED = '1970-01-01T00:00:00Z'

export function lotReport(input: LotReportInput): ReportDocument {
  const { analysis, working, date, program, paper } = input
  const uses = [...sourceUses(input), ...statisticsUses(analysis)]
  const context = reportContext(input, sourceList(input.sources, uses))
  return {
    title: `Lot ${analysis.lot.name}: sheet measurement report`,
    subject: analysis.lot.sentence,
    language: 'en',
    program,
    date: date ?? UNDATED,
    paper,
    footer: `Lot ${analysis.lot.name}`,
    blocks: [
      ...summarySection(context),
      ...findingsSection(context),
      ...context.wafers.flatMap((wafer) => waferSection(wafer, context)),
      ...mapErrorSection(context),
      ...planSection(context),
      ...layerSection(context),
      ...inputSection(context),
      ...procedureSection(context),
      ...riskSection(context),
      ...uncertaintySection(context),
      ...gaugeSection(context),
      ...(working ? workingSection(working, context) : []),
      ...sourcesSection(context),
    ],
  }
}

function sourceUses({ analysis, working }: LotReportInput): SourceUse[] {
  const components = analysis.lot.varianceComponents
  return [
    ...(working ? stepUses(working) : []),
    ...(components ? [{ reference: components.source, use: 'Components of variance' }] : []),
  ]
}

function stepUses({ steps }: Working): SourceUse[] {
  return steps.map((step) => ({ reference: step.source, use: step.title }))
}
