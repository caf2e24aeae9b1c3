import { mkdtemp, readFile, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join, resolve } from 'node:path'
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest'
import { CHANNELS } from '../../../app/contract/channels'
import { COMMAND_IDS } from '../../../app/contract/commands'
import { confine } from '../../../app/main/window'
import type { electronDouble } from './electron-double'

const electron = vi.hoisted(() => ({ double: undefined as unknown as ReturnType<typeof electronDouble> }))
vi.mock('electron', async () => {
  const { electronDouble, electronModule } = await import('./electron-double')
  electron.double = electronDouble()
  return electronModule(electron.double)
})

interface MenuItem {
  readonly id?: string
  readonly label?: string
  readonly role?: string
  readonly accelerator?: string
  readonly submenu?: readonly MenuItem[]
  readonly click?: () => void
}

let folder: string
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'persquare-'))
  await import('electron')
  electron.double.userData = folder
  await import('../../../app/main/index')
  await vi.waitFor(() => expect(electron.double.windows).toHaveLength(1))
})
afterAll(() => rm(folder, { recursive: true }))

const on = (name: string) => electron.double.appEvents.get(name)! as unknown as (...args: unknown[]) => void
const page = { senderFrame: { url: 'app://persquare/index.html', parent: null } }

describe('the main process', () => {
  it('opens one window, shut off from the machine, on the page’s own scheme', () => {
    const [window] = electron.double.windows
    expect(window!.options).toMatchObject({
      show: false,
      webPreferences: {
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
      },
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
    ;(window!.events['ready-to-show'] as () => void)()
    expect(window!.shown).toBe(true)
  })

  it('refuses every permission', () => {
    const decisions: unknown[] = []
    electron.double.permissions.request!({}, 'media', (allowed: unknown) => decisions.push(allowed))
    expect(decisions).toEqual([false])
    expect(electron.double.permissions.check!()).toBe(false)
    expect(electron.double.permissions.device!()).toBe(false)
  })

  it('registers the calls of the contract and no others', () => {
    expect([...electron.double.handlers.keys()].sort()).toEqual(Object.values(CHANNELS).sort())
  })

  it('hands out the bundled lot', async () => {
    const reply = await electron.double.handlers.get(CHANNELS.demoFiles)!(page)
    expect(reply).toMatchObject({ ok: true, value: [{ name: 'TB-0417.csv' }, { name: 'TB-0417.procedure.json' }] })
  })

  it('keeps the state in the person’s own folder', async () => {
    expect(await electron.double.handlers.get(CHANNELS.saveState)!(page, '{"a":1}', [])).toEqual({ ok: true, value: 'saved' }) // prettier-ignore
    expect(await electron.double.handlers.get(CHANNELS.loadState)!(page)).toEqual({
      ok: true,
      value: { text: '{"a":1}', generation: 'last' },
    })
    expect(await readFile(join(folder, 'session', 'state'), 'utf8')).toContain('{"a":1}')
  })

  it('remembers where the window stood', async () => {
    ;(electron.double.windows[0]!.events['close'] as () => void)()
    const written = async () => JSON.parse(await readFile(join(folder, 'window.json'), 'utf8')) as unknown
    await vi.waitFor(async () => expect(await written()).toEqual({ x: 10, y: 20, width: 900, height: 700 }))
  })

  it('ends with its window', () => {
    on('window-all-closed')()
    expect(electron.double.quits).toBe(1)
  })
})

describe('a second start', () => {
  it('sends its files to the first, which comes to the front', async () => {
    const [window] = electron.double.windows
    const sample = resolve('sample-data', 'TB-0522.csv')
    on('second-instance')({}, ['electron', '.'], '/', { paths: [sample, 'relative.csv', 7] })
    expect(window!.sent).toEqual([['persquare:files-waiting']])
    expect(window!.focused).toBe(1)
    const first = await electron.double.handlers.get(CHANNELS.startFiles)!(page)
    expect(first).toMatchObject({ ok: true, value: [{ name: 'TB-0522.csv' }] })
    expect(await electron.double.handlers.get(CHANNELS.startFiles)!(page)).toEqual({ ok: true, value: [] })
    expect(electron.double.lockData).toEqual({ paths: expect.any(Array) as unknown })
  })

  it('that sends nothing that could be a path opens nothing', () => {
    const [window] = electron.double.windows
    const before = window!.sent.length
    for (const sent of [undefined, null, 'paths', { paths: '/etc/hosts' }, {}]) on('second-instance')({}, [], '/', sent)
    expect(window!.sent).toHaveLength(before)
  })

  it('a file dragged onto the icon is opened too', () => {
    const preventDefault = vi.fn()
    on('open-file')({ preventDefault }, resolve('sample-data', 'TB-0417.csv'))
    expect(preventDefault).toHaveBeenCalled()
    expect(electron.double.windows[0]!.sent.at(-1)).toEqual(['persquare:files-waiting'])
  })
})

describe('the menus', () => {
  it.each(['linux', 'darwin', 'win32'] as const)('on %s hold every command once, with its key', async (platform) => {
    const { menuTemplate } = await import('../../../app/main/menu')
    const sent: string[] = []
    const items = (menuTemplate((id) => sent.push(id), platform) as unknown as readonly MenuItem[]).flatMap(
      ({ submenu }) => submenu ?? [],
    )
    const commands = items.filter(({ id }) => id !== undefined)
    expect(commands.map(({ id }) => id).sort()).toEqual([...COMMAND_IDS].sort())
    for (const { click } of commands) click!()
    expect(sent.sort()).toEqual([...COMMAND_IDS].sort())
    const keys = items.flatMap(({ accelerator }) => (accelerator === undefined ? [] : [accelerator]))
    expect(new Set(keys).size).toBe(keys.length)
    expect(commands.find(({ id }) => id === 'save-report')).toMatchObject({ accelerator: 'CmdOrCtrl+S' })
    // Nothing that opens the machine: no developer tools, no reload that would lose what is being typed.
    expect(items.map(({ role }) => role)).not.toContain('toggleDevTools')
    expect(items.map(({ role }) => role)).not.toContain('reload')
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
