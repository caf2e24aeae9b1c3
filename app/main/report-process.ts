/** Makes reports in a process of its own: a second of layout would hold up every key and click in the window. */
import { CoreError } from '../../core/problems/problem'
import type { Reply, ReportRequest } from '../contract/host'
import { makeReport, type Program } from '../host/make-report'
import { replying } from '../host/replies'

export interface ReportJob {
  readonly request: ReportRequest
  readonly program: Program
}

/** What the maker needs of Electron's utility process. */
export interface Maker {
  on(event: 'message', listener: (reply: Reply<Uint8Array>) => void): unknown
  on(event: 'exit', listener: (code: number) => void): unknown
  postMessage(job: ReportJob): void
  kill(): boolean
}

/**
 * One process a report: nothing of one lot is left for the next. Where it can't be started or dies (too little memory,
 * say) the report is made here, so that there is one.
 */
export async function makeReportBeside(job: ReportJob, start: () => Maker): Promise<Uint8Array> {
  const reply = await askMaker(job, start).catch(() => null)
  if (reply === null) return makeReport(job.request, job.program)
  if (reply.ok) return new Uint8Array(reply.value)
  throw new CoreError(reply.problem)
}

function askMaker(job: ReportJob, start: () => Maker): Promise<Reply<Uint8Array>> {
  return new Promise((resolve, reject) => {
    const maker = start()
    maker.on('message', (reply) => {
      resolve(reply)
      maker.kill()
    })
    maker.on('exit', (code) => reject(new Error(`the maker of reports ended with ${code}`)))
    maker.postMessage(job)
  })
}

/** The other end, in the process itself. */
export function answerJob({ request, program }: ReportJob): Promise<Reply<Uint8Array>> {
  return replying('makeReport', () => makeReport(request, program))
}
