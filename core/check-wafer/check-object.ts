/** A check wafer's charts as data for other programs: `"format": "persquare-check/1"`. */
import { CHECK_SOURCE, type CheckResult } from './check'

export const CHECK_FORMAT = 'persquare-check/1'

/** Plain data, keys in a fixed order; what is not known is null. Occasions stand in the order of time. */
export function checkObject({ history, options, limits, average, alarms, autocorrelation, isInControl }: CheckResult): object {
  const order = [...history.order]
  return {
    format: CHECK_FORMAT,
    input: { name: history.file, bytes: history.bytes, sha256: history.sha256 },
    unit: history.unit,
    wafer: history.wafers[0] ?? null,
    probe: history.probes[0] ?? null,
    count: history.count,
    baseline: limits.baseline,
    centerLine: limits.centerLine,
    lowerLimit: limits.lowerLimit,
    upperLimit: limits.upperLimit,
    standardDeviation: limits.standardDeviation,
    degreesOfFreedom: limits.degreesOfFreedom,
    repeatability: limits.repeatability,
    repeatabilityDegreesOfFreedom: limits.repeatabilityDegreesOfFreedom,
    precisionUpperLimit: limits.precisionUpperLimit,
    movingAverage: {
      lambda: options.lambda,
      width: options.averageWidth,
      steadyLower: average.steadyLower,
      steadyUpper: average.steadyUpper,
    },
    autocorrelation,
    inControl: isInControl,
    alarms: alarms.map(({ index, place, when, time_ms, chart, rule, value, sentence, nextStep }) => ({
      index,
      place,
      line: history.line[index - 1],
      when,
      time: Number.isNaN(time_ms) ? null : new Date(time_ms).toISOString(),
      chart,
      rule,
      value,
      sentence,
      nextStep,
    })),
    occasions: order.map((row, k) => ({
      when: history.when[row],
      value: history.value[row],
      standardDeviation: history.standardDeviation[row],
      precisionUpperLimit: Number.isNaN(limits.precisionLimits[row]) ? null : limits.precisionLimits[row],
      movingAverage: average.average[k],
    })),
    source: CHECK_SOURCE,
  }
} // prettier-ignore
