/** A gauge study as data for other programs: `"format": "persquare-gauge/1"`. */
import type { ConfidenceInterval } from '../statistics/intervals'
import { GAUGE_SOURCE, type GaugeStudy } from './gauge-study'
import type { GaugeLevel, GaugeLevels } from './levels'

export const GAUGE_FORMAT = 'persquare-gauge/1'

/** Plain data, keys in a fixed order; what is not known is null. */
export function gaugeObject(study: GaugeStudy): object {
  const { occasions, level, probe, wafers, probes, runs, measurement, tolerance, operator, betweenProbes } = study
  return {
    format: GAUGE_FORMAT,
    input: { name: occasions.file, bytes: occasions.bytes, sha256: occasions.sha256 },
    unit: occasions.unit,
    occasions: occasions.count,
    wafers,
    probes,
    runs,
    probe,
    confidence: level,
    components: componentsObject(study.components),
    byProbe: study.byProbe.map((entry) => ({ probe: entry.probe, components: componentsObject(entry.components) })),
    biases: study.biases.map((bias) => ({
      probe: bias.probe,
      bias: bias.bias,
      correction: bias.correction,
      standardUncertainty: bias.standardUncertainty,
      standardDeviation: bias.standardDeviation,
      degreesOfFreedom: bias.degreesOfFreedom,
      interval: intervalObject(bias.interval),
      pValue: bias.pValue,
      cells: bias.cells,
    })),
    operators: operator,
    betweenProbes: betweenProbes && {
      between: betweenProbes.between,
      within: betweenProbes.within,
      f: betweenProbes.f,
      rSquared: betweenProbes.rSquared,
      residualStandardDeviation: betweenProbes.residualStandardDeviation,
    },
    totalStandardDeviation: study.totalStandardDeviation,
    measurement,
    tolerance: tolerance && { lower: tolerance.lower, upper: tolerance.upper, sharePercent: tolerance.percent },
    source: GAUGE_SOURCE,
  }
}

function componentsObject({ repeatability, day, run, readingsPerOccasion, daysPerRun }: GaugeLevels): object {
  return {
    repeatability: repeatability && levelObject(repeatability),
    day: day && levelObject(day),
    run: run && levelObject(run),
    readingsPerOccasion,
    daysPerRun,
  }
}

function levelObject(level: GaugeLevel): object {
  return {
    standardDeviation: level.standardDeviation,
    degreesOfFreedom: level.degreesOfFreedom,
    interval: intervalObject(level.interval),
    ownVariance: level.ownVariance,
    ownStandardDeviation: level.ownStandardDeviation,
    ownInterval: intervalObject(level.ownInterval),
  }
}

function intervalObject({ lower, upper }: ConfidenceInterval): object {
  return { lower, upper }
}
