/**
 * Keeps the window's state over a crash or a power cut: the last state and the one before, each with its own digest.
 * Whatever moment the program dies in, what is read afterwards is a state that was saved, whole.
 */
import { createHash } from 'node:crypto'
import { mkdir, readFile, rename, rm } from 'node:fs/promises'
import { join } from 'node:path'
import { CoreError } from '../../core/problems/problem'
import { MAX_STATE_BYTES, type SavedState } from '../contract/host'
import { dropOld, isToken, KeptFiles } from './kept-files'
import { besideOf, flushFolder, PART_SUFFIX, writeFlushed } from './write-whole'

const FORMAT = 'persquare-state/1'
const LAST = 'state'
const PREVIOUS = 'state.previous'
const MAX_KEPT = 1000

interface Generation {
  readonly text: string
  readonly kept: readonly string[]
}

export class StateStore {
  readonly files: KeptFiles
  private readonly folder: string
  /** Saves follow one another; two at once would take each other's place. */
  private tail: Promise<unknown> = Promise.resolve()

  constructor(folder: string) {
    this.folder = folder
    this.files = new KeptFiles(join(folder, 'kept'))
  }

  /** @throws CoreError cannot-read where states are there, but none of them is whole */
  load(): Promise<SavedState | null> {
    return this.inTurn(async () => {
      const last = await this.read(LAST)
      if (last && last !== 'damaged') return { text: last.text, generation: 'last' }
      const previous = await this.read(PREVIOUS)
      if (previous && previous !== 'damaged') return { text: previous.text, generation: 'previous' }
      if (last === null && previous === null) return null
      throw new CoreError({
        kind: 'cannot-read',
        file: 'the saved session',
        why: 'it is damaged, and so is the one before',
      })
    })
  }

  /** @throws CoreError bad-argument where it is too large; what the system says where it can't be written */
  save(text: string, kept: readonly string[]): Promise<void> {
    const body = Buffer.from(text, 'utf8')
    if (body.length > MAX_STATE_BYTES || kept.length > MAX_KEPT || !kept.every(isToken)) {
      const why = `a state has at most ${MAX_STATE_BYTES / 2 ** 20} MB and speaks of at most ${MAX_KEPT} files`
      return Promise.reject(new CoreError({ kind: 'bad-argument', argument: 'the session', why }))
    }
    return this.inTurn(async () => {
      const last = join(this.folder, LAST)
      const beside = besideOf(last)
      await mkdir(this.folder, { recursive: true, mode: 0o700 })
      try {
        await writeFlushed(beside, Buffer.concat([header(body, kept), body]), 0o600)
        const before = await this.read(LAST)
        // A damaged one must not push out the whole one before it.
        if (before && before !== 'damaged') await rename(last, join(this.folder, PREVIOUS))
        await rename(beside, last)
      } catch (error) {
        await rm(beside, { force: true })
        throw error
      }
      await flushFolder(this.folder)
      await this.dropUnused()
    })
  }

  private async dropUnused(): Promise<void> {
    const generations = [await this.read(LAST), await this.read(PREVIOUS)]
    const used = generations.flatMap((found) => (found && found !== 'damaged' ? found.kept : []))
    await this.files.dropAllBut(new Set(used))
    // Left behind by a program that died while it wrote.
    await dropOld(this.folder, (name) => name.endsWith(PART_SUFFIX))
  }

  private async read(name: string): Promise<Generation | 'damaged' | null> {
    try {
      return parsed(await readFile(join(this.folder, name)))
    } catch (error) {
      return (error as NodeJS.ErrnoException).code === 'ENOENT' ? null : 'damaged'
    }
  }

  private inTurn<Value>(work: () => Promise<Value>): Promise<Value> {
    const mine = this.tail.then(work)
    this.tail = mine.catch(() => undefined)
    return mine
  }
}

function header(body: Buffer, kept: readonly string[]): Buffer {
  return Buffer.from(`${JSON.stringify({ format: FORMAT, sha256: digest(body), kept })}\n`)
}

function parsed(bytes: Buffer): Generation | 'damaged' {
  const end = bytes.indexOf(0x0a)
  if (end < 0) return 'damaged'
  const { format, sha256, kept } = JSON.parse(bytes.toString('utf8', 0, end)) as Record<string, unknown>
  const body = bytes.subarray(end + 1)
  if (format !== FORMAT || sha256 !== digest(body) || !Array.isArray(kept) || !kept.every(isToken)) return 'damaged'
  return { text: body.toString('utf8'), kept: kept as readonly string[] }
}

function digest(bytes: Uint8Array): string {
  return createHash('sha256').update(bytes).digest('hex')
}
