/** The entry of the process that makes reports; Electron gives it its parent port. */
import { answerJob, type ReportJob } from './report-process'

interface ParentPort {
  on(event: 'message', listener: (message: { readonly data: ReportJob }) => void): void
  postMessage(reply: unknown): void
}

const { parentPort } = process as unknown as { readonly parentPort: ParentPort }

parentPort.on('message', ({ data }) => {
  void answerJob(data).then((reply) => parentPort.postMessage(reply))
})
