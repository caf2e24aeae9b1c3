/** The check wafer's history judged: is the prober still what it was? */
import { controlLimits, CHART_DEFAULTS, type ChartOptions, type ControlLimits } from './control-limits'
import type { CheckHistory } from './history'
import { movingAverage, type MovingAverage } from './moving-average'
import { brokenRules, RUN_RULES, type RunRuleId } from './run-rules'

export const CHECK_SOURCE =
  'NIST/SEMATECH e-Handbook of Statistical Methods 2.6.2 (check wafer), 6.3.2 (run rules), 6.3.2.4 (moving average)'

export interface CheckAlarm {
  /** Row of the file, from 1. */
  readonly index: number
  /** Place in the order of time, from 1. */
  readonly place: number
  readonly when: string
  readonly time_ms: number
  readonly chart: 'value' | 'precision' | 'moving-average' | 'run'
  readonly rule: 'outside-limits' | RunRuleId
  /** What was charted. */
  readonly value: number
  readonly sentence: string
  readonly nextStep: string
}

export interface CheckResult {
  readonly history: CheckHistory
  readonly options: Required<ChartOptions>
  readonly limits: ControlLimits
  /** In the order of time, as are its columns. */
  readonly average: MovingAverage
  readonly alarms: readonly CheckAlarm[]
  /** Correlation of each value with the next; beyond +-2/root(n) the occasions are not independent. */
  readonly autocorrelation: number
  /** Whether the last occasion raised no alarm. */
  readonly isInControl: boolean
}

/** @throws CoreError not-applicable, as `controlLimits` */
export function checkHistory(history: CheckHistory, given: ChartOptions = {}): CheckResult {
  const options = { baseline: null, accepted: null, ...CHART_DEFAULTS, ...given }
  const limits = controlLimits(history, options)
  const order = [...history.order]
  const values = order.map((row) => history.value[row])
  const { centerLine: centre, standardDeviation } = limits
  const { lambda, averageWidth: width } = options
  const average = movingAverage({ values, centre, standardDeviation, lambda, width })
  const rules = brokenRules(values.map((value) => (value - centre) / standardDeviation))
  const alarms = order.flatMap((row, k) => alarmsAt({ history, limits, average, rules: rules[k], row, k }))
  const isInControl = !alarms.some(({ place }) => place === order.length)
  return { history, options, limits, average, alarms, autocorrelation: lagOne(values), isInControl }
}

interface Occasion {
  readonly history: CheckHistory
  readonly limits: ControlLimits
  readonly average: MovingAverage
  readonly rules: readonly RunRuleId[]
  readonly row: number
  readonly k: number
}

const LOOK_AT_PROBER =
  'Measure the check wafer again; if it stays off, look at probe, contact and temperature before another lot is measured.'
const LOOK_AT_TIP =
  'Measure the series again; if its spread stays, clean or change the probe tips and look for vibration and light.'
const LOOK_BACK = 'Look for what changed since the run began, such as a probe, a calibration or the room, and at the lots measured meanwhile.' // prettier-ignore

function alarmsAt({ history, limits, average, rules, row, k }: Occasion): CheckAlarm[] {
  const place = { index: row + 1, place: k + 1, when: history.when[row], time_ms: history.time_ms[row] }
  const { lowerLimit, upperLimit } = limits
  const value = history.value[row]
  const spread = history.standardDeviation[row]
  const mean = average.average[k]
  const found: CheckAlarm[] = []
  if (value < lowerLimit || value > upperLimit) {
    const sentence = `The check wafer read ${value < lowerLimit ? 'below its lower' : 'above its upper'} limit.`
    found.push({ ...place, chart: 'value', rule: 'outside-limits', value, sentence, nextStep: LOOK_AT_PROBER })
  }
  if (spread > limits.precisionLimits[row]) {
    const sentence = 'The readings of the series spread more than their limit.'
    found.push({ ...place, chart: 'precision', rule: 'outside-limits', value: spread, sentence, nextStep: LOOK_AT_TIP })
  }
  if (mean < average.lower[k] || mean > average.upper[k]) {
    const sentence = `The moving average lies ${mean < average.lower[k] ? 'below' : 'above'} its limits: the prober reads otherwise than it did.`
    found.push({ ...place, chart: 'moving-average', rule: 'outside-limits', value: mean, sentence, nextStep: LOOK_BACK })
  }
  const runs = rules.map((rule): CheckAlarm => {
    const sentence = `The value ${RUN_RULES[rule].words}.`
    return { ...place, chart: 'run', rule, value, sentence, nextStep: LOOK_BACK }
  })
  return [...found, ...runs]
} // prettier-ignore

