import { BrowserWindow } from 'electron'
import type { WebContents } from 'electron'
import { isPageUrl, PAGE_URL } from './page-protocol'

/** The one window, shown when its first picture is there. */
export function openWindow(preload: string): BrowserWindow {
  const window = new BrowserWindow({
    width: 1280,
    height: 860,
    minWidth: 640,
    minHeight: 480,
    show: false,
    title: 'Persquare',
    backgroundColor: '#fbfaf7',
    webPreferences: {
      preload,
      sandbox: true,
      contextIsolation: true,
      nodeIntegration: false,
      webviewTag: false,
      spellcheck: false,
    },
  })
  window.once('ready-to-show', () => window.show())
  void window.loadURL(PAGE_URL)
  return window
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
