/**
 * Readings and procedures of every sort, good, spoiled and meaningless, through the whole pipeline: it ends in a sound
 * result or in the tool's own problems, in time.
 */
import fc from 'fast-check'
import { describe, it } from 'vitest'
import { run, type RunResult } from '../../core/analysis/run'
import { readReadings } from '../../core/ingest/read-files'
import { damagedProcedures } from './damaged-procedures'
import { exportStyles } from './export-style'
import { fuzz, inTime, PATIENCE_MS } from './fuzz-runs'
import { measuredLots } from './measured-lots'
import { halfShapedProcedures } from './shaped-procedures'
import { checkOutputs } from './sound-outputs'
import { soundProcedures, type Json } from './sound-procedures'
import { checkProblems, checkResult, require, Words } from './sound-result'
import { damages, spoil } from './spoil-export'
import { writeExport } from './write-export'

const goodFiles = fc.tuple(measuredLots, exportStyles).map(([lot, style]) => writeExport(lot, style).bytes)
const spoiledFiles = fc
  .tuple(measuredLots, exportStyles, damages)
  .map(([lot, style, damage]) => spoil(writeExport(lot, style), style, damage))
const scrap = fc.constantFrom(
  'site', 'V', 'I', 'Rs', 'wafer', '\n', '\r\n', '\r', ',', ';', '\t', '"', '""', '1', '0.02', '-', 'e', ':', '#', '=', 'µ', ' ', '(mV)', '\u0000', 'x', 'y', 'Lot',
) // prettier-ignore
const meaninglessFiles = fc.oneof(
  fc.uint8Array({ maxLength: 400 }),
  fc.string({ unit: 'binary', maxLength: 300 }).map((text) => new TextEncoder().encode(text)),
  fc.array(scrap, { maxLength: 150 }).map((parts) => new TextEncoder().encode(parts.join(''))),
)

const textOf = (procedure: Json) => JSON.stringify(procedure)
const goodProcedures = fc.oneof(soundProcedures, halfShapedProcedures).map(textOf)

function analyzed(files: readonly Uint8Array[], procedure: string): RunResult {
  return run({
    readings: files.map((bytes, at) => ({ name: `TB-0417_W0${at + 1}.csv`, bytes, sha256: '00' })),
    procedure: { name: 'procedure.json', bytes: new TextEncoder().encode(procedure) },
  })
}

function checkWhole([files, procedure]: readonly [readonly Uint8Array[], string]): void {
  const words = new Words(...files, procedure)
  const result = inTime(() => analyzed(files, procedure))
  checkResult(result, words)
  if (result.analysis) inTime(() => checkOutputs(result.analysis!, words))
}

const one = (files: fc.Arbitrary<Uint8Array>) => files.map((bytes) => [bytes])
const several = fc.array(fc.oneof(goodFiles, spoiledFiles), { minLength: 2, maxLength: 3 })

describe('the whole pipeline', () => {
  it(
    'good and spoiled exports under sound procedures',
    () => {
      const inputs = fc.tuple(one(fc.oneof(goodFiles, spoiledFiles)), goodProcedures)
      fuzz('exports under sound procedures', 4, inputs, checkWhole)
    },
    PATIENCE_MS,
  )

  it(
    'several files at once',
    () => {
      const inputs = fc.tuple(several, goodProcedures)
      fuzz('several files', 1, inputs, checkWhole)
    },
    PATIENCE_MS,
  )

  it(
    'anything under anything',
    () => {
      const inputs = fc.tuple(one(fc.oneof(goodFiles, spoiledFiles, meaninglessFiles)), damagedProcedures)
      fuzz('anything under anything', 15, inputs, checkWhole)
    },
    PATIENCE_MS,
  )
})

describe('reading alone', () => {
  it(
    'of spoiled exports and of anything',
    () => {
      const inputs = fc.oneof({ weight: 2, arbitrary: spoiledFiles }, { weight: 1, arbitrary: meaninglessFiles })
      const check = (bytes: Uint8Array) => {
        const words = new Words(bytes)
        const { readings, problems } = inTime(() => readReadings([{ name: 'TB-0417.csv', bytes, sha256: '00' }]))
        checkProblems(problems, words)
        require(readings !== null || problems.length > 0, () => 'no readings and no problem')
      }
      fuzz('reading alone', 35, inputs, check)
    },
    PATIENCE_MS,
  )
})
