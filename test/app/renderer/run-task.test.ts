import { describe, expect, it } from 'vitest'
import type { WorkerLike } from '../../../app/renderer/analysis'
import { createTaskRunner } from '../../../app/renderer/tasks/run-task'
import { TASKS, type TaskInput } from '../../../app/renderer/tasks/register'
import type { TaskReport } from '../../../app/renderer/tasks/messages'
import { bandScale } from '../../../core/report/figures/band-scale'

interface WorkerDouble extends WorkerLike {
  readonly orders: unknown[]
  terminated: boolean
  say(report: TaskReport): void
}

function doubles() {
  const workers: WorkerDouble[] = []
  const newWorker = (): WorkerLike => {
    const worker: WorkerDouble = {
      orders: [],
      terminated: false,
      onmessage: null,
      onerror: null,
      postMessage: (order: unknown) => void worker.orders.push(order),
      terminate: () => void (worker.terminated = true),
      say: (data) => worker.onmessage?.call(worker as never, { data } as MessageEvent),
    }
    workers.push(worker)
    return worker
  }
  return { workers, runner: createTaskRunner(newWorker) }
}

const ring = Array.from({ length: 12 }, (_, k) => (k * Math.PI) / 6)
const input: TaskInput<'wafer-surface'> = {
  outline: { shape: 'disc', diameter_mm: 200, fiducial: 'notch' },
  scale: bandScale(80, 100, 10),
  sites: {
    x_mm: Float64Array.from(ring, (a) => 80 * Math.cos(a)),
    y_mm: Float64Array.from(ring, (a) => 80 * Math.sin(a)),
    value: Float64Array.from(ring, (a) => 90 + 5 * Math.cos(a)),
    verdict: [],
  },
  detail: 'small',
  interpolation: 'thin-plate-spline',
}

describe('the task runner', () => {
  it('gives the order to a worker, tells the share, and answers', async () => {
    const { workers, runner } = doubles()
    const shares: number[] = []
    const running = runner.run('wafer-surface', input, (share) => shares.push(share))
    expect(workers[0].orders).toEqual([{ name: 'wafer-surface', input }])
    workers[0].say({ kind: 'share', share: 0.5 })
    workers[0].say({ kind: 'done', output: null })
    expect(await running.result).toBeNull()
    expect(shares).toEqual([0.5])
    void runner.run('wafer-surface', input)
    expect(workers).toHaveLength(1)
  })

  it('ends the older of two, and one that is cancelled', async () => {
    const { workers, runner } = doubles()
    const older = runner.run('wafer-surface', input)
    const newer = runner.run('wafer-surface', input)
    expect(await older.result).toBeNull()
    older.cancel()
    expect(workers.map(({ terminated }) => terminated)).toEqual([true, false])
    newer.cancel()
    expect(await newer.result).toBeNull()
    expect(workers[1].terminated).toBe(true)
  })

  it('rejects where the task failed or the worker died, and starts a fresh one', async () => {
    const { workers, runner } = doubles()
    const failing = runner.run('wafer-surface', input)
    workers[0].say({ kind: 'failed', why: 'RangeError: too far' })
    await expect(failing.result).rejects.toThrow('too far')
    const dying = runner.run('wafer-surface', input)
    workers[0].onerror?.call(workers[0] as never, { message: '' } as ErrorEvent)
    await expect(dying.result).rejects.toThrow('without a word')
    void runner.run('wafer-surface', input)
    expect(workers).toHaveLength(2)
  })
})

describe('the task of a wafer’s surface', () => {
  it('joins the sites as the report does', async () => {
    const surface = (await TASKS['wafer-surface']())(input, () => undefined)
    expect(surface?.contours.length).toBeGreaterThan(2)
  })
})
