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

/** Sunflower positions on each wafer; every site its own voltage. */
function syntheticCsv(sites: number): string {
  const lines = ['wafer,site,x_mm,y_mm,current_A,voltage_V,current_rev_A,voltage_rev_V']
  for (let i = 0; i < sites; i++) {
    const k = i % SITES_PER_WAFER
    const r = 95 * Math.sqrt((k + 0.5) / SITES_PER_WAFER)
    const angle = k * 2.399963229728653
    const voltage = (0.0101 * (1 + 0.03 * Math.sin(i * 0.7))).toFixed(8)
    lines.push(
      `${Math.floor(i / SITES_PER_WAFER) + 1},${k + 1},${(r * Math.cos(angle)).toFixed(4)},${(r * Math.sin(angle)).toFixed(4)},5e-4,${voltage},-5e-4,-${voltage}`,
    )
  }
  return lines.join('\n')
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

console.log('sites      bare parse    pipeline    ratio   per site   peak memory')
for (const sites of [10_000, 100_000, 1_000_000]) {
  const text = syntheticCsv(sites)
  const bare: number[] = []
  const whole: number[] = []
  for (let round = 0; round < ROUNDS; round++) {
    bare.push(timed(() => void Papa.parse(text)))
    whole.push(timed(() => pipeline(text)))
  }
  const ratio = median(whole.map((ms, k) => ms / bare[k]))
  const peak_MB = process.resourceUsage().maxRSS / 1024
  console.log(
    `${String(sites).padEnd(9)} ${median(bare).toFixed(0).padStart(8)} ms ${median(whole).toFixed(0).padStart(8)} ms ${ratio.toFixed(2).padStart(8)} ` +
      `${((median(whole) / sites) * 1e3).toFixed(2).padStart(7)} us ${peak_MB.toFixed(0).padStart(10)} MB`,
  )
}
console.log(
  `medians of ${ROUNDS} interleaved rounds; single times swing with the machine, the ratio less; peak memory is the process's own, bare parse included`,
)
