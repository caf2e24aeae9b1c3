/** The host where the page stands in a plain browser: its file dialog, its downloads, and what the loopback host serves. */
import type { Problem } from '../../core/problems/problem'
import { FILE_CHOICES, isReadingsName, SAVE_KINDS, type SaveKind, type FileChoice } from '../contract/file-kinds'
import { packParts } from '../contract/frame'
import type { Host, OpenedFile, Reply, ReportRequest, SavedState } from '../contract/host'
import { COUNT_HEADER, LOOPBACK_PATHS, OWN_HEADER, type NamedFile } from '../contract/loopback'
import { readFiles } from './dropped-files'

const never = (): (() => void) => () => undefined

export const browserHost: Host = {
  kind: 'browser',
  can: { reopen: false, print: false, menus: false, asksWhere: false },
  chooseFiles,
  startFiles,
  demoFiles: () => filesAt(LOOPBACK_PATHS.demo),
  rememberDropped: () => Promise.resolve({ ok: true, value: 'ignored' }),
  recentFiles: () => Promise.resolve({ ok: true, value: [] }),
  reopen: () => refused('reopen', 'a browser does not open files again by itself'),
  forgetRecent: () => Promise.resolve({ ok: true, value: 'forgotten' }),
  saveFile,
  makeReport,
  printReport: () => refused('printReport', 'a browser prints the report when it is saved and opened'),
  loadState,
  saveState,
  keepFile: (bytes) => ask<string>(LOOPBACK_PATHS.kept, (response) => response.json(), bytes),
  keptFile: (token) => ask(`${LOOPBACK_PATHS.kept}/${encodeURIComponent(token)}`, bytesOf),
  onCommand: never,
  onFilesWaiting: never,
}

/** Of the state that this page loaded or saved last; null before. */
let stateCount: number | null = null

function loadState(): Promise<Reply<SavedState | null>> {
  return ask<SavedState | null>(LOOPBACK_PATHS.state, (response) => {
    stateCount = countIn(response)
    return response.json()
  })
}

function saveState(text: string, kept: readonly string[]): Promise<Reply<'saved'>> {
  const basis = stateCount === null ? [] : [utf8(JSON.stringify(stateCount))]
  const body = packParts([utf8(text), utf8(JSON.stringify(kept)), ...basis])
  const take = (response: Response) => {
    stateCount = countIn(response)
    return 'saved' as const
  }
  return ask(LOOPBACK_PATHS.state, take, body)
}

function countIn({ headers }: Response): number | null {
  const count = headers.get(COUNT_HEADER)
  return count === null ? null : Number(count)
}

/** Each file is handed out once: what was open is restored from the state when the page is loaded again. */
async function startFiles(): Promise<Reply<readonly OpenedFile[]>> {
  const files = await filesAt(LOOPBACK_PATHS.files)
  if (files.ok && files.value.length === 0) return files
  const taken = await ask(LOOPBACK_PATHS.taken, () => null, new Uint8Array())
  return taken.ok ? files : taken
}

async function filesAt(path: string): Promise<Reply<readonly OpenedFile[]>> {
  const list = await ask<readonly NamedFile[]>(path, (response) => response.json())
  if (!list.ok) return list
  const files: OpenedFile[] = []
  for (const [index, { name }] of list.value.entries()) {
    const bytes = await ask(`${path}/${index}`, bytesOf)
    if (!bytes.ok) return bytes
    files.push({ name, bytes: bytes.value })
  }
  return { ok: true, value: files }
}

function makeReport({ readings, procedure, ...terms }: ReportRequest): Promise<Reply<Uint8Array>> {
  const head = { ...terms, readings: readings.map(({ name }) => name), procedure: procedure.name }
  const files = [procedure, ...readings].map(({ bytes }) => bytes)
  return ask(LOOPBACK_PATHS.report, bytesOf, packParts([utf8(JSON.stringify(head)), ...files]))
}

/** Asks the loopback host; with a body it is told something. */
async function ask<Value>(
  path: string,
  read: (response: Response) => Promise<Value> | Value,
  body?: Uint8Array,
): Promise<Reply<Value>> {
  try {
    const response = await fetch(path, body ? post(body) : {})
    if (response.ok) return { ok: true, value: await read(response) }
    return { ok: false, problem: await problemIn(response, path) }
  } catch {
    return {
      ok: false,
      problem: { kind: 'not-applicable', what: path, why: 'the program that serves this page was closed' },
    }
  }
}

function post(body: Uint8Array): RequestInit {
  const bytes = body.buffer instanceof ArrayBuffer ? (body as Uint8Array<ArrayBuffer>) : new Uint8Array(body)
  const headers = { [OWN_HEADER]: '1', 'content-type': 'application/octet-stream' }
  // A blob is taken from the page once; a bare array is copied while the window waits.
  return { method: 'POST', headers, body: new Blob([bytes]) }
}

async function problemIn(response: Response, path: string): Promise<Problem> {
  if (response.status === 409) return (await response.json()) as Problem
  const why = response.status === 413 ? 'it is too large' : `the program answered with status ${response.status}`
  return { kind: 'bad-argument', argument: path, why }
}

async function bytesOf(response: Response): Promise<Uint8Array> {
  return new Uint8Array(await response.arrayBuffer())
}

function utf8(text: string): Uint8Array {
  return new TextEncoder().encode(text)
}

function refused(argument: string, why: string): Promise<Reply<never>> {
  return Promise.resolve({ ok: false, problem: { kind: 'not-applicable', what: argument, why } })
}

function chooseFiles(choice: FileChoice): Promise<Reply<readonly OpenedFile[]>> {
  const input = document.createElement('input')
  input.type = 'file'
  input.multiple = choice === 'readings'
  input.webkitdirectory = choice === 'folder'
  if (choice !== 'folder') input.accept = FILE_CHOICES[choice].extensions.map((extension) => `.${extension}`).join(',')
  return new Promise((resolve) => {
    input.addEventListener('cancel', () => resolve({ ok: true, value: [] }))
    input.addEventListener('change', () => resolve(readChosen(choice, [...(input.files ?? [])])))
    input.click()
  })
}

function readChosen(choice: FileChoice, files: readonly File[]): Promise<Reply<readonly OpenedFile[]>> {
  if (choice !== 'folder') return readFiles(files)
  // `folder/file.csv` lies in the folder itself, `folder/more/file.csv` below it.
  const readings = files.filter((file) => isReadingsName(file.name) && file.webkitRelativePath.split('/').length <= 2)
  const folder = files[0]?.webkitRelativePath.split('/')[0] ?? 'the folder'
  if (readings.length > 0) return readFiles(readings)
  const problem = { kind: 'cannot-read', file: folder, why: 'there is no CSV file in this folder' } as const
  return Promise.resolve({ ok: false, problem })
}

function saveFile(suggestedName: string, bytes: Uint8Array, kind: SaveKind): Promise<Reply<'saved' | 'cancelled'>> {
  const address = URL.createObjectURL(new Blob([new Uint8Array(bytes)], { type: SAVE_KINDS[kind].contentType }))
  const link = document.createElement('a')
  link.href = address
  link.download = suggestedName
  link.click()
  // The browser has taken hold of the bytes by the next turn, but not surely before.
  setTimeout(() => URL.revokeObjectURL(address), 60_000)
  return Promise.resolve({ ok: true, value: 'saved' })
}
