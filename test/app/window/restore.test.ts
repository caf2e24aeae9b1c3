import type { Browser } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { hasChromium, launchChromium } from '../browser/chromium'
import { lotFiles, lotIsOpen, withWindow } from './open-window'

describe.skipIf(!hasChromium())('after a crash', () => {
  let browser: Browser
  beforeAll(async () => void (browser = await launchChromium()))
  afterAll(() => browser.close())

  it('the lot, the choices, the decision and the place are there again', () =>
    withWindow(browser, { files: lotFiles('TB-0417') }, async (page) => {
      await lotIsOpen(page)
      await page.keyboard.press('n')
      await page.getByRole('heading', { name: /^Working of wafer 07/ }).waitFor()
      await page.keyboard.press('x')
      await page.getByLabel('Reason').fill('scratch')
      await page.getByRole('button', { name: 'Exclude the site' }).click()
      await page.getByText('This site was excluded by a person').waitFor()
      await page.keyboard.press('6')
      await page.getByRole('radio', { name: 'Measure again' }).check()
      await page.getByLabel('Name').fill('R. Aldous')
      // A moment after the last change everything is on the disk.
      await page.waitForTimeout(1500)
      await page.reload()
      await page.getByRole('heading', { level: 1, name: /^TB-0417 is out of spec/ }).waitFor()
      await page.getByRole('heading', { name: 'Your decision' }).waitFor()
      expect(await page.getByRole('radio', { name: 'Measure again' }).isChecked()).toBe(true)
      expect(await page.getByLabel('Name').inputValue()).toBe('R. Aldous')
      expect(await page.getByText('1 excluded by a person').isVisible()).toBe(true)
      expect(await page.getByText('not handed over yet').isVisible()).toBe(true)
      await page.keyboard.press('3')
      await page.getByText('This site was excluded by a person').waitFor()
    }))
}) // prettier-ignore
