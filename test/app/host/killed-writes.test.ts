/**
 * Processes that die between any two of their instructions while they write a report with its exports, a procedure, or the
 * files of an open lot. `PERSQUARE_KILLS=5000` looks longer; the moments are the same in every run. (The state itself is
 * killed in state-store.test.ts.)
 */
import { createHash } from 'node:crypto'
import { spawn } from 'node:child_process'
import { mkdir, mkdtemp, readdir, readFile, rm, utimes, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { outputFiles } from '../../../app/cli/output-files'
import { writeWhole } from '../../../app/host/write-whole'
import { run } from '../../../core/analysis/run'
import { buildWriters } from './build-writers'

const SAMPLES = join(import.meta.dirname, '..', '..', '..', 'sample-data')
const KILLS = Number(process.env['PERSQUARE_KILLS'] ?? 160)
const LANES = 3
const PATIENCE_ms = 60_000 + KILLS * 500
const PART = /\.[0-9a-f]{12}\.part$/

let base: string
let writers: string
beforeAll(async () => {
  base = await mkdtemp(join(tmpdir(), 'persquare-'))
  writers = await buildWriters(join(base, 'built'))
})
afterAll(() => rm(base, { recursive: true }))

/** Starts a writer and kills it a while after its first word; gives its words. */
function runAndKill(args: readonly string[], delay_ms: number): Promise<readonly string[]> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, [writers, ...args], { stdio: ['ignore', 'pipe', 'inherit'] })
    let said = ''
    child.stdout.on('data', (part: Buffer) => {
      if (said === '') setTimeout(() => child.kill('SIGKILL'), delay_ms)
      said += part.toString()
    })
    child.once('error', reject)
    child.once('close', (_, signal) => {
      if (signal === 'SIGKILL') resolve(said.split('\n').slice(0, -1))
      else reject(new Error('the writer ended by itself'))
    })
  })
}

/** Spread evenly over the span, in an order without a pattern. */
const moment_ms = (kill: number, span_ms: number): number => (kill * 0.618034 * span_ms) % span_ms

type Version = ReadonlyMap<string, Uint8Array | string>

async function versionsIn(folder: string, versions: readonly Version[]): Promise<readonly string[]> {
  const folders = versions.map((_, n) => join(folder, `version-${n}`))
  for (const [n, version] of versions.entries()) await writeWhole(folders[n], version)
  return folders
}

interface Tally {
  kills: number
  /** Kills that left something half written beside, or some files new and some old. */
  amid: number
}

/** Each file is that of one version, whole, and beside them lies nothing but what bears the mark of a part. */
async function expectWhole(folder: string, versions: readonly Version[], tally: Tally): Promise<void> {
  const names = await readdir(folder)
  const whole = names.filter((name) => !PART.test(name))
  const parts = names.filter((name) => PART.test(name))
  expect(whole.sort()).toEqual([...versions[0].keys()].sort())
  for (const part of parts) expect(whole).toContain(part.replace(PART, ''))
  const found = new Set<number>()
  for (const name of whole) {
    const bytes = await readFile(join(folder, name))
    const version = versions.findIndex((one) => Buffer.from(one.get(name)! as Uint8Array).equals(bytes))
    expect(version, `${name}, ${bytes.length} bytes`).toBeGreaterThanOrEqual(0)
    found.add(version)
  }
  tally.kills++
  if (parts.length > 0 || found.size > 1) tally.amid++
  await Promise.all(parts.map((part) => rm(join(folder, part))))
}

async function killAgainAndAgain(name: string, versions: readonly Version[], kills: number): Promise<Tally> {
  const tally: Tally = { kills: 0, amid: 0 }
  const sources = await versionsIn(join(base, name), versions)
  const lane = async (at: number): Promise<void> => {
    const folder = join(base, name, `lane-${at}`)
    for (let kill = at; kill < kills; kill += LANES) {
      await runAndKill(['versions', folder, ...sources], moment_ms(kill, 25))
      await expectWhole(folder, versions, tally)
    }
  }
  await Promise.all(Array.from({ length: LANES }, (_, at) => lane(at)))
  return tally
}

