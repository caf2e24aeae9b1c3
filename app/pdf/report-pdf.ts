import { formulaSources } from '../../core/analysis/formula-sources'
import type { LotAnalysis } from '../../core/analysis/lot-analysis'
import { reportSite } from '../../core/analysis/report-site'
import { siteWorking } from '../../core/analysis/site-working'
import { lotReport } from '../../core/report/lot-report'
import { renderReportPdf } from './write-report'

export interface ReportPdfOptions {
  /** Name and version. */
  readonly program: string
  /** Overrides the time of the latest reading, which is the report's date otherwise. */
  readonly date: string | null
  readonly paper: 'A4' | 'Letter'
}

/** An analysis as the PDF lot report; the command line and the window both make it here. */
export function reportPdf(analysis: LotAnalysis, { program, date, paper }: ReportPdfOptions): Promise<Uint8Array> {
  const site = reportSite(analysis)
  const report = lotReport({
    analysis,
    working: site === null ? null : siteWorking(analysis, site),
    date: date ?? latestReading(analysis.readings.time_ms),
    program,
    paper,
    sources: formulaSources(analysis),
  })
  return renderReportPdf(report)
}

/** ISO 8601; a lot without any time is dated to the epoch, so that the same input always makes the same bytes. */
function latestReading(time_ms: Float64Array | null): string {
  let latest = -Infinity
  for (const time of time_ms ?? []) if (time > latest) latest = time
  return new Date(Number.isFinite(latest) ? latest : 0).toISOString().replace('.000Z', 'Z')
}
