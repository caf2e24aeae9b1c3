/**
 * Keeps the window's state over a crash or a power cut: the last state and the one before, each with its own digest.
 * Whatever moment the program dies in, what is read afterwards is a state that was saved, whole.
 *
 * States are counted, not dated: a clock may be put back. Of two windows that keep their states in one place the first to
 * save goes on, and the other is told, since each state is saved only in place of the one that its window knows.
 */
import { createHash } from 'node:crypto'
import { link, readFile, rename, rm } from 'node:fs/promises'
import { join } from 'node:path'
import { CoreError } from '../../core/problems/problem'
import { MAX_STATE_BYTES, type SavedState } from '../contract/host'
import { isToken, KeptFiles } from './kept-files'
import { withLock } from './state-lock'
import { besideOf, dropOld, flushFolder, makeFolder, PART_SUFFIX, writeFlushed } from './write-whole'

const FORMAT = 'persquare-state/1'
const LAST = 'state'
const PREVIOUS = 'state.previous'
const MAX_KEPT = 1000

interface Generation {
  readonly text: string
  readonly kept: readonly string[]
  /** Of the states saved here, this one's number; 0 in those of an older program. */
  readonly count: number
}
type Found = Generation | 'damaged' | null

/** What was loaded, and the number of the state that a window now knows. */
export interface Loaded {
  readonly state: SavedState | null
  readonly count: number
}

export class StateStore {
  readonly files: KeptFiles
  private readonly folder: string
  /** Saves follow one another; two at once would take each other's place. */
  private tail: Promise<unknown> = Promise.resolve()
  /** The count of the state last loaded or saved here; null before. */
  private known: number | null = null

  constructor(folder: string) {
    this.folder = folder
    this.files = new KeptFiles(join(folder, 'kept'))
  }

  /** @throws CoreError cannot-read where states are there, but none of them is whole */
  async load(): Promise<SavedState | null> {
    return (await this.loadCounted()).state
  }

  /** The same, for a host of several windows: each gives the count back when it saves. */
  loadCounted(): Promise<Loaded> {
    return this.inTurn(async () => {
      const [last, previous] = [await this.read(LAST), await this.read(PREVIOUS)]
      const count = (this.known = countOf(last, previous))
      if (isWhole(last)) return { state: { text: last.text, generation: 'last' }, count }
      if (isWhole(previous)) return { state: { text: previous.text, generation: 'previous' }, count }
      if (last === null && previous === null) return { state: null, count }
      throw new CoreError({
        kind: 'cannot-read',
        file: 'the saved session',
        why: 'it is damaged, and so is the one before',
      })
    })
  }

  /**
   * @param basis  the count of the state that this one takes the place of; the one last loaded or saved here, where the
   *               host has one window
   * @returns the count of the state that is now there
   * @throws CoreError bad-argument where it is too large, kept-elsewhere where another window saved one since; what the
   *         system says where it can't be written
   */
  save(text: string, kept: readonly string[], basis?: number): Promise<number> {
    const body = Buffer.from(text, 'utf8')
    if (body.length > MAX_STATE_BYTES || kept.length > MAX_KEPT || !kept.every(isToken)) {
      const why = `a state has at most ${MAX_STATE_BYTES / 2 ** 20} MB and speaks of at most ${MAX_KEPT} files`
      return Promise.reject(new CoreError({ kind: 'bad-argument', argument: 'the session', why }))
    }
    return this.inTurn(async () => {
      await makeFolder(this.folder, 0o700)
      return withLock(this.folder, async () => {
        const count = await this.replace({ text, kept }, body, basis)
        await flushFolder(this.folder)
        await this.dropUnused()
        return (this.known = count)
      })
    })
  }

  private async replace(
    { text, kept }: Pick<Generation, 'text' | 'kept'>,
    body: Buffer,
    basis = this.known,
  ): Promise<number> {
    const [before, previous] = [await this.read(LAST), await this.read(PREVIOUS)]
    const current = countOf(before, previous)
    // Asked for again after an answer that got lost, it is there already.
    if (basis !== null && basis !== current && !(isWhole(before) && before.text === text)) {
      throw new CoreError({ kind: 'kept-elsewhere' })
    }
    const last = join(this.folder, LAST)
    const [beside, linked] = [besideOf(last), besideOf(last)]
    try {
      await writeFlushed(beside, Buffer.concat([header(body, kept, current + 1), body]), 0o600)
      // A damaged one must not push out the whole one before it.
      if (isWhole(before)) await moveAside(last, linked, join(this.folder, PREVIOUS))
      await rename(beside, last)
    } finally {
      await rm(beside, { force: true })
      await rm(linked, { force: true })
    }
    return current + 1
  }

  private async dropUnused(): Promise<void> {
    const generations = [await this.read(LAST), await this.read(PREVIOUS)]
    const used = generations.flatMap((found) => (isWhole(found) ? found.kept : []))
    await this.files.dropAllBut(new Set(used))
    // Left behind by a program that died while it wrote.
    await dropOld(this.folder, (name) => name.endsWith(PART_SUFFIX))
  }

  private async read(name: string): Promise<Found> {
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

/** The last state becomes the one before, and all the while there is a last one. */
async function moveAside(last: string, linked: string, previous: string): Promise<void> {
  const canLink = await link(last, linked).then(
    () => true,
    // Some file systems have no links; there, for a moment, only the one before is there.
    () => false,
  )
  await rename(canLink ? linked : last, previous)
}

function isWhole(found: Found): found is Generation {
  return found !== null && found !== 'damaged'
}

/** Of the last state; a damaged one counts as the next after the one before it. */
function countOf(last: Found, previous: Found): number {
  if (isWhole(last)) return last.count
  return (isWhole(previous) ? previous.count : 0) + (last === 'damaged' ? 1 : 0)
}

function header(body: Buffer, kept: readonly string[], count: number): Buffer {
  return Buffer.from(`${JSON.stringify({ format: FORMAT, sha256: digest(body, kept, count), kept, count })}\n`)
}

function parsed(bytes: Buffer): Generation | 'damaged' {
  const end = bytes.indexOf(0x0a)
  if (end < 0) return 'damaged'
  const { format, sha256, kept, count = 0 } = JSON.parse(bytes.toString('utf8', 0, end)) as Record<string, unknown>
  const body = bytes.subarray(end + 1)
  if (format !== FORMAT || !Array.isArray(kept) || !kept.every(isToken) || !isCount(count)) return 'damaged'
  if (sha256 !== digest(body, kept as string[], count)) return 'damaged'
  return { text: body.toString('utf8'), kept: kept as readonly string[], count }
}

function isCount(value: unknown): value is number {
  return typeof value === 'number' && Number.isSafeInteger(value) && value >= 0
}

/** Of the body alone in states that are not counted. */
function digest(body: Uint8Array, kept: readonly string[], count: number): string {
  const hash = createHash('sha256')
  if (count > 0) hash.update(`${JSON.stringify([kept, count])}\n`)
  return hash.update(body).digest('hex')
}
