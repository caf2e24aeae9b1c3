/**
 * `npm run bench`: the whole pipeline on a generated CSV against a bare Papa Parse of the same text, in one process and
 * interleaved, so that a slow moment of the machine falls on both; and against the plainest script that does the job.
 * `npm run bench -- 5000000` takes other numbers of sites.
 */
import Papa from 'papaparse'
import { analyze } from '../../core/analysis/analyze'
import type { LotAnalysis } from '../../core/analysis/lot-analysis'
import { readReadings } from '../../core/ingest/read-files'
import { parseProcedure } from '../../core/procedure/parse-procedure'
import { plainRows } from './plain-script'

const PROCEDURE = JSON.stringify({
  format: 'persquare-procedure/1',
  wafer: { diameterMm: 200, thicknessUm: 725, edgeExclusionMm: 3 },
  probe: { spacingMm: 1 },
  layer: {
    kind: 'doped-layer',
    dopant: 'boron',
    profile: 'gaussian',
    depthUm: 0.35,
    background: { dopant: 'phosphorus', concentrationCm3: 1e15 },
  },
  limits: { sheetResistanceOhmSq: { lower: 87, upper: 97 } },
  uncertainty: { currentRel: 2e-4, voltageRel: 3e-4, spacingMm: 0.005, temperatureC: 0.3 },
})

const SITES = [10_000, 100_000, 1_000_000]
const SITES_PER_WAFER = 4000
const ROUNDS = 3
/** The plain script takes milliseconds a site. */
const PLAIN_SITES = 500

/** Sunflower positions on each wafer; every site its own voltage. Joined a wafer at a time, to hold little besides the text. */
function syntheticCsv(sites: number): string {
  const wafers = ['wafer,site,x_mm,y_mm,current_A,voltage_V,current_rev_A,voltage_rev_V']
  for (let first = 0; first < sites; first += SITES_PER_WAFER) {
    const rows = Array.from({ length: Math.min(SITES_PER_WAFER, sites - first) }, (_, k) => syntheticRow(first + k))
    wafers.push(rows.join('\n'))
  }
  return wafers.join('\n')
}

function syntheticRow(i: number): string {
  const k = i % SITES_PER_WAFER
  const wafer = Math.floor(i / SITES_PER_WAFER) + 1
  const r = 95 * Math.sqrt((k + 0.5) / SITES_PER_WAFER)
  const angle = k * 2.399963229728653
  const voltage = (0.0101 * (1 + 0.03 * Math.sin(i * 0.7))).toFixed(8)
  const place = `${(r * Math.cos(angle)).toFixed(4)},${(r * Math.sin(angle)).toFixed(4)}`
  return `${wafer},${k + 1},${place},5e-4,${voltage},-5e-4,-${voltage}`
}

const median = (values: readonly number[]): number => [...values].sort((a, b) => a - b)[values.length >> 1]

function timed(run: () => void): number {
  globalThis.gc?.()
  const start = performance.now()
  run()
  return performance.now() - start
}

function pipeline(bytes: Uint8Array): LotAnalysis {
  const { procedure, defaults } = parseProcedure(PROCEDURE, 'bench')
  const read = readReadings([{ name: 'bench.csv', bytes, sha256: '' }])
  if (!procedure || !read.readings) throw new Error('the benchmark lot could not be read')
  const analysis = analyze({ readings: read.readings, procedure, defaults, problems: read.problems, notes: read.notes })
  if (!(analysis.sites.concentration_cm3[0] > 0)) throw new Error('the benchmark lot was not inverted')
  return analysis
}

interface Timing {
  readonly sites: number
  readonly bare_ms: number
  readonly whole_ms: number
  readonly ratio: number
  readonly peak_MB: number
}

/** Each is given what it takes: the parser a text, the pipeline the file's bytes. */
function compare(sites: number): Timing {
  const text = syntheticCsv(sites)
  const bytes = new TextEncoder().encode(text)
  const bare: number[] = []
  const whole: number[] = []
  let peak_MB = NaN
  for (let round = 0; round < ROUNDS; round++) {
    // The pipeline goes first: the process's peak is its own then, until the bare parse of this size has run.
    whole.push(timed(() => void pipeline(bytes)))
    if (round === 0) peak_MB = process.resourceUsage().maxRSS / 1024
    bare.push(timed(() => void Papa.parse(text)))
  }
  const ratio = median(whole.map((ms, k) => ms / bare[k]))
  return { sites, bare_ms: median(bare), whole_ms: median(whole), ratio, peak_MB }
}

function comparePlain(): { us: number; sheetDiffers: number; concentrationDiffers: number } {
  const text = syntheticCsv(PLAIN_SITES)
  const start = performance.now()
  const rows = plainRows(text)
  const us = ((performance.now() - start) / PLAIN_SITES) * 1e3
  const { sites } = pipeline(new TextEncoder().encode(text))
  const largest = (ours: Float64Array, theirs: (k: number) => number) =>
    ours.reduce((most, value, k) => Math.max(most, Math.abs(value / theirs(k) - 1)), 0)
  return {
    us,
    sheetDiffers: largest(sites.sheetResistance_ohm_sq, (k) => rows[k].sheetResistance_ohm_sq),
    concentrationDiffers: largest(sites.concentration_cm3, (k) => rows[k].concentration_cm3),
  }
}

const asked = process.argv.slice(2).map(Number)
if (asked.some((sites) => !(sites >= 1 && sites <= 6e6))) {
  console.error('npm run bench -- SITES ...: each from 1 to 6000000')
  process.exit(2)
}
console.log('sites      bare parse    pipeline    ratio    per site   peak memory, the text and its bytes among it')
const timings = (asked.length > 0 ? asked : SITES).map((sites) => {
  const timing = compare(sites)
  const { bare_ms, whole_ms, ratio, peak_MB } = timing
  console.log(
    `${String(sites).padEnd(9)} ${bare_ms.toFixed(0).padStart(8)} ms ${whole_ms.toFixed(0).padStart(8)} ms ${ratio.toFixed(2).padStart(8)} ` +
      `${((whole_ms / sites) * 1e3).toFixed(2).padStart(8)} us ${peak_MB.toFixed(0).padStart(10)} MB`,
  )
  return timing
})
console.log(
  `medians of ${ROUNDS} interleaved rounds in one process; single times swing with the machine, the ratio less`,
)
const plain = comparePlain()
const last = timings[timings.length - 1]
const perSite_us = (last.whole_ms / last.sites) * 1e3
console.log(
  `the plainest script, ${PLAIN_SITES} sites: ${plain.us.toFixed(0)} us a site, ${(plain.us / perSite_us).toFixed(0)} times the pipeline's ` +
    `${perSite_us.toFixed(2)} us at ${last.sites} sites; it also gives no uncertainty, statistics or verdicts\n` +
    `largest difference between the two: sheet resistance ${plain.sheetDiffers.toExponential(0)}, concentration ${plain.concentrationDiffers.toExponential(0)}`,
)
