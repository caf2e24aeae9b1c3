/** The built window in a real browser, served as people get it, with everything watched that must not happen. */
import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import type { Browser, BrowserContextOptions, Page } from 'playwright-core'
import { expect } from 'vitest'
import { startLoopbackHost } from '../../../app/browser/loopback-host'
import { builtPage } from '../browser/chromium'

const ROOT = join(import.meta.dirname, '..', '..', '..')

export const sample = (name: string): string => join(ROOT, 'sample-data', name)
export const lotFiles = (lot: string): readonly string[] => [sample(`${lot}.csv`), sample(`${lot}.procedure.json`)]

/** The lot with its uncertainties, its gauge study and its check wafer. */
export const trustFiles = (): readonly string[] =>
  ['TB-0417.csv', 'TB-0417-trust.procedure.json', 'station-2-gauge-study.csv', 'station-2-check-wafer.csv'].map(sample)

/** Where violations of the security policy are kept, in the page. */
interface Watched {
  violations: string[]
}

export interface Opening {
  readonly files?: readonly string[]
  readonly context?: BrowserContextOptions
}

/** Opens the window, lets `look` use it, and fails on any error in the console or breach of the policy. */
export async function withWindow(browser: Browser, opening: Opening, look: (page: Page) => Promise<void>): Promise<void> {
  const stateFolder = await mkdtemp(join(tmpdir(), 'persquare-window-'))
  const host = await startLoopbackHost({
    port: 0,
    root: builtPage(),
    files: opening.files ?? [],
    demo: lotFiles('TB-0417'),
    stateFolder,
    program: { program: 'Persquare', version: '0.0.0' },
  })
  const context = await browser.newContext({ viewport: { width: 1280, height: 720 }, acceptDownloads: true, ...opening.context })
  const page = await context.newPage()
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
    await context.close()
    await host.close()
    // A last state may still be on its way.
    await rm(stateFolder, { recursive: true, force: true, maxRetries: 5, retryDelay: 100 })
  }
} // prettier-ignore

/** Drops files on the page as a person would. */
export async function drop(page: Page, files: readonly { readonly name: string; readonly text: string }[]): Promise<void> {
  const transfer = await page.evaluateHandle((list) => {
    const held = new DataTransfer()
    for (const { name, text } of list) held.items.add(new File([text], name))
    return held
  }, files)
  await page.dispatchEvent('body', 'drop', { dataTransfer: transfer })
} // prettier-ignore

/** The lot's page is there, with its maps painted. */
export async function lotIsOpen(page: Page): Promise<void> {
  await page.getByRole('listbox', { name: 'Cassette' }).waitFor()
  await page.waitForFunction(() => performance.getEntriesByName('persquare:small-map').length > 0)
}
