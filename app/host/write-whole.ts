import { randomBytes } from 'node:crypto'
import { lstat, mkdir, open, rename, rm } from 'node:fs/promises'
import { join } from 'node:path'
import { CoreError } from '../../core/problems/problem'
import { systemReason } from '../../core/problems/system-reason'

/** Ends the names of files that are still being written. */
export const PART_SUFFIX = '.part'

/**
 * Writes files into a folder so that, whatever happens, each name holds either its old content or its new one, whole:
 * everything is written beside first and flushed, then renamed into place.
 *
 * @throws CoreError cannot-write; nothing is renamed unless every file could be written
 */
export async function writeWhole(folder: string, files: ReadonlyMap<string, Uint8Array | string>): Promise<void> {
  const written = new Map<string, string>()
  try {
    await mkdir(folder, { recursive: true })
    for (const name of files.keys()) await requireReplaceable(join(folder, name))
    for (const [name, content] of files) {
      const beside = besideOf(join(folder, name))
      written.set(beside, join(folder, name))
      await writeFlushed(beside, content)
    }
    for (const [beside, path] of written) await rename(beside, path)
    await flushFolder(folder)
  } catch (error) {
    await Promise.all([...written.keys()].map((path) => rm(path, { force: true })))
    if (error instanceof CoreError) throw error
    throw new CoreError({ kind: 'cannot-write', path: folder, why: systemReason(error) })
  }
}

/** A name of its own for what is to take the place of `path`. */
export function besideOf(path: string): string {
  return `${path}.${randomBytes(6).toString('hex')}${PART_SUFFIX}`
}

/** A new file with its bytes on the disk, not only in the system's memory. */
export async function writeFlushed(path: string, content: Uint8Array | string, mode = 0o666): Promise<void> {
  const file = await open(path, 'wx', mode)
  try {
    await file.writeFile(content)
    await file.sync()
  } finally {
    await file.close()
  }
}

/** Makes renames in it outlast a power cut, where the system can. */
export async function flushFolder(folder: string): Promise<void> {
  const handle = await open(folder, 'r').catch(() => null)
  // Not every system opens or flushes a folder; the files themselves are flushed all the same.
  await handle?.sync().catch(() => undefined)
  await handle?.close()
}

/** Found out before anything is renamed, so that a set of files is not left half new. */
async function requireReplaceable(path: string): Promise<void> {
  const known = await lstat(path).catch((error: NodeJS.ErrnoException) => {
    if (error.code === 'ENOENT') return null
    throw error
  })
  if (known && !known.isFile()) {
    throw new CoreError({ kind: 'cannot-write', path, why: 'there is something of this name that is no plain file' })
  }
}
