import { expect, it, vi } from 'vitest'
import type { electronDouble } from './electron-double'

const electron = vi.hoisted(() => ({ double: undefined as unknown as ReturnType<typeof electronDouble> }))
vi.mock('electron', async () => {
  const { electronDouble, electronModule } = await import('./electron-double')
  electron.double = electronDouble()
  electron.double.isFirst = false
  return electronModule(electron.double)
})

it('a second start ends at once, and leaves everything to the first', async () => {
  await import('../../../app/main/index')
  await new Promise((resolve) => setTimeout(resolve, 20))
  expect(electron.double.quits).toBe(1)
  expect(electron.double.windows).toEqual([])
  expect(electron.double.appEvents.size + electron.double.handlers.size + electron.double.privileged.length).toBe(0)
})
