/** Runs the built command line as its users do. `npm test` builds it first. */
import { spawnSync } from 'node:child_process'
import { existsSync, mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { afterAll } from 'vitest'

export const ROOT = fileURLToPath(new URL('../../..', import.meta.url))
const PROGRAM = join(ROOT, 'out/cli/persquare.js')

export interface Ran {
  readonly status: number | null
  readonly stdout: string
  readonly stderr: string
}

export function persquare(...args: readonly string[]): Ran {
  if (!existsSync(PROGRAM)) throw new Error('out/cli is not built: run npm run build:cli')
  const { status, stdout, stderr } = spawnSync(process.execPath, [PROGRAM, ...args], {
    cwd: ROOT,
    encoding: 'utf8',
    timeout: 60_000,
    maxBuffer: 64 * 1024 * 1024,
  })
  return { status, stdout, stderr }
}

/** A folder of this test file's own, gone afterwards. */
export function scratchFolder(): string {
  const folder = mkdtempSync(join(tmpdir(), 'persquare-test-'))
  afterAll(() => rmSync(folder, { recursive: true, force: true }))
  return folder
}
