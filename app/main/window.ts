import { BrowserWindow, dialog } from 'electron'
import type { WebContents } from 'electron'
import { isPageUrl, PAGE_URL } from './page-protocol'
import { SMALLEST, type Place } from './window-place'

/** The one window, shown when its first picture is there. */
export function openWindow(preload: string, place: Place): BrowserWindow {
  const window = new BrowserWindow({
    ...place,
    minWidth: SMALLEST.width,
    minHeight: SMALLEST.height,
    show: false,
    title: 'Persquare',
    backgroundColor: '#fbfaf7',
    webPreferences: {
      preload,
      sandbox: true,
      contextIsolation: true,
      nodeIntegration: false,
      nodeIntegrationInWorker: false,
      nodeIntegrationInSubFrames: false,
      webSecurity: true,
      allowRunningInsecureContent: false,
      experimentalFeatures: false,
      webviewTag: false,
      navigateOnDragDrop: false,
      spellcheck: false,
    },
  })
  window.once('ready-to-show', () => window.show())
  window.webContents.on('will-prevent-unload', (event) => {
    // Prevents the page's objection, not the closing.
    if (wantsToClose(window)) event.preventDefault()
  })
  window.webContents.on('render-process-gone', (_event, { reason }) => {
    if (reason !== 'clean-exit') comeBack(window)
  })
  void window.loadURL(PAGE_URL)
  return window
}

/** Crashes closer together than this have one cause, and a page that brings it back would crash for ever. */
const CRASH_GAP_ms = 20_000
const lastCrash = new WeakMap<BrowserWindow, number>()

/** What was open is in the saved state; the page asks for it when it is there again. */
function comeBack(window: BrowserWindow): void {
  const now = Date.now()
  const before = lastCrash.get(window) ?? -Infinity
  lastCrash.set(window, now)
  if (now - before > CRASH_GAP_ms) return window.webContents.reload()
  dialog.showErrorBox('Persquare', 'The window ended twice in a short time. Start the program again to go on.')
  window.destroy()
}

function wantsToClose(window: BrowserWindow): boolean {
  const answer = dialog.showMessageBoxSync(window, {
    type: 'question',
    message: 'Something in the window is not saved yet.',
    detail: 'The open lot and its decisions are restored at the next start, as far as they were kept.',
    buttons: ['Close', 'Go back'],
    defaultId: 1,
    cancelId: 1,
  })
  return answer === 0
}

/** The page stays where it is: no other page, no other window, no frame of another page. */
export function confine(contents: WebContents): void {
  contents.setWindowOpenHandler(() => ({ action: 'deny' }))
  contents.on('will-navigate', (event) => {
    if (!isPageUrl(event.url)) event.preventDefault()
  })
  contents.on('will-redirect', (event) => event.preventDefault())
  contents.on('will-frame-navigate', (event) => {
    if (!isPageUrl(event.url)) event.preventDefault()
  })
  contents.on('will-attach-webview', (event) => event.preventDefault())
}
