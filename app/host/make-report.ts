import { createHash } from 'node:crypto'
import { run } from '../../core/analysis/run'
import { CoreError } from '../../core/problems/problem'
import { partBrought } from '../contract/brought-files'
import type { ReportRequest } from '../contract/host'
import { reportPdf } from '../pdf/report-pdf'

export interface Program {
  readonly program: string
  readonly version: string
}

/**
 * The report of what the window shows, made anew from the same bytes.
 *
 * @throws CoreError the first thing that stands in the way of an analysis, or of a report
 */
export async function makeReport(request: ReportRequest, { program, version }: Program): Promise<Uint8Array> {
  const { procedure, excluded, decision, date, paper } = request
  const brought = request.readings.map(({ name, bytes }) => {
    return { name, bytes, sha256: createHash('sha256').update(bytes).digest('hex') }
  })
  const { readings, companions } = partBrought(brought, procedure)
  const { analysis, problems } = run({ readings, companions, procedure, excluded })
  if (!analysis) throw new CoreError(problems[0])
  return reportPdf(analysis, { program, version, date, paper, decision, inputs: { readings, procedure, companions } })
}
