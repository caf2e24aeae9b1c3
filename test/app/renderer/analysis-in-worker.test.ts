/** The analyzer with its real worker, in a real browser, under the page's own security policy. */
import { mkdir, mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import type { Browser, Page } from 'playwright-core'
import { build } from 'vite'
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { startLoopbackHost, type LoopbackHost } from '../../../app/browser/loopback-host'
import type { createAnalyzer } from '../../../app/renderer/analysis'
import { compareResults } from '../../../core/analysis/compare-results'
import { resultJson } from '../../../core/analysis/result-json'
import { sampleBytes, sampleLot } from '../../core/analysis/lots'
import { hasChromium, launchChromium } from '../browser/chromium'
import { loopbackSettings } from '../browser/loopback-settings'

/** What the page under test shows to its test. */
interface Shown {
  createAnalyzer: typeof createAnalyzer
  resultJson: typeof resultJson
  violations: string[]
  /** `count` rows that take a while, and the bundled lot's procedure. */
  largeCsv(count: number): Uint8Array
}

const ROOT = join(import.meta.dirname, '..', '..', '..')
const ENTRY = `
import { createAnalyzer } from ${JSON.stringify(join(ROOT, 'app', 'renderer', 'analysis.ts'))}
import { resultJson } from ${JSON.stringify(join(ROOT, 'core', 'analysis', 'result-json.ts'))}
const violations = []
document.addEventListener('securitypolicyviolation', (event) => violations.push(event.violatedDirective))
function largeCsv(count) {
  const rows = ['wafer,site,x_mm,y_mm,current_A,voltage_V']
  for (let i = 0; i < count; i++) rows.push([1 + (i % 25), i + 1, (Math.floor(i / 25) % 160) * 0.6 - 48, Math.floor(i / 4000) * 0.6 - 48, 5e-4, 0.0101 + (i % 7) * 1e-5].join())
  return new TextEncoder().encode(rows.join('\\n'))
}
Object.assign(window, { createAnalyzer, resultJson, violations, largeCsv })
`

function isRounding(before: unknown, after: unknown): boolean {
  if (typeof before !== 'number' || typeof after !== 'number') return false
  return Math.abs(before - after) <= 1e-9 * Math.max(Math.abs(before), Math.abs(after))
}

describe.skipIf(!hasChromium())('the analysis in its worker', () => {
  let browser: Browser
  let folder: string
  let host: LoopbackHost
  let page: Page
  beforeAll(async () => {
    folder = await mkdtemp(join(tmpdir(), 'persquare-'))
    const root = join(folder, 'source')
    await mkdir(root)
    await writeFile(join(root, 'index.html'), '<!doctype html><script type="module" src="./entry.js"></script>')
    await writeFile(join(root, 'entry.js'), ENTRY)
    await build({
      configFile: false,
      logLevel: 'error',
      root,
      base: './',
      worker: { format: 'es' },
      build: { outDir: join(folder, 'page') },
    })
    browser = await launchChromium()
    host = await startLoopbackHost(loopbackSettings(folder, { root: join(folder, 'page') }))
  }, 120_000)
  afterAll(async () => {
    await browser.close()
    await host.close()
    await rm(folder, { recursive: true })
  })
  beforeEach(async () => {
    page = await browser.newPage()
    page.setDefaultTimeout(15_000)
    await page.goto(host.url)
    await page.waitForFunction(() => 'createAnalyzer' in window)
  })
  afterEach(async () => {
    expect(await page.evaluate(() => (window as unknown as Shown).violations)).toEqual([])
    await page.close()
  })

  const lot = ['TB-0417.csv', 'TB-0417.procedure.json'].map((name) => ({
    name,
    text: new TextDecoder().decode(sampleBytes(name)),
  }))

  it('gives what it gives everywhere, and the same again and again', async () => {
    const texts = await page.evaluate(async (files) => {
      const { createAnalyzer, resultJson } = window as unknown as Shown
      const [csv, procedure] = files.map(({ name, text }) => ({ name, bytes: new TextEncoder().encode(text) }))
      const analyzer = createAnalyzer()
      const found: string[] = []
      for (let turn = 0; turn < 3; turn++) {
        const result = await analyzer.analyze([csv!], procedure!).result
        found.push(resultJson(result!.analysis!, { program: 'Persquare', version: '9' }))
      }
      return [...found, `${csv!.bytes.length}`]
    }, lot)
    expect(texts[0]).toBe(texts[1])
    expect(texts[1]).toBe(texts[2])
    const here = resultJson(sampleLot('TB-0417'), { program: 'Persquare', version: '9' })
    const { differences } = compareResults(JSON.parse(here), JSON.parse(texts[0]!), { limit: 1e6 })
    // Another edition of the engine may round a sine or a power otherwise, in the last digits and nowhere else.
    const real = differences.filter(({ before, after }) => !isRounding(before, after))
    expect(real).toEqual([])
    // The page still has the files: a report is made of them.
    expect(Number(texts[3])).toBe(sampleBytes('TB-0417.csv').length)
  })

  it('takes a site out, and back in', async () => {
    const counts = await page.evaluate(async (files) => {
      const { createAnalyzer } = window as unknown as Shown
      const [csv, procedure] = files.map(({ name, text }) => ({ name, bytes: new TextEncoder().encode(text) }))
      const analyzer = createAnalyzer()
      const count = async (excluded: { wafer: string; site: string; reason: string }[]) =>
        (await analyzer.analyze([csv!], procedure!, { excluded }).result)!.analysis!.wafers[0]!.statistics.count
      const [whole, without] = [await count([]), await count([{ wafer: '01', site: '1', reason: 'scratch' }])]
      return [whole, without, await count([])]
    }, lot)
    expect(counts[1]).toBe(counts[0]! - 1)
    expect(counts[2]).toBe(counts[0])
  })

  it('tells of the progress, and leaves the page free meanwhile', async () => {
    const { progress, ticks, rows } = await page.evaluate(async (procedureText) => {
      const { createAnalyzer, largeCsv } = window as unknown as Shown
      const procedure = { name: 'p.json', bytes: new TextEncoder().encode(procedureText) }
      const csv = { name: 'large.csv', bytes: largeCsv(200_000) }
      let ticks = 0
      const timer = setInterval(() => ticks++, 10)
      const progress: { stage: string; share: number; rows: number }[] = []
      const running = createAnalyzer().analyze([csv], procedure)
      running.progress((told) => progress.push(told))
      const result = await running.result
      clearInterval(timer)
      return { progress, ticks, rows: result!.analysis!.sites.count }
    }, lot[1]!.text)
    expect(rows).toBe(200_000)
    const reading = progress.filter(({ stage }) => stage === 'reading')
    expect(reading.length).toBeGreaterThan(3)
    expect(reading.map(({ share }) => share)).toEqual(reading.map(({ share }) => share).sort((a, b) => a - b))
    expect(reading.at(-1)).toEqual({ stage: 'reading', share: 1, rows: 200_000 })
    expect([...new Set(progress.map(({ stage }) => stage))]).toEqual(['reading', 'correcting', 'mapping', 'judging'])
    expect(ticks).toBeGreaterThan(5)
  })

  it('is cancelled at once in the midst of a run, and the next runs', async () => {
    const outcome = await page.evaluate(async (files) => {
      const { createAnalyzer, largeCsv } = window as unknown as Shown
      const [csv, procedure] = files.map(({ name, text }) => ({ name, bytes: new TextEncoder().encode(text) }))
      const analyzer = createAnalyzer()
      const large = analyzer.analyze([{ name: 'large.csv', bytes: largeCsv(400_000) }], procedure!)
      await new Promise<void>((resolve) => large.progress(() => resolve()))
      const start = performance.now()
      large.cancel()
      const cancelled = await large.result
      const wait_ms = performance.now() - start
      const superseded = analyzer.analyze([{ name: 'large.csv', bytes: largeCsv(400_000) }], procedure!)
      const newest = await analyzer.analyze([csv!], procedure!).result
      return { cancelled, wait_ms, superseded: await superseded.result, lot: newest!.analysis!.lot.name }
    }, lot)
    expect(outcome).toMatchObject({ cancelled: null, superseded: null, lot: 'TB-0417' })
    expect(outcome.wait_ms).toBeLessThan(200)
  })
})
