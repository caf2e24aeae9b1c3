/**
 * Pictures of the window for the README, into build/screenshots/: `npm run build && node build/screenshots.mjs`. Needs a
 * Chromium, at /usr/bin/chromium or where the environment variable CHROMIUM says.
 */
import { spawn } from 'node:child_process'
import { mkdir, mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { chromium } from 'playwright-core'

const ROOT = join(import.meta.dirname, '..')
const OUT = join(import.meta.dirname, 'screenshots')
const LOT = [
  'TB-0417.csv',
  'TB-0417-trust.procedure.json',
  'station-2-gauge-study.csv',
  'station-2-check-wafer.csv',
].map((name) => `sample-data/${name}`)

/** Those that the README shows. */
const SHOWN = ['files-light', 'lot-light', 'wafer-dark', 'trust-light', 'hand-over-light', 'check-wafer-dark']

const stateFolder = await mkdtemp(join(tmpdir(), 'persquare-screenshots-'))
await mkdir(OUT, { recursive: true })
const browser = await chromium.launch({
  executablePath: process.env['CHROMIUM'] ?? '/usr/bin/chromium',
  args: ['--no-sandbox'],
})
const host = await startHost()
try {
  await picture('light', { width: 1440, height: 900 })
  await picture('dark', { width: 1440, height: 900 })
} finally {
  await browser.close()
  host.child.kill()
  await rm(stateFolder, { recursive: true, force: true })
}

/** A person's way through the lot, a picture a step. */
async function picture(colorScheme, viewport) {
  const page = await browser.newPage({ colorScheme, viewport })
  const shot = async (name) => {
    if (SHOWN.includes(`${name}-${colorScheme}`))
      await page.screenshot({ path: join(OUT, `${name}-${colorScheme}.png`) })
  }
  await page.goto(host.url)
  // The second time round, the window comes back where the first left it.
  await page.getByRole('heading', { level: 1, name: /^TB-0417 is/ }).waitFor()
  await page.keyboard.press('2')
  await page.getByRole('listbox', { name: 'Cassette' }).waitFor()
  await page.waitForFunction(() => document.querySelectorAll('table tbody tr').length >= 25)
  await page.waitForFunction(() => performance.getEntriesByName('persquare:small-map').length >= 25)
  await shot('lot')
  await page.keyboard.press('n')
  await page.getByRole('heading', { name: /^Working of/ }).waitFor()
  await shot('wafer')
  await page.keyboard.press('4')
  await page.locator('.js-plotly-plot .main-svg').first().waitFor()
  await page.waitForTimeout(500)
  await shot('layer')
  await page.keyboard.press('5')
  await page.getByRole('heading', { name: /^Budget at site/ }).waitFor()
  await shot('trust')
  await page.keyboard.press('7')
  await page.getByRole('tab', { name: 'Check wafer' }).click()
  await page.getByRole('heading', { name: 'Values of the check wafer' }).waitFor()
  await shot('check-wafer')
  await page.keyboard.press('8')
  await page.getByRole('table', { name: /what each sees/ }).waitFor()
  await shot('plan')
  await page.keyboard.press('6')
  await page.getByRole('heading', { name: 'Your decision' }).waitFor()
  await page.waitForFunction(() => performance.getEntriesByName('persquare:report-page').length > 0)
  await page.waitForTimeout(500)
  await shot('hand-over')
  await page.keyboard.press('1')
  await page.getByRole('heading', { name: 'Columns' }).waitFor()
  await shot('files')
  await page.waitForTimeout(1000)
  await page.close()
}

function startHost() {
  const args = [join(ROOT, 'out', 'cli', 'start.js'), '--browser', '--no-open', '--port', '0', ...LOT]
  const child = spawn(process.execPath, args, { cwd: ROOT, env: { ...process.env, PERSQUARE_STATE_DIR: stateFolder } })
  return new Promise((resolve, reject) => {
    child.on('exit', (code) => reject(new Error(`the loopback host ended with ${code}; is the program built?`)))
    child.stdout.on('data', (said) => {
      const url = /http:\S+/.exec(String(said))?.[0]
      if (url) resolve({ child, url })
    })
  })
}
