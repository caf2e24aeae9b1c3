/** The pages that tell how far a lot and its prober can be trusted, used as a person would. */
import { readFile } from 'node:fs/promises'
import type { Browser, Download, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { hasChromium, launchChromium } from '../browser/chromium'
import { CHECK_WAFER_137, PROBE_2362 } from '../../reference/nist-gauge-study'
import { drop, lotIsOpen, trustFiles, withWindow } from './open-window'

const NIST = new URL('../../reference/nist/', import.meta.url)
const nist = (name: string): Promise<string> => readFile(new URL(name, NIST), 'utf8')

async function saved(page: Page, button: string): Promise<string> {
  const [download] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('button', { name: button }).click(),
  ])
  return readFile(await (download as Download).path(), 'utf8')
}

describe.skipIf(!hasChromium())('trust', () => {
  let browser: Browser
  beforeAll(async () => void (browser = await launchChromium()))
  afterAll(() => browser.close())

  it('shows the budget of the selected site, and holds it against draws that can be cancelled', () =>
    withWindow(browser, { files: trustFiles() }, async (page) => {
      await lotIsOpen(page)
      await page.keyboard.press('5')
      await page.getByRole('heading', { name: /^Budget at site/ }).waitFor()
      await page.getByRole('combobox', { name: /^Wafer/ }).selectOption('wafer 19')
      await page.getByRole('combobox', { name: /^Site/ }).selectOption({ label: '31' })
      await page.getByRole('heading', { name: 'Budget at site 31 of wafer 19' }).waitFor()
      const budget = page.getByRole('table', { name: 'Uncertainty budget of one site' })
      expect(await budget.getByRole('row', { name: /^each pin spacing/ }).count()).toBe(1)

      await page.getByLabel('Trials').fill('2000000')
      await page.getByRole('button', { name: 'Draw' }).click()
      await page.getByRole('button', { name: 'Cancel' }).click()
      expect(await page.getByRole('progressbar').count()).toBe(0)
      await page.getByLabel('Trials').fill('10')
      expect(await page.getByRole('alert').filter({ hasText: 'a number from 1000' }).count()).toBe(1)
      await page.getByLabel('Trials').fill('20000')
      await page.getByRole('button', { name: 'Draw' }).click()
      const held = page.getByRole('table', { name: 'First-order budget and Monte Carlo calculation of one site' })
      await held.waitFor()
      const [firstOrder, drawn] = await Promise.all([/^first order/, /^Monte Carlo, 20 000 trials/].map((name) => held.getByRole('row', { name }).textContent()))
      const u = (row: string | null): number => Number(/Ω\/sq\s*([\d.]+) Ω\/sq/.exec(row ?? '')![1])
      expect(u(drawn) / u(firstOrder)).toBeGreaterThan(0.97)
      expect(u(drawn) / u(firstOrder)).toBeLessThan(1.03)

      // Another site is another question.
      await page.getByRole('combobox', { name: /^Site/ }).selectOption({ label: '1' })
      expect(await held.count()).toBe(0)
    }))

  it('tells the risks of every rule, and what it would change here', () =>
    withWindow(browser, { files: trustFiles() }, async (page) => {
      await lotIsOpen(page)
      await page.keyboard.press('5')
      await page.getByRole('tab', { name: 'Risk' }).click()
      const counts = page.getByRole('table', { name: /under each decision rule/ })
      // One of the sites has no value.
      const cells = await counts.getByRole('row', { name: /^stringent/ }).getByRole('cell').allTextContents()
      expect(cells.slice(0, 4).map(Number).reduce((sum, n) => sum + n, 0)).toBe(25 * 49 - 1)
      expect(cells[3]).toBe('0')
    }))

  it('says what is unsound in the readings, and goes there', () =>
    withWindow(browser, { files: trustFiles() }, async (page) => {
      await lotIsOpen(page)
      await page.keyboard.press('5')
      await page.getByRole('tab', { name: 'Readings' }).click()
      await page.getByText(/^Site 31 of wafer 19 reads 23/).waitFor()
      await page.getByRole('button', { name: /^Go there: Site 31 of wafer 19/ }).click()
      await page.getByRole('heading', { name: /^Working of wafer 19/ }).waitFor()
    }))

  it('fits the surface between the sites of a chosen wafer, and tells its error', () =>
    withWindow(browser, { files: trustFiles() }, async (page) => {
      await lotIsOpen(page)
      await page.keyboard.press('5')
      await page.getByRole('tab', { name: 'Map' }).click()
      const worst = page.getByRole('region', { name: 'Farthest from what the others say' })
      await worst.waitFor()
      await page.getByRole('combobox', { name: /^Wafer/ }).selectOption('wafer 19')
      await worst.getByRole('row').nth(1).filter({ hasText: /^31/ }).waitFor()
      expect(await page.getByRole('img', { name: /^Standard error of the map/ }).count()).toBe(1)
      expect(await page.getByText('Length scale').isVisible()).toBe(true)
    }))

  it('works out a gauge study without a lot: the NIST probes', () =>
    withWindow(browser, {}, async (page) => {
      await page.keyboard.press('7')
      await page.getByRole('heading', { name: 'What the file holds' }).waitFor()
      await drop(page, [{ name: 'gauge-study.csv', text: await nist('gauge-study.csv') }])
      await page.getByRole('table', { name: 'Bias of each probe against the mean of all' }).waitFor()
      const bias = await page.getByRole('row', { name: /^2362/ }).first().getByRole('cell').nth(1).textContent()
      expect(Math.abs(Number(bias!.replace('−', '-')) - PROBE_2362.bias.mean)).toBeLessThan(PROBE_2362.bias.half)
      await page.getByRole('combobox', { name: 'Probe' }).selectOption('2362')
      const object = JSON.parse(await saved(page, 'Save result (JSON)…')) as { components: { repeatability: { standardDeviation: number } } }
      const { standardDeviation, half } = PROBE_2362.repeatability
      expect(Math.abs(object.components.repeatability.standardDeviation - standardDeviation)).toBeLessThan(half)
    }))

  it('charts a check wafer without a lot, says what is wrong with a file, and takes the next', () =>
    withWindow(browser, {}, async (page) => {
      await page.keyboard.press('7')
      await page.getByRole('tab', { name: 'Check wafer' }).click()
      await drop(page, [{ name: 'notes.csv', text: 'a,b\n1,2\n' }])
      await page.getByRole('alert').filter({ hasText: 'notes.csv' }).waitFor()
      await drop(page, [{ name: 'check-wafer-137.csv', text: await nist('check-wafer-137.csv') }])
      await page.getByRole('heading', { name: 'Values of the check wafer' }).waitFor()
      const object = JSON.parse(await saved(page, 'Save result (JSON)…')) as Record<'centerLine' | 'lowerLimit' | 'upperLimit', number>
      for (const name of ['centerLine', 'lowerLimit', 'upperLimit'] as const) {
        expect(Math.abs(object[name] - CHECK_WAFER_137[name].value), name).toBeLessThan(CHECK_WAFER_137[name].half)
      }
      await page.getByLabel('Occasions that make the limits').fill('10')
      expect(await page.getByText(/Limits from the first 10 of 25 occasions/).count()).toBe(1)
    }))

  it('plans sites without a lot, and saves the plan that is chosen', () =>
    withWindow(browser, {}, async (page) => {
      await page.keyboard.press('8')
      const plans = page.getByRole('table', { name: /what each sees/ })
      await plans.waitFor()
      await plans.getByRole('button', { name: '3 circles' }).click()
      const text = await saved(page, 'Save this plan (CSV)…')
      expect(text.trim().split('\n')).toHaveLength(1 + 49)
      expect(text).toMatch(/^site,x_mm,y_mm,r_mm,theta_deg/)
      await page.getByRole('textbox', { name: 'Edge exclusion' }).fill('')
      await page.getByRole('alert').filter({ hasText: 'a number from 0' }).waitFor()
    }))
}) // prettier-ignore
