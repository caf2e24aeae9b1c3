/** Lots for the tests: the bundled samples, and small ones written on the spot. */
import { createHash } from 'node:crypto'
import { readFileSync } from 'node:fs'
import type { Exclusion } from '../../../core/analysis/exclusions'
import type { LotAnalysis } from '../../../core/analysis/lot-analysis'
import { run, type RunResult } from '../../../core/analysis/run'
import type { ProcedureInput } from '../../../core/procedure/schema'

export function sampleBytes(name: string): Uint8Array {
  return readFileSync(new URL(`../../../sample-data/${name}`, import.meta.url))
}

export function sampleText(name: string): string {
  return new TextDecoder().decode(sampleBytes(name))
}

/** The lot of a sample file under its own procedure, or another. */
export function sampleLot(
  name: string,
  procedure: string | Uint8Array = sampleBytes(`${name}.procedure.json`),
): LotAnalysis {
  return mustAnalyze(runText(sampleText(`${name}.csv`), procedure, `${name}.csv`))
}

export function runText(
  csv: string,
  procedure: string | Uint8Array | Partial<ProcedureInput>,
  name = 'lot.csv',
  excluded: readonly Exclusion[] = [],
): RunResult {
  const bytes = new TextEncoder().encode(csv)
  const sha256 = createHash('sha256').update(bytes).digest('hex')
  return run({
    readings: [{ name, bytes, sha256 }],
    procedure: { name: 'procedure.json', bytes: procedureBytes(procedure) },
    excluded,
  })
}

function procedureBytes(procedure: string | Uint8Array | Partial<ProcedureInput>): Uint8Array {
  if (procedure instanceof Uint8Array) return procedure
  if (typeof procedure === 'string') return new TextEncoder().encode(procedure)
  return new TextEncoder().encode(JSON.stringify({ format: 'persquare-procedure/1', ...procedure }))
}

export function analyzeText(
  csv: string,
  procedure: string | Uint8Array | Partial<ProcedureInput>,
  name?: string,
): LotAnalysis {
  return mustAnalyze(runText(csv, procedure, name))
}

function mustAnalyze({ analysis, problems }: RunResult): LotAnalysis {
  if (!analysis) throw new Error(`not analysed: ${JSON.stringify(problems)}`)
  return analysis
}
