import { beforeAll, expect, it, vi } from 'vitest'
import type { Host } from '../../../app/contract/host'

const calls: unknown[][] = []
const exposed = vi.hoisted(() => new Map<string, unknown>())
vi.mock('electron', () => ({
  contextBridge: { exposeInMainWorld: (name: string, value: unknown) => exposed.set(name, value) },
  ipcRenderer: {
    invoke: (...args: unknown[]) => {
      calls.push(args)
      return Promise.resolve({ ok: true, value: [] })
    },
  },
}))

beforeAll(() => import('../../../app/preload/index'))

it('shows the page the host and nothing else', () => {
  expect([...exposed.keys()]).toEqual(['host'])
  expect(Object.keys(exposed.get('host') as object).sort()).toEqual(['chooseFiles', 'kind', 'saveFile', 'startFiles'])
})

it('sends each call over its own channel', async () => {
  const host = exposed.get('host') as Host
  expect(host.kind).toBe('electron')
  const bytes = new Uint8Array([1])
  expect(await host.chooseFiles('readings')).toEqual({ ok: true, value: [] })
  await host.startFiles()
  await host.saveFile('a.pdf', bytes)
  expect(calls).toEqual([
    ['persquare:choose-files', 'readings'],
    ['persquare:start-files'],
    ['persquare:save-file', 'a.pdf', bytes],
  ])
})
