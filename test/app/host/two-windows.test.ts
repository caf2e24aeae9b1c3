/** Two windows that keep their states in one place: nothing is mixed up, and whoever isn't kept any more is told. */
import { spawn } from 'node:child_process'
import { mkdtemp, readdir, readFile, rm, utimes, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest'
import { startLoopbackHost, type LoopbackHost } from '../../../app/browser/loopback-host'
import { packParts } from '../../../app/contract/frame'
import { COUNT_HEADER } from '../../../app/contract/loopback'
import { StateStore } from '../../../app/host/state-store'
import { explain } from '../../../core/problems/explain'
import type { Problem } from '../../../core/problems/problem'
import { loopbackSettings } from '../browser/loopback-settings'
import { buildWriters } from './build-writers'

let base: string
beforeAll(async () => (base = await mkdtemp(join(tmpdir(), 'persquare-'))))
afterAll(() => rm(base, { recursive: true }))

let folder: string
beforeEach(async () => (folder = await mkdtemp(join(base, 'state-'))))

const TOLD = { problem: { kind: 'kept-elsewhere' } }

describe('two programs', () => {
  it('the first to save goes on, the other is told and overwrites nothing', async () => {
    await new StateStore(folder).save('before', [])
    const [one, other] = [new StateStore(folder), new StateStore(folder)]
    await Promise.all([one.load(), other.load()])
    await one.save('one 1', [])
    for (let tries = 0; tries < 3; tries++) await expect(other.save(`other ${tries}`, [])).rejects.toMatchObject(TOLD)
    await one.save('one 2', [])
    expect(await new StateStore(folder).load()).toEqual({ text: 'one 2', generation: 'last' })
  })

  it('the other goes on where it has loaded what the first one kept', async () => {
    const [one, other] = [new StateStore(folder), new StateStore(folder)]
    await Promise.all([one.load(), other.load()])
    await one.save('one', [])
    expect(await other.load()).toEqual({ text: 'one', generation: 'last' })
    await other.save('other', [])
    await expect(one.save('one again', [])).rejects.toMatchObject(TOLD)
  })

  it('what was saved already, and is saved again because the answer got lost, is no other’s', async () => {
    const store = new StateStore(folder)
    const { count } = await store.loadCounted()
    await store.save('same', [], count)
    await expect(store.save('same', [], count)).resolves.toBe(count + 2)
  })

  it('at once, in processes of their own: each save is there or was told of', async () => {
    const writers = await buildWriters(join(folder, 'built'))
    const work = (who: string) =>
      new Promise<readonly string[]>((resolve, reject) => {
        const args = [writers, 'states', join(folder, 'state'), who, '60']
        const child = spawn(process.execPath, args, { stdio: ['ignore', 'pipe', 'inherit'] })
        let said = ''
        child.stdout.on('data', (part: Buffer) => (said += part.toString()))
        child.once('error', reject)
        child.once('close', (code) =>
          code === 0 ? resolve(said.trim().split('\n')) : reject(new Error(`ended with ${code}`)),
        )
      })
    const [a, b] = await Promise.all([work('a'), work('b')])
    expect([a.length, b.length]).toEqual([60, 60])
    const saved = [a, b].flatMap((said, who) =>
      said.filter((line) => !line.startsWith('told')).map((line) => ({ who: 'ab'[who], count: Number(line.split(' ')[0]), n: Number(line.split(' ')[1]) })),
    ) // prettier-ignore
    for (const line of [...a, ...b]) if (line.startsWith('told')) expect(line).toContain('kept-elsewhere')
    const counts = saved.map(({ count }) => count).sort((x, y) => x - y)
    expect(counts).toEqual(counts.map((_, at) => at + 1))
    const { text } = (await new StateStore(join(folder, 'state')).load())!
    const last = saved.find(({ count }) => count === counts.length)!
    expect(JSON.parse(text)).toMatchObject({ who: last.who, n: last.n, filling: last.who.repeat(20_000) })
    expect((await readdir(join(folder, 'state'))).sort()).toEqual(['state', 'state.previous'])
  })

  it('a lock of a process that is gone, or from another time, is in nobody’s way', async () => {
    const store = new StateStore(folder)
    const lock = join(folder, 'state.lock')
    await writeFile(lock, '4194999')
    await store.save('1', [])
    for (const shift_ms of [-60_000, 3_600_000]) {
      await writeFile(lock, String(process.pid))
      const then = new Date(Date.now() + shift_ms)
      await utimes(lock, then, then)
      await store.save(String(shift_ms), [])
    }
    expect(await readdir(folder)).not.toContain('state.lock')
  })
})

describe('two pages of one program', () => {
  let host: LoopbackHost
  beforeEach(async () => (host = await startLoopbackHost(loopbackSettings(folder, { root: folder }))))
  afterEach(() => host.close())

  const utf8 = (value: unknown) => new TextEncoder().encode(typeof value === 'string' ? value : JSON.stringify(value))
  /** As a page does it: it knows the count of what it loaded or saved. */
  async function page() {
    const loaded = await fetch(`${host.url}state`)
    let count = Number(loaded.headers.get(COUNT_HEADER))
    const save = async (text: string) => {
      const body = packParts([utf8(text), utf8([]), utf8(count)])
      const headers = { origin: new URL(host.url).origin, 'x-persquare': '1' }
      const answer = await fetch(`${host.url}state`, { method: 'POST', body, headers })
      if (answer.ok) count = Number(answer.headers.get(COUNT_HEADER))
      return answer
    }
    return { state: (await loaded.json()) as unknown, save }
  }

  it('the first to save goes on, the other is told in words', async () => {
    const [one, other] = [await page(), await page()]
    expect([one.state, other.state]).toEqual([null, null])
    expect((await one.save('"one"')).status).toBe(204)
    const told = await other.save('"other"')
    expect(told.status).toBe(409)
    expect(explain((await told.json()) as Problem)).toContain('Another window keeps its own lot now')
    expect((await one.save('"one again"')).status).toBe(204)
    expect((await page()).state).toEqual({ text: '"one again"', generation: 'last' })
  })

  it('a count that is none is refused', async () => {
    const headers = { origin: new URL(host.url).origin, 'x-persquare': '1' }
    for (const count of ['1.5', '"1"', 'null', '{', '[1]']) {
      const body = packParts([utf8('{}'), utf8([]), utf8(count)])
      expect((await fetch(`${host.url}state`, { method: 'POST', body, headers })).status, count).toBe(400)
    }
  })
})

describe('a clock that is put back', () => {
  afterEach(() => void vi.useRealTimers())

  it('changes nothing in which state is the last, and no kept file is dropped', async () => {
    const store = new StateStore(folder)
    const token = await store.files.keep(new Uint8Array([1, 2, 3]))
    vi.useFakeTimers({ toFake: ['Date'] })
    for (const [text, now] of [['today', '2026-12-01'], ['long ago', '1999-01-01'], ['later', '2026-11-30']]) {
      vi.setSystemTime(new Date(`${now}T00:00:00Z`))
      await new StateStore(folder).save(text, [token])
      expect(await new StateStore(folder).load()).toEqual({ text, generation: 'last' })
    }
    vi.setSystemTime(new Date('1970-01-02T00:00:00Z'))
    expect(await store.files.keep(new Uint8Array([1, 2, 3]))).toBe(token)
    await store.save('unspoken of', [])
    await store.save('and again', [])
    expect(await store.files.read(token)).toEqual(new Uint8Array([1, 2, 3]))
  }) // prettier-ignore
})

it('a state of a program that didn’t count is read, and counted from there', async () => {
  const { createHash } = await import('node:crypto')
  const body = '{"lot":"TB-0417"}'
  const sha256 = createHash('sha256').update(body).digest('hex')
  await writeFile(
    join(folder, 'state'),
    `${JSON.stringify({ format: 'persquare-state/1', sha256, kept: [] })}\n${body}`,
  )
  const store = new StateStore(folder)
  expect(await store.loadCounted()).toEqual({ state: { text: body, generation: 'last' }, count: 0 })
  expect(await store.save('next', [])).toBe(1)
  expect(await readFile(join(folder, 'state.previous'), 'utf8')).toContain(body)
})
