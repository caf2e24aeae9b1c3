/** What a check wafer's charts say, in sentences, for the command line, the window and the report. */
import { quote } from '../problems/quote'
import { formatFixed, formatSignificant } from '../units/format'
import type { CheckResult, StandingCheck } from './check'

export function checkWords({ history, limits, alarms, autocorrelation, isInControl }: CheckResult): readonly string[] {
  const name = [history.wafers[0] && `wafer ${history.wafers[0]}`, history.probes[0] && `probe ${history.probes[0]}`]
  const what = name.filter(Boolean).join(' with ') || history.file
  const spread = decimalsFor(limits.standardDeviation)
  const unit = history.unit && ` ${history.unit}`
  const made = limits.baseline === history.count ? `all ${history.count} occasions` : `the first ${limits.baseline} of ${history.count} occasions` // prettier-ignore
  const occasions = new Set(alarms.map(({ index }) => index)).size
  const correlated = Math.abs(autocorrelation) > 2 / Math.sqrt(history.count)
  return [
    isInControl
      ? `The last occasion of ${what} is in control.`
      : `The last occasion of ${what} raises an alarm: what was measured since is doubtful.`,
    `Limits from ${made}: ${formatFixed(limits.lowerLimit, spread)} to ${formatFixed(limits.upperLimit, spread)}${unit} about ${formatFixed(limits.centerLine, spread)}${limits.isAccepted ? ' (the accepted value)' : ''}.`,
    limits.precisionUpperLimit === null
      ? 'The history has no standard deviations with the count of their readings, so that the precision of an occasion is not judged.'
      : `A series may spread by ${formatSignificant(limits.precisionUpperLimit, 4)}${unit}.`,
    ...(history.hasUnreadTimes
      ? [
          `Its times, such as ${quote(history.when[0])}, can't be read as dates: its rows stand in the order of the file, and no lot can be placed among them.`,
        ]
      : []),
    occasions === 0 ? 'No occasion raised an alarm.' : `${occasions} of ${history.count} occasions raised an alarm.`,
    ...(correlated
      ? [
          `Values hang on their neighbours (correlation ${formatFixed(autocorrelation, 2)}): they drift, and the limits are too narrow or too wide for that.`,
        ]
      : []),
  ]
}

/** Of a lot, what its check wafer says. */
export function standingWords({ history }: CheckResult, standing: StandingCheck): string {
  const which = standing.isDuring
    ? 'while the lot was measured'
    : `its last occasion${standing.byTime ? ' before the lot' : ''}`
  const when = `on ${standing.when}, ${which}`
  switch (standing.state) {
    case 'in-control':
      return `The check wafer was in control ${when} (${history.file}).`
    case 'doubtful':
      return `The check wafer was in control on ${standing.lastGood}, and raised an alarm on ${standing.when}, the next occasion after the lot (${history.file}): ${standing.alarms[0].sentence} The fault may have begun after the good occasion, before the lot was measured or after: the lot is doubtful. ${standing.alarms[0].nextStep}`
    case 'before-history':
      return `The lot was measured before the check wafer's history begins (${history.file}).`
    case 'alarm':
      return `The check wafer raised an alarm ${when} (${history.file}): ${standing.alarms[0].sentence} The prober may read wrong; ${lowered(standing.alarms[0].nextStep)}`
  }
}

function lowered(sentence: string): string {
  return sentence.charAt(0).toLowerCase() + sentence.slice(1)
}

/** So many that the standard deviation shows three digits. */
export function decimalsFor(standardDeviation: number): number {
  return Math.max(0, 2 - Math.floor(Math.log10(standardDeviation)))
}
