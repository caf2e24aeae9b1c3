import { mkdir, mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest'
import { CHANNELS, type HostCall } from '../../../app/contract/channels'
import { REPLIES } from '../../../app/contract/messages'
import { StateStore } from '../../../app/host/state-store'
import { registerHandlers } from '../../../app/main/handlers'
import { RecentFiles } from '../../../app/main/recent-files'
import { WaitingFiles } from '../../../app/main/waiting-files'
import { CoreError } from '../../../core/problems/problem'
import type { electronDouble } from './electron-double'

const electron = vi.hoisted(() => ({ double: undefined as unknown as ReturnType<typeof electronDouble> }))
vi.mock('electron', async () => {
  const { electronDouble, electronModule } = await import('./electron-double')
  electron.double = electronDouble()
  return electronModule(electron.double)
})

const page = { senderFrame: { url: 'app://persquare/index.html', parent: null } }
async function ask(name: HostCall, args: readonly unknown[], event: unknown = page): Promise<unknown> {
  const reply = await electron.double.handlers.get(CHANNELS[name])!(event, ...args)
  // Whatever main says, the window must be able to take.
  expect(REPLIES[name].safeParse(reply).success, name).toBe(true)
  return reply
}
const refusal = (argument: string, why: RegExp) => ({
  ok: false,
  problem: { kind: 'bad-argument', argument, why: expect.stringMatching(why) as string },
})

const CSV = 'wafer,site\n'
const lot = { name: 'TB-0417.csv', bytes: new TextEncoder().encode(CSV) }
const request = { readings: [lot], procedure: { name: 'p.json', bytes: new Uint8Array([123, 125]) }, excluded: [], decision: null, date: null, paper: 'A4' } // prettier-ignore

let folder: string
let csv: string
const told = vi.fn()
const waiting = new WaitingFiles(told)
const makeReport = vi.fn()
const openInViewer = vi.fn()
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'persquare-'))
  csv = join(folder, 'TB-0417.csv')
  await writeFile(csv, CSV)
  await writeFile(join(folder, 'p.procedure.json'), '{}')
  await mkdir(join(folder, 'lot', 'below.csv'), { recursive: true })
  for (const name of ['W10.csv', 'W2.CSV', 'notes.txt', '.hidden.csv']) await writeFile(join(folder, 'lot', name), CSV)
  registerHandlers({
    waiting,
    demo: [csv],
    recent: new RecentFiles(join(folder, 'recent.json'), () => new Date('2026-03-14T09:30:00Z')),
    state: new StateStore(join(folder, 'session')),
    makeReport,
    openInViewer,
  })
})
afterAll(() => rm(folder, { recursive: true }))
beforeEach(() => {
  for (const mock of [...Object.values(electron.double.dialog), makeReport, openInViewer]) mock.mockReset()
})

describe('files', () => {
  it('opens what the person chooses', async () => {
    electron.double.dialog.showOpenDialog!.mockResolvedValue({ filePaths: [csv] })
    expect(await ask('chooseFiles', ['readings'])).toEqual({ ok: true, value: [lot] })
    expect(electron.double.dialog.showOpenDialog).toHaveBeenCalledWith(
      expect.objectContaining({ title: 'Readings', properties: ['openFile', 'multiSelections'] }),
    )
  })

  it('opens the readings of a folder, W2 before W10, and nothing hidden or below it', async () => {
    electron.double.dialog.showOpenDialog!.mockResolvedValue({ filePaths: [join(folder, 'lot')] })
    const reply = (await ask('chooseFiles', ['folder'])) as { value: { name: string }[] }
    expect(reply.value.map(({ name }) => name)).toEqual(['W2.CSV', 'W10.csv'])
    expect(electron.double.dialog.showOpenDialog).toHaveBeenCalledWith({
      title: 'Folder of readings',
      properties: ['openDirectory'],
    })
    electron.double.dialog.showOpenDialog!.mockResolvedValue({ filePaths: [join(folder, 'lot', 'below.csv')] })
    expect(await ask('chooseFiles', ['folder'])).toMatchObject({ ok: false, problem: { file: 'below.csv', why: 'there is no CSV file in this folder' } }) // prettier-ignore
  })

  it('takes a closed dialog for no files', async () => {
    electron.double.dialog.showOpenDialog!.mockResolvedValue({ canceled: true, filePaths: [] })
    for (const choice of ['procedure', 'folder'])
      expect(await ask('chooseFiles', [choice])).toEqual({ ok: true, value: [] })
  })

  it('says which file can’t be read, and why', async () => {
    for (const [name, why] of [
      ['gone.csv', 'no such file or folder'],
      ['lot', 'it is a folder'],
    ]) {
      electron.double.dialog.showOpenDialog!.mockResolvedValue({ filePaths: [join(folder, name!)] })
      const problem = { kind: 'cannot-read', file: name, why }
      expect(await ask('chooseFiles', ['readings'])).toEqual({ ok: false, problem })
    }
  })

  it('hands over what the system asked to open, once, and tells the window of it', async () => {
    waiting.add([csv])
    expect(told).toHaveBeenCalledTimes(1)
    expect(await ask('startFiles', [])).toEqual({ ok: true, value: [lot] })
    expect(await ask('startFiles', [])).toEqual({ ok: true, value: [] })
    waiting.add([join(folder, 'gone.csv')])
    expect(await ask('startFiles', [])).toMatchObject({ ok: false })
    expect(await ask('startFiles', [])).toEqual({ ok: true, value: [] })
    waiting.add([])
    expect(told).toHaveBeenCalledTimes(2)
  })

  it('has a lot to try', async () => {
    expect(await ask('demoFiles', [])).toEqual({ ok: true, value: [lot] })
  })
})

