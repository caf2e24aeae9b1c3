/** `persquare check`: the history of a check wafer. */
import { alarmedOccasions, checkHistory, type CheckResult } from '../../core/check-wafer/check'
import { checkObject } from '../../core/check-wafer/check-object'
import { checkWords, decimalsFor } from '../../core/check-wafer/check-words'
import { readHistory } from '../../core/check-wafer/history'
import { formatFixed, formatSignificant } from '../../core/units/format'
import { numberOf, refuse } from './convert-arguments'
import { jsonText } from './json-text'
import { oneFile } from './one-file'
import { printProblems } from './print-problems'
import { readInput } from './read-inputs'
import { aligned } from './text-table'

export const CHECK_USAGE = `usage: persquare check FILE [options]

  FILE                 CSV of a check wafer's history, a row an occasion: time (or year, month, day, hour, minute), value, and
                       where it is known standard_deviation and count of its readings
  --baseline N         the first N occasions make the limits (default: all)
  --accepted VALUE     the value that the wafer is held to have (default: the mean of the baseline)
  --width K            a value's limits lie K standard deviations from the centre line (default: 2)
  --json               print one object instead of the table

exit status: 0 the last occasion is in control; 1 it raises an alarm; 2 not done`

const OPTIONS = {
  baseline: { type: 'string' },
  accepted: { type: 'string' },
  width: { type: 'string' },
  json: { type: 'boolean' },
} as const

export async function checkCommand(args: readonly string[]): Promise<number> {
  const { path, given } = oneFile(args, OPTIONS, "a CSV file with a check wafer's history")
  const options = {
    ...(given.baseline === undefined ? {} : { baseline: countOf(given.baseline) }),
    ...(given.accepted === undefined ? {} : { accepted: numberOf('accepted', given.accepted) }),
    ...(given.width === undefined ? {} : { width: widthOf(given.width) }),
  }
  const { history, problems } = readHistory(await readInput(path))
  printProblems(problems)
  if (!history) return 2
  const result = checkHistory(history, options)
  process.stdout.write(given.json ? jsonText(checkObject(result)) : checkText(result))
  return result.isInControl ? 0 : 1
}

function countOf(text: string): number {
  const count = numberOf('baseline', text)
  if (!Number.isInteger(count) || count < 1) refuse('--baseline', `"${text}" is no number of occasions`)
  return count
}

function widthOf(text: string): number {
  const width = numberOf('width', text)
  if (!(width > 0 && width <= 10)) refuse('--width', `"${text}" lies not between 0 and 10`)
  return width
}

function checkText(result: CheckResult): string {
  const { limits } = result
  const decimals = decimalsFor(limits.standardDeviation)
  const occasions = alarmedOccasions(result)
  const rows = occasions.flatMap(({ index, when, value, standardDeviation, alarms }) =>
    alarms.map(({ sentence }, k) =>
      k === 0
        ? [String(index), when, formatFixed(value, decimals), formatSignificant(standardDeviation, 3), sentence]
        : ['', '', '', '', sentence],
    ),
  )
  const toRight = [true, false, true, true, false]
  const table = aligned([['row', 'when', 'value', 's', 'alarm'], ...rows], toRight)
  const steps = [...new Set(occasions.flatMap(({ nextSteps }) => nextSteps))]
  return [...checkWords(result), ...(rows.length > 0 ? ['', ...table, '', ...steps] : []), ''].join('\n')
}
