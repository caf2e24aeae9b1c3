/** The prober itself: its gauge study and its check wafer, where the procedure names them. */
import { alarmedOccasions, CHECK_SOURCE, type CheckResult } from '../../check-wafer/check'
import { checkWords, decimalsFor, standingWords } from '../../check-wafer/check-words'
import { GAUGE_SOURCE, type GaugeStudy } from '../../gauge/gauge-study'
import type { GaugeLevel } from '../../gauge/levels'
import { studyWords } from '../../gauge/study-words'
import { formatFixed, formatSignificant, NO_VALUE } from '../../units/format'
import type { Drawing } from '../drawing'
import type { Block, TableRow } from '../document'
import { controlChart } from '../figures/control-chart'
import { probeBiasChart } from '../figures/probe-biases'
import type { ReportContext } from '../report-context'

const CHART_HEIGHT_PT = 150

export function gaugeSection({ analysis, width_pt }: ReportContext): Block[] {
  const { gauge, check } = analysis
  return [
    ...(gauge ? gaugeBlocks(gauge, width_pt) : []),
    ...(check
      ? [
          { kind: 'heading', level: 1, text: 'Check wafer' } as const,
          { kind: 'paragraph', text: standingWords(check.result, check.standing) } as const,
          ...checkBlocks(check.result, width_pt),
        ]
      : []),
  ]
}

export function gaugeBlocks(study: GaugeStudy, width_pt: number): Block[] {
  const { components, biases, occasions } = study
  const biasTable: Block = {
    kind: 'table',
    summary: 'Bias of each probe against the mean of all',
    columns: [
      { title: 'Probe', align: 'left', share: 1 },
      { title: 'Bias', unit: occasions.unit, align: 'decimal', share: 1 },
      { title: 'u', unit: occasions.unit, align: 'decimal', share: 1 },
      { title: 'from', unit: occasions.unit, align: 'decimal', share: 1 },
      { title: 'to', unit: occasions.unit, align: 'decimal', share: 1 },
      { title: 'p', align: 'decimal', share: 0.8 },
    ],
    rows: biases.map(({ probe, bias, standardUncertainty, interval, pValue }) => ({
      cells: [probe, four(bias), four(standardUncertainty), four(interval.lower), four(interval.upper), pValue < 1e-4 ? '< 0.0001' : formatFixed(pValue, 4)],
      ...(probe === study.probe && { emphasis: 'strong' as const }),
    })),
  }
  const chart = probeBiasChart({ title: 'Differences of the probes from their mean', unit: occasions.unit, biases, width_pt, height_pt: CHART_HEIGHT_PT })
  return [
    { kind: 'heading', level: 1, text: 'Gauge study' },
    ...studyWords(study).map((text): Block => ({ kind: 'paragraph', text })),
    {
      kind: 'table',
      summary: 'Components of the spread of the gauge',
      columns: [
        { title: 'Among', align: 'left', share: 1.8 },
        { title: 's', unit: occasions.unit, align: 'decimal', share: 1 },
        { title: 'Degrees of freedom', align: 'right', share: 1 },
        { title: 'from', unit: occasions.unit, align: 'decimal', share: 1 },
        { title: 'to', unit: occasions.unit, align: 'decimal', share: 1 },
        { title: 'Own component', unit: occasions.unit, align: 'decimal', share: 1.2 },
      ],
      rows: [
        levelRow('readings of an occasion', components.repeatability),
        levelRow('days of a run', components.day),
        levelRow('runs', components.run),
      ],
    },
    ...(biases.length > 0 ? [biasTable, { kind: 'figures', figures: [chart] } as const] : []),
    { kind: 'paragraph', text: `Source: ${GAUGE_SOURCE}. Intervals at ${formatFixed(100 * study.level, 0)} %.`, quiet: true },
  ]
} // prettier-ignore

