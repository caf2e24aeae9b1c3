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
import { orderSlopes, sumOf, type OrderSlope } from './order-slopes'

export const DRIFT_AMONG_SOURCE = `H. B. Mann, Econometrica 13 (1945) 245; M. G. Kendall, Rank Correlation Methods (1948); thresholds ${COMMON_PRACTICE}`
export const DRIFT_WITHIN_SOURCE = `R. Frisch, F. V. Waugh, Econometrica 1 (1933) 387; M. C. Lovell, J. Am. Stat. Assoc. 58 (1963) 993; thresholds ${COMMON_PRACTICE}`
const SURE = 6
const SURE_AMONG_WAFERS = 3.5
/** Of the values: less drift is of no account. */
const LEAST_WITHIN = 0.001
const LEAST_AMONG = 0.01
const LEAST_WAFERS = 8
/** Of what all wafers share besides their surfaces. */
const LEAST_SHARE = 0.6
const SURE_ALONE = 7
const LEAST_ALONE = 0.003
const LEAST_DRIFTING_AMONG = 4
const AGAIN =
  'Measure the first site of a wafer again after its last: if it changed, let the prober warm up, and look for heating and light.'

export const drift: HealthCheck = { id: 'drift', title: 'Drift over the measurement', look }

function look(input: HealthInput): readonly HealthFinding[] {
  const slopes = orderSlopes(input)
  const among = amongWafers(input)
  return [...withinLot(slopes), ...withinSome(slopes), ...among, ...(among.length > 0 ? [] : stepAmongWafers(input))]
}

/** The wafers pooled. Where the surface is too smooth for what all wafers share, a drift can't be told from it: then none is. */
function withinLot(slopes: readonly OrderSlope[]): readonly HealthFinding[] {
  if (slopes.length === 0) return []
  // A wafer of few sites knows its own noise poorly: all their variances together.
  const error = Math.sqrt(slopes.reduce((sum, { standardError }) => sum + standardError ** 2, 0)) / slopes.length
  const change = medianOf(slopes.map((slope) => slope.change))
  const z = slopes.reduce((sum, slope) => sum + slope.change, 0) / slopes.length / error
  if (!(Math.abs(z) > SURE) || Math.abs(change) < LEAST_WITHIN || shareOfDrift(slopes, change) < LEAST_SHARE) return []
  return [
    {
      check: 'drift',
      severity: 'look',
      sentence: `Within the wafers the readings ${change > 0 ? 'rise' : 'fall'} by ${formatFixed(100 * Math.abs(change), 2)} % from the first site to the last, beyond any pattern on the wafer.`,
      nextStep: AGAIN,
      wafers: [],
      site: null,
      evidence: { z, relativeChange: change },
      source: DRIFT_WITHIN_SOURCE,
    },
  ]
} // prettier-ignore

/** What all wafers share besides their surfaces, and how much of it beyond the noise is a straight change with the order. */
function shareOfDrift(slopes: readonly OrderSlope[], change: number): number {
  const alike = slopes.filter(({ residual }) => residual.length === slopes[0].residual.length)
  const shared = slopes[0].residual.map((_, k) => alike.reduce((sum, { residual }) => sum + residual[k], 0) / alike.length)
  const noise = (medianOf(slopes.map((slope) => slope.noise)) ** 2 * shared.length) / alike.length
  const drifting = change ** 2 * sumOf(slopes[0].order, slopes[0].order)
  return drifting / Math.max(drifting, sumOf(shared, shared) - noise)
} // prettier-ignore

/** Wafers that drift where the others do not: a shape that all wafers share cancels here. */
function withinSome(slopes: readonly OrderSlope[]): readonly HealthFinding[] {
  if (slopes.length < LEAST_DRIFTING_AMONG) return []
  const ofLot = medianOf(slopes.map(({ change }) => change))
  const spread = robustDeviation(slopes.map(({ change }) => change), ofLot)
  const usual = medianOf(slopes.map(({ standardError }) => standardError))
  const off = slopes.filter(({ change, standardError, noise }) => {
    const beyond = Math.abs(change - ofLot)
    return beyond > Math.max(LEAST_ALONE, SURE_ALONE * Math.max(usual, standardError, spread), 3 * noise)
  })
  if (off.length > slopes.length / 3) return []
  return off.slice(0, 5).map(({ wafer, rows, change, standardError }): HealthFinding => ({
    check: 'drift',
    severity: 'look',
    sentence: `On wafer ${wafer} the readings ${change > 0 ? 'rise' : 'fall'} by ${formatFixed(100 * Math.abs(change), 2)} % from the first site to the last, unlike the other wafers.`,
    nextStep: AGAIN,
    wafers: [wafer],
    site: rows[0],
    evidence: { relativeChange: change, standardError, ofLot },
    source: DRIFT_WITHIN_SOURCE,
  }))
} // prettier-ignore

