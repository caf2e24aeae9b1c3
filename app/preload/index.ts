import { contextBridge, ipcRenderer } from 'electron'
import { CHANNELS } from '../contract/channels'
import type { Host } from '../contract/host'

/** The window reaches the main process by these calls and no others. */
const host: Host = {
  kind: 'electron',
  chooseFiles: (choice) => ipcRenderer.invoke(CHANNELS.chooseFiles, choice),
  startFiles: () => ipcRenderer.invoke(CHANNELS.startFiles),
  saveFile: (suggestedName, bytes) => ipcRenderer.invoke(CHANNELS.saveFile, suggestedName, bytes),
}

contextBridge.exposeInMainWorld('host', host)
