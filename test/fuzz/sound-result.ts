/** What holds of every result, whatever went in; throws where it doesn't. */
import { SITE_FLAGS } from '../../core/analysis/flags'
import { limitsOn } from '../../core/analysis/quantity'
import { VERDICTS, type LotAnalysis, type Statistics } from '../../core/analysis/lot-analysis'
import type { RunResult } from '../../core/analysis/run'
import { explain, placeOf } from '../../core/problems/explain'
import type { Problem } from '../../core/problems/problem'

export function fail(why: string): never {
  throw new Error(why)
}

export function require(holds: boolean, why: () => string): void {
  if (!holds) fail(why())
}

/** Words that a program lets slip; none is looked for where the input holds it. */
const SLIPS = ['undefined', 'nan', '[object', 'infinity', 'null']

export class Words {
  private readonly forbidden: RegExp | null

  constructor(...inputs: readonly (string | Uint8Array)[]) {
    // NUL out, so that UTF-16 is looked through as well.
    const text = inputs
      .map((input) => (typeof input === 'string' ? input : new TextDecoder('latin1').decode(input)))
      .join('\n')
      .replace(/\0/g, '')
      .toLowerCase()
    const words = SLIPS.filter((word) => !text.includes(word)).map((word) =>
      word === '[object' ? '\\[object' : `\\b${word}\\b`,
    )
    this.forbidden = words.length > 0 ? new RegExp(words.join('|'), 'i') : null
  }

  check(text: string, where: string): void {
    require(text.trim() !== '', () => `empty text: ${where}`)
    require(!this.forbidden?.test(text), () => `slip in ${where}: ${text.slice(0, 300)}`)
  }
}

export function checkProblems(problems: readonly Problem[], words: Words): void {
  for (const problem of problems) {
    words.check(explain(problem), problem.kind)
    require(typeof placeOf(problem) === 'string', () => `no place: ${problem.kind}`)
  }
}

export function checkResult({ analysis, problems }: RunResult, words: Words): void {
  checkProblems(problems, words)
  if (analysis === null) return require(problems.length > 0, () => 'no analysis and no problem')
  checkSites(analysis)
  checkDies(analysis)
  checkRows(analysis)
  checkWafers(analysis)
  for (const text of [
    analysis.lot.sentence,
    ...analysis.notes,
    ...analysis.lot.reasons,
    ...analysis.wafers.flatMap(({ reasons }) => reasons),
  ]) {
    words.check(text, 'sentence')
  }
}

const isGood = (value: number) => value > 0 && value < Infinity
const isUncertainty = (u: number) => u >= 0 && u < Infinity

function checkSites({ sites, quantity, procedure }: LotAnalysis): void {
  const { site: limits } = limitsOn(quantity, procedure)
  const hasLimits = limits?.lower !== undefined || limits?.upper !== undefined
  const quantities = [
    ['sheet resistance', sites.sheetResistance_ohm_sq, sites.uSheetResistance_ohm_sq],
    ['resistivity', sites.resistivity_ohm_cm, sites.uResistivity_ohm_cm],
    ['concentration', sites.concentration_cm3, sites.uConcentration_cm3],
    ['dose', sites.dose_cm2, null],
    ['thickness', sites.thickness_um, null],
  ] as const
  for (let i = 0; i < sites.count; i++) {
    const at = () =>
      `site ${i}: value ${sites.value[i]} u ${sites.u[i]} flags ${sites.flags[i].toString(2)} V/I ${sites.vOverI_ohm[i]}`
    const hasReading = (sites.flags[i] & SITE_FLAGS.noReading.bit) === 0
    require(hasReading === isGood(sites.value[i]), () => `value or flag missing, ${at()}`)
    require(hasReading ? isUncertainty(sites.u[i]) : Number.isNaN(sites.value[i]), () => `uncertainty, ${at()}`)
    for (const [name, column, u] of quantities) {
      const value = column[i]
      require(isGood(value) || Number.isNaN(value), () => `${name} is ${value}, ${at()}`)
      if (u && isGood(value)) require(isUncertainty(u[i]), () => `u of ${name} is ${u[i]} at ${value}, ${at()}`)
    }
    const p = sites.conformanceProbability[i]
    require(hasLimits && hasReading ? p >= 0 && p <= 1 : Number.isNaN(p), () => `conformance ${p}, ${at()}`)
    require(VERDICTS[sites.verdict[i]] !== undefined, () => `verdict ${sites.verdict[i]}`)
    require(isFlaggedWhereLayerGivesNone(sites, procedure, i), () => `no concentration and no flag, ${at()}`)
  }
}

