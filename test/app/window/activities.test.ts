import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { hasChromium, launchChromium } from '../browser/chromium'
import { drop, lotFiles, lotIsOpen, withWindow } from './open-window'

/** Share of a canvas that is not white. */
function inkOf(canvas: Element): number {
  const { width, height } = canvas as HTMLCanvasElement
  const { data } = (canvas as HTMLCanvasElement).getContext('2d')!.getImageData(0, 0, width, height)
  let inked = 0
  for (let i = 0; i < data.length; i += 4) if (data[i] + data[i + 1] + data[i + 2] < 600) inked++
  return inked / (width * height)
}

describe.skipIf(!hasChromium())('what a person does with a lot', () => {
  let browser: Browser
  beforeAll(async () => void (browser = await launchChromium()))
  afterAll(() => browser.close())

  it('brings it in: begins empty, says what to do, and opens the demo lot', () =>
    withWindow(browser, {}, async (page) => {
      await page.getByRole('heading', { level: 1, name: 'No lot is open' }).waitFor()
      expect(await page.getByText('Drop the prober’s CSV export and the procedure').isVisible()).toBe(true)
      await page.getByRole('button', { name: 'Open the demo lot' }).click()
      await lotIsOpen(page)
      await page.getByRole('button', { name: /Files/ }).click()
      const columns = page.getByRole('table', { name: /each column of the file/ })
      expect(await columns.getByRole('combobox', { name: 'Column for voltage_V', exact: true }).inputValue()).toBe('voltage_V')
    }))

  it('is never wider than the window, whatever is selected', () =>
    withWindow(browser, { files: lotFiles('TB-0417') }, async (page) => {
      await page.setViewportSize({ width: 1280, height: 720 })
      await lotIsOpen(page)
      await page.keyboard.press('n')
      await page.getByRole('heading', { name: /^Working of/ }).waitFor()
      for (const key of '12345678') {
        await page.keyboard.press(key)
        await page.waitForTimeout(150)
        expect(await page.locator('.page').evaluate((element) => element.scrollWidth - window.innerWidth), `page ${key}`).toBeLessThanOrEqual(0)
      }
    }))

  it('brings in a folder, chosen or dropped: its readings are one lot', async () => {
    const folder = await mkdtemp(join(tmpdir(), 'persquare-lot-'))
    const wafer = (id: number): string => ['wafer,site,x_mm,y_mm,v_over_i_ohm', ...[0, 20, 40].map((x, k) => `${id},${k + 1},${x},0,20.${k}`)].join('\n')
    for (const id of [1, 2, 10]) await writeFile(join(folder, `W${id}.csv`), wafer(id))
    await writeFile(join(folder, 'notes.txt'), 'not for the lot')
    const procedure = '{ "format": "persquare-procedure/1", "wafer": { "diameterMm": 200 }, "probe": { "spacingMm": 1 } }'
    const wafersAre = async (page: Page): Promise<void> => {
      await lotIsOpen(page)
      expect(await page.getByRole('table', { name: /Statistics of every wafer/ }).getByRole('rowheader').allTextContents()).toEqual(['1', '2', '10'])
    }
    try {
      await withWindow(browser, {}, async (page) => {
        await drop(page, [{ name: 'p.json', text: procedure }])
        const [chooser] = await Promise.all([page.waitForEvent('filechooser'), page.getByRole('button', { name: 'A folder…' }).click()])
        await chooser.setFiles(folder)
        await wafersAre(page)
      })
      await withWindow(browser, {}, async (page) => {
        await drop(page, [{ name: 'p.json', text: procedure }])
        await page.getByRole('heading', { level: 1, name: /readings are missing/ }).waitFor()
        const devtools = await page.context().newCDPSession(page)
        for (const type of ['dragEnter', 'dragOver', 'drop'] as const) {
          await devtools.send('Input.dispatchDragEvent', { type, x: 600, y: 400, data: { items: [], files: [folder], dragOperationsMask: 1 } })
        }
        await wafersAre(page)
      })
    } finally {
      await rm(folder, { recursive: true })
    }
  })

  it('sees the lot: every wafer, the sentence, a table that sorts, what is out', () =>
    withWindow(browser, { files: lotFiles('TB-0417') }, async (page) => {
      await lotIsOpen(page)
      expect(await page.getByRole('heading', { level: 1 }).textContent()).toMatch(/^TB-0417 is out of spec: wafer 07 reads high/)
      expect(await page.getByRole('listbox').getByRole('option').count()).toBe(25)
      expect(await page.getByRole('option', { name: /^wafer 07 ?: out of spec, above its limit/ }).count()).toBe(1)
      const table = page.getByRole('table', { name: /Statistics of every wafer/ })
      await table.getByRole('button', { name: 'Mean Rs' }).click()
      expect(await table.getByRole('rowheader').first().textContent()).toBe('07')
      await table.getByRole('button', { name: 'Wafer' }).click()
      expect(await table.getByRole('rowheader').first().textContent()).toBe('01')
    }))

  it('looks at a wafer: layers, a pinned one subtracted, the mean map, a site by click', () =>
    withWindow(browser, { files: lotFiles('TB-0417') }, async (page) => {
      await lotIsOpen(page)
      await page.getByRole('option', { name: /^wafer 08/ }).dblclick()
      await page.getByRole('button', { name: 'Pin', exact: true }).click()
      await page.getByRole('option', { name: /^wafer 07/ }).click()
      const map = page.getByRole('combobox', { name: 'Map of' })
      for (const layer of ['deviation', 'concentration', 'dose', 'probability', 'uncertainty', 'value']) await map.selectOption(layer)
      await page.getByRole('combobox', { name: 'Compared with' }).selectOption('difference')
      await page.getByText('Wafer 07 less wafer 08, at the sites, which lie at the same places').first().waitFor()
      await page.getByRole('combobox', { name: 'Compared with' }).selectOption('lot-mean')
      await page.getByText('Mean of 25 wafers').first().waitFor()
      await page.getByRole('combobox', { name: 'Compared with' }).selectOption('beside')
      expect(await page.getByRole('img', { name: /^Map/ }).count()).toBe(2)
      await page.getByRole('combobox', { name: 'Compared with' }).selectOption('none')
      const box = (await page.getByRole('img', { name: /^Map/ }).boundingBox())!
      // The centre of the wafer: the middle of the room between the axes.
      await page.mouse.click(box.x + 42 + (box.width - 56) / 2, box.y + 12 + (box.height - 44) / 2)
      await page.getByRole('heading', { name: /^Working of wafer 07, site 1 / }).waitFor()
    }))

  it('opens a number: factor by factor, with value, formula and source', () =>
    withWindow(browser, { files: lotFiles('TB-0417') }, async (page) => {
      await lotIsOpen(page)
      await page.keyboard.press('n')
      const working = page.getByRole('region', { name: /^Working of wafer 07/ })
      await working.waitFor()
      for (const title of ['Mean of forward and reverse', 'Geometry factor, disc', 'Sheet resistance', 'Surface concentration']) {
        expect(await working.getByText(title).count(), title).toBeGreaterThan(0)
      }
      await working.getByText('Geometry factor, disc').first().click()
      await working.locator('details[open]').getByText('all digits').waitFor()
      expect(await working.getByRole('table', { name: /Uncertainty budget/ }).getByRole('row').count()).toBeGreaterThan(2)
    }))

  it('excludes a site with a reason, sees everything follow, and takes it back', () =>
    withWindow(browser, { files: lotFiles('TB-0417') }, async (page) => {
      await lotIsOpen(page)
      await page.getByRole('option', { name: /^wafer 19/ }).dblclick()
      expect(await page.getByText('1 of 49', { exact: true }).isVisible()).toBe(true)
      await page.keyboard.press('n')
      await page.getByRole('heading', { name: /^Working of wafer 19/ }).waitFor()
      await page.keyboard.press('x')
      await page.getByLabel('Reason').fill('probe made poor contact')
      await page.getByRole('button', { name: 'Exclude the site' }).click()
      await page.getByText('0 of 48', { exact: true }).waitFor()
      await page.getByText('This site was excluded by a person').waitFor()
      expect(await page.getByText('not handed over yet').isVisible()).toBe(true)
      await page.getByRole('button', { name: 'Undo' }).click()
      await page.getByText('1 of 49', { exact: true }).waitFor()
      await page.getByRole('button', { name: 'Redo' }).click()
      await page.getByText('0 of 48', { exact: true }).waitFor()
    }))

  it('understands the layer: its curve with the wafers, the profile, other models', () =>
    withWindow(browser, { files: lotFiles('TB-0417') }, async (page) => {
      await lotIsOpen(page)
      await page.getByRole('button', { name: /Layer/ }).click()
      await page.locator('.js-plotly-plot .main-svg').first().waitFor()
      expect(await page.locator('.js-plotly-plot').count()).toBe(2)
      const models = page.getByRole('table', { name: /under each mobility model/ })
      expect(await models.getByRole('rowheader').count()).toBe(6)
      expect(await models.getByText('(the procedure’s)').count()).toBe(1)
    }))

  it('decides and hands over: a decision with name, the report, the tables', () =>
    withWindow(browser, { files: lotFiles('TB-0417') }, async (page) => {
      await lotIsOpen(page)
      await page.getByRole('button', { name: /Hand over/ }).click()
      await page.getByRole('radio', { name: 'Hold' }).check()
      await page.getByLabel('Name').fill('R. Aldous')
      await page.getByLabel('Comment').fill('Edge of wafer 07 to be measured again.')
      await page.waitForFunction(() => performance.getEntriesByName('persquare:report-page').length > 0, null, { timeout: 60_000 })
      expect(await page.getByRole('img', { name: /^Page 1 of \d+/ }).evaluate(inkOf)).toBeGreaterThan(0.02)
      await page.getByRole('tab', { name: 'Text' }).click()
      await page.getByRole('tabpanel', { name: 'Text' }).getByText('R. Aldous').first().waitFor()
      const saved = async (button: string | RegExp): Promise<Buffer> => {
        const [download] = await Promise.all([page.waitForEvent('download'), page.getByRole('button', { name: button }).click()])
        return readFile(await download.path())
      }
      const pdf = await saved(/Save report/)
      expect(pdf.subarray(0, 5).toString()).toBe('%PDF-')
      const sites = (await saved('sites.csv')).toString()
      expect(sites.split('\n').length).toBe(1 + 1224 + 1)
      const result = JSON.parse((await saved('result.json')).toString()) as { format: string; lot: { verdict: string } }
      expect([result.format, result.lot.verdict]).toEqual(['persquare-result/1', 'out-of-spec'])
      expect(await page.getByText('not handed over yet').count()).toBe(0)
    }))

  it('saves any picture as SVG and PNG', () =>
    withWindow(browser, { files: lotFiles('TB-0417') }, async (page) => {
      await lotIsOpen(page)
      for (const [kind, start] of [['SVG', '<svg'], ['PNG', '\x89PNG']] as const) {
        const [download] = await Promise.all([page.waitForEvent('download'), page.getByRole('button', { name: `Save TB-0417-wafer-means as ${kind}` }).click()])
        expect((await readFile(await download.path())).subarray(0, 4).toString('latin1')).toBe(start)
      }
    }))
}) // prettier-ignore
