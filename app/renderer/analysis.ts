/**
 * From files to the analysis of a lot, in a worker: the window never waits. The one place where the window has core's
 * pipeline run.
 */
import type { Exclusion } from '../../core/analysis/exclusions'
import type { Progress } from '../../core/analysis/progress'
import type { RunResult } from '../../core/analysis/run'
import type { OpenedFile } from '../contract/host'
import type { FileUse, Job, Rehearsal, Report } from './analysis-messages'

export interface AnalysisOptions {
  readonly excluded?: readonly Exclusion[]
}

export interface RunningAnalysis {
  /** null when it was cancelled or a newer one took its place. Never rejects. */
  readonly result: Promise<RunResult | null>
  /** Calls back from now on; may be called never, for a small lot. */
  progress(listener: (progress: Progress) => void): void
  cancel(): void
}

export interface Analyzer {
  /** The newest call wins: an older one that is still running is cancelled. */
  analyze(readings: readonly OpenedFile[], procedure: OpenedFile, options?: AnalysisOptions): RunningAnalysis
  /** Starts the worker ahead of the first file. */
  warm(): void
  /** Has an idle worker run through made-up lots, from small to large, so that the first real one finds it fast; null where it isn't idle. */
  rehearse(lots: readonly OpenedFile[], procedure: OpenedFile): Promise<RunResult | null>
  /** Ends the worker; the next call starts another. */
  close(): void
}

/** What an analyzer needs of a worker. */
export type WorkerLike = Pick<Worker, 'postMessage' | 'terminate' | 'onmessage' | 'onerror'>

export function newAnalysisWorker(): WorkerLike {
  return new Worker(new URL('./analysis.worker.ts', import.meta.url), { type: 'module' })
}

/** An analyzer with a worker of its own, so that one analysis (of another model, say) can run beside another. */
export function createAnalyzer(newWorker: () => WorkerLike = newAnalysisWorker): Analyzer {
  let worker: WorkerLike | null = null
  let sent = sentFiles()
  let running: Ending | null = null
  let rehearsing: Ending | null = null

  function close(): void {
    worker?.terminate()
    worker = null
    sent = sentFiles()
    running?.end(null)
    running = null
    rehearsed(null)
  }

  function rehearsed(result: RunResult | null): void {
    rehearsing?.end(result)
    rehearsing = null
  }

  function rehearse(lots: readonly OpenedFile[], procedure: OpenedFile): Promise<RunResult | null> {
    if (running || rehearsing) return Promise.resolve(null)
    const own = (worker ??= newWorker())
    const mine = (rehearsing = ending())
    own.onmessage = ({ data }: MessageEvent<Report>) => rehearsed(data.kind === 'rehearsed' ? data.result : null)
    own.onerror = close
    own.postMessage({ rehearse: { lots, procedure } } satisfies Rehearsal)
    return mine.result
  }

  function analyze(
    readings: readonly OpenedFile[],
    procedure: OpenedFile,
    { excluded = [] }: AnalysisOptions = {},
  ): RunningAnalysis {
    // A worker in the midst of a run hears nothing: it is ended, and another started.
    if (running) close()
    const own = (worker ??= newWorker())
    const listeners: ((progress: Progress) => void)[] = []
    const mine = ending()
    running = mine
    const finish = (found: RunResult): void => {
      if (running === mine) running = null
      mine.end(found)
    }
    own.onmessage = ({ data }: MessageEvent<Report>) => {
      if (data.kind === 'rehearsed') rehearsed(data.result)
      else if (data.kind === 'progress') for (const listener of listeners) listener(data.progress)
      else finish(data.kind === 'done' ? data.result : failure(data.why))
    }
    own.onerror = (event) => {
      finish(failure(event.message))
      // It may be out of memory or never have started: the next run gets a fresh one.
      if (worker === own) close()
    }
    own.postMessage(sent.job(readings, procedure, excluded))
    return {
      result: mine.result,
      progress: (listener) => void listeners.push(listener),
      cancel: () => {
        if (running === mine) close()
      },
    }
  }

  return { analyze, rehearse, close, warm: () => void (worker ??= newWorker()) }
}

interface Ending {
  readonly result: Promise<RunResult | null>
  end(result: RunResult | null): void
}

function ending(): Ending {
  let end: Ending['end'] = () => undefined
  const result = new Promise<RunResult | null>((resolve) => (end = resolve))
  return { result, end }
}

/** Knows which files a worker has, and says what it still needs for the next job. */
function sentFiles() {
  const ids = new Map<Uint8Array, number>()
  let count = 0

  function job(readings: readonly OpenedFile[], procedure: OpenedFile, excluded: readonly Exclusion[]): Job {
    const used = new Set([...readings, procedure].map(({ bytes }) => bytes))
    const dropped = [...ids].filter(([bytes]) => !used.has(bytes))
    for (const [bytes] of dropped) ids.delete(bytes)
    const fresh = [...used].filter((bytes) => !ids.has(bytes))
    for (const bytes of fresh) ids.set(bytes, ++count)
    const idOf = (bytes: Uint8Array): number => ids.get(bytes) ?? 0
    const use = ({ name, bytes }: OpenedFile): FileUse => ({ id: idOf(bytes), name })
    return {
      added: fresh.map((bytes) => ({ id: idOf(bytes), bytes })),
      dropped: dropped.map(([, id]) => id),
      readings: readings.map(use),
      procedure: use(procedure),
      // Plain copies: what a store holds may be wrapped, and a wrapped object can't be sent.
      excluded: excluded.map(({ wafer, site, reason }) => ({ wafer, site, reason })),
    }
  }

  return { job }
}

function failure(why: string): RunResult {
  const said = why === '' ? 'the worker ended without a word' : why
  return {
    analysis: null,
    problems: [{ kind: 'not-applicable', what: 'the analysis', why: `internal error: ${said}` }],
  }
}

/** Of the lot that the window holds. */
export const lotAnalyzer = createAnalyzer()

export function analyzeInWorker(
  readings: readonly OpenedFile[],
  procedure: OpenedFile,
  options?: AnalysisOptions,
): RunningAnalysis {
  return lotAnalyzer.analyze(readings, procedure, options)
}
