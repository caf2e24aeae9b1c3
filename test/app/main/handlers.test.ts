import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest'
import { CHANNELS } from '../../../app/contract/channels'
import type { HostCall } from '../../../app/contract/channels'
import { registerHandlers } from '../../../app/main/handlers'
import type { electronDouble } from './electron-double'

const electron = vi.hoisted(() => ({ double: undefined as unknown as ReturnType<typeof electronDouble> }))
vi.mock('electron', async () => {
  const { electronDouble, electronModule } = await import('./electron-double')
  electron.double = electronDouble()
  return electronModule(electron.double)
})

const page = { senderFrame: { url: 'app://persquare/index.html', parent: null } }
const ask = (name: HostCall, args: readonly unknown[], event: unknown = page) =>
  electron.double.handlers.get(CHANNELS[name])!(event, ...args) as Promise<unknown>
const refusal = (argument: string, why: RegExp) => ({
  ok: false,
  problem: { kind: 'bad-argument', argument, why: expect.stringMatching(why) as string },
})

let folder: string
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'persquare-'))
  await writeFile(join(folder, 'TB-0417.csv'), 'wafer,site\n')
  registerHandlers([join(folder, 'TB-0417.csv')])
})
afterAll(() => rm(folder, { recursive: true }))
beforeEach(() => {
  electron.double.dialog.showOpenDialog.mockReset()
  electron.double.dialog.showSaveDialog.mockReset()
})

describe('calls from the window', () => {
  it('opens what the person chooses', async () => {
    electron.double.dialog.showOpenDialog.mockResolvedValue({ filePaths: [join(folder, 'TB-0417.csv')] })
    expect(await ask('chooseFiles', ['readings'])).toEqual({
      ok: true,
      value: [{ name: 'TB-0417.csv', bytes: new TextEncoder().encode('wafer,site\n') }],
    })
    expect(electron.double.dialog.showOpenDialog).toHaveBeenCalledWith(
      expect.objectContaining({ title: 'Readings', properties: ['openFile', 'multiSelections'] }),
    )
  })

  it('takes a closed dialog for no files', async () => {
    electron.double.dialog.showOpenDialog.mockResolvedValue({ canceled: true, filePaths: [] })
    expect(await ask('chooseFiles', ['procedure'])).toEqual({ ok: true, value: [] })
  })

  it('says which file can’t be read, and why', async () => {
    electron.double.dialog.showOpenDialog.mockResolvedValue({ filePaths: [join(folder, 'gone.csv')] })
    expect(await ask('chooseFiles', ['readings'])).toEqual({
      ok: false,
      problem: { kind: 'cannot-read', file: 'gone.csv', why: 'no such file or folder' },
    })
  })

  it('hands over the files of the command line', async () => {
    expect(await ask('startFiles', [])).toMatchObject({ ok: true, value: [{ name: 'TB-0417.csv' }] })
  })

  it('saves where the person says, whatever folder the page has in mind', async () => {
    const filePath = join(folder, 'report.pdf')
    electron.double.dialog.showSaveDialog.mockResolvedValue({ canceled: false, filePath })
    const bytes = new Uint8Array([1, 2, 3])
    expect(await ask('saveFile', ['../../report.pdf', bytes])).toEqual({ ok: true, value: 'saved' })
    expect(electron.double.dialog.showSaveDialog).toHaveBeenCalledWith({ defaultPath: 'report.pdf' })
    expect(new Uint8Array(await readFile(filePath))).toEqual(bytes)
  })

  it('tells cancelled from failed', async () => {
    electron.double.dialog.showSaveDialog.mockResolvedValue({ canceled: true, filePath: '' })
    expect(await ask('saveFile', ['a.pdf', new Uint8Array()])).toEqual({ ok: true, value: 'cancelled' })
    electron.double.dialog.showSaveDialog.mockResolvedValue({ filePath: folder })
    expect(await ask('saveFile', ['a.pdf', new Uint8Array()])).toEqual({
      ok: false,
      problem: { kind: 'cannot-write', path: folder, why: 'it is a folder' },
    })
  })
})

describe('calls that are refused', () => {
  it.each([
    ['another page', { senderFrame: { url: 'https://example.com/', parent: null } }],
    ['a name that begins like ours', { senderFrame: { url: 'app://persquare.example/', parent: null } }],
    ['a frame inside the page', { senderFrame: { url: 'app://persquare/index.html', parent: {} } }],
    ['a frame that is gone', { senderFrame: null }],
  ])('from %s', async (_, event) => {
    expect(await ask('startFiles', [], event)).toEqual(refusal('startFiles', /not asked for by the window/))
  })

  it.each<[HostCall, unknown[]]>([
    ['chooseFiles', []],
    ['chooseFiles', ['toString']],
    ['chooseFiles', ['readings', 'more']],
    ['startFiles', ['more']],
    ['saveFile', ['a.pdf']],
    ['saveFile', ['a.pdf', 'text']],
    ['saveFile', [7, new Uint8Array()]],
  ])('%s with %j', async (name, args) => {
    expect(await ask(name, args)).toEqual(refusal(name, /in a way that it does not know/))
    expect(electron.double.dialog.showOpenDialog).not.toHaveBeenCalled()
    expect(electron.double.dialog.showSaveDialog).not.toHaveBeenCalled()
  })

  it('and what throws becomes a reply', async () => {
    electron.double.dialog.showOpenDialog.mockRejectedValue(new Error('no display'))
    expect(await ask('chooseFiles', ['readings'])).toEqual(refusal('chooseFiles', /^no display$/))
  })
})
