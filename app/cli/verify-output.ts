/** What `persquare verify` found, as a person reads it and as a program does. */
import { ABSENT, type Difference } from '../../core/analysis/compare-results'
import { explain } from '../../core/problems/explain'
import { quote } from '../../core/problems/quote'
import type { Verification, Verifier } from '../pdf/verify-report'

export const VERIFICATION_FORMAT = 'persquare-verification/1'

/** More of one kind than this are counted, not listed; --json lists more. */
const LISTED = 20

export function verificationText(verification: Verification, own: Verifier): string {
  const { isSame, result, inputs, sentence } = verification
  const head = isSame
    ? `${shown(own.file)} is what comes out of the inputs inside it: ${listed(inputs)}.`
    : `${shown(own.file)} is not what comes out of the inputs inside it: ${listed(inputs)}.`
  const lines = [
    head,
    ...versionLines(verification, own),
    ...verification.problems.map((problem) => `Nothing comes out of them. ${explain(problem)}`),
    ...(result && result.count === 0 ? [resultLine(verification)] : []),
    ...cut((result?.differences ?? []).map(differenceLine), result?.count ?? 0),
    ...pageLines(verification),
    ...(isSame && sentence !== null ? ['', sentence] : []),
  ]
  return `${lines.join('\n')}\n`
}

function versionLines({ madeBy }: Verification, { program, version }: Verifier): readonly string[] {
  if (madeBy.program === program && madeBy.version === version) return []
  return [`It was made by ${shown(madeBy.program)} ${shown(madeBy.version)}; this is ${program} ${version}.`]
}

function resultLine({ isRewritten, tolerance }: Verification): string {
  if (tolerance > 0) {
    return `Its result comes out the same to within ${tolerance} of each number; the last digits hang on the engine, and it was made by another.`
  }
  return isRewritten
    ? 'result.json inside it: every value comes out the same, but its text was written differently.'
    : 'Every digit of its result comes out the same.'
}

function differenceLine({ path, before, after }: Difference): string {
  return `${path === '' ? 'the result' : shown(path)}: ${valueText(before)} in the report, ${valueText(after)} comes out now`
}

function pageLines({ pages: { how, places }, result }: Verification): readonly string[] {
  if (how === 'none') return result ? ['Its pages were not compared: another version may set them differently.'] : []
  if (places.length > 0)
    return cut(
      places.map((place) => `${place}: not as it comes out now`),
      places.length,
    )
  if (how === 'rounding') return ['Its pages come out the same; what is drawn may lie a hair beside.']
  return how === 'bytes'
    ? ['Every byte of its pages and of all else in it comes out the same.']
    : ['All in it comes out the same, but for its compression, which this computer does in another way.']
}

function cut(lines: readonly string[], count: number): readonly string[] {
  const rest = count - Math.min(lines.length, LISTED)
  return rest > 0 ? [...lines.slice(0, LISTED), `... and ${rest} more`] : lines
}

/** A number to its last digit. */
function valueText(value: unknown): string {
  if (value === ABSENT) return 'nothing'
  if (typeof value === 'string') return quote(value)
  return shown(JSON.stringify(value))
}

/** Without what a terminal would take for a command. */
function shown(text: string): string {
  const printable = text.replace(/[\p{Cc}\p{Cf}\p{Zl}\p{Zp}\p{Cs}]/gu, '?')
  return printable.length > LONGEST ? `${printable.slice(0, LONGEST - 1)}…` : printable
}

const LONGEST = 200

function listed(names: readonly string[]): string {
  const rest = names.length - 8
  return [...names.slice(0, 8).map(shown), ...(rest > 0 ? [`${rest} more`] : [])].join(', ')
}

/** The object of `--json`; its keys stay, in this order. A value that is not there has no key. */
export function verificationJson(verification: Verification, { file, program, version }: Verifier): string {
  const { isSame, madeBy, inputs, result, isRewritten, problems, tolerance, pages } = verification
  const object = {
    format: VERIFICATION_FORMAT,
    report: file,
    same: isSame,
    madeBy,
    verifiedBy: { program, version },
    inputs,
    problems: problems.map((problem) => ({ ...problem, sentence: explain(problem) })),
    result: result && {
      differences: result.differences.map(({ path, before, after }) => ({
        path,
        ...(before === ABSENT ? {} : { report: before }),
        ...(after === ABSENT ? {} : { now: after }),
      })),
      count: result.count,
      rewritten: isRewritten,
      tolerance,
    },
    pages: { compared: pages.how, differences: pages.places },
  }
  return `${JSON.stringify(object, null, 2)}\n`
}
