/** A file's bytes as it stood at one moment: half of an export that is still being written would be read as all of it. */
import { open, type FileHandle } from 'node:fs/promises'
import { CoreError } from '../../core/problems/problem'
import { systemReason } from '../../core/problems/system-reason'

/**
 * @param file  what the file is called when it is refused
 * @param most  of its bytes, known before anything is read
 * @throws CoreError cannot-read: it is not there, no plain file, too large, or it grew, shrank or went while it was read
 */
export async function readUnchanged(path: string, file = path, most = Infinity): Promise<Uint8Array> {
  const refuse = (why: string): never => {
    throw new CoreError({ kind: 'cannot-read', file, why })
  }
  try {
    const handle = await open(path, 'r')
    try {
      return await readFrom(handle, most, refuse)
    } finally {
      await handle.close()
    }
  } catch (error) {
    return error instanceof CoreError ? Promise.reject(error) : refuse(systemReason(error))
  }
}

async function readFrom(handle: FileHandle, most: number, refuse: (why: string) => never): Promise<Uint8Array> {
  const before = await handle.stat({ bigint: true })
  if (before.isDirectory()) refuse('it is a folder')
  if (before.size > most) refuse(`it is larger than ${most / 2 ** 20} MB`)
  const bytes = await handle.readFile()
  const after = await handle.stat({ bigint: true })
  // A pipe has no size; it ends when its writer is done.
  if (!before.isFile()) return bytes
  // The reading ends where the file ended when it began, so that a longer file shows in its size alone.
  if (BigInt(bytes.length) !== after.size || before.mtimeNs !== after.mtimeNs) {
    refuse('it changed while it was read; wait until the program that writes it is done')
  }
  return bytes
}
