import { readFile } from 'node:fs/promises'
import { createRequire } from 'node:module'
import type { AxeResults } from 'axe-core'
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { hasChromium, launchChromium } from '../browser/chromium'
import { lotFiles, lotIsOpen, trustFiles, withWindow, type Opening } from './open-window'

/** Every page is gone through: on a busy machine that takes its time. */
const LONG_ms = 150_000
const windowOf = (files: readonly string[], colorScheme: 'light' | 'dark'): Opening => ({
  files,
  context: { colorScheme, reducedMotion: 'reduce', viewport: { width: 1280, height: 720 } },
})

const AXE = createRequire(import.meta.url).resolve('axe-core/axe.min.js')

describe.skipIf(!hasChromium())('accessibility', () => {
  let browser: Browser
  let source: string
  beforeAll(async () => {
    browser = await launchChromium()
    source = await readFile(AXE, 'utf8')
  })
  afterAll(() => browser.close())

  /** Through the browser's own console, so that the page's policy stays as it is. */
  async function violations(page: Page): Promise<string[]> {
    await page.evaluate(source)
    const { violations: found } = await page.evaluate(() => (window as unknown as { axe: { run(): Promise<AxeResults> } }).axe.run())
    return found.flatMap(({ id, nodes }) => nodes.map((node) => `${id}: ${node.html.slice(0, 160)} ${node.failureSummary?.split('\n')[1] ?? ''}`))
  }

  it.each(['light', 'dark'] as const)('finds no violation on the pages of the lot, %s', (colorScheme) =>
    withWindow(browser, windowOf(lotFiles('TB-0417'), colorScheme), async (page) => {
      await lotIsOpen(page)
      expect(await page.evaluate(() => document.documentElement.dataset['theme'])).toBe(colorScheme)
      expect(await violations(page), 'lot').toEqual([])
      await page.keyboard.press('n')
      await page.getByRole('heading', { name: /^Working of wafer/ }).waitFor()
      expect(await violations(page), 'working').toEqual([])
      for (const leaf of ['Figures', 'Sites', 'Findings']) {
        await page.getByRole('tab', { name: leaf }).click()
        expect(await violations(page), leaf).toEqual([])
      }
      await page.keyboard.press('Escape')
      await page.locator('h1').click()
      await page.keyboard.press('4')
      await page.locator('.js-plotly-plot .main-svg').first().waitFor()
      expect(await violations(page), 'layer').toEqual([])
      await page.keyboard.press('6')
      await page.getByRole('heading', { name: 'Your decision' }).waitFor()
      await page.waitForFunction(() => performance.getEntriesByName('persquare:report-page').length > 0, null, { timeout: 60_000 })
      expect(await violations(page), 'hand over').toEqual([])
      await page.getByRole('tab', { name: 'Text' }).click()
      expect(await violations(page), 'text of the report').toEqual([])
      await page.keyboard.press('1')
      await page.getByRole('heading', { name: 'Columns' }).waitFor()
      expect(await violations(page), 'files').toEqual([])
      await page.keyboard.press('?')
      await page.getByRole('dialog').waitFor()
      expect(await violations(page), 'keys').toEqual([])
    }), LONG_ms)

  it.each(['light', 'dark'] as const)('finds no violation on the pages of trust, gauge and plan, %s', (colorScheme) =>
    withWindow(browser, windowOf(trustFiles(), colorScheme), async (page) => {
      await lotIsOpen(page)
      await page.keyboard.press('5')
      await page.getByRole('button', { name: 'Draw' }).click()
      await page.getByRole('img', { name: /draws of site/ }).waitFor()
      expect(await violations(page), 'uncertainty').toEqual([])
      for (const tab of ['Risk', 'Readings']) {
        await page.getByRole('tab', { name: tab }).click()
        expect(await violations(page), tab).toEqual([])
      }
      await page.getByRole('tab', { name: 'Map' }).click()
      await page.getByRole('img', { name: /^Standard error of the map/ }).waitFor()
      expect(await violations(page), 'map').toEqual([])
      await page.keyboard.press('7')
      await page.getByRole('heading', { name: 'Gauge study' }).waitFor()
      expect(await violations(page), 'gauge study').toEqual([])
      await page.getByRole('tab', { name: 'Check wafer' }).click()
      expect(await violations(page), 'check wafer').toEqual([])
      await page.keyboard.press('8')
      await page.getByRole('table', { name: /what each sees/ }).waitFor()
      expect(await violations(page), 'plan').toEqual([])
    }), LONG_ms)

  it('finds none in the empty window', () =>
    withWindow(browser, {}, async (page) => {
      await page.getByRole('button', { name: 'Open the demo lot' }).waitFor()
      expect(await violations(page)).toEqual([])
    }))

  it('what is pressed is 40 pixels high', () =>
    withWindow(browser, { files: lotFiles('TB-0417') }, async (page) => {
      await lotIsOpen(page)
      await page.keyboard.press('3')
      await page.getByRole('region', { name: 'Wafer 07', exact: true }).waitFor()
      const low = await page.evaluate(() =>
        [...document.querySelectorAll('button, select, [role=option], label.check')]
          .filter((element) => element.checkVisibility() && element.getBoundingClientRect().height < 39.5)
          .map((element) => element.textContent?.trim()),
      )
      expect(low).toEqual([])
    }))
}) // prettier-ignore
