/** What is fuzzed: every sort of file that comes from outside, each with what must hold whatever is in it. */
import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { deflateSync } from 'node:zlib'
import { openPdf } from '../../../app/pdf/pdf-file'
import { PdfFault } from '../../../app/pdf/pdf-syntax'
import { readAttachments } from '../../../app/pdf/read-attachments'
import { run } from '../../../core/analysis/run'
import { checkHistory } from '../../../core/check-wafer/check'
import { readHistory } from '../../../core/check-wafer/history'
import { gaugeStudy } from '../../../core/gauge/gauge-study'
import { readOccasions } from '../../../core/gauge/occasions'
import { decodeText } from '../../../core/ingest/decode-text'
import { readReadings } from '../../../core/ingest/read-files'
import { readProfile } from '../../../core/ingest/read-profile'
import { CoreError } from '../../../core/problems/problem'
import { parseProcedure } from '../../../core/procedure/parse-procedure'
import { checkProblems, checkResult, require, Words } from '../sound-result'
import { agreesWithPlainReading, readsTheSameOtherwise } from './oracles'

export interface Target {
  readonly name: string
  readonly seeds: (root: string) => readonly Uint8Array[]
  readonly dictionary: readonly string[]
  /** Throws where something doesn't hold. */
  readonly check: (bytes: Uint8Array) => void
}

const utf8 = (text: string): Uint8Array => new TextEncoder().encode(text)
const file = (bytes: Uint8Array, name = 'input.csv') => ({ name, bytes, sha256: '00' })
const sample = (root: string, name: string): Uint8Array => new Uint8Array(readFileSync(join(root, 'sample-data', name)))
const head = (bytes: Uint8Array, lines: number): Uint8Array =>
  Buffer.from(Buffer.from(bytes).toString('latin1').split('\n').slice(0, lines).join('\n') + '\n', 'latin1')
const kept = (root: string, extension: RegExp): Uint8Array[] => {
  const folder = join(root, 'test', 'fuzz', 'corpus')
  return readdirSync(folder).filter((name) => extension.test(name)).map((name) => new Uint8Array(readFileSync(join(folder, name))))
} // prettier-ignore

export const PLAIN = utf8(
  'wafer,site,x_mm,y_mm,current_A,voltage_V\nW1,1,0,0,5e-4,0.0101\nW1,2,10,0,5e-4,0.0102\nW2,1,0,-10,5e-4,0.01\n',
)
const CSV_WORDS = ['wafer', 'site', 'x_mm', 'y_mm', 'current_A', 'voltage_V', 'V/I', 'Rs', 'ohm/sq', 'mV', 'µA', 'r_mm', 'theta_deg', 'temperature_C', 'time', 'die_x', 'rev', 'Mean', 'Lot', 'Slot', 'sep=;', 'direction', 'fwd', 'config', 'A', 'B', '2026-03-04T05:06:07Z', '__proto__', 'toString'] // prettier-ignore

/** Nothing of these may be thrown by what collects problems. */
function settled<Value>(work: () => Value): Value | null {
  try {
    return work()
  } catch (error) {
    if (error instanceof CoreError) return null
    throw error
  }
}

const readings: Target = {
  name: 'readings',
  seeds: (root) => [PLAIN, ...['TB-0417.csv', 'TB-0522.csv', 'nist-wafer-map.csv'].map((name) => head(sample(root, name), 14)), ...kept(root, /\.csv$/)],
  dictionary: CSV_WORDS,
  check: (bytes) => {
    const { readings, problems } = readReadings([file(bytes)])
    checkProblems(problems, new Words(bytes))
    require(readings !== null || problems.length > 0, () => 'no readings and no problem')
    agreesWithPlainReading(bytes, readings)
    readsTheSameOtherwise(bytes, readings)
  },
} // prettier-ignore

const PROCEDURE = utf8('{"format":"persquare-procedure/1","wafer":{"diameterMm":200,"thicknessUm":725},"probe":{"spacingMm":1},"limits":{"sheetResistanceOhmSq":{"lower":87,"upper":97}},"uncertainty":{"currentRel":2e-4}}') // prettier-ignore

const lots: Target = {
  name: 'lots',
  seeds: (root) => [PLAIN, ...['TB-0417.csv', 'nist-wafer-map.csv'].map((name) => head(sample(root, name), 12))],
  dictionary: CSV_WORDS,
  check: (bytes) => {
    checkResult(run({ readings: [file(bytes)], procedure: { name: 'p.json', bytes: PROCEDURE } }), new Words(bytes))
  },
}

const procedures: Target = {
  name: 'procedures',
  seeds: (root) => [
    PROCEDURE,
    ...['TB-0417.procedure.json', 'TB-0522.procedure.json', 'TB-0417-trust.procedure.json'].map((name) => sample(root, name)),
    ...kept(root, /\.json$/),
  ],
  dictionary: ['"wafer":', '"probe":', '"layer":', '"limits":', '"uncertainty":', '"dieGrid":', '"temperature":', '"kind":', '"bulk"', '"film"', '"implant"', '"sheet"', '"rectangle"', '"dual"', '"radial"', '"lower":', 'null', 'true', '[]', '{}', '1e999', '"__proto__":', '\\u0000', '"gaugeStudy":', '"checkWafer":', '"map":', '"acceptance":'],
  check: (bytes) => {
    const decoded = decodeText(bytes)
    if ('looksLike' in decoded) return
    const { procedure, problems } = parseProcedure(decoded.text(), 'p.json')
    checkProblems(problems, new Words(bytes))
    require((procedure === null) === problems.length > 0, () => 'a procedure and a problem, or neither')
    if (!procedure) return
    // Written out again, with every default said, it says the same.
    const again = parseProcedure(JSON.stringify(procedure), 'p.json')
    require(JSON.stringify(again.procedure) === JSON.stringify(procedure), () => `not the same again: ${JSON.stringify(again.problems)}`)
  },
} // prettier-ignore

