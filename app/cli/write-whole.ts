import { randomBytes } from 'node:crypto'
import { lstat, mkdir, open, rename, rm } from 'node:fs/promises'
import { join } from 'node:path'
import { CoreError } from '../../core/problems/problem'
import { systemReason } from '../../core/problems/system-reason'

/**
 * Writes files into a folder so that, whatever happens, each name holds either its old content or its new one, whole:
 * everything is written beside first and flushed, then renamed into place.
 *
 * @throws CoreError cannot-write; nothing is renamed unless every file could be written
 */
export async function writeWhole(folder: string, files: ReadonlyMap<string, Uint8Array | string>): Promise<void> {
  const suffix = `.${randomBytes(6).toString('hex')}.part`
  const written: string[] = []
  try {
    await mkdir(folder, { recursive: true })
    for (const name of files.keys()) await requireReplaceable(join(folder, name))
    for (const [name, content] of files) {
      const beside = join(folder, name + suffix)
      const file = await open(beside, 'wx')
      written.push(beside)
      try {
        await file.writeFile(content)
        await file.sync()
      } finally {
        await file.close()
      }
    }
    for (const name of files.keys()) await rename(join(folder, name + suffix), join(folder, name))
  } catch (error) {
    await Promise.all(written.map((path) => rm(path, { force: true })))
    if (error instanceof CoreError) throw error
    throw new CoreError({ kind: 'cannot-write', path: folder, why: systemReason(error) })
  }
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
