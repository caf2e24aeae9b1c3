import { diesCsv, sitesCsv } from '../../core/analysis/export-csv'
import type { LotAnalysis } from '../../core/analysis/lot-analysis'
import { resultJson } from '../../core/analysis/result-json'
import type { ReportInputs } from '../pdf/report-contents'
import { reportPdf } from '../pdf/report-pdf'
import { PROGRAM, VERSION } from './version'

/** What `analyze` writes, by the word that `--write` knows it by. */
export const ARTIFACTS = { json: 'result.json', sites: 'sites.csv', dies: 'dies.csv', pdf: 'report.pdf' } as const
export type Artifact = keyof typeof ARTIFACTS

export interface OutputOptions {
  readonly write: readonly Artifact[]
  readonly date: string | null
  readonly paper: 'A4' | 'Letter'
}

/** @throws CoreError cannot-write, of the report */
export async function outputFiles(
  analysis: LotAnalysis,
  inputs: ReportInputs,
  { write, date, paper }: OutputOptions,
): Promise<ReadonlyMap<string, Uint8Array | string>> {
  const make: Record<Artifact, () => string | Promise<Uint8Array>> = {
    json: () => resultJson(analysis, { program: PROGRAM, version: VERSION }),
    sites: () => sitesCsv(analysis),
    dies: () => diesCsv(analysis),
    pdf: () => reportPdf(analysis, { program: PROGRAM, version: VERSION, date, paper, inputs }),
  }
  const files = new Map<string, Uint8Array | string>()
  for (const artifact of write) files.set(ARTIFACTS[artifact], await make[artifact]())
  return files
}
