/** The guided fuzzer: a short look without its guide, all that it ever found, and that it finds what is hidden. */
import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { runInNewContext } from 'node:vm'
import { describe, expect, it } from 'vitest'
import { openPdf } from '../../app/pdf/pdf-file'
import { readAttachments } from '../../app/pdf/read-attachments'
import { counted } from '../../build/fuzz/count-branches'
import { readReadings } from '../../core/ingest/read-files'
import { agreesWithPlainReading, readsTheSameOtherwise } from './guided/oracles'
import { searcher } from './guided/search'
import { PDF, PLAIN, TARGETS, type Target } from './guided/targets'

const ROOT = join(import.meta.dirname, '..', '..')
const KEPT = join(import.meta.dirname, 'corpus', 'guided')
const INPUTS = 400

describe.each(TARGETS.map((target) => [target.name, target] as const))('%s', (name, target) => {
  it(`${INPUTS} inputs hold`, () => {
    const { found, step } = searcher(target, { root: ROOT, seed: 417, branches: null })
    step(INPUTS)
    expect(found.failures.map(({ why, bytes }) => [why, Buffer.from(bytes).toString('latin1')])).toEqual([])
    expect(found.inputs).toBeGreaterThanOrEqual(INPUTS)
  })

  const folder = join(KEPT, name.replaceAll(' ', '-'))
  const files = existsSync(folder) ? readdirSync(folder) : []
  it.each(files)('%s, which once failed, holds', (kept) =>
    target.check(new Uint8Array(readFileSync(join(folder, kept)))),
  )
})

describe('the fuzzer itself', () => {
  /** A fault behind four steps, none of which shows from outside. */
  const HIDDEN = `check = (s) => { if (s[0] === 'q') { if (s[1] === 'u' && s[2] === 'a') { if (s[3] === 'y') throw new Error('found') } } }`
  const toy = (): { readonly target: Target; readonly branches: Uint8Array } => {
    const { text, count } = counted(HIDDEN)
    const branches = new Uint8Array(count)
    const context: Record<string, unknown> = { $n: branches, check: null, Error }
    runInNewContext(text, context)
    const check = (bytes: Uint8Array) =>
      (context['check'] as (text: string) => void)(Buffer.from(bytes).toString('latin1'))
    return { branches, target: { name: 'toy', seeds: () => [Buffer.from('....')], dictionary: [...'quay'], check } }
  }

  it('finds with its guide what it doesn’t find without', () => {
    const { target, branches } = toy()
    const guided = searcher(target, { root: ROOT, seed: 1, branches })
    const blind = searcher(target, { root: ROOT, seed: 1, branches: null })
    for (const { step } of [guided, blind]) step(60_000)
    expect(guided.found.failures.map(({ why }) => why.split('\n')[0])).toEqual(['found'])
    expect(blind.found.failures).toEqual([])
  })

  it('tells an input that takes too long', () => {
    const check = () => {
      const end = performance.now() + 1050
      while (performance.now() < end);
    }
    const { found } = searcher({ name: 'slow', seeds: () => [PLAIN], dictionary: ['x'], check }, { root: ROOT, seed: 1, branches: null }) // prettier-ignore
    expect(found.failures.map(({ why }) => why)).toEqual([expect.stringMatching(/^took \d+ ms$/)])
  })

  it('counting changes nothing in what a program does', () => {
    const program = `out = []; for (const n of [0, 1, 2, 3]) { switch (n) { case 0: case 1: out.push(n ? 'one' : 'zero'); break; default: if (n > 2) out.push('more'); else out.push(n === 2 && (n || 5)) } }`
    const run = (text: string, branches = new Uint8Array(0)) => {
      const context = { out: [] as unknown[], $n: branches }
      runInNewContext(text, context)
      return JSON.stringify(context.out)
    }
    const { text, count } = counted(program)
    const branches = new Uint8Array(count)
    expect(run(text, branches)).toBe(run(program))
    expect([...branches].reduce((sum, hits) => sum + hits, 0)).toBeGreaterThan(count)
  })

  it('begins from sound files', () => {
    expect(readAttachments(openPdf(PDF)).map(({ name, bytes }) => [name, Buffer.from(bytes).toString()])).toEqual([['a.csv', '1,2\n']]) // prettier-ignore
    expect(readReadings([{ name: 'a.csv', bytes: PLAIN, sha256: '00' }])).toMatchObject({
      readings: { count: 3 },
      problems: [],
    })
  })

  it('has second opinions that object', () => {
    const { readings } = readReadings([{ name: 'a.csv', bytes: PLAIN, sha256: '00' }])
    agreesWithPlainReading(PLAIN, readings)
    readsTheSameOtherwise(PLAIN, readings)
    const wrong = { ...readings!, voltage_V: readings!.voltage_V!.map((value) => value * (1 + 1e-15)) }
    expect(() => agreesWithPlainReading(PLAIN, wrong)).toThrow('row 2')
    expect(() => readsTheSameOtherwise(PLAIN, wrong)).toThrow('read otherwise')
    expect(() => agreesWithPlainReading(PLAIN, null)).toThrow('sites')
  })
})
