// @vitest-environment jsdom
import { flushPromises, mount } from '@vue/test-utils'
import { createPinia, setActivePinia } from 'pinia'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import type { Host, RecentEntry } from '../../../app/contract/host'
import { hostKey } from '../../../app/renderer/host-key'
import FilesPage from '../../../app/renderer/pages/FilesPage.vue'
import { useChoicesStore } from '../../../app/renderer/stores/choices'

const entries: readonly RecentEntry[] = [
  { token: 'a1', kind: 'readings', names: ['TB-0417.csv', 'TB-0417-b.csv'], opened: '2026-03-16T08:48:00Z' },
  { token: 'b2', kind: 'procedure', names: ['boron.procedure.json'], opened: '2026-03-15T08:48:00Z' },
]

function hostWith(recent: readonly RecentEntry[]) {
  return {
    kind: 'electron',
    can: { reopen: true, print: true, menus: true, asksWhere: true },
    recentFiles: vi.fn(() => Promise.resolve({ ok: true, value: recent })),
    forgetRecent: vi.fn(() => Promise.resolve({ ok: true, value: 'forgotten' })),
    reopen: vi.fn((token: string) =>
      Promise.resolve({ ok: true, value: [{ name: `${token}.json`, bytes: new TextEncoder().encode('{}') }] }),
    ),
  }
}

beforeEach(() => setActivePinia(createPinia()))

describe('what was opened before', () => {
  it('is listed newest first, and opens again by its token', async () => {
    const host = hostWith(entries)
    const page = mount(FilesPage, { global: { provide: { [hostKey as symbol]: host as unknown as Host } } })
    await flushPromises()
    const buttons = page.findAll('[aria-labelledby=recent-title] li button')
    expect(buttons.map((button) => button.text())).toEqual([
      expect.stringContaining('TB-0417.csv'),
      expect.stringContaining('boron.procedure.json'),
    ])
    await buttons[1].trigger('click')
    await flushPromises()
    expect(host.reopen).toHaveBeenCalledWith('b2')
    expect(useChoicesStore().now.procedure?.name).toBe('b2.json')
  })

  it('leaves no heading where there is nothing', async () => {
    const page = mount(FilesPage, { global: { provide: { [hostKey as symbol]: hostWith([]) as unknown as Host } } })
    await flushPromises()
    expect(page.find('#recent-title').exists()).toBe(false)
  })
})
