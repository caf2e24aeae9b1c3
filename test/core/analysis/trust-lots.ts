/** The sample lots with everything that can be said of their trust, and changes of their procedure. */
import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import type { LotAnalysis } from '../../../core/analysis/lot-analysis'
import { run, type RunResult } from '../../../core/analysis/run'

const SAMPLES = join(import.meta.dirname, '..', '..', '..', 'sample-data')
const COMPANIONS = ['station-2-gauge-study.csv', 'station-2-check-wafer.csv']

export const sampleBytes = (name: string): Uint8Array => new Uint8Array(readFileSync(join(SAMPLES, name)))
export const sampleFile = (name: string) => ({ name, bytes: sampleBytes(name), sha256: '' })

type Written = Record<string, unknown>

export function tryLot(lot: string, change: (procedure: Written) => Written = (procedure) => procedure, companions = COMPANIONS): RunResult {
  const written = JSON.parse(new TextDecoder().decode(sampleBytes(`${lot}.procedure.json`))) as Written
  return run({
    readings: [sampleFile(`${lot.replace(/-trust$/, '')}.csv`)],
    procedure: { name: 'p.json', bytes: new TextEncoder().encode(JSON.stringify(change(written))) },
    companions: companions.map(sampleFile),
  })
} // prettier-ignore

export function runLot(lot: string, change?: (procedure: Written) => Written): LotAnalysis {
  const { analysis, problems } = tryLot(lot, change)
  if (!analysis) throw new Error(JSON.stringify(problems))
  return analysis
}
