/** One process at a time changes what is in a folder. The lock is a file; one whose process is gone is nobody's. */
import { readFile, rename, rm, stat, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { setTimeout as pause } from 'node:timers/promises'
import { CoreError } from '../../core/problems/problem'
import { besideOf } from './write-whole'

const LOCK = 'state.lock'
/** Much longer than any change takes; a number of a process may come again. */
const LONGEST_ms = 10_000
const PATIENCE_ms = 15_000
const STEP_ms = 10

/** @throws CoreError not-applicable where another process doesn't let go; what the system says; what `work` throws */
export async function withLock<Value>(folder: string, work: () => Promise<Value>): Promise<Value> {
  const path = join(folder, LOCK)
  await take(path)
  try {
    return await work()
  } finally {
    await rm(path, { force: true })
  }
}

async function take(path: string): Promise<void> {
  const most = PATIENCE_ms / STEP_ms
  for (let tries = 0; tries < most; tries++) {
    try {
      return await writeFile(path, String(process.pid), { flag: 'wx', mode: 0o600 })
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code !== 'EEXIST') throw error
    }
    if (await isNobodys(path)) await takeAway(path)
    else await pause(STEP_ms)
  }
  const why = 'another window has been saving for too long'
  throw new CoreError({ kind: 'not-applicable', what: 'keeping the session', why })
}

async function isNobodys(path: string): Promise<boolean> {
  const [text, known] = await Promise.all([readFile(path, 'utf8').catch(() => ''), stat(path).catch(() => null)])
  if (!known) return false
  // Of another clock, or of a clock that was put back since, it is old as well.
  if (Math.abs(Date.now() - known.mtimeMs) > LONGEST_ms) return true
  return /^\d+$/.test(text) && !isRunning(Number(text))
}

function isRunning(pid: number): boolean {
  try {
    process.kill(pid, 0)
    return true
  } catch (error) {
    return (error as NodeJS.ErrnoException).code === 'EPERM'
  }
}

/** By a new name first, which only one of several can give it. */
async function takeAway(path: string): Promise<void> {
  const aside = besideOf(path)
  await rename(path, aside).catch(() => undefined)
  await rm(aside, { force: true })
}
