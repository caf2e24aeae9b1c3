/** Files that the person chose or dropped, folders among them, as names and bytes. */
import { isReadingsName } from '../contract/file-kinds'
import type { OpenedFile, Reply } from '../contract/host'

/** In order of their names, W2 before W10: a lot's files come in the order of the folder, not of the disk. */
export async function readFiles(files: readonly File[]): Promise<Reply<readonly OpenedFile[]>> {
  const opened: OpenedFile[] = []
  for (const file of [...files].sort(byNumber)) {
    try {
      opened.push({ name: file.name, bytes: new Uint8Array(await file.arrayBuffer()) })
    } catch {
      const why = 'it can no longer be read; is it a folder?'
      return { ok: false, problem: { kind: 'cannot-read', file: file.name, why } }
    }
  }
  return { ok: true, value: opened }
}

/**
 * What was dropped: the files themselves, and of a folder the readings files in it. Must be called while the drop is
 * handled: afterwards the browser has forgotten what was dropped.
 */
export function droppedFiles(transfer: DataTransfer): Promise<readonly File[]> {
  const entries = [...transfer.items].map((item) => (item.kind === 'file' ? item.webkitGetAsEntry() : null))
  const files = [...transfer.files]
  const folders = entries.filter((entry): entry is FileSystemDirectoryEntry => entry?.isDirectory ?? false)
  if (folders.length === 0) return Promise.resolve(files)
  const names = new Set(folders.map(({ name }) => name))
  const plain = files.filter(({ name, type }) => !(type === '' && names.has(name)))
  return Promise.all(folders.map(readingsIn)).then((inside) => [...plain, ...inside.flat()])
}

async function readingsIn(folder: FileSystemDirectoryEntry): Promise<readonly File[]> {
  const reader = folder.createReader()
  const files: File[] = []
  // A reader hands out a hundred entries at a time, and none when it is through.
  for (;;) {
    const entries = await new Promise<FileSystemEntry[]>((resolve, reject) => reader.readEntries(resolve, reject))
    if (entries.length === 0) return files
    for (const entry of entries) if (entry.isFile && isReadingsName(entry.name)) files.push(await fileOf(entry))
  }
}

function fileOf(entry: FileSystemEntry): Promise<File> {
  return new Promise((resolve, reject) => (entry as FileSystemFileEntry).file(resolve, reject))
}

function byNumber(a: File, b: File): number {
  return a.name.localeCompare(b.name, 'en', { numeric: true })
}
