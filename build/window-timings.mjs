/** Prints how quickly the built window opens, shows a lot's maps after a drop, and stays awake with a very large wafer. */
import { mkdtemp, readdir, readFile, rm, stat } from 'node:fs/promises'
import { spawn } from 'node:child_process'
import { once } from 'node:events'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { chromium } from 'playwright-core'

const ROOT = join(import.meta.dirname, '..')
const RUNS = Number(process.argv[2] ?? 5)
const LARGE_SITES = 100_000

const sample = async (name) => ({ name, text: await readFile(join(ROOT, 'sample-data', name), 'utf8') })
const LOT = [await sample('TB-0417.csv'), await sample('TB-0417.procedure.json')]

const browser = await chromium.launch({
  executablePath: process.env.CHROMIUM ?? '/usr/bin/chromium',
  args: ['--no-sandbox'],
})
try {
  const starts = []
  const lots = []
  for (let k = 0; k < RUNS; k++) {
    await withPage(async (page) => {
      starts.push(await page.evaluate(() => performance.getEntriesByName('persquare:usable')[0]?.startTime ?? NaN))
      lots.push(await timedDrop(page, LOT))
    })
  }
  print('start-up to the first usable screen', starts)
  print(
    'drop of 25 x 49 to the analysis',
    lots.map(({ analysed }) => analysed),
  )
  print(
    'drop of 25 x 49 to the first map',
    lots.map(({ first }) => first),
  )
  print(
    'drop of 25 x 49 to all maps',
    lots.map(({ all }) => all),
  )
  print(
    'drop of 25 x 49, longest halt of the window',
    lots.map(({ longest }) => longest),
  )
  const large = []
  await withPage(async (page) => large.push(await timedDrop(page, [largeWafer(), LOT[1]], true)))
  print(
    `drop of ${LARGE_SITES} sites to the map`,
    large.map(({ all }) => all),
  )
  print(
    `${LARGE_SITES} sites, longest halt of the window`,
    large.map(({ longest }) => longest),
  )
  await printSizes()
} finally {
  await browser.close()
}

/** What is read before the first screen, and all else that waits until it is wanted. */
async function printSizes() {
  const page = join(ROOT, 'out/renderer')
  const html = await readFile(join(page, 'index.html'), 'utf8')
  const first = [...html.matchAll(/(?:src|href)="\.\/(assets\/[^"]+)"/g)].map(([, file]) => file)
  const all = (await readdir(join(page, 'assets'))).map((file) => `assets/${file}`)
  const kilobytes = async (files) => {
    const sizes = await Promise.all(files.map(async (file) => (await stat(join(page, file))).size))
    return Math.round(sizes.reduce((sum, size) => sum + size, 0) / 1000)
  }
  console.log(`read before the first screen: ${await kilobytes(first)} kB in ${first.length} files`)
  console.log(`read when it is wanted: ${await kilobytes(all.filter((file) => !first.includes(file)))} kB`)
}

async function addressOf(child) {
  let said = ''
  for await (const chunk of child.stdout) {
    said += chunk
    const address = /http:\S+/.exec(said)
    if (address) return address[0]
  }
  throw new Error('the loopback host did not start')
}

/** Each in a context of its own, so that nothing is warm but the disk. */
async function withPage(look) {
  const state = await mkdtemp(join(tmpdir(), 'persquare-timings-'))
  const host = spawn(process.execPath, [join(ROOT, 'out/cli/start.js'), '--browser', '--port', '0', '--no-open'], {
    env: { ...process.env, XDG_STATE_HOME: state },
  })
  const context = await browser.newContext({ viewport: { width: 1280, height: 720 } })
  const page = await context.newPage()
  await page.addInitScript(() => {
    window.halts = []
    new PerformanceObserver((list) => {
      for (const { startTime, duration } of list.getEntries()) window.halts.push({ startTime, duration })
    }).observe({ type: 'longtask', buffered: true })
  })
  await page.goto(await addressOf(host))
  await page.getByRole('button', { name: 'Open the demo lot' }).waitFor()
  // A person takes longer than this to find their file.
  await page.waitForTimeout(1500)
  await look(page)
  await context.close()
  host.kill()
  await once(host, 'exit')
  await rm(state, { recursive: true, force: true })
}

async function timedDrop(page, files, isLarge = false) {
  const transfer = await page.evaluateHandle((list) => {
    const held = new DataTransfer()
    for (const { name, text } of list) held.items.add(new File([text], name))
    return held
  }, files)
  await page.evaluate(() =>
    document.body.addEventListener('drop', () => performance.mark('dropped'), { capture: true, once: true }),
  )
  await page.dispatchEvent('body', 'drop', { dataTransfer: transfer })
  await page.getByRole('listbox', { name: 'Cassette' }).waitFor({ timeout: 60_000 })
  const maps = isLarge ? 1 : 25
  await page.waitForFunction((n) => performance.getEntriesByName('persquare:small-map').length >= n, maps, {
    timeout: 60_000,
  })
  if (isLarge) {
    await page.keyboard.press('3')
    await page.waitForTimeout(4000)
  }
  return page.evaluate(() => {
    const dropped = performance.getEntriesByName('dropped')[0].startTime
    const marks = performance.getEntriesByName('persquare:small-map').map(({ startTime }) => startTime)
    const analysed = performance.getEntriesByName('persquare:analysed')[0].startTime
    const halts = window.halts.filter(({ startTime }) => startTime >= dropped)
    return {
      analysed: analysed - dropped,
      first: marks[0] - dropped,
      all: marks.at(-1) - dropped,
      longest: Math.max(0, ...halts.map(({ duration }) => duration)),
      halts,
    }
  })
}

/** Made here: a lattice on the 200 mm disc with a bowl and a pseudo-random hundredth. */
function largeWafer() {
  const rows = ['lot,wafer,site,x_mm,y_mm,current_A,voltage_V']
  const across = Math.ceil(Math.sqrt((LARGE_SITES * 4) / Math.PI))
  let seed = 1
  for (let i = 0, site = 0; i < across; i++) {
    for (let j = 0; j < across; j++) {
      const [x, y] = [(190 * (i + 0.5)) / across - 95, (190 * (j + 0.5)) / across - 95]
      if (x * x + y * y > 95 * 95) continue
      seed = (seed * 16807) % 2147483647
      const value = 92 * (1 + (0.02 * (x * x + y * y)) / 9025 + 0.01 * (seed / 2147483647 - 0.5))
      rows.push(
        `TB-0999,1,${++site},${x.toFixed(3)},${y.toFixed(3)},0.001,${(value * 0.001 * 0.2206356).toPrecision(6)}`,
      )
    }
  }
  return { name: 'TB-0999.csv', text: rows.join('\n') }
}

function print(what, times) {
  const sorted = [...times].sort((a, b) => a - b)
  const [low, median, high] = [sorted[0], sorted[Math.floor(sorted.length / 2)], sorted.at(-1)].map((t) =>
    Math.round(t),
  )
  console.log(`${what}: ${median} ms (${low} to ${high}, ${times.length} runs)`)
}
