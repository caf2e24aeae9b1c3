/** Names that are markup, in the real window: they are shown as they are, nothing of them runs, the policy isn't even asked. */
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { hasChromium, launchChromium } from '../browser/chromium'
import { exportOf, MARKUP } from '../../security/hostile-names'
import { drop, lotIsOpen, withWindow } from './open-window'

const PROCEDURE = JSON.stringify({
  format: 'persquare-procedure/1',
  title: MARKUP[0],
  wafer: { diameterMm: 200 },
  probe: { spacingMm: 1 },
  limits: { sheetResistanceOhmSq: { lower: 87, upper: 97 } },
})

const ran = (page: Page) => page.evaluate(() => (window as unknown as { __ran?: number }).__ran ?? 0)
/** Elements that only the names could have brought. */
const strangers = (page: Page) => page.locator('img[src="x"], body script, svg[onload], a[href^="javascript"]').count()

describe.skipIf(!hasChromium())('hostile names', () => {
  let browser: Browser
  beforeAll(async () => void (browser = await launchChromium()))
  afterAll(() => browser.close())

  it('are text on every page of the window and in the report’s preview', () =>
    withWindow(browser, {}, async (page) => {
      const text = exportOf(MARKUP, MARKUP[0], MARKUP[1])
      await drop(page, [
        { name: `${MARKUP[0]}.csv`, text },
        { name: '<b>.procedure.json', text: PROCEDURE },
      ])
      await lotIsOpen(page)
      await page.getByText(MARKUP[0]).first().waitFor()
      const pages = page.getByRole('navigation', { name: 'Steps' }).getByRole('button')
      for (let at = 0; at < (await pages.count()); at++) {
        await pages.nth(at).click()
        await page.waitForTimeout(300)
        expect([await ran(page), await strangers(page)], String(at)).toEqual([0, 0])
      }
      expect(await page.evaluate(() => document.body.textContent)).toContain(MARKUP[0])
      const before = await pages.count()
      expect(before).toBeGreaterThan(3)
    }))
})
