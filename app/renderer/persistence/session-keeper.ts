/** Keeps the open lot through a crash or a power cut, a moment after each change, and brings it back. */
import type { Exclusion } from '../../../core/analysis/exclusions'
import type { Problem } from '../../../core/problems/problem'
import type { Host, OpenedFile, Reply, SavedState } from '../../contract/host'
import { parseSession, sessionText, type KeptDecision, type KeptFile } from '../../contract/session'

export interface OpenSession {
  readonly readings: readonly OpenedFile[]
  readonly procedure: OpenedFile | null
  readonly excluded: readonly Exclusion[]
  readonly decision: KeptDecision
  readonly view: Readonly<Record<string, unknown>>
}

export interface RestoredSession extends OpenSession {
  /** `previous`: the last state was damaged, and a few of the latest changes are missing. */
  readonly generation: SavedState['generation']
}

export type Keeping = 'kept' | 'keeping' | { readonly problem: Problem }

export interface SessionKeeper {
  restore(): Promise<Reply<RestoredSession | null>>
  /** Keeps this in place of what was kept before, a moment from now; the last call within the moment counts. */
  keep(session: OpenSession): void
  /** Keeps at once what still waits. */
  flush(): Promise<void>
}

/** A full disk may have room again by then. */
const RETRY_ms = 5000

type Keeper = Pick<Host, 'loadState' | 'saveState' | 'keepFile' | 'keptFile'>

/**
 * @param tell      is called whenever it stands otherwise with what is kept
 * @param pause_ms  from a change to the disk: short enough to lose nothing that took thought, long enough to type a word
 */
export function sessionKeeper(host: Keeper, tell: (keeping: Keeping) => void, pause_ms = 400): SessionKeeper {
  const files = keptFiles(host)
  let waiting: OpenSession | null = null
  let timer: ReturnType<typeof setTimeout> | undefined
  let tail: Promise<void> = Promise.resolve()
  const saveIn = (delay_ms: number): void => void (timer ??= setTimeout(() => void flush(), delay_ms))

  function flush(): Promise<void> {
    clearTimeout(timer)
    timer = undefined
    // One save at a time: the next takes whatever is the newest when its turn comes.
    return (tail = tail.then(saveWaiting))
  }

  async function saveWaiting(): Promise<void> {
    const session = waiting
    waiting = null
    if (!session) return
    try {
      await save(host, files, session)
      if (!waiting) tell('kept')
    } catch (error) {
      waiting ??= session
      saveIn(RETRY_ms)
      tell({ problem: problemOf(error) })
    }
  }

  return {
    restore: () => restore(host, files),
    flush,
    keep: (session) => {
      waiting = session
      tell('keeping')
      saveIn(pause_ms)
    },
  }
}

async function save(host: Keeper, files: Files, { readings, procedure, ...rest }: OpenSession): Promise<void> {
  const kept: KeptFile[] = []
  for (const file of readings) kept.push(await files.keep(file))
  const keptProcedure = procedure && (await files.keep(procedure))
  const used = [...kept, ...(keptProcedure ? [keptProcedure] : [])].map(({ token }) => token)
  const text = sessionText({ ...rest, readings: kept, procedure: keptProcedure })
  const reply = await host.saveState(text, [...new Set(used)])
  if (!reply.ok) throw new Refused(reply.problem)
}

async function restore(host: Keeper, files: Files): Promise<Reply<RestoredSession | null>> {
  const state = await host.loadState()
  if (!state.ok || state.value === null) return state as Reply<null>
  const { text, generation } = state.value
  const session = parseSession(text)
  if (!session) return { ok: true, value: null }
  try {
    const readings: OpenedFile[] = []
    for (const file of session.readings) readings.push(await files.open(file))
    const procedure = session.procedure && (await files.open(session.procedure))
    return { ok: true, value: { ...session, readings, procedure, generation } }
  } catch (error) {
    return { ok: false, problem: problemOf(error) }
  }
}

type Files = ReturnType<typeof keptFiles>

/** Files go to the host once; afterwards they are known by their tokens. */
function keptFiles(host: Keeper) {
  const tokens = new WeakMap<Uint8Array, string>()

  async function keep({ name, bytes }: OpenedFile): Promise<KeptFile> {
    const known = tokens.get(bytes)
    if (known !== undefined) return { name, token: known }
    const reply = await host.keepFile(bytes)
    if (!reply.ok) throw new Refused(reply.problem)
    tokens.set(bytes, reply.value)
    return { name, token: reply.value }
  }

  async function open({ name, token }: KeptFile): Promise<OpenedFile> {
    const reply = await host.keptFile(token)
    if (!reply.ok) throw new Refused('file' in reply.problem ? { ...reply.problem, file: name } : reply.problem)
    tokens.set(reply.value, token)
    return { name, bytes: reply.value }
  }

  return { keep, open }
}

class Refused extends Error {
  readonly problem: Problem
  constructor(problem: Problem) {
    super(problem.kind)
    this.problem = problem
  }
}

function problemOf(error: unknown): Problem {
  if (error instanceof Refused) return error.problem
  return { kind: 'not-applicable', what: 'keeping the session', why: String(error) }
}
