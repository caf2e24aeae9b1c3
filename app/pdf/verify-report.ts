/** A report made again from what it carries, and held against itself. */
import { createHash } from 'node:crypto'
import { compareResults, type Comparison } from '../../core/analysis/compare-results'
import { resultJson } from '../../core/analysis/result-json'
import { run } from '../../core/analysis/run'
import { CoreError, type Problem } from '../../core/problems/problem'
import { pdfDifferences, type PdfStrictness } from './compare-pdf'
import { openPdf, type PdfFile } from './pdf-file'
import { PdfFault } from './pdf-syntax'
import { readAttachments } from './read-attachments'
import { arithmeticMark, compressionMark } from './making-marks'
import { reportContents, type ReportContents } from './report-contents'
import { reportPdf } from './report-pdf'

export interface Verifier {
  /** The report's own name, for what is said of it. */
  readonly file: string
  readonly program: string
  readonly version: string
}

export interface Verification {
  /** No difference in what was compared. */
  readonly isSame: boolean
  readonly madeBy: { readonly program: string; readonly version: string }
  /** Names of the readings, the procedure and the files that it names. */
  readonly inputs: readonly string[]
  /** The lot's own sentence as it comes out now; null where nothing comes out. */
  readonly sentence: string | null
  /** `before` stands in the report, `after` comes out now; null where nothing comes out. */
  readonly result: Comparison | null
  /** Same values, other text: spaces, order of keys, ways to write a number. */
  readonly isRewritten: boolean
  /** Why nothing comes out. */
  readonly problems: readonly Problem[]
  /** How far numbers could differ and still be the same: 0 where this engine rounds as the one that made the report. */
  readonly tolerance: number
  readonly pages: PageComparison
}

export interface PageComparison {
  /**
   * Byte by byte; by content, where the compressor is another build; to a hair, where the engine rounds otherwise; not at
   * all, where the program is another version.
   */
  readonly how: PdfStrictness | 'none'
  /** Where something differs. */
  readonly places: readonly string[]
}

/** @throws CoreError cannot-read if it is no report of this program, or a damaged one */
export async function verifyReport(bytes: Uint8Array, verifier: Verifier): Promise<Verification> {
  const { file, contents } = read(bytes, verifier.file)
  const { readings, procedure, companions } = contents.inputs
  const { analysis, problems } = run({
    readings: readings.map(withDigest),
    procedure,
    companions: companions.map(withDigest),
    excluded: contents.excluded,
  })
  const known = {
    madeBy: { program: contents.program, version: contents.version },
    inputs: [...readings, procedure, ...companions].map(({ name }) => name),
  }
  if (!analysis) {
    const pages = { how: 'none', places: [] } as const
    return { ...known, isSame: false, sentence: null, result: null, isRewritten: false, problems, tolerance: 0, pages }
  }
  const isOwnVersion = contents.program === verifier.program && contents.version === verifier.version
  const tolerance = contents.arithmetic === arithmeticMark() ? 0 : ROUNDING
  const result = compareText(contents, resultJson(analysis, contents), verifier.file, tolerance)
  const pages = isOwnVersion
    ? await comparePages(file, contents, () => reportPdf(analysis, contents))
    : ({ how: 'none', places: [] } as const)
  const isSame = result.comparison.count === 0 && !result.isRewritten && pages.places.length === 0
  return {
    ...known,
    isSame,
    sentence: analysis.lot.sentence,
    result: result.comparison,
    isRewritten: result.isRewritten,
    problems: [],
    tolerance,
    pages,
  }
}

function read(bytes: Uint8Array, name: string): { file: PdfFile; contents: ReportContents } {
  try {
    const file = openPdf(bytes)
    return { file, contents: reportContents(readAttachments(file)) }
  } catch (error) {
    if (error instanceof PdfFault) throw new CoreError({ kind: 'cannot-read', file: name, why: error.message })
    throw error
  }
}

function withDigest<Input extends { readonly bytes: Uint8Array }>(input: Input): Input & { readonly sha256: string } {
  return { ...input, sha256: createHash('sha256').update(input.bytes).digest('hex') }
}

/**
 * Two engines' results of one lot were found to differ by up to 1e-9 (the small differences that patterns are made of
 * most); no digit that is printed hangs on this.
 */
const ROUNDING = 1e-7
const MAX_LONGER = 2 ** 20

/** As if the same version had made both: the version is told apart from the digits. */
function compareText(
  { result }: ReportContents,
  now: string,
  name: string,
  tolerance: number,
): { comparison: Comparison; isRewritten: boolean } {
  // Far longer than what comes out, it is something else; it isn't taken apart.
  const isForeign = result.length > 2 * now.length + MAX_LONGER
  const comparison = isForeign
    ? compareResults(`${result.length} characters`, `${now.length} characters`)
    : compareResults(parsed(result, name), JSON.parse(now), { tolerance })
  return { comparison, isRewritten: tolerance === 0 && comparison.count === 0 && result !== now }
}

function parsed(text: string, file: string): unknown {
  try {
    return JSON.parse(text)
  } catch {
    throw new CoreError({ kind: 'cannot-read', file, why: 'the result in it is damaged' })
  }
}

async function comparePages(
  file: PdfFile,
  { compression, arithmetic }: ReportContents,
  remake: () => Promise<Uint8Array>,
): Promise<PageComparison> {
  const isOwnEngine = arithmetic === arithmeticMark()
  const how = !isOwnEngine ? 'rounding' : compression === compressionMark() ? 'bytes' : 'contents'
  return { how, places: pdfDifferences(file, openPdf(await remake()), how) }
}
