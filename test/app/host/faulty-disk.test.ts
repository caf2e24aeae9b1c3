/** A disk that is full, folders that can't be written, files that change or go while they are read. */
import { execFileSync, spawnSync } from 'node:child_process'
import { appendFileSync, existsSync, rmSync, truncateSync, writeFileSync } from 'node:fs'
import { mkdir, mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises'
import type * as Promises from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest'
import { readInput } from '../../../app/cli/read-inputs'
import { openFiles } from '../../../app/host/open-files'
import { readUnchanged } from '../../../app/host/read-unchanged'
import { replying } from '../../../app/host/replies'
import { StateStore } from '../../../app/host/state-store'
import { writeWhole } from '../../../app/host/write-whole'
import { buildWriters } from './build-writers'

/** What happens to the next files opened; null as usual. */
const disk = vi.hoisted(() => ({
  /** Bytes until it is full. */
  room: Infinity,
  whileRead: null as (() => void) | null,
  beforeOpened: null as (() => void) | null,
}))

vi.mock('node:fs/promises', async (original) => {
  const real = await original<typeof Promises>()
  const open: typeof real.open = async (...args) => {
    disk.beforeOpened?.()
    const handle = await real.open(...args)
    const [write, read] = [handle.writeFile.bind(handle), handle.readFile.bind(handle)]
    handle.writeFile = async (content) => {
      const bytes = Buffer.from(content as Uint8Array)
      await write(bytes.subarray(0, Math.min(bytes.length, disk.room)))
      if (bytes.length > disk.room) {
        throw Object.assign(new Error('ENOSPC: no space left on device, write'), { code: 'ENOSPC' })
      }
      disk.room -= bytes.length
    }
    handle.readFile = (async () => {
      const bytes = await read()
      disk.whileRead?.()
      return bytes
    }) as typeof handle.readFile
    return handle
  }
  return { ...real, open, default: { ...real, open } }
})

let folder: string
beforeEach(async () => (folder = await mkdtemp(join(tmpdir(), 'persquare-'))))
afterEach(async () => {
  Object.assign(disk, { room: Infinity, whileRead: null, beforeOpened: null })
  await rm(folder, { recursive: true })
})

const OLD = new Map([
  ['report.pdf', 'old report'],
  ['sites.csv', 'old sites'],
])
const NEW = new Map([
  ['report.pdf', 'a new report'],
  ['sites.csv', 'new sites'],
])
const found = async (): Promise<Record<string, string>> => {
  const names = (await readdir(folder)).sort()
  return Object.fromEntries(await Promise.all(names.map(async (name) => [name, await readFile(join(folder, name), 'utf8')])))
} // prettier-ignore

describe('a full disk', () => {
  it('at any byte of a set of files leaves the old ones, and nothing beside them', async () => {
    await writeWhole(folder, OLD)
    const size = [...NEW.values()].join('').length
    for (let room = 0; room < size; room++) {
      disk.room = room
      await expect(writeWhole(folder, NEW), `${room} bytes`).rejects.toMatchObject({
        problem: { kind: 'cannot-write', path: folder, why: 'the disk is full' },
      })
      expect(await found(), `${room} bytes`).toEqual(Object.fromEntries(OLD))
    }
    disk.room = size
    await writeWhole(folder, NEW)
    expect(await found()).toEqual(Object.fromEntries(NEW))
  })

  it('leaves the last state, and saving goes on when there is room again', async () => {
    const store = new StateStore(folder)
    await store.save('first', [])
    disk.room = 100
    const told = await replying('saveState', () => store.save('second', []))
    expect(told).toEqual({ ok: false, problem: { kind: 'bad-argument', argument: 'saveState', why: 'the disk is full' } })
    expect(await store.load()).toEqual({ text: 'first', generation: 'last' })
    expect(await readdir(folder)).toEqual(['state'])
    disk.room = Infinity
    await store.save('second', [])
    expect(await store.load()).toEqual({ text: 'second', generation: 'last' })
  }) // prettier-ignore

  it('keeps no half of a file beside the state', async () => {
    const store = new StateStore(folder)
    disk.room = 2
    await expect(store.files.keep(new Uint8Array([1, 2, 3]))).rejects.toThrow('no space')
    expect(await readdir(join(folder, 'kept'))).toEqual([])
  })
})

/** Not the double: a process of its own, on a real small file system or under the system's limit of a file's size. */
describe.runIf(process.platform === 'linux')('a real disk without room', () => {
  let built: string
  let writers: string
  beforeAll(async () => {
    built = await mkdtemp(join(tmpdir(), 'persquare-'))
    writers = await buildWriters(join(built, 'built'))
    await mkdir(join(built, 'large'))
    await writeFile(join(built, 'large', 'report.pdf'), Buffer.alloc(300_000, 1))
  })
  afterAll(() => rm(built, { recursive: true }))

  const writeOnce = (to: string, before = '') => {
    const command = `${before} exec "$0" "$1" once "$2" "$3"`
    const ran = spawnSync('sh', ['-c', command, process.execPath, writers, to, join(built, 'large')], { encoding: 'utf8' })
    expect(ran.stderr).toBe('')
    return ran.stdout.trim()
  } // prettier-ignore

  it('a file beyond the system’s limit leaves the old one', async () => {
    await writeWhole(folder, OLD)
    const said = writeOnce(folder, 'ulimit -f 64;')
    expect(JSON.parse(said)).toMatchObject({ kind: 'cannot-write', why: 'a file of this size is not allowed here' })
    expect(await found()).toEqual(Object.fromEntries(OLD))
    expect(writeOnce(folder)).toBe('written')
  })

  // Mounting needs leave that not every machine gives; the double above shows the same byte by byte.
  it('a file system of 128 KB leaves the old one', async ({ skip }) => {
    const mount = await mkdtemp(join(built, 'mount-'))
    try {
      execFileSync('mount', ['-t', 'tmpfs', '-o', 'size=128k', 'none', mount], { stdio: 'ignore' })
    } catch {
      return skip('no leave to mount a file system here')
    }
    try {
      writeFileSync(join(mount, 'report.pdf'), 'old')
      expect(JSON.parse(writeOnce(mount))).toEqual({ kind: 'cannot-write', path: mount, why: 'the disk is full' })
      expect(await readFile(join(mount, 'report.pdf'), 'utf8')).toBe('old')
      expect(await readdir(mount)).toEqual(['report.pdf'])
    } finally {
      execFileSync('umount', [mount])
    }
  })
})

describe('a folder that can’t be written', () => {
  // The superuser may write where the mode says no: a file in the folder's place stops everyone.
  it('is told with its reason', async () => {
    await writeFile(join(folder, 'file'), '')
    for (const inside of ['file', 'file/below']) {
      await expect(writeWhole(join(folder, inside), OLD)).rejects.toMatchObject({
        problem: { kind: 'cannot-write', why: expect.stringMatching(/not a folder/) as string },
      })
    }
    expect(await readFile(join(folder, 'file'), 'utf8')).toBe('')
    const store = new StateStore(join(folder, 'file'))
    expect(await replying('saveState', () => store.save('{}', []))).toMatchObject({ ok: false })
  })

  // In /proc the recursion of Node's mkdir would never end.
  it.runIf(process.platform === 'linux')('of the system’s own, too', async () => {
    await expect(writeWhole('/proc/persquare', OLD)).rejects.toMatchObject({ problem: { kind: 'cannot-write' } })
    await expect(writeWhole('/proc/persquare/a/b', OLD)).rejects.toMatchObject({ problem: { kind: 'cannot-write' } })
    await expect(writeWhole('/proc/self', OLD)).rejects.toMatchObject({ problem: { kind: 'cannot-write' } })
  })

  it('and a folder in a file’s place leaves the whole set as it was', async () => {
    await writeWhole(folder, new Map([['report.pdf', 'old report']]))
    await mkdir(join(folder, 'sites.csv'))
    await expect(writeWhole(folder, NEW)).rejects.toMatchObject({ problem: { kind: 'cannot-write' } })
    expect(await readFile(join(folder, 'report.pdf'), 'utf8')).toBe('old report')
    expect((await readdir(folder)).sort()).toEqual(['report.pdf', 'sites.csv'])
  })
})

describe('a file that is read', () => {
  let path: string
  beforeEach(async () => {
    path = join(folder, 'TB-0417.csv')
    await writeFile(path, 'site,V,I\n1,0.092,0.0')
  })
  const readers = [
    ['by the command line', () => readInput(path)],
    ['by the window’s host', () => openFiles([path])],
  ] as const
  const refusal = (why: RegExp) => ({ problem: { kind: 'cannot-read', why: expect.stringMatching(why) as string } })

  it.each(readers)('%s while it grows is refused: a cut number would be another number', async (_, read) => {
    disk.whileRead = () => appendFileSync(path, '01\n2,0.091,0.001\n')
    await expect(read()).rejects.toMatchObject(refusal(/changed while it was read/))
    disk.whileRead = null
    await expect(read()).resolves.toBeDefined()
  })

  it.each(readers)('%s while it shrinks, or is written over, is refused', async (_, read) => {
    disk.whileRead = () => truncateSync(path, 5)
    await expect(read()).rejects.toMatchObject(refusal(/changed while it was read/))
    await writeFile(path, 'site,V,I\n1,0.092,0.0')
    await new Promise((resolve) => setTimeout(resolve, 20))
    disk.whileRead = () => writeFileSync(path, 'site,V,I\n1,0.099,0.0')
    await expect(read()).rejects.toMatchObject(refusal(/changed while it was read/))
  })

  it.each(readers)('%s is told of where it goes before it is opened', async (_, read) => {
    disk.beforeOpened = () => rmSync(path, { force: true })
    await expect(read()).rejects.toMatchObject(refusal(/no such file/))
  })

  it.each(readers)('%s is whole where it goes after it was opened', async (_, read) => {
    disk.whileRead = () => rmSync(path)
    await expect(read()).resolves.toBeDefined()
    expect(existsSync(path)).toBe(false)
  })

  it('is refused by its size before it is read', async () => {
    disk.whileRead = () => expect.unreachable('it was read')
    await expect(readUnchanged(path, 'TB-0417.csv', 5)).rejects.toMatchObject(refusal(/larger than/))
  })

  it('is refused where it is a folder', async () => {
    await expect(readUnchanged(folder)).rejects.toMatchObject(refusal(/it is a folder/))
  })
})
