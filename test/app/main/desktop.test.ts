/** The built program in the real Electron, on a computer that has its runtime and a screen; elsewhere it says why not. */
import { spawn } from 'node:child_process'
import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { _electron, type ElectronApplication, type Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { electronRuntime } from '../../../app/cli/electron-runtime'
import type { Host } from '../../../app/contract/host'

const ROOT = join(import.meta.dirname, '..', '..', '..')
const sample = (name: string) => join(ROOT, 'sample-data', name)

const runtime = await electronRuntime()

function whyNot(): string | null {
  if (runtime === null) return 'Electron’s runtime is not installed here (npm ci without --ignore-scripts fetches it)'
  if (process.platform === 'linux' && !process.env['DISPLAY'] && !process.env['WAYLAND_DISPLAY'])
    return 'there is no screen (run it under xvfb-run, or set DISPLAY)'
  return null
}
const reason = whyNot()
if (reason !== null) console.warn(`Skipped: the desktop program was not started: ${reason}.`)

describe.skipIf(reason !== null)('the desktop program', () => {
  let profile: string
  let app: ElectronApplication
  let page: Page
  const args = (...files: readonly string[]) => [
    ROOT,
    ...(process.getuid?.() === 0 ? ['--no-sandbox'] : []),
    `--user-data-dir=${profile}`,
    '--',
    ...files,
  ]
  beforeAll(async () => {
    profile = await mkdtemp(join(tmpdir(), 'persquare-'))
    const files = [sample('TB-0417.csv'), sample('TB-0417.procedure.json')]
    app = await _electron.launch({ executablePath: runtime!, args: args(...files) })
    page = await app.firstWindow()
  })
  afterAll(async () => {
    await app?.close()
    await rm(profile, { recursive: true, force: true })
  })

  it('opens the files that it was started with', async () => {
    await page
      .getByText(/^TB-0417 is /)
      .first()
      .waitFor()
    expect(page.url()).toBe('app://persquare/index.html')
  })

  it('has a page without Node, and with the host alone', async () => {
    const seen = await page.evaluate(() => ({
      require: 'require' in window,
      process: 'process' in window,
      kind: (window as unknown as { host: Host }).host.kind,
      evaluates: (() => {
        try {
          return new Function('return true')() as boolean
        } catch {
          return false
        }
      })(),
    }))
    expect(seen).toEqual({ require: false, process: false, kind: 'electron', evaluates: false })
  })

  it('makes a report and keeps a state, by its own processes', async () => {
    const made = await page.evaluate(async () => {
      const { host } = window as unknown as { host: Host }
      const demo = await host.demoFiles()
      if (!demo.ok) return demo
      const [csv, procedure] = demo.value
      const terms = { excluded: [], decision: null, date: null, paper: 'A4' } as const
      const report = await host.makeReport({ readings: [csv!], procedure: procedure!, ...terms })
      const saved = await host.saveState('{"smoke":1}', [])
      return { report: report.ok && report.value.length, saved, state: await host.loadState() }
    })
    expect(made).toMatchObject({ saved: { ok: true }, state: { ok: true } })
    expect((made as { report: number }).report).toBeGreaterThan(10_000)
  })

  it('takes the files of a second start, which ends', async () => {
    const code = await new Promise((resolve, reject) => {
      const second = spawn(runtime!, args(sample('TB-0522.csv'), sample('TB-0522.procedure.json')), { stdio: 'ignore' })
      second.once('error', reject)
      second.once('exit', resolve)
    })
    expect(code).toBe(0)
    expect(app.windows()).toHaveLength(1)
  })
})
