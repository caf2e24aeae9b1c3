/** Shared by the tests of reading. */
import { readFileSync } from 'node:fs'
import { readReadings } from '../../../core/ingest/read-files'
import type { InputFile, ReadResult } from '../../../core/ingest/read-files'
import type { ReadOptions } from '../../../core/ingest/read-options'
import type { Readings } from '../../../core/ingest/readings'

export function textFile(text: string, name = 'TB-0417.csv'): InputFile {
  return { name, bytes: new TextEncoder().encode(text), sha256: '00' }
}

export function fixture(name: string): InputFile {
  const path = new URL(`../../fixtures/ingest/${name}`, import.meta.url)
  return { name, bytes: new Uint8Array(readFileSync(path)), sha256: '00' }
}

export function readText(text: string, options?: ReadOptions): ReadResult {
  return readReadings([textFile(text)], options)
}

/** Readings that must have come without any problem. */
export function readClean(text: string, options?: ReadOptions): Readings {
  const { readings, problems } = readText(text, options)
  if (!readings || problems.length > 0) throw new Error(JSON.stringify(problems))
  return readings
}

export function list(column: Float64Array | null): number[] | null {
  return column && [...column]
}