function levelRow(name: string, level: GaugeLevel | null): TableRow {
  if (!level) return { cells: [name, NO_VALUE, NO_VALUE, NO_VALUE, NO_VALUE, NO_VALUE] }
  const { standardDeviation, degreesOfFreedom, interval, ownStandardDeviation } = level
  const own = ownStandardDeviation === null ? 'none seen' : four(ownStandardDeviation)
  return {
    cells: [name, four(standardDeviation), String(degreesOfFreedom), four(interval.lower), four(interval.upper), own],
  }
}

export function checkBlocks(result: CheckResult, width_pt: number): Block[] {
  const { history, limits } = result
  const decimals = decimalsFor(limits.standardDeviation)
  const rows = alarmedOccasions(result).map(({ index, when, value, standardDeviation, alarms, nextSteps }): TableRow => ({
    cells: [
      String(index),
      when,
      formatFixed(value, decimals),
      formatSignificant(standardDeviation, 3),
      [...alarms.map(({ sentence }) => sentence), ...nextSteps].join(' '),
    ],
  }))
  return [
    ...checkWords(result).map((text): Block => ({ kind: 'paragraph', text })),
    ...checkCharts(result, width_pt).map((chart): Block => ({ kind: 'figures', figures: [chart] })),
    ...(rows.length > 0
      ? [{
          kind: 'table' as const,
          summary: 'Alarms of the check wafer',
          columns: [
            { title: 'Row', align: 'right' as const, share: 0.5 },
            { title: 'When', align: 'left' as const, share: 1.3 },
            { title: 'Value', unit: history.unit, align: 'decimal' as const, share: 0.9 },
            { title: 's', unit: history.unit, align: 'decimal' as const, share: 0.7 },
            { title: 'Alarm, and what to do', align: 'left' as const, share: 5 },
          ],
          rows,
        }]
      : []),
    { kind: 'paragraph', text: `Source: ${CHECK_SOURCE}.`, quiet: true },
  ]
} // prettier-ignore

/** Value, precision where it is known, moving average. */
export function checkCharts({ history, limits, average, alarms }: CheckResult, width_pt: number, chosen: number | null = null): Drawing[] {
  const order = [...history.order]
  const unit = history.unit && ` / ${history.unit}`
  const places = (...charts: readonly string[]): Set<number> => new Set(alarms.filter(({ chart }) => charts.includes(chart)).map(({ place }) => place - 1))
  const common = { baseline: limits.baseline, chosen, width_pt, height_pt: CHART_HEIGHT_PT }
  const spread = order.map((row) => history.standardDeviation[row])
  const own = order.map((row) => limits.precisionLimits[row]).map((limit) => (Number.isNaN(limit) ? (limits.precisionUpperLimit ?? NaN) : limit))
  // Occasions of one length share one limit.
  const isOne = own.every((limit) => limit === own[0])
  return [
    controlChart({
      ...common, title: 'Values of the check wafer', yTitle: `value${unit}`, values: order.map((row) => history.value[row]),
      centre: limits.centerLine, lower: limits.lowerLimit, upper: limits.upperLimit, alarms: places('value', 'run'),
    }),
    ...(limits.precisionUpperLimit === null ? [] : [controlChart({
      ...common, title: 'Precision of the check wafer', yTitle: `standard deviation of a series${unit}`, values: spread,
      centre: limits.repeatability, lower: null, upper: isOne ? limits.precisionUpperLimit : null, curves: isOne ? [] : [{ lower: own, upper: own }], alarms: places('precision'),
    })]),
    controlChart({
      ...common, title: 'Moving average of the check wafer', yTitle: `moving average${unit}`, values: Array.from(average.average),
      centre: limits.centerLine, lower: null, upper: null, curves: [{ lower: average.lower, upper: average.upper }], alarms: places('moving-average'),
    }),
  ]
} // prettier-ignore

const four = (value: number): string => formatSignificant(value, 4)
