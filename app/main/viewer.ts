/** Hands a report to the system's PDF viewer, which can print. */
import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { CoreError } from '../../core/problems/problem'

const folders: string[] = []

export interface Viewer {
  /** Where temporary files belong. */
  readonly folder: string
  /** Electron's: gives an empty text, or what went wrong. */
  readonly open: (path: string) => Promise<string>
}

/** @throws CoreError not-applicable where nothing opens a PDF */
export async function openInViewer(pdf: Uint8Array, { folder, open }: Viewer): Promise<void> {
  if (Buffer.from(pdf.subarray(0, 5)).toString('latin1') !== '%PDF-') {
    throw new CoreError({ kind: 'bad-argument', argument: 'the report', why: 'it is no PDF' })
  }
  // A folder that nobody else can look into.
  const own = await mkdtemp(join(folder, 'persquare-'))
  folders.push(own)
  const path = join(own, 'report.pdf')
  await writeFile(path, pdf, { mode: 0o600 })
  const fault = await open(path)
  if (fault !== '') throw new CoreError({ kind: 'not-applicable', what: 'printing', why: fault })
}

/** When the program ends; a viewer that still shows one keeps what it has read. */
export async function removeViewed(): Promise<void> {
  await Promise.all(folders.splice(0).map((path) => rm(path, { recursive: true, force: true }).catch(() => undefined)))
}
