/** What the window may ask for. Checks who asks and what came, once for all calls, and turns every throw into a reply. */
import { dirname, basename } from 'node:path'
import { dialog, ipcMain } from 'electron'
import type { IpcMainInvokeEvent, OpenDialogOptions } from 'electron'
import { CoreError } from '../../core/problems/problem'
import { CHANNELS, type HostCall } from '../contract/channels'
import { FILE_CHOICES, SAVE_KINDS, type SaveKind, type FileChoice } from '../contract/file-kinds'
import type { OpenedFile, ReportRequest } from '../contract/host'
import { ARGUMENTS, type HostArguments, type ValueOf } from '../contract/messages'
import { openFiles, readingsIn } from '../host/open-files'
import { refusal, replying } from '../host/replies'
import type { StateStore } from '../host/state-store'
import { writeWhole } from '../host/write-whole'
import { isPageUrl } from './page-protocol'
import type { RecentFiles } from './recent-files'
import type { WaitingFiles } from './waiting-files'

type Handlers = {
  readonly [Name in HostCall]: (...args: HostArguments<Name>) => Promise<ValueOf<Name>> | ValueOf<Name>
}

export interface Services {
  readonly waiting: WaitingFiles
  readonly demo: readonly string[]
  readonly recent: RecentFiles
  readonly state: StateStore
  readonly makeReport: (request: ReportRequest) => Promise<Uint8Array>
  readonly openInViewer: (pdf: Uint8Array) => Promise<void>
}

export function registerHandlers(services: Services): void {
  const handlers = handlersFor(services)
  for (const name of Object.keys(handlers) as HostCall[]) {
    ipcMain.handle(CHANNELS[name], (event, ...args: unknown[]) => answer(handlers, name, event, args))
  }
}

async function answer<Name extends HostCall>(
  handlers: Handlers,
  name: Name,
  event: Pick<IpcMainInvokeEvent, 'senderFrame'>,
  args: readonly unknown[],
) {
  const frame = event.senderFrame
  const refused = (why: string) => ({ ok: false, problem: refusal(name, why) }) as const
  if (!frame || frame.parent !== null || !isPageUrl(frame.url)) return refused('it was not asked for by the window')
  const parsed = ARGUMENTS[name].safeParse(args)
  if (!parsed.success) return refused('it was asked for in a way that it does not know')
  return replying(name, () => handlers[name](...(parsed.data as HostArguments<Name>)))
}

function handlersFor({ waiting, demo, recent, state, makeReport, openInViewer }: Services): Handlers {
  const opened = async (paths: readonly string[]): Promise<readonly OpenedFile[]> => {
    const files = await openFiles(paths)
    await recent.remember(paths)
    return files
  }
  return {
    chooseFiles: async (choice) => opened(await chosenPaths(choice)),
    startFiles: () => waiting.take(opened),
    demoFiles: () => openFiles(demo),
    rememberDropped: async (paths) => ((await recent.remember(paths)) ? 'remembered' : 'ignored'),
    recentFiles: () => recent.list(),
    reopen: async (token) => opened(await recent.pathsOf(token)),
    forgetRecent: async () => {
      await recent.forget()
      return 'forgotten' as const
    },
    saveFile,
    makeReport,
    printReport: async (pdf) => {
      await openInViewer(pdf)
      return 'opened' as const
    },
    loadState: () => state.load(),
    saveState: async (text, kept) => {
      await state.save(text, kept)
      return 'saved' as const
    },
    keepFile: (bytes) => state.files.keep(bytes),
    keptFile: (token) => state.files.read(token),
  }
}

async function chosenPaths(choice: FileChoice): Promise<readonly string[]> {
  const { title, extensions } = FILE_CHOICES[choice]
  const properties: Record<FileChoice, NonNullable<OpenDialogOptions['properties']>> = {
    readings: ['openFile', 'multiSelections'],
    procedure: ['openFile'],
    folder: ['openDirectory'],
  }
  const filters = [
    { name: title, extensions: [...extensions] },
    { name: 'All files', extensions: ['*'] },
  ]
  const { filePaths } = await dialog.showOpenDialog({
    title,
    properties: properties[choice],
    ...(choice !== 'folder' && { filters }),
  })
  if (choice !== 'folder') return filePaths
  return (await Promise.all(filePaths.map(readingsIn))).flat()
}

async function saveFile(suggestedName: string, bytes: Uint8Array, kind: SaveKind): Promise<'saved' | 'cancelled'> {
  const { title, extension } = SAVE_KINDS[kind]
  const { filePath } = await dialog.showSaveDialog({
    // The name alone: the page has no say in the folder.
    defaultPath: basename(suggestedName),
    filters: [{ name: title, extensions: [extension] }],
  })
  if (!filePath) return 'cancelled'
  try {
    await writeWhole(dirname(filePath), new Map([[basename(filePath), bytes]]))
  } catch (error) {
    if (!(error instanceof CoreError) || error.problem.kind !== 'cannot-write') throw error
    // No path reaches the window; the name is what the person typed a moment ago.
    throw new CoreError({ ...error.problem, path: basename(filePath) })
  }
  return 'saved'
}
