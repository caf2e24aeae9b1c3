/**
 * Spreads of a gauge study at three levels: among the readings of an occasion, among the days of a run, among the runs.
 * Each is pooled over its groups by their degrees of freedom.
 *
 * Source: NIST/SEMATECH e-Handbook of Statistical Methods 2.4.4, 2.6.1 and 2.6.3.
 */
import { componentInterval } from '../statistics/component-interval'
import { rootOfInterval, varianceInterval, type ConfidenceInterval } from '../statistics/intervals'
import type { Occasions } from './occasions'

/** One level: what it is as found, and what is its own once the level below is taken out of it. */
export interface GaugeLevel {
  /** Pooled standard deviation of what varies at this level: readings, daily means, run means. */
  readonly standardDeviation: number
  readonly degreesOfFreedom: number
  readonly interval: ConfidenceInterval
  /**
   * The level's own component of variance. Left negative where it comes out so: its groups differ less than what they
   * hold lets expect.
   */
  readonly ownVariance: number
  /** null where the variance is negative. */
  readonly ownStandardDeviation: number | null
  readonly ownInterval: ConfidenceInterval
}

/** null where nothing was repeated at that level. */
export interface GaugeLevels {
  readonly repeatability: GaugeLevel | null
  readonly day: GaugeLevel | null
  readonly run: GaugeLevel | null
  /** Readings an occasion, days a run: harmonic means, as they enter the components. */
  readonly readingsPerOccasion: number
  readonly daysPerRun: number
}

interface Pooled {
  readonly variance: number
  readonly freedom: number
}

export function gaugeLevels(occasions: Occasions, rows: readonly number[], level: number): GaugeLevels {
  const first = pooledReadings(occasions, rows)
  const runs = groupedBy(rows, (i) => [occasions.wafer[i], occasions.probe[i], occasions.run[i]])
  const daily = occasions.has.day || occasions.has.run ? pooledMeans(runs.map((list) => list.map((i) => occasions.mean[i]))) : null
  const runMeans = runs.map((list) => ({ row: list[0], mean: meanOf(list.map((i) => occasions.mean[i])), days: list.length }))
  const wafers = groupedBy(runMeans.map((_, k) => k), (k) => [occasions.wafer[runMeans[k].row], occasions.probe[runMeans[k].row]])
  const byRun = occasions.has.run ? pooledMeans(wafers.map((list) => list.map((k) => runMeans[k].mean))) : null
  const readingsPerOccasion = harmonicMean(rows.map((i) => occasions.readings[i]))
  const daysPerRun = harmonicMean(runMeans.map(({ days }) => days))
  return {
    repeatability: first && innermost(first, level),
    day: daily && above(daily, first, readingsPerOccasion, level),
    run: byRun && above(byRun, daily, daysPerRun, level),
    readingsPerOccasion,
    daysPerRun,
  }
} // prettier-ignore

/** Of the readings within occasions; null where no occasion tells. */
function pooledReadings({ standardDeviation, readings }: Occasions, rows: readonly number[]): Pooled | null {
  let sum = 0
  let freedom = 0
  for (const i of rows) {
    const own = readings[i] - 1
    if (!(own > 0) || !(standardDeviation[i] >= 0)) continue
    sum += own * standardDeviation[i] ** 2
    freedom += own
  }
  return freedom > 0 ? { variance: sum / freedom, freedom } : null
}

/** Of values within groups; null where no group has two. */
function pooledMeans(groups: readonly (readonly number[])[]): Pooled | null {
  let sum = 0
  let freedom = 0
  for (const values of groups) {
    const mean = meanOf(values)
    for (const value of values) sum += (value - mean) ** 2
    freedom += values.length - 1
  }
  return freedom > 0 ? { variance: sum / freedom, freedom } : null
}

function innermost({ variance, freedom }: Pooled, level: number): GaugeLevel {
  const interval = rootOfInterval(varianceInterval({ variance, degreesOfFreedom: freedom, level }))
  const standardDeviation = Math.sqrt(variance)
  return {
    standardDeviation,
    degreesOfFreedom: freedom,
    interval,
    ownVariance: variance,
    ownStandardDeviation: standardDeviation,
    ownInterval: interval,
  }
}

/** `size` values of the level below make one value here, and leave their share of spread in it. */
function above({ variance, freedom }: Pooled, below: Pooled | null, size: number, level: number): GaugeLevel {
  const ownVariance = below ? variance - below.variance / size : variance
  const interval = rootOfInterval(varianceInterval({ variance, degreesOfFreedom: freedom, level }))
  const ownInterval = below
    ? rootOfInterval(
        componentInterval({
          larger: { meanSquare: size * variance, degreesOfFreedom: freedom },
          smaller: { meanSquare: below.variance, degreesOfFreedom: below.freedom },
          divisor: size,
          level,
        }),
      )
    : interval
  return {
    standardDeviation: Math.sqrt(variance),
    degreesOfFreedom: freedom,
    interval,
    ownVariance,
    ownStandardDeviation: ownVariance < 0 ? null : Math.sqrt(ownVariance),
    ownInterval,
  }
}

export function groupedBy(rows: readonly number[], keyOf: (row: number) => readonly string[]): number[][] {
  const groups = new Map<string, number[]>()
  for (const row of rows) {
    const key = JSON.stringify(keyOf(row))
    const group = groups.get(key)
    if (group) group.push(row)
    else groups.set(key, [row])
  }
  return [...groups.values()]
}

export function meanOf(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length
}

/** Of what is known; NaN where nothing is. */
function harmonicMean(values: readonly number[]): number {
  const known = values.filter((value) => value > 0)
  return known.length / known.reduce((sum, value) => sum + 1 / value, 0)
}
