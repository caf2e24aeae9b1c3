/** What a look at the readings themselves brought up: what is suspicious, how badly, and what to do next. */
import type { PinSpacings, Orientation } from '../geometry/pin-line'
import type { Readings } from '../ingest/readings'
import type { Outline } from '../wafer/outline'

export const SEVERITIES = ['stops', 'look', 'note'] as const
/** stops: the numbers can't be trusted; look: before the lot is released; note: good to know. */
export type Severity = (typeof SEVERITIES)[number]

export interface HealthFinding {
  readonly check: string
  readonly severity: Severity
  /** What was seen, in words. */
  readonly sentence: string
  readonly nextStep: string
  readonly wafers: readonly string[]
  /** Row of the site columns that shows it best; null where none does. */
  readonly site: number | null
  /** The numbers that it was seen by, with their units in the names. */
  readonly evidence: Readonly<Record<string, number>>
  readonly source: string
}

/** One wafer's sites that count, in the order of reading. */
export interface HealthWafer {
  readonly id: string
  readonly rows: Uint32Array
}

/** Columns have an entry a reading. */
export interface HealthInput {
  readonly readings: Readings
  readonly wafers: readonly HealthWafer[]
  readonly outline: Outline
  readonly edgeExclusion_mm: number
  readonly spacings_mm: PinSpacings
  readonly orientation: Orientation
  readonly isDual: boolean
  /** null without places. */
  readonly x_mm: Float64Array | null
  readonly y_mm: Float64Array | null
  readonly vOverIA_ohm: Float64Array
  readonly vOverIB_ohm: Float64Array | null
  readonly sheetResistance_ohm_sq: Float64Array
  /** The judged quantity. */
  readonly value: Float64Array
  /** Standard uncertainty that each site has to itself. */
  readonly uIndependent: Float64Array
  /** What the value is expected to be; NaN where nobody says. */
  readonly expected: number
  readonly unit: string
}

export interface HealthCheck {
  readonly id: string
  readonly title: string
  readonly look: (input: HealthInput) => readonly HealthFinding[]
}

export const COMMON_PRACTICE = 'common practice, no source'

export function medianOf(values: ArrayLike<number>): number {
  const finite = new Float64Array(values.length)
  let length = 0
  for (let i = 0; i < values.length; i++) if (Number.isFinite(values[i])) finite[length++] = values[i]
  const sorted = finite.subarray(0, length).sort()
  if (length === 0) return NaN
  return length % 2 === 1 ? sorted[length >> 1] : (sorted[length / 2 - 1] + sorted[length / 2]) / 2
}

/** 1.4826 times the median distance from the median: the standard deviation of a normal sample, whatever its strays. */
export function robustDeviation(values: ArrayLike<number>, median = medianOf(values)): number {
  const distances = new Float64Array(values.length)
  for (let i = 0; i < values.length; i++) distances[i] = Math.abs(values[i] - median)
  return 1.4826 * medianOf(distances)
}
