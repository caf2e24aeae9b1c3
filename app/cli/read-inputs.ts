import { createHash } from 'node:crypto'
import { basename } from 'node:path'
import { readUnchanged } from '../host/read-unchanged'

export interface InputFile {
  readonly name: string
  readonly bytes: Uint8Array
  readonly sha256: string
}

/** @throws CoreError cannot-read */
export async function readInput(path: string): Promise<InputFile> {
  const bytes = await readUnchanged(path)
  return { name: basename(path), bytes, sha256: createHash('sha256').update(bytes).digest('hex') }
}
