import { contextBridge, ipcRenderer, webUtils } from 'electron'
import { CHANNELS, EVENTS } from '../contract/channels'
import type { HostCall } from '../contract/channels'
import type { CommandId } from '../contract/commands'
import type { Host } from '../contract/host'

const ask = (call: HostCall, ...args: readonly unknown[]): Promise<never> =>
  ipcRenderer.invoke(CHANNELS[call], ...args) as Promise<never>

/** Gives how to stop. The event itself stays here: with it the page would have the channel. */
function listen(channel: string, listener: (argument: CommandId) => void): () => void {
  const relay = (_event: unknown, argument: CommandId): void => listener(argument)
  ipcRenderer.on(channel, relay)
  return () => void ipcRenderer.removeListener(channel, relay)
}

/** The window reaches the main process by these calls and no others. */
const host: Host = {
  kind: 'electron',
  can: { reopen: true, print: true, menus: true, asksWhere: true },
  chooseFiles: (choice) => ask('chooseFiles', choice),
  startFiles: () => ask('startFiles'),
  demoFiles: () => ask('demoFiles'),
  // Files that the page made up itself have no path.
  rememberDropped: (files) =>
    ask(
      'rememberDropped',
      files.map((file) => webUtils.getPathForFile(file as never)).filter((path) => path !== ''),
    ),
  recentFiles: () => ask('recentFiles'),
  reopen: (token) => ask('reopen', token),
  forgetRecent: () => ask('forgetRecent'),
  saveFile: (suggestedName, bytes, kind) => ask('saveFile', suggestedName, bytes, kind),
  makeReport: (request) => ask('makeReport', request),
  printReport: (pdf) => ask('printReport', pdf),
  loadState: () => ask('loadState'),
  saveState: (text, kept) => ask('saveState', text, kept),
  keepFile: (bytes) => ask('keepFile', bytes),
  keptFile: (token) => ask('keptFile', token),
  onCommand: (listener) => listen(EVENTS.command, listener),
  onFilesWaiting: (listener) => listen(EVENTS.filesWaiting, () => listener()),
}

contextBridge.exposeInMainWorld('host', host)
