/**
 * `npm run bench`: a bare Papa Parse of a generated CSV against the whole pipeline on the same text, in one process and
 * interleaved, so that a slow moment of the machine falls on both.
 */
import Papa from 'papaparse'
import { analyze } from '../../core/analysis/analyze'
import { readReadings } from '../../core/ingest/read-files'
import { parseProcedure } from '../../core/procedure/parse-procedure'

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

const SITES_PER_WAFER = 4000
const ROUNDS = 3

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

function pipeline(text: string): void {
  const { procedure, defaults } = parseProcedure(PROCEDURE, 'bench')
  const read = readReadings([{ name: 'bench.csv', bytes: new TextEncoder().encode(text), sha256: '' }])
  if (!procedure || !read.readings) throw new Error('the benchmark lot could not be read')
  const analysis = analyze({ readings: read.readings, procedure, defaults, problems: read.problems, notes: read.notes })
  if (!(analysis.sites.concentration_cm3[0] > 0)) throw new Error('the benchmark lot was not inverted')
}

console.log('sites      bare parse    pipeline    ratio    per site   peak memory of the pipeline')
const sizes = process.argv.slice(2).map(Number)
for (const sites of sizes.length > 0 ? sizes : [10_000, 100_000, 1_000_000]) {
  const text = syntheticCsv(sites)
  const bare: number[] = []
  const whole: number[] = []
  let peak_MB = NaN
  for (let round = 0; round < ROUNDS; round++) {
    // The pipeline goes first: the process's peak is its own then, until the bare parse of this size has run.
    whole.push(timed(() => pipeline(text)))
    if (round === 0) peak_MB = process.resourceUsage().maxRSS / 1024
    bare.push(timed(() => void Papa.parse(text)))
  }
  const ratio = median(whole.map((ms, k) => ms / bare[k]))
  const perSite_us = (median(whole) / sites) * 1e3
  console.log(
    `${String(sites).padEnd(9)} ${median(bare).toFixed(0).padStart(8)} ms ${median(whole).toFixed(0).padStart(8)} ms ${ratio.toFixed(2).padStart(8)} ` +
      `${perSite_us.toFixed(2).padStart(8)} us ${peak_MB.toFixed(0).padStart(10)} MB`,
  )
}
console.log(
  `medians of ${ROUNDS} interleaved rounds in one process; single times swing with the machine, the ratio less; peak memory holds the text itself too`,
)
