/** What a gauge study says, in sentences, for the command line, the window and the report. */
import { formatFixed, formatQuantity, formatSignificant } from '../units/format'
import type { GaugeStudy } from './gauge-study'

/** Below this a bias is told as one that is there. Common practice, no source. */
export const SIGNIFICANT = 0.05

export function studyWords(study: GaugeStudy): readonly string[] {
  const { occasions, probe, wafers, probes, runs, measurement, tolerance, operator, totalStandardDeviation } = study
  const extent = `${counted(occasions.count, 'occasion')} on ${counted(wafers.length, 'wafer')} with ${counted(probes.length, 'probe')} in ${counted(runs.length, 'run')}`
  const whose = probe === null ? (probes.length > 1 ? 'all probes pooled' : `probe ${probes[0]}`) : `probe ${probe}`
  const unit = occasions.unit
  return [
    `${occasions.file}: ${extent}; components of ${whose}.`,
    `A single reading on any day of any run spreads by ${quantity(totalStandardDeviation, unit)} (one standard deviation).`,
    ...(measurement
      ? [
          `One day's average of ${averaged(study)} is uncertain by ${quantity(measurement.expandedUncertainty, unit)} (k = ${formatFixed(measurement.coverageFactor, 2)}, ${formatFixed(measurement.effectiveDegreesOfFreedom, 0)} degrees of freedom).`,
        ]
      : []),
    ...missingLevels(study),
    ...biasWords(study),
    ...(operator && operator.pValue < SIGNIFICANT
      ? [`Operators read differently (p = ${formatSignificant(operator.pValue, 2)}).`]
      : []),
    ...(tolerance
      ? [
          `Six standard deviations take ${formatFixed(tolerance.percent, 1)} % of the tolerance from ${tolerance.lower} to ${tolerance.upper}${unit && ` ${unit}`}.`,
        ]
      : []),
  ]
}

function biasWords({ biases, occasions }: GaugeStudy): readonly string[] {
  const off = biases.filter(({ pValue }) => pValue < SIGNIFICANT)
  if (biases.length === 0) return []
  if (off.length === 0) return ['No probe reads significantly apart from the average of all.']
  return off.map(
    ({ probe, bias, correction, standardUncertainty }) =>
      `Probe ${probe} reads ${quantity(Math.abs(bias), occasions.unit)} ${bias > 0 ? 'high' : 'low'}; add ${quantity(correction, occasions.unit)} (u ${formatSignificant(standardUncertainty, 2)}).`,
  )
}

function missingLevels({ components }: GaugeStudy): readonly string[] {
  const missing = (['repeatability', 'day', 'run'] as const).filter((level) => components[level] === null)
  const WORDS = { repeatability: 'readings of an occasion', day: 'days of a run', run: 'runs' } as const
  return missing.map((level) => `The study does not tell the spread among ${WORDS[level]}.`)
}

function averaged({ components: { readingsPerOccasion } }: GaugeStudy): string {
  return readingsPerOccasion > 0
    ? `${Number.isInteger(readingsPerOccasion) ? readingsPerOccasion : formatSignificant(readingsPerOccasion, 2)} readings`
    : 'its readings'
}

function quantity(value: number, unit: string, digits = 3): string {
  return unit === '' ? formatSignificant(value, digits) : formatQuantity(value, unit)
}

function counted(count: number, word: string): string {
  return count === 1 ? `one ${word}` : `${count} ${word}s`
}
