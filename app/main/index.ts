import { join } from 'node:path'
import { app, BrowserWindow, protocol, session } from 'electron'
import { registerHandlers } from './handlers'
import { PAGE_SCHEME, pageResponder } from './page-protocol'
import { startPaths } from './start-paths'
import { confine, openWindow } from './window'

const OUT = join(import.meta.dirname, '..')
const PRELOAD = join(OUT, 'preload', 'index.cjs')

protocol.registerSchemesAsPrivileged([
  { scheme: PAGE_SCHEME, privileges: { standard: true, secure: true, supportFetchAPI: true } },
])
app.enableSandbox()
app.on('web-contents-created', (_, contents) => confine(contents))
app.on('window-all-closed', () => app.quit())
app.on('activate', () => {
  if (app.isReady() && BrowserWindow.getAllWindows().length === 0) openWindow(PRELOAD)
})

void app.whenReady().then(() => {
  protocol.handle(PAGE_SCHEME, pageResponder(join(OUT, 'renderer')))
  // Nothing that the page could ask leave for is needed: no camera, no notifications, no location.
  session.defaultSession.setPermissionRequestHandler((_contents, _permission, decide) => decide(false))
  session.defaultSession.setPermissionCheckHandler(() => false)
  registerHandlers(startPaths(process.argv, app.isPackaged))
  openWindow(PRELOAD)
})
