/** Values that move with the order of measurement: within a wafer, and from wafer to wafer. */
import { formatFixed } from '../units/format'
import {
  COMMON_PRACTICE,
  medianOf,
  robustDeviation,
  type HealthCheck,
  type HealthFinding,
  type HealthInput,
} from './finding'
import { surfaceResiduals } from './surface-residuals'

const SOURCE = `H. B. Mann, Econometrica 13 (1945) 245; M. G. Kendall, Rank Correlation Methods (1948); thresholds ${COMMON_PRACTICE}`
const SURE = 5
const SURE_AMONG_WAFERS = 3.5
/** Of the values: less drift is of no account. */
const LEAST_WITHIN = 0.001
const LEAST_AMONG = 0.01
const LEAST_WAFERS = 8
/** Pairs grow with the square. */
const MOST_SITES = 500

export const drift: HealthCheck = { id: 'drift', title: 'Drift over the measurement', look }

function look(input: HealthInput): readonly HealthFinding[] {
  return [...withinWafers(input), ...amongWafers(input)]
}

/** Residuals of each wafer's surface against the order of reading, the wafers pooled: a pattern on the wafer is no drift. */
function withinWafers(input: HealthInput): readonly HealthFinding[] {
  let score = 0
  let variance = 0
  const slopes: number[] = []
  const noises: number[] = []
  for (const { wafer, residual } of surfaceResiduals(input)) {
    const n = residual.length
    if (n > MOST_SITES) continue
    const order = inOrder(input, wafer.rows)
    score += kendall(order.map((k) => residual[k]))
    variance += (n * (n - 1) * (2 * n + 5)) / 18
    const level = medianOf([...wafer.rows].map((i) => input.value[i]))
    slopes.push(totalChange(order.map((k) => residual[k])) / level)
    noises.push(robustDeviation(residual, 0) / level)
  }
  const z = score / Math.sqrt(variance)
  const change = medianOf(slopes)
  if (!(Math.abs(z) > SURE) || Math.abs(change) < Math.max(LEAST_WITHIN, 2 * medianOf(noises))) return []
  return [
    {
      check: 'drift',
      severity: 'look',
      sentence: `Within the wafers the readings ${change > 0 ? 'rise' : 'fall'} by ${formatFixed(100 * Math.abs(change), 2)} % from the first site to the last, beyond any pattern on the wafer.`,
      nextStep:
        'Measure the first site of a wafer again after its last: if it changed, let the prober warm up, and look for heating and light.',
      wafers: [],
      site: null,
      evidence: { z, relativeChange: change },
      source: SOURCE,
    },
  ]
}

function amongWafers({ wafers, value, readings }: HealthInput): readonly HealthFinding[] {
  const measured = wafers.filter(({ rows }) => rows.length > 0)
  if (measured.length < LEAST_WAFERS) return []
  const { time_ms } = readings
  const timed = time_ms ? [...measured].sort((a, b) => (time_ms[a.rows[0]] || 0) - (time_ms[b.rows[0]] || 0)) : measured
  const medians = timed.map(({ rows }) => medianOf([...rows.subarray(0, 2000)].map((i) => value[i])))
  const n = medians.length
  const z = kendall(medians) / Math.sqrt((n * (n - 1) * (2 * n + 5)) / 18)
  const change = totalChange(medians) / medianOf(medians)
  if (!(Math.abs(z) > SURE_AMONG_WAFERS) || Math.abs(change) < LEAST_AMONG) return []
  return [
    {
      check: 'drift',
      severity: 'look',
      sentence: `From wafer to wafer the readings ${change > 0 ? 'rise' : 'fall'}, ${formatFixed(100 * Math.abs(change), 1)} % over the lot in the order measured: the process may have moved, or the prober.`,
      nextStep: `Measure wafer ${timed[0].id} again, or the check wafer: if it reads as before, the process has moved.`,
      wafers: [],
      site: null,
      evidence: { z, relativeChange: change, wafers: n },
      source: SOURCE,
    },
  ]
}

/** Entries of the wafer's rows in the order measured. */
function inOrder({ readings: { time_ms } }: HealthInput, rows: Uint32Array): number[] {
  const order = Array.from(rows.keys())
  return time_ms ? order.sort((a, b) => (time_ms[rows[a]] || 0) - (time_ms[rows[b]] || 0) || a - b) : order
}

/** Pairs that rise less pairs that fall. */
function kendall(values: readonly number[]): number {
  let score = 0
  for (let i = 1; i < values.length; i++) for (let j = 0; j < i; j++) score += Math.sign(values[i] - values[j])
  return score
}

/** Median of the slopes between early and late values (first third, last third), over the whole length. */
function totalChange(values: readonly number[]): number {
  const third = Math.floor(values.length / 3)
  if (third === 0) return 0
  const early = medianOf(values.slice(0, third))
  const late = medianOf(values.slice(-third))
  return ((late - early) * values.length) / (values.length - third)
}
