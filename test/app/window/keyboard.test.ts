import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { hasChromium, launchChromium } from '../browser/chromium'
import { lotFiles, lotIsOpen, withWindow } from './open-window'

const focused = (page: Page): Promise<string> =>
  page.evaluate(
    () => document.activeElement?.getAttribute('aria-label') ?? document.activeElement?.textContent?.trim() ?? '',
  )

describe.skipIf(!hasChromium())('the keyboard alone', () => {
  let browser: Browser
  beforeAll(async () => void (browser = await launchChromium()))
  afterAll(() => browser.close())

  it('opens the demo lot', () =>
    withWindow(browser, {}, async (page) => {
      await page.getByRole('button', { name: 'Open the demo lot' }).waitFor()
      for (let k = 0; k < 20 && (await focused(page)) !== 'Open the demo lot'; k++) await page.keyboard.press('Tab')
      await page.keyboard.press('Enter')
      await lotIsOpen(page)
    }))

  it('goes through a whole lot, in and out, and shows where the focus is', () =>
    withWindow(browser, { files: lotFiles('TB-0417') }, async (page) => {
      await lotIsOpen(page)
      for (let k = 0; k < 30 && !(await focused(page)).startsWith('wafer 01'); k++) await page.keyboard.press('Tab')
      const outline = await page.evaluate(() => getComputedStyle(document.activeElement!).outlineStyle)
      expect(outline).not.toBe('none')
      await page.keyboard.press('ArrowRight')
      await page.keyboard.press('ArrowRight')
      expect(await focused(page)).toMatch(/^wafer 03/)
      await page.keyboard.press('Enter')
      await page.getByRole('region', { name: 'Wafer 03', exact: true }).waitFor()
      await page.keyboard.press(']')
      await page.getByRole('region', { name: 'Wafer 04', exact: true }).waitFor()
      await page.keyboard.press('Enter')
      await page.getByRole('heading', { name: /^Working of wafer 04, site 1 / }).waitFor()
      const before = await page.locator('.trail').textContent()
      await page.keyboard.press('ArrowRight')
      await page.waitForFunction((text) => document.querySelector('.trail')?.textContent !== text, before)
      expect(await page.locator('.trail').textContent()).toMatch(/x 31\.2 mm, y 0\.0 mm/)
      await page.keyboard.press('Escape')
      await page.getByText('Choose a site on the map').waitFor()
      await page.keyboard.press('Escape')
      await page.getByRole('heading', { name: /^Cassette/ }).waitFor()
    }))

  it('finds sites out of spec, and any wafer or site by name', () =>
    withWindow(browser, { files: lotFiles('TB-0417') }, async (page) => {
      await lotIsOpen(page)
      await page.keyboard.press('n')
      await page.getByRole('heading', { name: /^Working of wafer 07/ }).waitFor()
      const first = await page.locator('.trail').textContent()
      await page.keyboard.press('n')
      await page.waitForFunction((text) => document.querySelector('.trail')?.textContent !== text, first)
      await page.keyboard.press('p')
      await page.waitForFunction((text) => document.querySelector('.trail')?.textContent === text, first)
      await page.keyboard.press('/')
      await page.keyboard.type('12 31')
      await page.keyboard.press('Enter')
      await page.getByRole('heading', { name: /^Working of wafer 12, site 31 / }).waitFor()
    }))

  it('pages by number, changes the map, helps, and undoes', () =>
    withWindow(browser, { files: lotFiles('TB-0417') }, async (page) => {
      await lotIsOpen(page)
      await page.keyboard.press('3')
      await page.getByRole('region', { name: 'Wafer 07', exact: true }).waitFor()
      await page.keyboard.press('l')
      expect(await page.getByRole('combobox', { name: 'Map of' }).inputValue()).toBe('deviation')
      await page.keyboard.press('+')
      await page.keyboard.press('0')
      await page.keyboard.press('?')
      await page.getByRole('dialog', { name: 'Keyboard' }).waitFor()
      await page.keyboard.press('Escape')
      await page.getByRole('dialog').waitFor({ state: 'detached' })
      await page.keyboard.press('Enter')
      await page.keyboard.press('x')
      await page.getByRole('dialog').waitFor()
      await page.keyboard.type('scratch')
      await page.keyboard.press('Enter')
      await page.getByText('This site was excluded by a person').waitFor()
      await page.keyboard.press('Control+z')
      await page.getByText('This site was excluded by a person').waitFor({ state: 'detached' })
      await page.keyboard.press('6')
      await page.getByRole('heading', { name: 'Your decision' }).waitFor()
    }))

  it('leaves single letters alone where a person wants it so', () =>
    withWindow(browser, { files: lotFiles('TB-0417') }, async (page) => {
      await lotIsOpen(page)
      await page.keyboard.press('?')
      await page.getByRole('checkbox', { name: /by themselves are commands/ }).uncheck()
      await page.keyboard.press('Escape')
      await page.getByRole('dialog').waitFor({ state: 'detached' })
      await page.keyboard.press('3')
      await page.keyboard.press('n')
      expect(await page.getByRole('listbox', { name: 'Cassette' }).isVisible()).toBe(true)
      expect(await page.getByRole('heading', { name: /^Working of/ }).count()).toBe(0)
      await page.getByRole('button', { name: /Keys/ }).click()
      await page.getByRole('checkbox', { name: /by themselves are commands/ }).check()
      await page.keyboard.press('Escape')
      await page.getByRole('dialog').waitFor({ state: 'detached' })
      await page.keyboard.press('n')
      await page.getByRole('heading', { name: /^Working of wafer 07/ }).waitFor()
    }))
}) // prettier-ignore
