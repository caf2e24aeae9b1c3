/**
 * The checklist that Electron publishes for its applications (Security, "Checklist: Security Recommendations"), item by
 * item in our own words: where each holds here, and what would fail if it no longer did.
 */
import { mkdtemp, rm } from 'node:fs/promises'
import { readdirSync, readFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest'
import { CHANNELS } from '../../../app/contract/channels'
import { CONTENT_SECURITY_POLICY, PAGE_HEADERS } from '../../../app/contract/page'
import { PAGE_URL } from '../../../app/main/page-protocol'
import { confine } from '../../../app/main/window'
import type { electronDouble } from './electron-double'

const electron = vi.hoisted(() => ({ double: undefined as unknown as ReturnType<typeof electronDouble> }))
vi.mock('electron', async () => {
  const { electronDouble, electronModule } = await import('./electron-double')
  electron.double = electronDouble()
  return electronModule(electron.double)
})

const ROOT = join(import.meta.dirname, '..', '..', '..')
const file = (...path: readonly string[]): string => readFileSync(join(ROOT, ...path), 'utf8')
const sources = (folder: string): string =>
  readdirSync(join(ROOT, folder), { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && /\.(ts|vue|html)$/.test(entry.name))
    .map((entry) => readFileSync(join(entry.parentPath, entry.name), 'utf8'))
    .join('\n')
const main = sources('app/main')
const builder = file('build', 'electron-builder.yml')

let folder: string
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'persquare-'))
  await import('electron')
  electron.double.userData = folder
  await import('../../../app/main/index')
  await vi.waitFor(() => expect(electron.double.windows).toHaveLength(1))
})
afterAll(() => rm(folder, { recursive: true }))

const preferences = (): Readonly<Record<string, unknown>> =>
  (electron.double.windows[0]!.options as { webPreferences: Record<string, unknown> }).webPreferences

interface Contents {
  readonly events: Readonly<Record<string, (event: { url: string; preventDefault: () => void }) => void>>
  readonly open: (details: { url: string }) => { action: string }
}

/** What the program does to any contents that come to be. */
function confined(): Contents {
  const events: Record<string, (event: { url: string; preventDefault: () => void }) => void> = {}
  let open: Contents['open'] = () => ({ action: 'allow' })
  confine({
    on: (name: string, listener: (typeof events)[string]) => void (events[name] = listener),
    setWindowOpenHandler: (handler: Contents['open']) => void (open = handler),
  } as never)
  return { events, open }
}
const isPrevented = (event: string, url: string): boolean => {
  const preventDefault = vi.fn()
  confined().events[event]!({ url, preventDefault })
  return preventDefault.mock.calls.length > 0
}

const PLACES = ['https://evil.example/', 'http://127.0.0.1/', 'file:///etc/passwd', 'data:text/html,x', 'app://persquare.evil.example/', 'app://other/index.html', 'javascript:0'] // prettier-ignore

