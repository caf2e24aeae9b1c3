/** What the window may ask for. Checks who asks and what came, once for all calls, and turns every throw into a reply. */
import { readFile, writeFile } from 'node:fs/promises'
import { basename } from 'node:path'
import { dialog, ipcMain } from 'electron'
import type { IpcMainInvokeEvent } from 'electron'
import type { Problem } from '../../core/problems/problem'
import { systemReason } from '../../core/problems/system-reason'
import { CHANNELS } from '../contract/channels'
import type { HostCall } from '../contract/channels'
import { FILE_CHOICES } from '../contract/file-kinds'
import type { FileChoice, Host, OpenedFile, Reply } from '../contract/host'
import { isPageUrl } from './page-protocol'

type Handlers = { readonly [Name in HostCall]: (...args: Parameters<Host[Name]>) => ReturnType<Host[Name]> }
type Arguments = { readonly [Name in HostCall]: (args: readonly unknown[]) => args is Parameters<Host[Name]> }

/** Whether what came over a channel is what the contract says. */
const accepts: Arguments = {
  chooseFiles: (args): args is [FileChoice] => args.length === 1 && Object.hasOwn(FILE_CHOICES, String(args[0])),
  startFiles: (args): args is [] => args.length === 0,
  saveFile: (args): args is [string, Uint8Array] =>
    args.length === 2 && typeof args[0] === 'string' && args[1] instanceof Uint8Array,
}

export function registerHandlers(startPaths: readonly string[]): void {
  const handlers: Handlers = {
    chooseFiles,
    startFiles: () => openAll(startPaths),
    saveFile,
  }
  for (const name of Object.keys(handlers) as HostCall[]) {
    ipcMain.handle(CHANNELS[name], (event, ...args: unknown[]) => answer(handlers, name, event, args))
  }
}

async function answer<Name extends HostCall>(
  handlers: Handlers,
  name: Name,
  event: Pick<IpcMainInvokeEvent, 'senderFrame'>,
  args: readonly unknown[],
): Promise<Reply<unknown>> {
  const frame = event.senderFrame
  if (!frame || frame.parent !== null || !isPageUrl(frame.url))
    return refused(name, 'it was not asked for by the window')
  if (!accepts[name](args)) return refused(name, 'it was asked for in a way that it does not know')
  try {
    return await handlers[name](...args)
  } catch (error) {
    return refused(name, systemReason(error))
  }
}

function refused(name: string, why: string): Reply<never> {
  return { ok: false, problem: { kind: 'bad-argument', argument: name, why } }
}

async function chooseFiles(choice: FileChoice): Promise<Reply<readonly OpenedFile[]>> {
  const { title, extensions } = FILE_CHOICES[choice]
  const { filePaths } = await dialog.showOpenDialog({
    title,
    properties: choice === 'readings' ? ['openFile', 'multiSelections'] : ['openFile'],
    filters: [
      { name: title, extensions: [...extensions] },
      { name: 'All files', extensions: ['*'] },
    ],
  })
  return openAll(filePaths)
}

async function openAll(paths: readonly string[]): Promise<Reply<readonly OpenedFile[]>> {
  const files: OpenedFile[] = []
  for (const path of paths) {
    const name = basename(path)
    try {
      files.push({ name, bytes: new Uint8Array(await readFile(path)) })
    } catch (error) {
      return failed({ kind: 'cannot-read', file: name, why: systemReason(error) })
    }
  }
  return { ok: true, value: files }
}

async function saveFile(suggestedName: string, bytes: Uint8Array): Promise<Reply<'saved' | 'cancelled'>> {
  // The name alone: the page has no say in the folder.
  const { filePath } = await dialog.showSaveDialog({ defaultPath: basename(suggestedName) })
  if (!filePath) return { ok: true, value: 'cancelled' }
  try {
    await writeFile(filePath, bytes)
    return { ok: true, value: 'saved' }
  } catch (error) {
    return failed({ kind: 'cannot-write', path: filePath, why: systemReason(error) })
  }
}

function failed(problem: Problem): Reply<never> {
  return { ok: false, problem }
}
