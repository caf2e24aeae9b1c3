import { access, readFile } from 'node:fs/promises'
import { createRequire } from 'node:module'
import { dirname, join } from 'node:path'

/**
 * The path of Electron's executable, or null where only its package is there. Loading the package would try to fetch the
 * runtime; this only looks.
 */
export async function electronRuntime(): Promise<string | null> {
  try {
    const folder = dirname(createRequire(import.meta.url).resolve('electron/package.json'))
    const override = process.env['ELECTRON_OVERRIDE_DIST_PATH']
    const executable = await readFile(join(folder, 'path.txt'), 'utf8').catch(() => 'electron')
    const path = join(override ?? join(folder, 'dist'), executable)
    await access(path)
    return path
  } catch {
    return null
  }
}
