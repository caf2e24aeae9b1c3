import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { startLoopbackHost } from '../../../app/browser/loopback-host'
import { loopbackSettings } from './loopback-settings'
import { builtPage, hasChromium, launchChromium } from './chromium'

const sample = (name: string): string => join(import.meta.dirname, '..', '..', '..', 'sample-data', name)

/** Where violations of the security policy are kept, in the page. */
interface Watched {
  violations: string[]
}

describe.skipIf(!hasChromium())('the window in a browser', () => {
  let browser: Browser
  let folder: string
  beforeAll(async () => {
    browser = await launchChromium()
    folder = await mkdtemp(join(tmpdir(), 'persquare-'))
  })
  afterAll(async () => {
    await browser.close()
    await rm(folder, { recursive: true })
  })

  async function open(files: readonly string[], look: (page: Page) => Promise<void>): Promise<void> {
    const own = await mkdtemp(join(folder, 'own-'))
    const host = await startLoopbackHost(loopbackSettings(own, { root: builtPage(), files }))
    const page = await browser.newPage()
    page.setDefaultTimeout(15_000)
    const complaints: string[] = []
    page.on('console', (message) => void (message.type() === 'error' && complaints.push(message.text())))
    page.on('pageerror', (error) => void complaints.push(error.message))
    await page.addInitScript(() => {
      const watched = window as unknown as Watched
      watched.violations = []
      document.addEventListener('securitypolicyviolation', (event) => {
        watched.violations.push(`${event.violatedDirective} ${event.blockedURI} ${event.sourceFile}`)
      })
    })
    try {
      await page.goto(host.url)
      await look(page)
      expect(await page.evaluate(() => (window as unknown as Watched).violations)).toEqual([])
      expect(complaints).toEqual([])
    } finally {
      await page.close()
      await host.close()
    }
  }

  it('begins empty and says what to do', () =>
    open([], async (page) => {
      await page.getByRole('heading', { level: 1, name: 'No lot is open' }).waitFor()
      expect(await page.getByText('Drop the prober’s CSV export and the procedure').isVisible()).toBe(true)
      expect(await page.getByRole('button').allTextContents()).toEqual(['Choose readings…', 'Choose procedure…'])
      expect(await page.title()).toBe('Persquare')
      expect(await page.getByRole('table').count()).toBe(0)
    }))

  it('shows the lot that it was started with, by the same core as everywhere', () =>
    open([sample('TB-0417.csv'), sample('TB-0417.procedure.json')], async (page) => {
      await page.getByRole('heading', { level: 1, name: /^TB-0417 is / }).waitFor()
      const rows = page.getByRole('table').getByRole('row')
      expect(await rows.count()).toBe(26)
      expect(await rows.nth(7).getByRole('rowheader').textContent()).toBe('07')
      expect(await page.getByRole('heading', { level: 2 }).allTextContents()).toEqual([
        'Wafers',
        expect.stringMatching(/^\s*Findings \d+$/),
      ])
    }))

  it('asks for the procedure when it has only readings', async () => {
    const readings = join(folder, 'TB-0417.csv')
    await writeFile(readings, 'wafer,site,v_over_i_ohm\n1,1,20.3\n')
    await open([readings], async (page) => {
      await page.getByRole('heading', { level: 1, name: 'The readings are here; the procedure is missing' }).waitFor()
      expect(await page.getByText('TB-0417.csv').isVisible()).toBe(true)
    })
  })

  it('explains what is wrong with a procedure', async () => {
    const readings = join(folder, 'TB-0417.csv')
    const procedure = join(folder, 'TB-0417.procedure.json')
    await writeFile(readings, 'wafer,site,v_over_i_ohm\n1,1,20.3\n')
    await writeFile(procedure, '{ "format": "persquare-procedure/1", "wafer": { "diametreMm": 200 } }')
    await open([readings, procedure], async (page) => {
      await page.getByRole('heading', { level: 1, name: 'These files could not be analysed' }).waitFor()
      expect(await page.getByRole('listitem').allTextContents()).toEqual([
        'TB-0417.procedure.json, wafer.diametreMm: A procedure has no such key. Was wafer.diameterMm meant?',
      ])
    })
  })
})
