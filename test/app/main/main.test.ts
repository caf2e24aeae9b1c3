import { beforeAll, describe, expect, it, vi } from 'vitest'
import { confine } from '../../../app/main/window'
import type { electronDouble } from './electron-double'

const electron = vi.hoisted(() => ({ double: undefined as unknown as ReturnType<typeof electronDouble> }))
vi.mock('electron', async () => {
  const { electronDouble, electronModule } = await import('./electron-double')
  electron.double = electronDouble()
  return electronModule(electron.double)
})

beforeAll(async () => {
  await import('../../../app/main/index')
  await vi.waitFor(() => expect(electron.double.windows).toHaveLength(1))
})

describe('the main process', () => {
  it('opens one window, shut off from the machine, on the page’s own scheme', () => {
    const [window] = electron.double.windows
    expect(window!.options).toMatchObject({
      show: false,
      webPreferences: { sandbox: true, contextIsolation: true, nodeIntegration: false, webviewTag: false },
    })
    expect(window!.options).toHaveProperty(
      'webPreferences.preload',
      expect.stringMatching(/[\\/]preload[\\/]index\.cjs$/),
    )
    expect(window!.loaded).toEqual(['app://persquare/index.html'])
    expect(electron.double.privileged).toEqual([
      { scheme: 'app', privileges: { standard: true, secure: true, supportFetchAPI: true } },
    ])
    expect([...electron.double.protocols.keys()]).toEqual(['app'])
    expect(electron.double.sandboxed).toBe(true)
  })

  it('shows the window when there is something to see', () => {
    const [window] = electron.double.windows
    expect(window!.shown).toBe(false)
    window!.events['ready-to-show']!()
    expect(window!.shown).toBe(true)
  })

  it('refuses every permission', () => {
    const decisions: unknown[] = []
    electron.double.permissions.request!({}, 'media', (allowed: unknown) => decisions.push(allowed))
    expect(decisions).toEqual([false])
    expect(electron.double.permissions.check!()).toBe(false)
  })

  it('registers the calls of the contract and no others', () => {
    expect([...electron.double.handlers.keys()].sort()).toEqual([
      'persquare:choose-files',
      'persquare:save-file',
      'persquare:start-files',
    ])
  })

  it('ends with its window', () => {
    electron.double.appEvents.get('window-all-closed')!()
    expect(electron.double.quits).toBe(1)
  })
})

describe('confine', () => {
  const events = new Map<string, (event: { url: string; preventDefault: () => void }) => void>()
  let opened: unknown
  confine({
    setWindowOpenHandler: (handler: () => unknown) => void (opened = handler()),
    on: (name: string, listener: never) => events.set(name, listener),
  } as never)
  const prevented = (name: string, url: string): boolean => {
    const preventDefault = vi.fn()
    events.get(name)!({ url, preventDefault })
    return preventDefault.mock.calls.length > 0
  }

  it('opens no second window', () => {
    expect(opened).toEqual({ action: 'deny' })
  })

  it.each([
    ['will-navigate', 'https://example.com/', true],
    ['will-navigate', 'file:///etc/hosts', true],
    ['will-navigate', 'app://persquare.example.com/', true],
    ['will-navigate', 'app://persquare/index.html', false],
    ['will-frame-navigate', 'https://example.com/', true],
    ['will-frame-navigate', 'app://persquare/index.html', false],
    ['will-redirect', 'app://persquare/index.html', true],
    ['will-attach-webview', 'app://persquare/index.html', true],
  ])('%s to %s is prevented: %s', (name, url, expected) => {
    expect(prevented(name, url)).toBe(expected)
  })
})
