import { isAbsolute, join } from 'node:path'
import { app, BrowserWindow, Menu, protocol, screen, session, shell, utilityProcess } from 'electron'
import type { CommandId } from '../contract/commands'
import { EVENTS } from '../contract/channels'
import { demoPaths } from '../host/demo-lot'
import { StateStore } from '../host/state-store'
import { registerHandlers } from './handlers'
import { menuTemplate } from './menu'
import { PAGE_SCHEME, pageResponder } from './page-protocol'
import { RecentFiles } from './recent-files'
import { makeReportBeside } from './report-process'
import { startPaths } from './start-paths'
import { openInViewer, removeViewed } from './viewer'
import { WaitingFiles } from './waiting-files'
import { confine, openWindow } from './window'
import { readPlace, windowPlace, writePlace } from './window-place'

const OUT = join(import.meta.dirname, '..')
const PRELOAD = join(OUT, 'preload', 'index.cjs')
const REPORT_MAKER = join(OUT, 'main', 'report-maker.js')

const waiting = new WaitingFiles(() => tell(EVENTS.filesWaiting))

const ownPaths = startPaths(process.argv, app.isPackaged)

if (app.requestSingleInstanceLock({ paths: ownPaths })) begin()
// The first one opens our files and comes to the front.
else app.quit()

function begin(): void {
  protocol.registerSchemesAsPrivileged([
    { scheme: PAGE_SCHEME, privileges: { standard: true, secure: true, supportFetchAPI: true } },
  ])
  app.enableSandbox()
  app.on('web-contents-created', (_, contents) => confine(contents))
  // The command line may come in another order; what the second start made of its own is sent along.
  app.on('second-instance', (_event, _argv, _folder, sent) => {
    waiting.add(pathsIn(sent))
    toFront()
  })
  // A Mac sends a dragged file this way, before the window is there or after.
  app.on('open-file', (event, path) => {
    event.preventDefault()
    waiting.add([path])
    toFront()
  })
  app.on('window-all-closed', () => app.quit())
  app.on('activate', () => {
    if (app.isReady() && BrowserWindow.getAllWindows().length === 0) void open()
  })
  app.on('will-quit', () => void removeViewed())
  waiting.add(ownPaths)
  void app.whenReady().then(ready)
}

async function ready(): Promise<void> {
  protocol.handle(PAGE_SCHEME, pageResponder(join(OUT, 'renderer')))
  // Nothing that the page could ask leave for is needed: no camera, no notifications, no location.
  session.defaultSession.setPermissionRequestHandler((_contents, _permission, decide) => decide(false))
  session.defaultSession.setPermissionCheckHandler(() => false)
  session.defaultSession.setDevicePermissionHandler(() => false)
  const program = { program: 'Persquare', version: app.getVersion() }
  registerHandlers({
    waiting,
    demo: demoPaths(join(OUT, '..')),
    recent: new RecentFiles(join(app.getPath('userData'), 'recent.json')),
    state: new StateStore(join(app.getPath('userData'), 'session')),
    makeReport: (request) => makeReportBeside({ request, program }, () => utilityProcess.fork(REPORT_MAKER)),
    openInViewer: (pdf) => openInViewer(pdf, { folder: app.getPath('temp'), open: (path) => shell.openPath(path) }),
  })
  Menu.setApplicationMenu(Menu.buildFromTemplate(menuTemplate(command, process.platform)))
  await open()
}

async function open(): Promise<void> {
  const path = join(app.getPath('userData'), 'window.json')
  const [main, ...others] = [screen.getPrimaryDisplay(), ...screen.getAllDisplays()].map(({ workArea }) => workArea)
  const window = openWindow(PRELOAD, windowPlace(await readPlace(path), [main, ...others]))
  window.on('close', () => void writePlace(path, window.getNormalBounds()))
}

function pathsIn(sent: unknown): readonly string[] {
  const paths = (sent as { readonly paths?: unknown } | null | undefined)?.paths
  return Array.isArray(paths) ? paths.filter((path) => typeof path === 'string' && isAbsolute(path)) : []
}

function command(id: CommandId): void {
  tell(EVENTS.command, id)
}

function tell(channel: string, ...args: readonly unknown[]): void {
  for (const window of BrowserWindow.getAllWindows()) window.webContents.send(channel, ...args)
}

function toFront(): void {
  const [window] = BrowserWindow.getAllWindows()
  if (!window) return
  if (window.isMinimized()) window.restore()
  window.focus()
}