describe('recent files', () => {
  it('are those that the person opened, by name and token, and open again', async () => {
    await ask('forgetRecent', [])
    const paths = [csv, join(folder, 'p.procedure.json')]
    expect(await ask('rememberDropped', [paths])).toEqual({ ok: true, value: 'remembered' })
    const { value } = (await ask('recentFiles', [])) as { value: { token: string; names: string[] }[] }
    expect(value).toMatchObject([
      { kind: 'readings', names: ['TB-0417.csv'], opened: '2026-03-14T09:30:00.000Z' },
      { kind: 'procedure', names: ['p.procedure.json'] },
    ])
    expect(JSON.stringify(value)).not.toContain(folder)
    expect(await ask('reopen', [value[0]!.token])).toEqual({ ok: true, value: [lot] })
  })

  it('are none that it didn’t open: a token can’t be made up', async () => {
    for (const token of ['', csv, '../../etc/hosts', '0'.repeat(32)]) {
      expect(await ask('reopen', [token])).toEqual(refusal('the recent file', /not in the list/))
    }
    expect(await ask('rememberDropped', [['relative.csv', join(folder, 'gone.csv'), folder]])).toEqual({ ok: true, value: 'ignored' }) // prettier-ignore
  })

  it('outlive the program, keep to ten of a kind, and can be forgotten', async () => {
    const store = () => new RecentFiles(join(folder, 'recent.json'))
    const recent = store()
    for (let n = 0; n < 14; n++) {
      await writeFile(join(folder, `R${n}.csv`), CSV)
      await recent.remember([join(folder, `R${n}.csv`)])
    }
    await recent.remember([join(folder, 'R9.csv')])
    const list = await store().list()
    expect(list.filter(({ kind }) => kind === 'readings').map(({ names }) => names[0])).toEqual(
      [9, 13, 12, 11, 10, 8, 7, 6, 5, 4].map((n) => `R${n}.csv`),
    )
    await recent.forget()
    expect(await store().list()).toEqual([])
    for (const damaged of ['', '[]', '{"format":"persquare-recent/1","entries":[{"kind":"readings","paths":["relative"],"opened":""}, 7]}']) {
      await writeFile(join(folder, 'recent.json'), damaged)
      expect(await store().list()).toEqual([])
    }
  }) // prettier-ignore
})

describe('saving', () => {
  it('is where the person says, whatever folder the page has in mind', async () => {
    const filePath = join(folder, 'report.pdf')
    electron.double.dialog.showSaveDialog!.mockResolvedValue({ canceled: false, filePath })
    const bytes = new Uint8Array([1, 2, 3])
    expect(await ask('saveFile', ['../../report.pdf', bytes, 'report'])).toEqual({ ok: true, value: 'saved' })
    expect(electron.double.dialog.showSaveDialog).toHaveBeenCalledWith({
      defaultPath: 'report.pdf',
      filters: [{ name: 'PDF report', extensions: ['pdf'] }],
    })
    expect(new Uint8Array(await readFile(filePath))).toEqual(bytes)
    expect((await readdir(folder)).filter((name) => name.endsWith('.part'))).toEqual([])
  })

  it('tells cancelled from failed, and names no folder', async () => {
    electron.double.dialog.showSaveDialog!.mockResolvedValue({ canceled: true, filePath: '' })
    expect(await ask('saveFile', ['a.pdf', new Uint8Array(), 'report'])).toEqual({ ok: true, value: 'cancelled' })
    electron.double.dialog.showSaveDialog!.mockResolvedValue({ filePath: join(folder, 'lot') })
    expect(await ask('saveFile', ['a.pdf', new Uint8Array(), 'report'])).toEqual({
      ok: false,
      problem: { kind: 'cannot-write', path: 'lot', why: 'there is something of this name that is no plain file' },
    })
  })
})

