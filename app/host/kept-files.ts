/** Files of an open lot, kept beside the state under their own digest: what the state speaks of can't have changed. */
import { createHash } from 'node:crypto'
import { readFile, rename, rm, stat, utimes } from 'node:fs/promises'
import { join } from 'node:path'
import { CoreError } from '../../core/problems/problem'
import { MAX_FILES_BYTES } from '../contract/host'
import { besideOf, dropOld, flushFolder, makeFolder, PART_SUFFIX, writeFlushed } from './write-whole'

export function isToken(value: unknown): boolean {
  return typeof value === 'string' && /^[0-9a-f]{64}$/.test(value)
}

export class KeptFiles {
  private readonly folder: string

  constructor(folder: string) {
    this.folder = folder
  }

  async keep(bytes: Uint8Array): Promise<string> {
    if (bytes.length > MAX_FILES_BYTES) {
      const why = `it is larger than ${MAX_FILES_BYTES / 2 ** 20} MB`
      throw new CoreError({ kind: 'bad-argument', argument: 'the file', why })
    }
    const token = createHash('sha256').update(bytes).digest('hex')
    const path = join(this.folder, token)
    if (await this.isThere(path, bytes.length)) return token
    await makeFolder(this.folder, 0o700)
    const beside = besideOf(path)
    try {
      await writeFlushed(beside, bytes, 0o600)
      await rename(beside, path)
    } catch (error) {
      await rm(beside, { force: true })
      throw error
    }
    await flushFolder(this.folder)
    return token
  }

  /** @throws CoreError cannot-read where it was dropped or is damaged */
  async read(token: string): Promise<Uint8Array> {
    const bytes = isToken(token) ? await readFile(join(this.folder, token)).catch(() => null) : null
    if (bytes && createHash('sha256').update(bytes).digest('hex') === token) return new Uint8Array(bytes)
    const why = bytes ? 'the copy that was kept is damaged' : 'no copy of it was kept'
    throw new CoreError({ kind: 'cannot-read', file: 'a file of the last session', why })
  }

  async dropAllBut(used: ReadonlySet<string>): Promise<void> {
    await dropOld(this.folder, (name) => !used.has(name) && (isToken(name) || name.endsWith(PART_SUFFIX)))
  }

  /** One that is there already begins its grace anew. */
  private async isThere(path: string, length: number): Promise<boolean> {
    const known = await stat(path).catch(() => null)
    if (!known?.isFile() || known.size !== length) return false
    const now = new Date()
    await utimes(path, now, now).catch(() => undefined)
    return true
  }
}
