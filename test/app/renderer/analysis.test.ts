import { describe, expect, it } from 'vitest'
import { createAnalyzer, type WorkerLike } from '../../../app/renderer/analysis'
import type { Job, Report } from '../../../app/renderer/analysis-messages'

interface WorkerDouble extends WorkerLike {
  readonly jobs: Job[]
  terminated: boolean
  say(report: Report): void
}

function doubles() {
  const workers: WorkerDouble[] = []
  const newWorker = (): WorkerLike => {
    const worker: WorkerDouble = {
      jobs: [],
      terminated: false,
      onmessage: null,
      onerror: null,
      postMessage: (job: unknown) => void worker.jobs.push(job as Job),
      terminate: () => void (worker.terminated = true),
      say: (data) => worker.onmessage?.call(worker as never, { data } as MessageEvent),
    }
    workers.push(worker)
    return worker
  }
  return { workers, analyzer: createAnalyzer(newWorker) }
}

const file = (name: string) => ({ name, bytes: new TextEncoder().encode(name) })
const csv = file('TB-0417.csv')
const procedure = file('p.json')
const done = { kind: 'done', result: { analysis: null, problems: [] } } as const

describe('the analyzer', () => {
  it('sends each file once, and says when it is no longer needed', async () => {
    const { workers, analyzer } = doubles()
    const first = analyzer.analyze([csv], procedure)
    workers[0].say(done)
    expect(await first.result).toEqual(done.result)
    const excluded = [{ wafer: '1', site: '2', reason: 'r' }]
    const second = analyzer.analyze([csv], procedure, { excluded })
    workers[0].say(done)
    await second.result
    void analyzer.analyze([csv], file('other.json'))
    expect(workers).toHaveLength(1)
    const [a, b, c] = workers[0].jobs
    expect(a.added.map(({ id }) => id)).toEqual([1, 2])
    expect([b.added, b.dropped, b.excluded]).toEqual([[], [], excluded])
    expect([c.added.map(({ id }) => id), c.dropped, c.readings]).toEqual([[3], [2], [{ id: 1, name: 'TB-0417.csv' }]])
  })

  it('lets the newest win: the older one ends as null, and its worker with it', async () => {
    const { workers, analyzer } = doubles()
    const older = analyzer.analyze([csv], procedure)
    const newer = analyzer.analyze([csv], procedure)
    expect(await older.result).toBeNull()
    expect(workers.map(({ terminated }) => terminated)).toEqual([true, false])
    expect(workers[1].jobs[0].added).toHaveLength(2)
    older.cancel()
    workers[1].say(done)
    expect(await newer.result).toEqual(done.result)
  })

  it('cancels, and starts afresh afterwards', async () => {
    const { workers, analyzer } = doubles()
    const running = analyzer.analyze([csv], procedure)
    running.cancel()
    expect(await running.result).toBeNull()
    running.cancel()
    void analyzer.analyze([csv], procedure)
    expect(workers.map(({ terminated }) => terminated)).toEqual([true, false])
  })

  it('tells of the progress', async () => {
    const { workers, analyzer } = doubles()
    const running = analyzer.analyze([csv], procedure)
    const heard: unknown[] = []
    running.progress((progress) => heard.push(progress))
    const progress = { stage: 'reading', share: 0.5, rows: 10 } as const
    workers[0].say({ kind: 'progress', progress })
    expect(heard).toEqual([progress])
  })

  it('makes a problem of a worker that fails or dies, and starts another', async () => {
    const { workers, analyzer } = doubles()
    const failing = analyzer.analyze([csv], procedure)
    workers[0].say({ kind: 'failed', why: 'RangeError: too long' })
    expect((await failing.result)?.problems).toMatchObject([{ why: 'internal error: RangeError: too long' }])
    const dying = analyzer.analyze([csv], procedure)
    workers[0].onerror?.call(workers[0] as never, { message: '' } as ErrorEvent)
    expect((await dying.result)?.problems).toMatchObject([{ why: 'internal error: the worker ended without a word' }])
    void analyzer.analyze([csv], procedure)
    expect(workers).toHaveLength(2)
  })

  it('is warm before the first file, and another one works beside it', () => {
    const { workers, analyzer } = doubles()
    analyzer.warm()
    analyzer.warm()
    void analyzer.analyze([csv], procedure)
    expect(workers).toHaveLength(1)
  })
})
