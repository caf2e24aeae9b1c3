import type { Browser } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { hasChromium, launchChromium } from '../browser/chromium'
import { lotFiles, lotIsOpen, withWindow } from './open-window'

const TOLD = 'Another window keeps its own lot now.'

describe.skipIf(!hasChromium())('the same lot in two windows', () => {
  let browser: Browser
  beforeAll(async () => void (browser = await launchChromium()))
  afterAll(() => browser.close())

  it(
    'the one that isn’t kept any more says so, the other goes on, and what it kept comes back',
    { timeout: 120_000 },
    () =>
      withWindow(browser, { files: lotFiles('TB-0417') }, async (first) => {
        await lotIsOpen(first)
        await first.waitForTimeout(1500)
        const second = await first.context().newPage()
        await second.goto(first.url())
        await lotIsOpen(second)
        await first.keyboard.press('6')
        await first.getByLabel('Name').fill('R. Aldous')
        await first.waitForTimeout(1500)
        // Not watched for what its console says: a refusal is an answer that a browser notes there.
        await second.keyboard.press('6')
        await second.getByLabel('Name').fill('K. Imber')
        await second.getByText(TOLD).waitFor()
        expect(await second.getByLabel('Name').inputValue()).toBe('K. Imber')
        expect(await first.getByText(TOLD).count()).toBe(0)
        await first.getByLabel('Name').fill('R. Aldous, shift B')
        await first.waitForTimeout(1500)
        await first.reload()
        await first.getByRole('heading', { name: 'Your decision' }).waitFor()
        expect(await first.getByLabel('Name').inputValue()).toBe('R. Aldous, shift B')
      }),
  )
})
