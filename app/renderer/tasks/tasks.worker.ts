/** Does one task at a time beside the window. */
import type { TaskOrder, TaskReport } from './messages'
import { TASKS, type TellShare } from './register'

/** The worker's own side of the channel, as far as it is used; the page's `self` has another type. */
const port = self as unknown as {
  postMessage(report: TaskReport): void
  onmessage: ((event: MessageEvent<TaskOrder>) => void) | null
}

const LEAST_PAUSE_ms = 50

port.onmessage = ({ data }) => {
  carryOut(data).catch((error: unknown) => port.postMessage({ kind: 'failed', why: String(error) }))
}

async function carryOut({ name, input }: TaskOrder): Promise<void> {
  const work = (await TASKS[name]()) as (input: unknown, tell: TellShare) => unknown
  port.postMessage({ kind: 'done', output: work(input, sparingly()) })
}

function sparingly(): TellShare {
  let last = -Infinity
  return (share) => {
    const now = performance.now()
    if (now - last < LEAST_PAUSE_ms) return
    last = now
    port.postMessage({ kind: 'share', share })
  }
}
