import { randomBytes } from 'node:crypto'
import { mkdir, open, rename, rm } from 'node:fs/promises'
import { join } from 'node:path'
import { CoreError } from '../../core/problems/problem'

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
    throw new CoreError({ kind: 'cannot-write', path: folder, why: reason(error) })
  }
}

/** What the system said, without its stack. */
export function reason(error: unknown): string {
  const code = (error as NodeJS.ErrnoException).code
  const plain: Record<string, string> = {
    EACCES: 'permission denied',
    EPERM: 'operation not permitted',
    ENOENT: 'no such file or folder',
    ENOTDIR: 'a part of the path is not a folder',
    EISDIR: 'it is a folder',
    EEXIST: 'it exists and is not a folder',
    ENOSPC: 'the disk is full',
    EROFS: 'the file system is read-only',
  }
  return (code && plain[code]) ?? (error instanceof Error ? error.message : String(error))
}