function amongWafers(input: HealthInput): readonly HealthFinding[] {
  const { ids, medians } = inSequence(input)
  if (medians.length < LEAST_WAFERS) return []
  const n = medians.length
  const z = kendall(medians) / Math.sqrt((n * (n - 1) * (2 * n + 5)) / 18)
  const change = totalChange(medians) / medianOf(medians)
  if (!(Math.abs(z) > SURE_AMONG_WAFERS) || Math.abs(change) < LEAST_AMONG) return []
  return [
    {
      check: 'drift',
      severity: 'look',
      sentence: `From wafer to wafer the readings ${change > 0 ? 'rise' : 'fall'}, ${formatFixed(100 * Math.abs(change), 1)} % over the lot in the order measured: the process may have moved, or the prober.`,
      nextStep: `Measure wafer ${ids[0]} again, or the check wafer: if it reads as before, the process has moved.`,
      wafers: [],
      site: null,
      evidence: { z, relativeChange: change, wafers: n },
      source: DRIFT_AMONG_SOURCE,
    },
  ]
}

const LEAST_EITHER_SIDE = 4
/** Of the scatter on either side. */
const STEP_OVER_SCATTER = 8

/** A level up to one wafer and another from the next on: every wafer of one side above every wafer of the other. */
function stepAmongWafers(input: HealthInput): readonly HealthFinding[] {
  const { ids, rows, medians } = inSequence(input)
  const whole = medianOf(medians)
  let best = { at: 0, step: 0, scatter: 0 }
  for (let at = LEAST_EITHER_SIDE; at <= medians.length - LEAST_EITHER_SIDE; at++) {
    const [before, after] = [medians.slice(0, at), medians.slice(at)]
    const [levelBefore, levelAfter] = [medianOf(before), medianOf(after)]
    const step = levelAfter - levelBefore
    const scatter = robustDeviation([...before.map((m) => m - levelBefore), ...after.map((m) => m - levelAfter)], 0)
    const isParted = step > 0 ? Math.min(...after) > Math.max(...before) : Math.max(...after) < Math.min(...before)
    if (isParted && Math.abs(step) > Math.abs(best.step)) best = { at, step, scatter }
  }
  const { at, step, scatter } = best
  if (at === 0 || Math.abs(step) < LEAST_AMONG * whole || Math.abs(step) < STEP_OVER_SCATTER * scatter) return []
  const share = step / whole
  return [
    {
      check: 'drift',
      severity: 'look',
      sentence: `From wafer ${ids[at]} on the readings are ${formatFixed(100 * Math.abs(share), 1)} % ${share > 0 ? 'higher' : 'lower'} than before, in the order measured: the process, the probe or the current changed there.`,
      nextStep: `Measure wafer ${ids[at - 1]} again: if it reads as before, the wafers differ; if not, the prober does.`,
      wafers: ids.slice(at),
      site: rows[at],
      evidence: { relativeStep: share, relativeScatter: scatter / whole, wafersBefore: at, wafersAfter: ids.length - at },
      source: COMMON_PRACTICE,
    },
  ]
} // prettier-ignore

interface Sequence {
  readonly ids: readonly string[]
  /** First row of each. */
  readonly rows: readonly number[]
  readonly medians: readonly number[]
}

/** Wafers in the order measured: by time where there is one. */
function inSequence({ wafers, value, readings: { time_ms } }: HealthInput): Sequence {
  const measured = wafers.filter(({ rows }) => rows.length > 0)
  const timed = time_ms ? [...measured].sort((a, b) => (time_ms[a.rows[0]] || 0) - (time_ms[b.rows[0]] || 0)) : measured
  return {
    ids: timed.map(({ id }) => id),
    rows: timed.map(({ rows }) => rows[0]),
    medians: timed.map(({ rows }) => medianOf(Array.from(rows.subarray(0, 2000), (i) => value[i]))),
  }
} // prettier-ignore

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
