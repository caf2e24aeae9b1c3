import { companionNames, companionsOf } from '../../core/analysis/companions'
import { formulaSources } from '../../core/analysis/formula-sources'
import type { LotAnalysis } from '../../core/analysis/lot-analysis'
import { reportSite } from '../../core/analysis/report-site'
import { resultJson } from '../../core/analysis/result-json'
import { siteWorking } from '../../core/analysis/site-working'
import { parseTime } from '../../core/ingest/parse-time'
import { CoreError } from '../../core/problems/problem'
import { lotReport } from '../../core/report/lot-report'
import { openPdf } from './pdf-file'
import { PdfFault } from './pdf-syntax'
import { ATTACHMENT_LIMITS, readAttachments } from './read-attachments'
import { reportAttachments, reportContents, type ReportInputs, type ReportMaking } from './report-contents'
import { renderReportPdf, type ReportAttachment } from './write-report'

/** `date` overrides the time of the latest reading, which is the report's date otherwise. */
export interface ReportPdfOptions extends ReportMaking {
  /** The bytes that the analysis was made from: they travel inside the report. */
  readonly inputs: ReportInputs
}

/**
 * An analysis as the PDF lot report, with its inputs and its result inside; the command line and the window both make it
 * here. The same analysis, inputs and options make the same bytes.
 *
 * @throws CoreError cannot-write if the inputs are too many or too large to travel in a report that can be read again
 */
export async function reportPdf(analysis: LotAnalysis, options: ReportPdfOptions): Promise<Uint8Array> {
  const { program, version, date, paper, decision = null } = options
  const inputs = { ...options.inputs, companions: companionsOf(analysis.procedure, options.inputs.companions ?? []) }
  requireAll(analysis, inputs)
  const result = resultJson(analysis, { program, version })
  const attachments = reportAttachments({ inputs, excluded: analysis.excluded, result }, options)
  const site = reportSite(analysis)
  const report = lotReport({
    analysis,
    working: site === null ? null : siteWorking(analysis, site),
    date: date === null ? latestReading(analysis.readings.time_ms) : zonedDate(date),
    program: `${program} ${version}`,
    paper,
    sources: formulaSources(analysis),
    decision,
  })
  const pdf = await renderReportPdf(report, { attachments })
  requireReadable(pdf, attachments)
  return pdf
}

function requireAll({ procedure }: LotAnalysis, { readings, companions }: Required<ReportInputs>): void {
  if (companions.length < companionNames(procedure).length) {
    throw new Error('a file that the procedure names was not handed to its report')
  }
  // Beside them stand the procedure, the result and the list of them all.
  const most = ATTACHMENT_LIMITS.count - 3 - companions.length
  if (readings.length > most) throw unwritable(`no more than ${most} files with readings can travel in it`)
}

/** A report that can't be read back is none: better no report than one found wanting when it is needed. */
function requireReadable(pdf: Uint8Array, attachments: readonly ReportAttachment[]): void {
  try {
    const found = readAttachments(openPdf(pdf))
    const isWhole = attachments.every(
      ({ name, bytes }, k) => found[k].name === name && Buffer.compare(found[k].bytes, bytes) === 0,
    )
    reportContents(found)
    if (!isWhole) throw new Error('the report does not hold what was attached to it')
  } catch (error) {
    if (error instanceof PdfFault) throw unwritable(`its inputs can't travel in it: ${error.message}`)
    throw error
  }
}

function unwritable(why: string): CoreError {
  return new CoreError({ kind: 'cannot-write', path: 'report.pdf', why })
}

const DAY_AND_ZONED_TIME = /^\d{4}-\d\d-\d\d(?:T\d\d:\d\d(?::\d\d(?:\.\d{1,9})?)?(?:Z|[+-]\d\d:\d\d))?$/

/** As given where that has one meaning everywhere; else in UTC, so that no report depends on where it was made. */
function zonedDate(date: string): string {
  const reading = parseTime(date)
  if (typeof reading === 'string') {
    throw new CoreError({ kind: 'bad-argument', argument: date, why: 'it is no date that can be read' })
  }
  return DAY_AND_ZONED_TIME.test(date) ? date : isoTime(reading.time_ms)
}

/** ISO 8601; null where no reading has a time. */
function latestReading(time_ms: Float64Array | null): string | null {
  let latest = -Infinity
  for (const time of time_ms ?? []) if (time > latest) latest = time
  return Number.isFinite(latest) ? isoTime(latest) : null
}

function isoTime(time_ms: number): string {
  return new Date(time_ms).toISOString().replace('.000Z', 'Z')
}
