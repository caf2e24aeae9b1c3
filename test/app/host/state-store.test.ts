import { spawn } from 'node:child_process'
import { mkdir, mkdtemp, readdir, readFile, rm, stat, truncate, utimes, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { pathToFileURL } from 'node:url'
import { build } from 'vite'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { MAX_STATE_BYTES } from '../../../app/contract/host'
import { stateFolder } from '../../../app/host/state-folder'
import { StateStore } from '../../../app/host/state-store'

let base: string
beforeAll(async () => (base = await mkdtemp(join(tmpdir(), 'persquare-'))))
afterAll(() => rm(base, { recursive: true }))

let folder: string
let store: StateStore
beforeEach(async () => {
  folder = await mkdtemp(join(base, 'state-'))
  store = new StateStore(folder)
})

const flipped = async (path: string, at: number): Promise<void> => {
  const bytes = await readFile(path)
  bytes[at] ^= 1
  await writeFile(path, bytes)
}

describe('a state', () => {
  it('is none before the first', async () => {
    expect(await store.load()).toBeNull()
    expect(await new StateStore(join(folder, 'not', 'there')).load()).toBeNull()
  })

  it('comes back as it was saved, from another start too', async () => {
    const text = '{"lot":"TB-0417","Ω":"\\n"}\n\u2028'
    await store.save(text, [])
    expect(await store.load()).toEqual({ text, generation: 'last' })
    expect(await new StateStore(folder).load()).toEqual({ text, generation: 'last' })
  })

  it('is nobody else’s to read', async () => {
    await store.save('{}', [])
    if (process.platform !== 'win32') expect((await stat(join(folder, 'state'))).mode & 0o077).toBe(0)
  })

  it('is the one before where the last is damaged, at any place and in any way', async () => {
    await store.save('first', [])
    await store.save('second', [])
    const whole = await readFile(join(folder, 'state'))
    for (let at = 0; at < whole.length; at++) {
      await flipped(join(folder, 'state'), at)
      expect(await store.load(), `byte ${at}`).toEqual({ text: 'first', generation: 'previous' })
      await writeFile(join(folder, 'state'), whole)
    }
    for (const length of [0, 1, whole.length - 1]) {
      await writeFile(join(folder, 'state'), whole)
      await truncate(join(folder, 'state'), length)
      expect(await store.load()).toEqual({ text: 'first', generation: 'previous' })
    }
  })

  it('that is damaged does not push out the whole one before it', async () => {
    await store.save('first', [])
    await store.save('second', [])
    await flipped(join(folder, 'state'), 20)
    await store.save('third', [])
    await flipped(join(folder, 'state'), 20)
    expect(await store.load()).toEqual({ text: 'first', generation: 'previous' })
  })

  it('that can’t be had at all is told, and saving goes on', async () => {
    await store.save('first', [])
    await flipped(join(folder, 'state'), 20)
    await expect(store.load()).rejects.toMatchObject({ problem: { kind: 'cannot-read' } })
    await store.save('second', [])
    expect(await store.load()).toEqual({ text: 'second', generation: 'last' })
  })

  it('saved many times at once is the last of them', async () => {
    await Promise.all(Array.from({ length: 30 }, (_, n) => store.save(`state ${n}`, [])))
    expect(await store.load()).toEqual({ text: 'state 29', generation: 'last' })
    expect((await readdir(folder)).sort()).toEqual(['state', 'state.previous'])
  })

  it('has a largest size, counted in bytes', async () => {
    await store.save('a'.repeat(MAX_STATE_BYTES), [])
    await expect(store.save('ä'.repeat(MAX_STATE_BYTES / 2) + 'a', [])).rejects.toMatchObject({
      problem: { kind: 'bad-argument' },
    })
    await expect(store.save('{}', ['../../etc/hosts'])).rejects.toMatchObject({ problem: { kind: 'bad-argument' } })
    expect((await store.load())?.text).toHaveLength(MAX_STATE_BYTES)
  })

  it('that can’t be written leaves the last one', async () => {
    await store.save('first', [])
    await rm(join(folder, 'state.previous'), { force: true })
    await mkdir(join(folder, 'state.previous', 'in the way'), { recursive: true })
    await expect(store.save('second', [])).rejects.toThrow()
    expect(await store.load()).toEqual({ text: 'first', generation: 'last' })
    expect((await readdir(folder)).filter((name) => name.endsWith('.part'))).toEqual([])
  })
})

it('what a killed program left half written goes some time later', async () => {
  const longAgo = new Date(Date.now() - 2 * 3_600_000)
  for (const name of ['state.0123456789ab.part', 'state.ba9876543210.part', 'note.txt'])
    await writeFile(join(folder, name), '')
  for (const name of ['state.0123456789ab.part', 'note.txt']) await utimes(join(folder, name), longAgo, longAgo)
  await store.save('{}', [])
  expect((await readdir(folder)).sort()).toEqual(['note.txt', 'state', 'state.ba9876543210.part'])
})

describe('a kept file', () => {
  const bytes = new Uint8Array([1, 2, 3])

  it('comes back under a token that says nothing of it but its bytes', async () => {
    const token = await store.files.keep(bytes)
    expect(token).toMatch(/^[0-9a-f]{64}$/)
    expect(await store.files.keep(Uint8Array.from(bytes))).toBe(token)
    expect(await store.files.read(token)).toEqual(bytes)
  })

  it('is refused where it is damaged, gone, or no token is given', async () => {
    const token = await store.files.keep(bytes)
    await flipped(join(folder, 'kept', token), 0)
    for (const wrong of [token, '0'.repeat(64), '../state', '', token.toUpperCase()]) {
      await expect(store.files.read(wrong)).rejects.toMatchObject({ problem: { kind: 'cannot-read' } })
    }
  })

  it('goes when neither the last state nor the one before speaks of it, but not at once', async () => {
    const [a, b, c] = await Promise.all([1, 2, 3].map((n) => store.files.keep(new Uint8Array([n]))))
    const there = async () => (await readdir(join(folder, 'kept'))).sort()
    await store.save('1', [a])
    await store.save('2', [b])
    expect(await there()).toEqual([a, b, c].sort())
    const longAgo = new Date(Date.now() - 2 * 3_600_000)
    for (const token of [a, b, c]) await utimes(join(folder, 'kept', token), longAgo, longAgo)
    await store.save('3', [b])
    expect(await there()).toEqual([b].sort())
  })
})

it.each([
  [{ PERSQUARE_STATE_DIR: '/here', XDG_STATE_HOME: '/x' }, 'linux', /^\/here$/],
  [{ XDG_STATE_HOME: '/x' }, 'linux', /^\/x\/persquare$/],
  [{ XDG_STATE_HOME: 'relative' }, 'linux', /\/\.local\/state\/persquare$/],
  [{}, 'darwin', /\/\.local\/state\/persquare$/],
  [{ LOCALAPPDATA: '/local', XDG_STATE_HOME: '/x' }, 'win32', /^\/local\/persquare$/],
] as const)('with %j on %s, it is kept in %s', (env, platform, expected) => {
  expect(stateFolder(env, platform).replaceAll('\\', '/')).toMatch(expected)
})

/** A process that dies between any two of its instructions, two hundred times over. */
describe.runIf(process.platform !== 'win32')('killed while it saves', () => {
  const KILLS = 200
  const WRITER = join(import.meta.dirname, 'state-writer.mjs')
  let built: string
  beforeAll(async () => {
    const outDir = join(base, 'built')
    const entry = join(import.meta.dirname, '..', '..', '..', 'app', 'host', 'state-store.ts')
    await build({ configFile: false, logLevel: 'silent', build: { ssr: entry, outDir, rolldownOptions: { output: { entryFileNames: 'store.mjs' } } } }) // prettier-ignore
    built = pathToFileURL(join(outDir, 'store.mjs')).href
  })

  /** Starts a writer, kills it a while after its first save, and gives the last save that it said was done. */
  function runAndKill(folder: string, first: number, delay_ms: number): Promise<number> {
    return new Promise((resolve, reject) => {
      const child = spawn(process.execPath, [WRITER, built, folder, String(first)], { stdio: ['ignore', 'pipe', 'inherit'] })
      let said = ''
      child.stdout.on('data', (part: Buffer) => {
        if (said === '') setTimeout(() => child.kill('SIGKILL'), delay_ms)
        said += part.toString()
      })
      child.once('error', reject)
      child.once('close', () => {
        const done = said.split('\n').slice(0, -1)
        resolve(done.length > 0 ? Number(done.at(-1)) : first - 1)
      })
    })
  } // prettier-ignore

  interface Tally {
    kills: number
    /** Kills that fell into a save: what was under way is there, or it left something behind. */
    amid: number
  }

  async function killAgainAndAgain(folder: string, times: number, tally: Tally): Promise<void> {
    const store = new StateStore(folder)
    let next = 0
    for (let kill = 0; kill < times; kill++) {
      const done = await runAndKill(folder, next, (kill * 0.618034 * 20) % 20)
      const state = await store.load()
      const { n, filling } = JSON.parse(state!.text) as { n: number; filling: string }
      expect([done, done + 1], `kill ${kill}`).toContain(n)
      expect(filling).toBe(String.fromCharCode(97 + (n % 26)).repeat(((n * 7919) % 60) * 1000))
      if (n === done + 1 || state!.generation === 'previous') tally.amid++
      tally.kills++
      next = n + 1
    }
    tally.amid += (await readdir(folder)).filter((name) => name.endsWith('.part')).length
  }

  it(`${KILLS} times, a whole state is there afterwards: the last that was done, or the one then under way`, async () => {
    const tally: Tally = { kills: 0, amid: 0 }
    const lanes = Array.from({ length: 4 }, (_, lane) => join(folder, String(lane)))
    await Promise.all(lanes.map((lane) => killAgainAndAgain(lane, KILLS / lanes.length, tally)))
    expect(tally.kills).toBe(KILLS)
    expect(tally.amid).toBeGreaterThan(KILLS / 10)
  }, 240_000)
})
