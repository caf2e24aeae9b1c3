import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { beforeAll, beforeEach, expect, it, vi } from 'vitest'
import { CHANNELS, type HostCall } from '../../../app/contract/channels'
import type { Host } from '../../../app/contract/host'

const calls: unknown[][] = []
const electron = vi.hoisted(() => ({
  exposed: new Map<string, unknown>(),
  listeners: new Map<string, (event: unknown, argument?: unknown) => void>(),
}))
vi.mock('electron', () => ({
  contextBridge: { exposeInMainWorld: (name: string, value: unknown) => electron.exposed.set(name, value) },
  ipcRenderer: {
    invoke: (...args: unknown[]) => {
      calls.push(args)
      return Promise.resolve({ ok: true, value: [] })
    },
    on: (channel: string, listener: (event: unknown, argument?: unknown) => void) =>
      electron.listeners.set(channel, listener),
    removeListener: (channel: string) => electron.listeners.delete(channel),
  },
  webUtils: { getPathForFile: (file: { path?: string }) => file.path ?? '' },
}))

let host: Host
beforeAll(async () => {
  await import('../../../app/preload/index')
  host = electron.exposed.get('host') as Host
})
beforeEach(() => void (calls.length = 0))

it('shows the page the host and nothing else', () => {
  expect([...electron.exposed.keys()]).toEqual(['host'])
  const others = ['kind', 'can', 'onCommand', 'onFilesWaiting']
  expect(Object.keys(host).sort()).toEqual([...Object.keys(CHANNELS), ...others].sort())
  expect(host.kind).toBe('electron')
})

it('sends each call over its own channel, as it came', async () => {
  const bytes = new Uint8Array([1])
  const args: Record<HostCall, unknown[]> = {
    chooseFiles: ['readings'],
    startFiles: [],
    demoFiles: [],
    rememberDropped: [[]],
    recentFiles: [],
    reopen: ['token'],
    forgetRecent: [],
    saveFile: ['a.pdf', bytes, 'report'],
    makeReport: [{ paper: 'A4' }],
    printReport: [bytes],
    loadState: [],
    saveState: ['{}', ['token']],
    keepFile: [bytes],
    keptFile: ['token'],
  }
  for (const name of Object.keys(args) as HostCall[]) {
    const call = host[name] as (...args: unknown[]) => Promise<unknown>
    expect(await call(...args[name])).toEqual({ ok: true, value: [] })
  }
  expect(calls).toEqual(Object.entries(args).map(([name, given]) => [CHANNELS[name as HostCall], ...given]))
})

it('sends paths of dropped files to main alone, and none of files that the page made up', async () => {
  await host.rememberDropped([{ path: '/lots/TB-0417.csv' }, { name: 'made-up.csv' }])
  expect(calls).toEqual([['persquare:remember-dropped', ['/lots/TB-0417.csv']]])
})

it('passes on commands without the event that carries them, until it is told to stop', () => {
  const heard: unknown[][] = []
  const stop = host.onCommand((...args) => heard.push(args))
  const stopFiles = host.onFilesWaiting((...args: unknown[]) => heard.push(args))
  electron.listeners.get('persquare:command')!({ sender: 'secret' }, 'undo')
  electron.listeners.get('persquare:files-waiting')!({ sender: 'secret' })
  expect(heard).toEqual([['undo'], []])
  stop()
  stopFiles()
  expect(electron.listeners.size).toBe(0)
})

it('is one small file that needs nothing but Electron', async () => {
  const built = await readFile(join(import.meta.dirname, '..', '..', '..', 'out', 'preload', 'index.cjs'), 'utf8')
  expect([...built.matchAll(/require\(([^)]*)\)/g)].map(([, name]) => name)).toEqual(['"electron"'])
  expect(built.length).toBeLessThan(5000)
})