/** Two lots of the same names and other contents: of all the readings, and of the first hundred. */
async function outputs(lines: number): Promise<Version> {
  const file = async (name: string) => ({ name, bytes: new Uint8Array(await readFile(join(SAMPLES, name))), sha256: '00' })
  const procedure = await file('TB-0417.procedure.json')
  const csv = await file('TB-0417.csv')
  const text = new TextDecoder().decode(csv.bytes).split('\n').slice(0, lines).join('\n') + '\n'
  const readings = [{ ...csv, bytes: new TextEncoder().encode(text) }]
  const { analysis } = run({ readings, procedure })
  const made = await outputFiles(analysis!, { readings, procedure, companions: [] }, { write: ['json', 'sites', 'dies', 'pdf'], date: null, paper: 'A4' }) // prettier-ignore
  return new Map([...made].map(([name, content]) => [name, Buffer.from(content)]))
} // prettier-ignore

describe.runIf(process.platform !== 'win32')('killed while it writes', () => {
  it(
    'a report and its exports: each is the old or the new one',
    async () => {
      const kills = Math.round(KILLS / 2)
      const tally = await killAgainAndAgain('exports', [await outputs(Infinity), await outputs(120)], kills)
      expect(tally.kills).toBe(kills)
      expect(tally.amid).toBeGreaterThan(kills / 10)
    },
    PATIENCE_ms,
  )

  it(
    'a procedure: it is the old or the new one',
    async () => {
      const kills = Math.round(KILLS / 4)
      const whole = await readFile(join(SAMPLES, 'TB-0417.procedure.json'), 'utf8')
      const versions = [whole, JSON.stringify(JSON.parse(whole))].map((text) => new Map([['own.json', Buffer.from(text)]]))
      const tally = await killAgainAndAgain('procedure', versions, kills)
      expect(tally.kills).toBe(kills)
      expect(tally.amid).toBeGreaterThan(0)
    },
    PATIENCE_ms,
  ) // prettier-ignore

  it(
    'the files of an open lot: under each token lie the bytes that it stands for',
    async () => {
      const kills = Math.round(KILLS / 4)
      const folder = join(base, 'kept')
      await mkdir(folder)
      let next = 0
      for (let kill = 0; kill < kills; kill++) {
        const said = await runAndKill(['keep', folder, String(next)], moment_ms(kill, 25))
        next += said.length + 1
        const names = await readdir(join(folder, 'kept'))
        const tokens = names.filter((name) => !PART.test(name))
        expect(tokens).toEqual(expect.arrayContaining([...said]))
        for (const token of tokens) {
          const bytes = await readFile(join(folder, 'kept', token))
          expect(createHash('sha256').update(bytes).digest('hex')).toBe(token)
        }
        await Promise.all(names.map((name) => rm(join(folder, 'kept', name))))
      }
    },
    PATIENCE_ms,
  )
})

it('what a killed export left goes with a later one, and nothing else does', async () => {
  const folder = await mkdtemp(join(base, 'left-'))
  const old = ['report.pdf.0123456789ab.part', 'other.pdf.0123456789ab.part', 'report.pdf.part', 'report.pdf.0123.part']
  const fresh = 'report.pdf.ba9876543210.part'
  for (const name of [...old, fresh]) await writeFile(join(folder, name), 'half')
  const longAgo = new Date(Date.now() - 2 * 3_600_000)
  for (const name of old) await utimes(join(folder, name), longAgo, longAgo)
  await writeWhole(folder, new Map([['report.pdf', 'whole']]))
  expect((await readdir(folder)).sort()).toEqual([...old.slice(1), fresh, 'report.pdf'].sort())
})