describe('reports', () => {
  it('are made of what the page sends, all of it checked', async () => {
    makeReport.mockResolvedValue(new Uint8Array([37]))
    expect(await ask('makeReport', [{ ...request, path: '/etc' }])).toEqual({ ok: true, value: new Uint8Array([37]) })
    expect(makeReport).toHaveBeenCalledWith(request)
    makeReport.mockRejectedValue(new CoreError({ kind: 'empty-file', file: 'TB-0417.csv' }))
    expect(await ask('makeReport', [request])).toEqual({ ok: false, problem: { kind: 'empty-file', file: 'TB-0417.csv' } }) // prettier-ignore
  })

  it('go to the system’s viewer to be printed', async () => {
    const pdf = new Uint8Array([37, 80, 68, 70])
    expect(await ask('printReport', [pdf])).toEqual({ ok: true, value: 'opened' })
    expect(openInViewer).toHaveBeenCalledWith(pdf)
  })
})

it('keeps files and the state that speaks of them', async () => {
  const { value: token } = (await ask('keepFile', [lot.bytes])) as { value: string }
  expect(await ask('saveState', ['{}', [token]])).toEqual({ ok: true, value: 'saved' })
  expect(await ask('loadState', [])).toEqual({ ok: true, value: { text: '{}', generation: 'last' } })
  expect(await ask('keptFile', [token])).toEqual({ ok: true, value: lot.bytes })
  expect(await ask('keptFile', ['../state'])).toMatchObject({ ok: false, problem: { kind: 'cannot-read' } })
})

describe('calls that are refused', () => {
  it.each([
    ['another page', { senderFrame: { url: 'https://example.com/', parent: null } }],
    ['a name that begins like ours', { senderFrame: { url: 'app://persquare.example/', parent: null } }],
    ['a frame inside the page', { senderFrame: { url: 'app://persquare/index.html', parent: {} } }],
    ['a frame that is gone', { senderFrame: null }],
  ])('from %s', async (_, event) => {
    for (const name of Object.keys(CHANNELS) as HostCall[]) {
      expect(await ask(name, [], event)).toEqual(refusal(name, /not asked for by the window/))
    }
  })

  it.each<[HostCall, unknown[]]>([
    ['chooseFiles', []],
    ['chooseFiles', ['toString']],
    ['chooseFiles', ['readings', 'more']],
    ['startFiles', ['more']],
    ['rememberDropped', [['a.csv', 7]]],
    ['rememberDropped', [['']]],
    ['reopen', [{}]],
    ['saveFile', ['a.pdf']],
    ['saveFile', ['a.pdf', 'text', 'report']],
    ['saveFile', ['a.pdf', new Uint8Array(), 'program']],
    ['saveFile', [7, new Uint8Array(), 'report']],
    ['makeReport', [{ ...request, paper: 'A3' }]],
    ['makeReport', [{ ...request, readings: [{ name: 'a.csv' }] }]],
    ['makeReport', [{ ...request, decision: { decision: 'ship', name: '', comment: '', date: '' } }]],
    ['makeReport', [{ ...request, excluded: [{ wafer: '1' }] }]],
    ['printReport', ['pdf']],
    ['saveState', [{}, []]],
    ['saveState', ['{}', [7]]],
    ['keepFile', [[1, 2]]],
    ['keptFile', []],
  ])('%s with %j', async (name, args) => {
    expect(await ask(name, args)).toEqual(refusal(name, /in a way that it does not know/))
    for (const mock of [...Object.values(electron.double.dialog), makeReport, openInViewer])
      expect(mock).not.toHaveBeenCalled()
  })

  it('and what throws becomes a reply', async () => {
    electron.double.dialog.showOpenDialog!.mockRejectedValue(new Error('no display'))
    expect(await ask('chooseFiles', ['readings'])).toEqual(refusal('chooseFiles', /^no display$/))
  })
})