const profiles: Target = {
  name: 'profiles',
  seeds: () => [
    utf8('depth_nm,concentration_cm3\n0,1e20\n10,9e19\n20,5e19\n30,1e19\n40,1e17\n'),
    utf8('# measured\nDepth (um);B [cm-3]\n0,00;1e20\n0,01;9e19\n0,02;5e19\n0,03;1e18\n'),
  ],
  dictionary: ['depth_nm', 'depth_um', 'concentration_cm3', 'cm-3', 'nm', '%', '#', 'Depth', 'B [cm-3]'],
  check: (bytes) => {
    const { profile, problems } = readProfile(file(bytes))
    checkProblems(problems, new Words(bytes))
    require((profile === null) === problems.length > 0, () => 'a profile and a problem, or neither')
    for (let i = 0; profile && i < profile.depth_um.length; i++) {
      const isRising = i === 0 || profile.depth_um[i] > profile.depth_um[i - 1]
      const n = profile.concentration_cm3[i]
      require(isRising && n >= 0 && n < Infinity, () => `depth ${profile.depth_um[i]}, concentration ${n}`)
    }
  },
}

const STUDY_WORDS = ['wafer', 'probe', 'run', 'day', 'operator', 'value', 'sheet_resistance_ohm_sq', 'resistivity_ohm_cm', 'standard_deviation', 'count', 'df', 'time', 'year', 'month', '2026-02-05'] // prettier-ignore

const studies: Target = {
  name: 'gauge studies',
  seeds: (root) =>
    ['station-2-gauge-study.csv', 'nist-check-wafer-137.csv'].map((name) => head(sample(root, name), 40)),
  dictionary: STUDY_WORDS,
  check: (bytes) => {
    const { occasions, problems } = readOccasions(file(bytes))
    checkProblems(problems, new Words(bytes))
    require(occasions !== null || problems.length > 0, () => 'no study and no problem')
    if (!occasions) return
    require(occasions.mean.every(Number.isFinite), () => 'a mean that is no number')
    settled(() => gaugeStudy(occasions))
  },
}

const histories: Target = {
  name: 'check wafers',
  seeds: (root) =>
    ['station-2-check-wafer.csv', 'nist-check-wafer-137.csv'].map((name) => head(sample(root, name), 40)),
  dictionary: STUDY_WORDS,
  check: (bytes) => {
    const { history, problems } = readHistory(file(bytes))
    checkProblems(problems, new Words(bytes))
    require(history !== null || problems.length > 0, () => 'no history and no problem')
    if (!history) return
    require(history.value.every(Number.isFinite), () => 'a value that is no number')
    settled(() => checkHistory(history))
  },
}

const pdfs: Target = {
  name: 'reports',
  seeds: () => [PDF],
  dictionary: ['obj', 'endobj', 'stream', 'endstream', 'xref', 'trailer', 'startxref', '%%EOF', '/Names', '/EmbeddedFiles', '/Filter /FlateDecode', '/Length', '/Size', '/Params', '/EF', '/UF', '/Root', '/Prev', ' 0 R', '0000000000 65535 f ', '<<', '>>'],
  check: (bytes) => {
    try {
      const files = readAttachments(openPdf(bytes))
      for (const { name } of files) require(/^[\w .-]{1,120}$/.test(name), () => `a name: ${name}`)
    } catch (error) {
      if (!(error instanceof PdfFault)) throw error
    }
  },
} // prettier-ignore

const PACKED = deflateSync('1,2\n').toString('latin1')

/** One attachment, "1,2\n", as this program writes it. */
export const PDF = Buffer.from(
  pdfOf([
    '<<\n/Names 2 0 R\n>>',
    '<<\n/EmbeddedFiles <<\n/Names [(a.csv) 3 0 R]\n>>\n>>',
    '<<\n/UF (a.csv)\n/EF <<\n/F 4 0 R\n>>\n>>',
    `<<\n/Filter /FlateDecode\n/Params <<\n/Size 4\n>>\n/Length ${PACKED.length}\n>>\nstream\n${PACKED}\nendstream`,
    '<<\n>>',
  ]),
  'latin1',
)

function pdfOf(objects: readonly string[]): string {
  let text = '%PDF-1.7\n'
  const offsets = objects.map((object, at) => {
    const offset = text.length
    text += `${at + 1} 0 obj\n${object}\nendobj\n`
    return offset
  })
  const table = offsets.map((offset) => `${String(offset).padStart(10, '0')} 00000 n \n`).join('')
  const at = text.length
  return `${text}xref\n0 ${objects.length + 1}\n0000000000 65535 f \n${table}trailer\n<<\n/Size ${objects.length + 1}\n/Root 1 0 R\n/Info ${objects.length} 0 R\n>>\nstartxref\n${at}\n%%EOF\n`
}

export const TARGETS: readonly Target[] = [readings, lots, procedures, profiles, studies, histories, pdfs]
