/** What the reader must know before trusting the lot, worst first, each with the place it speaks of. */
import type { LotAnalysis, WaferAnalysis } from '../../../core/analysis/lot-analysis'
import { explain } from '../../../core/problems/explain'
import type { Problem } from '../../../core/problems/problem'
import { reasonsOf, waferTitle } from '../../../core/report/report-context'

export interface Finding {
  readonly weight: 'out' | 'problem' | 'note'
  readonly sentence: string
  readonly place: FindingPlace | null
}

export type FindingPlace =
  | { readonly to: 'files' }
  | {
      readonly to: 'wafer'
      readonly wafer: string
      /** Row of the site columns. */
      readonly site: number | null
    }

export function listFindings(analysis: LotAnalysis | null, problems: readonly Problem[], procedureFile: string): readonly Finding[] {
  return [
    ...(analysis?.wafers ?? []).filter(({ verdict }) => verdict !== 'in-spec').flatMap(waferFindings),
    ...problems.map((problem): Finding => ({ weight: 'problem', sentence: explain(problem), place: placeOf(problem, analysis) })),
    ...(analysis?.notes ?? []).map((sentence): Finding => ({ weight: 'note', sentence, place: null })),
    ...(analysis ? defaultsNote(analysis, procedureFile) : []),
  ].sort((a, b) => WEIGHTS.indexOf(a.weight) - WEIGHTS.indexOf(b.weight))
} // prettier-ignore

const WEIGHTS = ['out', 'problem', 'note'] as const satisfies readonly Finding['weight'][]

function waferFindings(wafer: WaferAnalysis): readonly Finding[] {
  const weight = wafer.verdict === 'out-of-spec' ? 'out' : 'problem'
  const sentences = reasonsOf(wafer).map((reason) => `${waferTitle(wafer.id)}: ${reason}`)
  return sentences.map((sentence) => ({ weight, sentence, place: { to: 'wafer', wafer: wafer.id, site: null } }))
}

function placeOf(problem: Problem, analysis: LotAnalysis | null): FindingPlace | null {
  if (analysis && 'wafer' in problem && 'site' in problem) {
    const site = siteRow(analysis, problem.wafer, problem.site)
    if (site !== null) return { to: 'wafer', wafer: problem.wafer, site }
  }
  if (analysis && problem.kind === 'flagged-sites' && problem.wafers.length > 0) {
    return { to: 'wafer', wafer: problem.wafers[0], site: null }
  }
  return 'file' in problem ? { to: 'files' } : null
}

function siteRow({ readings }: LotAnalysis, wafer: string, site: string): number | null {
  for (let row = 0; row < readings.count; row++) {
    if (readings.siteNames[readings.site[row]] === site && readings.wafers[readings.wafer[row]].id === wafer) return row
  }
  return null
}

function defaultsNote({ defaults }: LotAnalysis, file: string): readonly Finding[] {
  if (defaults.length === 0) return []
  const list = defaults.map(({ key, value }) => `${key} ${value}`).join(', ')
  return [{ weight: 'note', sentence: `${file} leaves these keys to their defaults: ${list}.`, place: { to: 'files' } }]
}
