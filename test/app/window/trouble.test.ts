import { readFile } from 'node:fs/promises'
import type { Browser } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { hasChromium, launchChromium } from '../browser/chromium'
import { drop, lotFiles, lotIsOpen, sample, withWindow } from './open-window'

const PROCEDURE = '{ "format": "persquare-procedure/1", "wafer": { "diameterMm": 200 }, "probe": { "spacingMm": 1 } }'

describe.skipIf(!hasChromium())('when something is wrong', () => {
  let browser: Browser
  beforeAll(async () => void (browser = await launchChromium()))
  afterAll(() => browser.close())

  it('asks for the procedure when it has only readings, and starts a new one', () =>
    withWindow(browser, { files: [sample('TB-0417.csv')] }, async (page) => {
      await page.getByRole('heading', { level: 1, name: 'The readings are here; the procedure is missing' }).waitFor()
      await page.getByRole('button', { name: 'start a new one' }).click()
      await page.getByRole('heading', { name: /^Procedure/ }).waitFor()
      // The lot is analysed by it at once, yet the form stays: there is much to fill in.
      await page.getByRole('heading', { level: 1, name: /TB-0417/ }).waitFor()
      expect(await page.getByRole('heading', { name: /^Procedure/ }).isVisible()).toBe(true)
    }))

  it('shows every bad row with the text that was found there', () =>
    withWindow(browser, {}, async (page) => {
      const rows = ['wafer,site,x_mm,y_mm,v_over_i_ohm', '1,1,0,0,20.3', '1,2,10,0,n/a', '1,3,20,0,20.4', '1,4,abc,0,20.2']
      await drop(page, [{ name: 'TB-0611.csv', text: rows.join('\n') }, { name: 'TB-0611.procedure.json', text: PROCEDURE }])
      await lotIsOpen(page)
      await page.getByRole('button', { name: /Files/ }).click()
      const table = page.getByRole('table', { name: /Rows that were left out/ })
      const cells = await table.getByRole('row').evaluateAll((list) => list.slice(1).map((row) => [...row.children].map((cell) => cell.textContent)))
      expect(cells.map(([line, column, found]) => [line, column, found])).toEqual([['3', 'v_over_i_ohm', 'n/a'], ['5', 'x_mm', 'abc']])
    }))

  it('says why a picture is no lot, and what a good file looks like', () =>
    withWindow(browser, {}, async (page) => {
      await page.getByText('What a good file looks like').waitFor()
      await drop(page, [{ name: 'photo.csv', text: '\u0000\u0001\u0002PNG' }, { name: 'TB-0611.procedure.json', text: PROCEDURE }])
      await page.getByRole('heading', { level: 1, name: 'These files could not be analysed' }).waitFor()
      expect(await page.getByRole('region', { name: /^Problems/ }).getByRole('listitem').first().textContent()).toMatch(/^photo\.csv/)
    }))

  it('lets a person say which column is which: it stands in the procedure', () =>
    withWindow(browser, {}, async (page) => {
      const text = ['wafer,site,x_mm,y_mm,alpha,beta', '1,1,0,0,20.3,1', '1,2,10,0,20.5,1', '1,3,20,0,20.4,1'].join('\n')
      await drop(page, [{ name: 'TB-0612.csv', text }, { name: 'TB-0612.procedure.json', text: PROCEDURE }])
      await page.getByRole('heading', { level: 1, name: 'These files could not be analysed' }).waitFor()
      await page.getByRole('combobox', { name: 'Column for alpha' }).selectOption('v_over_i_ohm')
      await lotIsOpen(page)
      await page.getByRole('button', { name: /Files/ }).click()
      await page.getByRole('checkbox', { name: 'as JSON' }).check()
      const written = JSON.parse(await page.getByRole('textbox', { name: 'Text of the procedure' }).inputValue()) as { readings: unknown }
      expect(written.readings).toEqual({ columns: { v_over_i_ohm: 'alpha' } })
    }))

  it('checks the procedure as it is typed, and takes it only when it is right', () =>
    withWindow(browser, { files: lotFiles('TB-0417') }, async (page) => {
      await lotIsOpen(page)
      await page.getByRole('button', { name: /Files/ }).click()
      const upper = page.getByRole('group').getByLabel(/^sheetResistanceOhmSq upper/)
      await upper.fill('85')
      await page.getByText(/Not taken yet: 1 to mend/).waitFor()
      expect(await page.getByRole('heading', { level: 1 }).textContent()).toContain('25 of 49 sites in')
      await upper.fill('110')
      await upper.press('Tab')
      await page.getByText('In order; every change takes effect at once.').waitFor()
      await page.waitForFunction(() => !document.querySelector('h1')?.textContent?.includes('25 of 49'))
      await page.getByRole('button', { name: 'Undo' }).click()
      await page.waitForFunction(() => document.querySelector('h1')?.textContent?.includes('25 of 49'))
      expect(await upper.inputValue()).toBe('97')
    }))

  it('mends a procedure that is no JSON as text', () =>
    withWindow(browser, {}, async (page) => {
      await drop(page, [{ name: 'TB-0417.csv', text: await readFile(sample('TB-0417.csv'), 'utf8') }, { name: 'broken.procedure.json', text: '{ "format": ' }])
      const text = page.getByRole('textbox', { name: 'Text of the procedure' })
      await text.fill(PROCEDURE)
      await text.press('Tab')
      await lotIsOpen(page)
    }))
}) // prettier-ignore