describe('Electron’s checklist', () => {
  it('1. nothing is loaded over an open line: the page comes from the program, and the policy names no other place', () => {
    expect(electron.double.windows[0]!.loaded).toEqual([PAGE_URL])
    expect(CONTENT_SECURITY_POLICY).not.toMatch(/https?:|ws:|\*/)
    expect(main).not.toMatch(/https?:\/\//)
  })

  it('2. the page has no Node', () =>
    expect(preferences()).toMatchObject({ nodeIntegration: false, nodeIntegrationInWorker: false, nodeIntegrationInSubFrames: false })) // prettier-ignore

  it('3. the preload’s world is not the page’s', () => {
    expect(preferences()['contextIsolation']).toBe(true)
    expect(sources('app/preload')).toContain('contextBridge.exposeInMainWorld')
  })

  it('4. every process of the page is in the sandbox', () => {
    expect(preferences()['sandbox']).toBe(true)
    expect(electron.double.sandboxed).toBe(true)
    expect(main).not.toContain('no-sandbox')
  })

  it('5. whatever leave is asked for is denied', () => {
    const { request, check, device } = electron.double.permissions
    for (const permission of ['media', 'geolocation', 'notifications', 'openExternal', 'clipboard-read', 'hid']) {
      const decide = vi.fn()
      request!(null, permission, decide)
      expect(decide).toHaveBeenCalledExactlyOnceWith(false)
    }
    expect([check!(), device!()]).toEqual([false, false])
  })

  it('6. the same-origin policy is on', () => {
    expect(preferences()['webSecurity']).toBe(true)
    expect(main).not.toContain('disable-web-security')
  })

  it('7. a policy of content goes with every file of the page, and lets no text be run', () => {
    expect(PAGE_HEADERS['content-security-policy']).toBe(CONTENT_SECURITY_POLICY)
    expect(CONTENT_SECURITY_POLICY).toMatch(/^default-src 'none'; script-src 'self';/)
    expect(CONTENT_SECURITY_POLICY).not.toMatch(/unsafe-eval|script-src[^;]*unsafe-inline/)
    expect(CONTENT_SECURITY_POLICY).toContain("base-uri 'none'; form-action 'none'; frame-ancestors 'none'")
  })

  it('8. nothing insecure runs in a secure page', () =>
    expect(preferences()['allowRunningInsecureContent']).toBe(false))

  it('9. no experimental features of the engine', () => expect(preferences()['experimentalFeatures']).toBe(false))

  it('10. none of its features is switched on one by one', () => {
    expect(preferences()).not.toHaveProperty('enableBlinkFeatures')
    expect(main).not.toMatch(/enable-blink-features|enable-features|appendSwitch/)
  })

  it('11. no webview, so none with pop-ups', () => {
    expect(preferences()['webviewTag']).toBe(false)
    expect(sources('app/renderer')).not.toMatch(/<webview|allowpopups/i)
  })

  it('12. a webview that would be made all the same is stopped', () =>
    expect(isPrevented('will-attach-webview', PAGE_URL)).toBe(true))

  it('13. the page goes nowhere else, itself or in a frame', () => {
    for (const place of PLACES) {
      expect(isPrevented('will-navigate', place), place).toBe(true)
      expect(isPrevented('will-frame-navigate', place), place).toBe(true)
      expect(isPrevented('will-redirect', place), place).toBe(true)
    }
    expect(isPrevented('will-navigate', PAGE_URL)).toBe(false)
  })

  it('14. no other window is opened', () => {
    for (const url of [...PLACES, PAGE_URL]) expect(confined().open({ url })).toEqual({ action: 'deny' })
    expect(main).toContain("app.on('web-contents-created', (_, contents) => confine(contents))")
  })

  it('15. nothing is handed to the system’s browser; the viewer gets a PDF of our own making and no other', () => {
    expect(main).not.toContain('openExternal')
    expect(main.match(/openPath/g)).toHaveLength(1)
    expect(file('app', 'main', 'viewer.ts')).toMatch(/!== '%PDF-'\) \{\n\s+throw/)
  })

  it('16. the runtime’s version is fixed to the digit, so that an update is a decision and is seen', () => {
    const { devDependencies } = JSON.parse(file('package.json')) as { devDependencies: Record<string, string> }
    expect(devDependencies['electron']).toMatch(/^\d+\.\d+\.\d+$/)
    // Three majors are kept at a time; this one was the newest when it was taken.
    expect(Number(devDependencies['electron']!.split('.')[0])).toBeGreaterThanOrEqual(45)
  })

  it('17. every message is answered to the page’s own top frame alone', async () => {
    const senders = [
      null,
      { url: 'https://evil.example/', parent: null },
      { url: 'app://persquare.evil.example/index.html', parent: null },
      { url: PAGE_URL, parent: { url: PAGE_URL } },
    ]
    expect(electron.double.handlers.size).toBe(Object.keys(CHANNELS).length)
    for (const [channel, handler] of electron.double.handlers) {
      for (const senderFrame of senders) {
        expect(await handler({ senderFrame }), channel).toMatchObject({
          ok: false,
          problem: { why: 'it was not asked for by the window' },
        })
      }
    }
  })

  it('18. the page has a scheme of its own, not file:, and the scheme none of its rights beyond', () => {
    expect(PAGE_URL).toMatch(/^app:\/\//)
    expect(main).not.toMatch(/loadFile|['"`]file:\/\//)
    expect(electron.double.privileged).toEqual([
      { scheme: 'app', privileges: { standard: true, secure: true, supportFetchAPI: true } },
    ])
  })

  it('19. the fuses of what the runtime could do for a stranger are blown', () => {
    for (const fuse of ['runAsNode', 'enableNodeOptionsEnvironmentVariable', 'enableNodeCliInspectArguments', 'grantFileProtocolExtraPrivileges'])
      expect(builder).toContain(`\n  ${fuse}: false\n`)
    for (const fuse of ['enableCookieEncryption', 'enableEmbeddedAsarIntegrityValidation', 'onlyLoadAppFromAsar'])
      expect(builder).toContain(`\n  ${fuse}: true\n`)
  }) // prettier-ignore

  it('20. no part of Electron reaches the page: calls with names of ours, and no event of its own', () => {
    const preload = sources('app/preload')
    expect(preload.match(/exposeInMainWorld/g)).toHaveLength(1)
    expect(preload).not.toMatch(/exposeInMainWorld\([^)]*ipcRenderer|: ipcRenderer\b|\.on\(channel, listener\)/)
    expect(preload).toContain('const relay = (_event: unknown, argument: CommandId): void => listener(argument)')
  })
})
