import { existsSync } from 'node:fs'
import { join } from 'node:path'
import { chromium } from 'playwright-core'
import type { Browser } from 'playwright-core'

export const CHROMIUM_PATH = process.env['CHROMIUM'] ?? '/usr/bin/chromium'

/** Whether tests in a real browser can run; says why not. In continuous integration they must. */
export function hasChromium(): boolean {
  if (existsSync(CHROMIUM_PATH)) return true
  if (process.env['CI'] === 'true') throw new Error(`no Chromium at ${CHROMIUM_PATH}; set CHROMIUM to its path`)
  console.warn(
    `Skipped: there is no Chromium at ${CHROMIUM_PATH}. Set CHROMIUM to its path to run the tests in a browser.`,
  )
  return false
}

/** The folder of the built page; `npm test` builds it first. */
export function builtPage(): string {
  const folder = join(import.meta.dirname, '..', '..', '..', 'out', 'renderer')
  if (!existsSync(join(folder, 'index.html'))) throw new Error('the page is not built: run `npm run build` first')
  return folder
}

export function launchChromium(): Promise<Browser> {
  return chromium.launch({
    executablePath: CHROMIUM_PATH,
    args: [
      '--no-sandbox',
      '--disable-quic',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
      '--no-first-run',
    ],
  })
}
