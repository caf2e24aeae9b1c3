/** Has a task of the register done in a worker, with its progress, and a way to end it. */
import type { WorkerLike } from '../analysis'
import type { TaskOrder, TaskReport } from './messages'
import type { TaskInput, TaskName, TaskOutput } from './register'

export interface RunningTask<Output> {
  /** null when it was cancelled or a newer call took its place. Rejects only for a bug in the task. */
  readonly result: Promise<Output | null>
  cancel(): void
}

export interface TaskRunner {
  /** The newest call wins: one that is still running is ended, whatever its name. */
  run<Name extends TaskName>(
    name: Name,
    input: TaskInput<Name>,
    tell?: (share: number) => void,
  ): RunningTask<TaskOutput<Name>>
  /** Ends the worker; the next call starts another. */
  close(): void
}

function newTaskWorker(): WorkerLike {
  return new Worker(new URL('./tasks.worker.ts', import.meta.url), { type: 'module' })
}

interface Running {
  readonly end: (output: unknown) => void
  readonly fail: (why: string) => void
}

/** A runner has a worker of its own: a part of the window that asks again and again keeps one. */
export function createTaskRunner(newWorker: () => WorkerLike = newTaskWorker): TaskRunner {
  let worker: WorkerLike | null = null
  let running: Running | null = null

  function close(): void {
    worker?.terminate()
    worker = null
    const ended = running
    running = null
    ended?.end(null)
  }

  function run<Name extends TaskName>(
    name: Name,
    input: TaskInput<Name>,
    tell: (share: number) => void = () => undefined,
  ): RunningTask<TaskOutput<Name>> {
    // A worker in the midst of a task hears nothing: it is ended, and another started.
    if (running) close()
    const own = (worker ??= newWorker())
    let mine!: Running
    const result = new Promise<TaskOutput<Name> | null>((resolve, reject) => {
      mine = { end: (output) => resolve(output as TaskOutput<Name> | null), fail: (why) => reject(new Error(why)) }
    })
    running = mine
    const settle = (how: () => void): void => {
      if (running === mine) running = null
      how()
    }
    own.onmessage = ({ data }: MessageEvent<TaskReport>) => {
      if (data.kind === 'share') tell(data.share)
      else settle(() => (data.kind === 'done' ? mine.end(data.output) : mine.fail(data.why)))
    }
    own.onerror = (event) => {
      settle(() => mine.fail(event.message || 'the worker ended without a word'))
      if (worker === own) close()
    }
    own.postMessage({ name, input } satisfies TaskOrder)
    return {
      result,
      cancel: () => {
        if (running === mine) close()
      },
    }
  }

  return { run, close }
}
