/** Stands in for Electron in tests: keeps what the main process asked of it. */
import { vi } from 'vitest'

type Handler = (event: unknown, ...args: unknown[]) => unknown
type Listener = (...args: never[]) => void

/** What a window shows of itself to a test. */
export interface WindowDouble {
  readonly options: unknown
  readonly loaded: string[]
  readonly events: Record<string, Listener>
  readonly contentsEvents: Record<string, Listener>
  /** What was sent to the page: the channel, then the words. */
  readonly sent: unknown[][]
  readonly reloads: number
  readonly focused: number
  readonly destroyed: boolean
  shown: boolean
}

export interface ElectronDouble {
  readonly windows: WindowDouble[]
  readonly handlers: Map<string, Handler>
  readonly appEvents: Map<string, Listener>
  readonly privileged: unknown[]
  readonly protocols: Map<string, unknown>
  permissions: { request: Handler | null; check: (() => boolean) | null; device: (() => boolean) | null }
  sandboxed: boolean
  quits: number
  /** Whether this start is the first. */
  isFirst: boolean
  lockData: unknown
  userData: string
  menu: unknown
  readonly forked: string[]
  readonly dialog: Record<
    'showOpenDialog' | 'showSaveDialog' | 'showMessageBoxSync' | 'showErrorBox',
    ReturnType<typeof vi.fn>
  >
  readonly openPath: ReturnType<typeof vi.fn>
}

export function electronDouble(): ElectronDouble {
  return {
    windows: [],
    handlers: new Map(),
    appEvents: new Map(),
    privileged: [],
    protocols: new Map(),
    permissions: { request: null, check: null, device: null },
    sandboxed: false,
    quits: 0,
    isFirst: true,
    lockData: null,
    userData: '/nowhere/persquare',
    menu: null,
    forked: [],
    dialog: { showOpenDialog: vi.fn(), showSaveDialog: vi.fn(), showMessageBoxSync: vi.fn(), showErrorBox: vi.fn() },
    openPath: vi.fn(),
  }
}

const SCREEN = { workArea: { x: 0, y: 0, width: 1920, height: 1040 } }

/** The module `electron` as the main process imports it. */
export function electronModule(double: ElectronDouble): object {
  return {
    BrowserWindow: windowClass(double),
    Menu: { buildFromTemplate: (template: unknown) => template, setApplicationMenu: (menu: unknown) => void (double.menu = menu) },
    app: appOf(double),
    dialog: double.dialog,
    ipcMain: { handle: (channel: string, handler: Handler) => double.handlers.set(channel, handler) },
    protocol: {
      registerSchemesAsPrivileged: (schemes: unknown[]) => double.privileged.push(...schemes),
      handle: (scheme: string, responder: unknown) => double.protocols.set(scheme, responder),
    },
    screen: { getPrimaryDisplay: () => SCREEN, getAllDisplays: () => [SCREEN] },
    session: {
      defaultSession: {
        setPermissionRequestHandler: (handler: Handler) => void (double.permissions.request = handler),
        setPermissionCheckHandler: (handler: () => boolean) => void (double.permissions.check = handler),
        setDevicePermissionHandler: (handler: () => boolean) => void (double.permissions.device = handler),
      },
    },
    shell: { openPath: double.openPath },
    utilityProcess: {
      fork: (path: string) => {
        double.forked.push(path)
        throw new Error('no process can be started here')
      },
    },
  }
} // prettier-ignore

function appOf(double: ElectronDouble): object {
  return {
    isPackaged: false,
    isReady: () => true,
    enableSandbox: () => void (double.sandboxed = true),
    getPath: () => double.userData,
    getVersion: () => '9.8.7',
    on: (name: string, listener: Listener) => double.appEvents.set(name, listener),
    quit: () => void (double.quits += 1),
    requestSingleInstanceLock: (sent: unknown) => {
      double.lockData = sent
      return double.isFirst
    },
    whenReady: () => Promise.resolve(),
  }
}

function windowClass(double: ElectronDouble) {
  return class BrowserWindow {
    static getAllWindows(): BrowserWindow[] {
      return double.windows as unknown as BrowserWindow[]
    }
    readonly loaded: string[] = []
    readonly events: Record<string, Listener> = {}
    readonly contentsEvents: Record<string, Listener> = {}
    readonly sent: unknown[][] = []
    reloads = 0
    focused = 0
    destroyed = false
    shown = false
    readonly options: unknown
    constructor(options: unknown) {
      this.options = options
      double.windows.push(this)
    }
    readonly webContents = {
      on: (name: string, listener: Listener) => void (this.contentsEvents[name] = listener),
      send: (...args: unknown[]) => void this.sent.push(args),
      reload: () => void (this.reloads += 1),
    }
    on(name: string, listener: Listener): void {
      this.events[name] = listener
    }
    once(name: string, listener: Listener): void {
      this.events[name] = listener
    }
    loadURL(url: string): Promise<void> {
      this.loaded.push(url)
      return Promise.resolve()
    }
    show(): void {
      this.shown = true
    }
    isMinimized(): boolean {
      return false
    }
    focus(): void {
      this.focused += 1
    }
    destroy(): void {
      this.destroyed = true
    }
    getNormalBounds(): object {
      return { x: 10, y: 20, width: 900, height: 700 }
    }
  }
}
