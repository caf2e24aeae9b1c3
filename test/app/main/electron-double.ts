/** Stands in for Electron in tests: keeps what the main process asked of it. */
import { vi } from 'vitest'

type Handler = (event: unknown, ...args: unknown[]) => unknown

export interface ElectronDouble {
  readonly windows: {
    readonly options: unknown
    readonly loaded: string[]
    readonly events: Record<string, () => void>
    shown: boolean
  }[]
  readonly handlers: Map<string, Handler>
  readonly appEvents: Map<string, (...args: unknown[]) => void>
  readonly privileged: unknown[]
  readonly protocols: Map<string, unknown>
  permissions: { request: Handler | null; check: (() => boolean) | null }
  sandboxed: boolean
  quits: number
  readonly dialog: { showOpenDialog: ReturnType<typeof vi.fn>; showSaveDialog: ReturnType<typeof vi.fn> }
}

export function electronDouble(): ElectronDouble {
  return {
    windows: [],
    handlers: new Map(),
    appEvents: new Map(),
    privileged: [],
    protocols: new Map(),
    permissions: { request: null, check: null },
    sandboxed: false,
    quits: 0,
    dialog: { showOpenDialog: vi.fn(), showSaveDialog: vi.fn() },
  }
}

/** The module `electron` as the main process imports it. */
export function electronModule(double: ElectronDouble): object {
  class BrowserWindow {
    static getAllWindows(): unknown[] {
      return double.windows
    }
    private readonly record: ElectronDouble['windows'][number]
    constructor(options: unknown) {
      this.record = { options, loaded: [], events: {}, shown: false }
      double.windows.push(this.record)
    }
    once(name: string, listener: () => void): void {
      this.record.events[name] = listener
    }
    loadURL(url: string): Promise<void> {
      this.record.loaded.push(url)
      return Promise.resolve()
    }
    show(): void {
      this.record.shown = true
    }
  }
  return {
    BrowserWindow,
    app: {
      isPackaged: false,
      isReady: () => true,
      enableSandbox: () => void (double.sandboxed = true),
      on: (name: string, listener: () => void) => double.appEvents.set(name, listener),
      quit: () => void (double.quits += 1),
      whenReady: () => Promise.resolve(),
    },
    dialog: double.dialog,
    ipcMain: { handle: (channel: string, handler: Handler) => double.handlers.set(channel, handler) },
    protocol: {
      registerSchemesAsPrivileged: (schemes: unknown[]) => double.privileged.push(...schemes),
      handle: (scheme: string, responder: unknown) => double.protocols.set(scheme, responder),
    },
    session: {
      defaultSession: {
        setPermissionRequestHandler: (handler: Handler) => void (double.permissions.request = handler),
        setPermissionCheckHandler: (handler: () => boolean) => void (double.permissions.check = handler),
      },
    },
  }
}
