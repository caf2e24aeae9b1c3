import type { Problem } from '../../core/problems/problem'
import { FILE_CHOICES } from '../contract/file-kinds'
import type { FileChoice, Host, OpenedFile, Reply } from '../contract/host'
import { NAMED_FILES_PATH } from '../contract/named-files'
import type { NamedFile } from '../contract/named-files'

/** The host where the page stands in a plain browser: its file dialog, its downloads, and the loopback host's files. */
export const browserHost: Host = {
  kind: 'browser',
  chooseFiles,
  startFiles,
  saveFile,
}

async function startFiles(): Promise<Reply<readonly OpenedFile[]>> {
  try {
    const list = (await (await fetch(NAMED_FILES_PATH)).json()) as readonly NamedFile[]
    const files: OpenedFile[] = []
    for (const [index, { name }] of list.entries()) {
      const response = await fetch(`${NAMED_FILES_PATH}/${index}`)
      if (!response.ok) return { ok: false, problem: await problemIn(response, name) }
      files.push({ name, bytes: new Uint8Array(await response.arrayBuffer()) })
    }
    return { ok: true, value: files }
  } catch {
    return { ok: false, problem: { kind: 'cannot-read', file: 'the named files', why: 'the program was closed' } }
  }
}

async function problemIn(response: Response, name: string): Promise<Problem> {
  if (response.status === 409) return (await response.json()) as Problem
  return { kind: 'cannot-read', file: name, why: `the program answered with status ${response.status}` }
}

function chooseFiles(choice: FileChoice): Promise<Reply<readonly OpenedFile[]>> {
  const input = document.createElement('input')
  input.type = 'file'
  input.multiple = choice === 'readings'
  input.accept = FILE_CHOICES[choice].extensions.map((extension) => `.${extension}`).join(',')
  return new Promise((resolve) => {
    input.addEventListener('cancel', () => resolve({ ok: true, value: [] }))
    input.addEventListener('change', () => resolve(readFiles([...(input.files ?? [])])))
    input.click()
  })
}

/** The bytes of files that the person chose or dropped. */
export async function readFiles(files: readonly File[]): Promise<Reply<readonly OpenedFile[]>> {
  const opened: OpenedFile[] = []
  for (const file of files) {
    try {
      opened.push({ name: file.name, bytes: new Uint8Array(await file.arrayBuffer()) })
    } catch {
      return {
        ok: false,
        problem: { kind: 'cannot-read', file: file.name, why: 'it can no longer be read; is it a folder?' },
      }
    }
  }
  return { ok: true, value: opened }
}

function saveFile(suggestedName: string, bytes: Uint8Array): Promise<Reply<'saved' | 'cancelled'>> {
  const address = URL.createObjectURL(new Blob([new Uint8Array(bytes)]))
  const link = document.createElement('a')
  link.href = address
  link.download = suggestedName
  link.click()
  // The browser has taken hold of the bytes by the next turn, but not surely before.
  setTimeout(() => URL.revokeObjectURL(address), 60_000)
  return Promise.resolve({ ok: true, value: 'saved' })
}
