import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest'
import { openWindow } from '../../../app/main/window'
import { readPlace, windowPlace, writePlace, type Place } from '../../../app/main/window-place'
import type { electronDouble } from './electron-double'

const electron = vi.hoisted(() => ({ double: undefined as unknown as ReturnType<typeof electronDouble> }))
vi.mock('electron', async () => {
  const { electronDouble, electronModule } = await import('./electron-double')
  electron.double = electronDouble()
  return electronModule(electron.double)
})

const HD: Place = { x: 0, y: 0, width: 1920, height: 1040 }
const RIGHT: Place = { x: 1920, y: 0, width: 1280, height: 680 }

describe('where the window opens', () => {
  it.each<[string, Place | null, readonly Place[], Place]>([
    ['in the middle at first', null, [HD], { x: 320, y: 90, width: 1280, height: 860 }],
    ['where it stood', { x: 100, y: 50, width: 900, height: 700 }, [HD], { x: 100, y: 50, width: 900, height: 700 }],
    ['on the other screen', { x: 2000, y: 10, width: 900, height: 600 }, [HD, RIGHT], { x: 2000, y: 10, width: 900, height: 600 }],
    ['on the first screen when the other is gone', { x: 2000, y: 10, width: 900, height: 600 }, [HD], { x: 510, y: 220, width: 900, height: 600 }],
    ['no larger than the screen', { x: 0, y: 0, width: 5000, height: 4000 }, [HD], { x: 0, y: 0, width: 1920, height: 1040 }],
    ['no smaller than it can be used', { x: 0, y: 0, width: 1, height: 1 }, [HD], { x: 640, y: 280, width: 640, height: 480 }],
    ['where its title bar can be reached', { x: 300, y: 5000, width: 900, height: 700 }, [HD], { x: 510, y: 170, width: 900, height: 700 }],
    ['on a small screen, whole', null, [{ x: 0, y: 0, width: 1280, height: 720 }], { x: 0, y: 0, width: 1280, height: 720 }],
  ])('%s', (_, saved, screens, expected) => {
    expect(windowPlace(saved, screens)).toEqual(expected)
  }) // prettier-ignore

  let folder: string
  beforeAll(async () => (folder = await mkdtemp(join(tmpdir(), 'persquare-'))))
  afterAll(() => rm(folder, { recursive: true }))

  it('is read as it was written, or not at all', async () => {
    const path = join(folder, 'window.json')
    expect(await readPlace(path)).toBeNull()
    await writePlace(path, RIGHT)
    expect(await readPlace(path)).toEqual(RIGHT)
    for (const text of ['', '{}', '[]', 'null', '{"x":1,"y":1,"width":"wide","height":1}', '{"x":1e99,"y":0,"width":1,"height":1}']) {
      await writeFile(path, text)
      expect(await readPlace(path), text).toBeNull()
    }
    await writePlace(join(path, 'below a file'), RIGHT)
  }) // prettier-ignore
})

describe('the window', () => {
  let window: (typeof electron.double.windows)[number]
  beforeEach(() => {
    electron.double.windows.length = 0
    openWindow('preload.cjs', HD)
    window = electron.double.windows[0]!
  })
  const contents = (name: string) => window.contentsEvents[name] as unknown as (...args: unknown[]) => void

  it('asks before it drops what is not saved', () => {
    for (const [answer, calls] of [[1, 0], [0, 1]] as const) {
      electron.double.dialog.showMessageBoxSync.mockReturnValue(answer)
      const preventDefault = vi.fn()
      contents('will-prevent-unload')({ preventDefault })
      expect(preventDefault).toHaveBeenCalledTimes(calls)
    }
  }) // prettier-ignore

  it('comes back after a crash, but not for ever', () => {
    contents('render-process-gone')({}, { reason: 'clean-exit' })
    expect(window.reloads).toBe(0)
    contents('render-process-gone')({}, { reason: 'crashed' })
    expect([window.reloads, window.destroyed]).toEqual([1, false])
    contents('render-process-gone')({}, { reason: 'oom' })
    expect([window.reloads, window.destroyed]).toEqual([1, true])
    expect(electron.double.dialog.showErrorBox).toHaveBeenCalledTimes(1)
  })
})