/** Source: e-Handbook 1.3.5.12, the autocorrelation coefficient of lag 1. */
function lagOne(values: readonly number[]): number {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length
  let both = 0
  let whole = 0
  values.forEach((value, i) => {
    whole += (value - mean) ** 2
    if (i > 0) both += (value - mean) * (values[i - 1] - mean)
  })
  return both / whole
}

/** How the check wafer stood while something was measured. */
export interface StandingCheck {
  /** doubtful: in control before, and an alarm at the next occasion after; the fault may have begun in between. */
  readonly state: 'in-control' | 'alarm' | 'doubtful' | 'before-history'
  /** Place in the order of time, from 1, of the occasion that counts; 0 for none. */
  readonly place: number
  readonly when: string
  /** Of that occasion. */
  readonly alarms: readonly CheckAlarm[]
  /** Whether it was found by the time; without times the history's last occasion stands. */
  readonly byTime: boolean
  /** Whether that occasion came after the measurement had begun. */
  readonly isDuring: boolean
  /** Of a doubtful one: the last occasion that was in control. */
  readonly lastGood: string | null
}

/**
 * What was measured from `first_ms` to `last_ms` hangs on the last occasion at or before it began and on those while it
 * went on: an alarm stands until an occasion without one, and the first alarm of these counts, else an alarm at the next
 * occasion after it, as nobody knows when that fault began, else the last occasion.
 * `first_ms` NaN, or a history without times: the last occasion of all.
 */
export function standingAt({ history, alarms }: CheckResult, first_ms: number, last_ms = first_ms): StandingCheck {
  const order = [...history.order]
  const byTime = !Number.isNaN(first_ms) && order.every((row) => !Number.isNaN(history.time_ms[row]))
  const until = (time_ms: number): number => order.filter((row) => history.time_ms[row] <= time_ms).length
  const before = byTime ? until(first_ms) : order.length
  const end = byTime ? Math.max(before, until(last_ms)) : before
  if (end === 0)
    return { state: 'before-history', place: 0, when: '', alarms: [], byTime, isDuring: false, lastGood: null }
  const alarmed = alarms.find((alarm) => alarm.place >= before && alarm.place <= end)
  const isDoubtful = !alarmed && alarms.some((alarm) => alarm.place === end + 1)
  const place = alarmed?.place ?? (isDoubtful ? end + 1 : end)
  return {
    state: alarmed ? 'alarm' : isDoubtful ? 'doubtful' : 'in-control',
    place,
    when: history.when[order[place - 1]],
    alarms: alarms.filter((alarm) => alarm.place === place),
    byTime,
    isDuring: !isDoubtful && place > before,
    lastGood: isDoubtful ? history.when[order[end - 1]] : null,
  }
}

/** The alarms of one occasion, with what they say together. */
export interface AlarmedOccasion {
  readonly index: number
  readonly place: number
  readonly when: string
  readonly value: number
  readonly standardDeviation: number
  readonly alarms: readonly CheckAlarm[]
  readonly nextSteps: readonly string[]
}

export function alarmedOccasions({ history, alarms }: CheckResult): readonly AlarmedOccasion[] {
  const places = [...new Set(alarms.map(({ place }) => place))]
  return places.map((place) => {
    const own = alarms.filter((alarm) => alarm.place === place)
    const row = history.order[place - 1]
    return {
      index: own[0].index,
      place,
      when: own[0].when,
      value: history.value[row],
      standardDeviation: history.standardDeviation[row],
      alarms: own,
      nextSteps: [...new Set(own.map(({ nextStep }) => nextStep))],
    }
  })
}