/** A layer of silicon gives a concentration or a dose, or the site says why it doesn't. */
function isFlaggedWhereLayerGivesNone(
  sites: LotAnalysis['sites'],
  { layer }: LotAnalysis['procedure'],
  i: number,
): boolean {
  if (!('dopant' in layer) || !isGood(sites.value[i])) return true
  const given = layer.kind === 'implant' ? sites.dose_cm2[i] : sites.concentration_cm3[i]
  return isGood(given) || (sites.flags[i] & (SITE_FLAGS.layerRange.bit | SITE_FLAGS.mobilityRange.bit)) !== 0
}

function checkDies({ dies }: LotAnalysis): void {
  for (let i = 0; dies && i < dies.count; i++) {
    const at = () => `die ${i}: ${dies.value[i]} u ${dies.u[i]} p ${dies.conformanceProbability[i]}`
    const p = dies.conformanceProbability[i]
    require(isGood(dies.value[i]) ? isUncertainty(dies.u[i]) : Number.isNaN(dies.value[i]), at)
    require((p >= 0 && p <= 1) || Number.isNaN(p), at)
    require(VERDICTS[dies.verdict[i]] !== undefined && dies.basis[i] <= 1, at)
  }
}

/** Rows read are sites, rejected rows and, in a long file, rows put together with another. */
function checkRows({ readings, problems }: LotAnalysis): void {
  const perFile = new Map<string, number>()
  for (const problem of problems) {
    if (!['bad-cell', 'bad-row', 'doubled-site'].includes(problem.kind) || !('file' in problem)) continue
    perFile.set(problem.file, (perFile.get(problem.file) ?? 0) + 1)
  }
  let left = -readings.count
  for (const { name, rows, rejectedRows } of readings.files) {
    require((perFile.get(name) ?? 0) === Math.min(rejectedRows, 10_000), () =>
      `${rejectedRows} rejected, ${perFile.get(name)} listed`)
    left += rows - rejectedRows
  }
  const isLong =
    readings.files.some(({ ignoredHeaders, matches }) => matches.length + ignoredHeaders.length > 0) && left > 0
  require(left === 0 || (isLong && left > 0), () => `${left} rows unaccounted for`)
  const ofWafers = readings.wafers.reduce((sum, { rejectedRows }) => sum + rejectedRows, 0)
  const ofFiles = readings.files.reduce((sum, { rejectedRows }) => sum + rejectedRows, 0)
  require(ofWafers <= ofFiles, () => `${ofWafers} rejected rows of wafers, ${ofFiles} of files`)
  require(readings.line.length === readings.count && readings.site.length === readings.count, () =>
    'columns of unequal length')
}

function checkWafers({ wafers, lot, readings }: LotAnalysis): void {
  require(wafers.length === readings.wafers.length, () => 'a wafer is missing')
  for (const wafer of wafers) {
    checkStatistics(wafer.statistics, wafer.id)
    require(VERDICTS.includes(wafer.verdict), () => `verdict ${wafer.verdict}`)
    require(wafer.statistics.count > 0 ? isUncertainty(wafer.uMean) : Number.isNaN(wafer.uMean), () =>
      `u of mean ${wafer.uMean}`)
    for (const [name, mean] of Object.entries(wafer.means))
      require(isGood(mean) || Number.isNaN(mean), () => `${name} ${mean}`)
  }
  checkStatistics(lot.statistics, 'lot')
  require(VERDICTS.includes(lot.verdict), () => `verdict ${lot.verdict}`)
}

function checkStatistics(statistics: Statistics, whose: string): void {
  const { count, mean, median, min, max, range, standardDeviation, nonuniformity, nonuniformityPercent, rangePercent } =
    statistics
  const text = () => `statistics of ${whose}: ${JSON.stringify(statistics)}`
  const figures = [mean, median, min, max, range, rangePercent]
  if (count === 0) return require(figures.every(Number.isNaN), text)
  require(figures.every(Number.isFinite) && min <= median && median <= max && min > 0, text)
  require(mean >= min * (1 - 1e-12) && mean <= max * (1 + 1e-12), text)
  if (count === 1) return require(Number.isNaN(standardDeviation), text)
  require(isUncertainty(standardDeviation) && isUncertainty(nonuniformityPercent), text)
  require(nonuniformity.every(({ percent }) => isUncertainty(percent)), text)
}
