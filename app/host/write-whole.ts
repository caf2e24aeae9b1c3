import { randomBytes } from 'node:crypto'
import { lstat, mkdir, open, readdir, rename, rm, stat } from 'node:fs/promises'
import { dirname, join } from 'node:path'
import { CoreError } from '../../core/problems/problem'
import { systemReason } from '../../core/problems/system-reason'

/** Ends the names of files that are still being written. */
export const PART_SUFFIX = '.part'

/**
 * What a program that died may have left is removed no sooner: another may be writing it still. Nor is a kept file
 * dropped before the state that speaks of it is surely saved.
 */
const GRACE_ms = 3_600_000

/**
 * Writes files into a folder so that, whatever happens, each name holds either its old content or its new one, whole:
 * everything is written beside first and flushed, then renamed into place.
 *
 * @throws CoreError cannot-write; nothing is renamed unless every file could be written
 */
export async function writeWhole(folder: string, files: ReadonlyMap<string, Uint8Array | string>): Promise<void> {
  const written = new Map<string, string>()
  try {
    await makeFolder(folder)
    for (const name of files.keys()) await requireReplaceable(join(folder, name))
    for (const [name, content] of files) {
      const beside = besideOf(join(folder, name))
      written.set(beside, join(folder, name))
      await writeFlushed(beside, content)
    }
    for (const [beside, path] of written) await rename(beside, path)
    await flushFolder(folder)
    await dropOld(folder, (name) => files.has(name.replace(/\.[0-9a-f]{12}\.part$/, '')) && name.endsWith(PART_SUFFIX))
  } catch (error) {
    await Promise.all([...written.keys()].map((path) => rm(path, { force: true })))
    if (error instanceof CoreError) throw error
    throw new CoreError({ kind: 'cannot-write', path: folder, why: systemReason(error) })
  }
}

/**
 * The folder, with those that it lies in. Node's own recursion never ends where a folder is there in which none can be made,
 * as under /proc.
 *
 * @throws what the system says
 */
export async function makeFolder(folder: string, mode = 0o777): Promise<void> {
  try {
    await mkdir(folder, { mode })
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException
    const known = await stat(folder).catch(() => null)
    if (known?.isDirectory()) return
    const parent = dirname(folder)
    if (code !== 'ENOENT' || parent === folder || (await stat(parent).catch(() => null))) throw error
    await makeFolder(parent, mode)
    await makeFolder(folder, mode)
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

/** Files whose time of grace is over. */
export async function dropOld(folder: string, isUnused: (name: string) => boolean): Promise<void> {
  const names = await readdir(folder).catch(() => [] as string[])
  for (const name of names.filter(isUnused)) {
    const known = await stat(join(folder, name)).catch(() => null)
    if (known?.isFile() && Date.now() - known.mtimeMs > GRACE_ms) {
      await rm(join(folder, name), { force: true }).catch(() => undefined)
    }
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
