/** `persquare gauge`: a gauge study. */
import { gaugeStudy, type GaugeStudy, type Tolerance } from '../../core/gauge/gauge-study'
import type { GaugeLevel } from '../../core/gauge/levels'
import { readOccasions } from '../../core/gauge/occasions'
import { gaugeObject } from '../../core/gauge/study-object'
import { studyWords } from '../../core/gauge/study-words'
import { formatFixed, formatSignificant, NO_VALUE } from '../../core/units/format'
import { numberOf, refuse } from './convert-arguments'
import { jsonText } from './json-text'
import { oneFile } from './one-file'
import { printProblems } from './print-problems'
import { readInput } from './read-inputs'
import { alignedNumbers } from './text-table'

export const GAUGE_USAGE = `usage: persquare gauge FILE [options]

  FILE                 CSV of repeated measurements: wafer, probe, run, day, operator and value, a row a reading; or a row an
                       occasion, with the mean, the standard deviation and the count of its readings
  --probe NAME         the probe whose components are told; all of them pooled without it
  --tolerance L,U      the limits that the gauge is to judge by: tells the share of them that its spread takes
  --confidence P       of every interval (default: 0.95)
  --json               print one object instead of the tables

exit status: 0 done; 2 not done`

const OPTIONS = {
  probe: { type: 'string' },
  tolerance: { type: 'string' },
  confidence: { type: 'string' },
  json: { type: 'boolean' },
} as const

export async function gaugeCommand(args: readonly string[]): Promise<number> {
  const { path, given } = oneFile(args, OPTIONS, 'a CSV file of repeated measurements')
  const options = {
    probe: given.probe ?? null,
    tolerance: given.tolerance === undefined ? null : toleranceOf(given.tolerance),
    ...(given.confidence === undefined ? {} : { level: numberOf('confidence', given.confidence) }),
  }
  const { occasions, problems } = readOccasions(await readInput(path))
  printProblems(problems)
  if (!occasions) return 2
  const study = gaugeStudy(occasions, options)
  process.stdout.write(given.json ? jsonText(gaugeObject(study)) : gaugeText(study))
  return 0
}

function toleranceOf(text: string): Tolerance {
  const [lower, upper, more] = text.split(/[,;:]/).map((part) => numberOf('tolerance', part.trim()))
  if (upper === undefined || more !== undefined) refuse('--tolerance', 'it is two numbers, such as 87,97')
  return { lower, upper }
}

function gaugeText(study: GaugeStudy): string {
  const { components, biases, occasions } = study
  const unit = occasions.unit && ` ${occasions.unit}`
  const levels = [
    ['level', `s${unit}`, 'df', `from`, `to`, `of its own${unit}`],
    levelRow('readings of an occasion', components.repeatability),
    levelRow('days of a run', components.day),
    levelRow('runs', components.run),
  ]
  const probes = biases.map((bias) => [
    bias.probe,
    digits(bias.bias),
    digits(bias.standardUncertainty),
    digits(bias.interval.lower),
    digits(bias.interval.upper),
    bias.pValue < 1e-4 ? '< 0.0001' : formatFixed(bias.pValue, 4),
  ])
  return [
    ...studyWords(study),
    '',
    ...alignedNumbers(levels),
    ...(probes.length > 0 ? ['', ...alignedNumbers([['probe', `bias${unit}`, 'u', 'from', 'to', 'p'], ...probes])] : []),
    '',
  ].join('\n')
} // prettier-ignore

function levelRow(name: string, level: GaugeLevel | null): string[] {
  if (!level) return [name, NO_VALUE, NO_VALUE, NO_VALUE, NO_VALUE, NO_VALUE]
  const { standardDeviation, degreesOfFreedom, interval, ownStandardDeviation } = level
  const own = ownStandardDeviation === null ? 'none seen' : digits(ownStandardDeviation)
  return [name, digits(standardDeviation), String(degreesOfFreedom), digits(interval.lower), digits(interval.upper), own]
} // prettier-ignore

const digits = (value: number): string => formatSignificant(value, 4)
