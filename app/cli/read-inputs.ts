import { createHash } from 'node:crypto'
import { readFile } from 'node:fs/promises'
import { basename } from 'node:path'
import { CoreError } from '../../core/problems/problem'
import { systemReason } from '../../core/problems/system-reason'

export interface InputFile {
  readonly name: string
  readonly bytes: Uint8Array
  readonly sha256: string
}

/** @throws CoreError cannot-read */
export async function readInput(path: string): Promise<InputFile> {
  try {
    const bytes = await readFile(path)
    return { name: basename(path), bytes, sha256: createHash('sha256').update(bytes).digest('hex') }
  } catch (error) {
    throw new CoreError({ kind: 'cannot-read', file: path, why: systemReason(error) })
  }
}
