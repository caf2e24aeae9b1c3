/** Files that the person chose, as name and bytes. */
import { readdir, stat } from 'node:fs/promises'
import { basename, join } from 'node:path'
import { CoreError } from '../../core/problems/problem'
import { systemReason } from '../../core/problems/system-reason'
import { isReadingsName } from '../contract/file-kinds'
import { MAX_FILES_BYTES, type OpenedFile } from '../contract/host'
import { readUnchanged } from './read-unchanged'

/** @throws CoreError cannot-read, naming the first file that can't be had */
export async function openFiles(paths: readonly string[]): Promise<readonly OpenedFile[]> {
  const files: OpenedFile[] = []
  let total = 0
  for (const path of paths) {
    const name = basename(path)
    const refuse = (why: string): never => {
      throw new CoreError({ kind: 'cannot-read', file: name, why })
    }
    const known = await stat(path).catch((error: unknown) => refuse(systemReason(error)))
    if (known.isDirectory()) refuse('it is a folder')
    if (!known.isFile()) refuse('it is no plain file')
    total += known.size
    if (total > MAX_FILES_BYTES) refuse(`the files together are larger than ${MAX_FILES_BYTES / 2 ** 20} MB`)
    const bytes = await readUnchanged(path, name, MAX_FILES_BYTES)
    // A plain array crosses between processes; a Buffer of Node's doesn't come out the same.
    files.push({ name, bytes: new Uint8Array(bytes) })
  }
  return files
}

/**
 * The readings files in a folder, not below it, by name.
 *
 * @throws CoreError cannot-read where there are none
 */
export async function readingsIn(folder: string): Promise<readonly string[]> {
  const file = basename(folder)
  const entries = await readdir(folder, { withFileTypes: true }).catch((error: unknown) => {
    throw new CoreError({ kind: 'cannot-read', file, why: systemReason(error) })
  })
  const names = entries.filter((entry) => entry.isFile() && isReadingsName(entry.name)).map(({ name }) => name)
  if (names.length === 0) throw new CoreError({ kind: 'cannot-read', file, why: 'there is no CSV file in this folder' })
  return names.sort(byNumber).map((name) => join(folder, name))
}

/** W2 before W10. */
function byNumber(a: string, b: string): number {
  return a.localeCompare(b, 'en', { numeric: true })
}
