/** Runs core's pipeline beside the window, one job at a time. */
import type { LotAnalysis } from '../../core/analysis/lot-analysis'
import { run, type RunInput, type RunResult } from '../../core/analysis/run'
import { partBrought } from '../contract/brought-files'
import type { FileUse, Job, Rehearsal, Report } from './analysis-messages'
import { sha256 } from './formats/files'

interface KeptFile {
  readonly bytes: Uint8Array
  readonly sha256: string
}

/** The worker's own side of the channel, as far as it is used; the page's `self` has another type. */
const port = self as unknown as {
  postMessage(report: Report, transfer?: readonly ArrayBufferLike[]): void
  onmessage: ((event: MessageEvent<Job | Rehearsal>) => void) | null
}

const kept = new Map<number, KeptFile>()

let jobs = 0

port.onmessage = ({ data }) => {
  const failed = (error: unknown) => port.postMessage({ kind: 'failed', why: String(error) })
  // A rehearsal that fails is none; it must not be taken for the job that may have come meanwhile.
  if ('rehearse' in data) void rehearse(data).catch(() => port.postMessage({ kind: 'rehearsed', result: NOTHING }))
  else {
    jobs++
    answer(data).catch(failed)
  }
}

/** The engine compiles what it has seen run often; a turn is short, and a real job goes before the next. */
async function rehearse({ rehearse: { lots, procedure } }: Rehearsal): Promise<void> {
  let result = NOTHING
  for (const lot of lots) {
    const input = { readings: [{ ...lot, sha256: '' }], procedure }
    for (let turn = 0; turn < TURNS_A_LOT && jobs === 0; turn++) {
      result = run(input)
      await new Promise((resolve) => setTimeout(resolve))
    }
  }
  // Once there is a real lot, the page has better to do than to paint a made-up one.
  port.postMessage({ kind: 'rehearsed', result: jobs === 0 ? result : NOTHING })
}
const TURNS_A_LOT = 8
const NOTHING: RunResult = { analysis: null, problems: [] }

async function answer({ added, dropped, readings, procedure, excluded }: Job): Promise<void> {
  for (const id of dropped) kept.delete(id)
  for (const { id, bytes } of added) kept.set(id, { bytes, sha256: await sha256(bytes) })
  const input: RunInput = {
    ...partBrought(readings.map(named), named(procedure)),
    procedure: named(procedure),
    excluded,
    watch: (progress) => port.postMessage({ kind: 'progress', progress }),
  }
  const result = run(input)
  port.postMessage({ kind: 'done', result }, result.analysis ? buffersOf(result.analysis) : [])
}

function named({ id, name }: FileUse): KeptFile & { readonly name: string } {
  const file = kept.get(id)
  if (!file) throw new Error(`the worker was never given "${name}"`)
  return { name, ...file }
}

/** The memory of every column: it is handed over, not copied. */
function buffersOf({ readings, sites, dies, wafers }: LotAnalysis): ArrayBufferLike[] {
  const buffers = new Set<ArrayBufferLike>()
  for (const part of [readings, sites, dies ?? {}, ...wafers]) {
    for (const value of Object.values(part) as unknown[]) {
      if (ArrayBuffer.isView(value)) buffers.add(value.buffer)
    }
  }
  return [...buffers]
}
