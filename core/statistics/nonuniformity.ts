/**
 * How far the sites of a wafer spread, in percent. The trade uses several figures under the one word "uniformity",
 * and they differ by factors of 2 and more: so a percentage is never shown without its definition.
 */
import { CoreError } from '../problems/problem'

/** What a definition may draw on. All four in the same unit. */
export interface SpreadSummary {
  readonly mean: number
  /** Sample standard deviation, divisor n - 1. */
  readonly standardDeviation: number
  readonly min: number
  readonly max: number
}

export const nonuniformityIds = [
  'sup',
  'hlv',
  'half-range-over-mean',
  'contrast',
  'range-over-mean',
  'range-over-min',
] as const
export type NonuniformityId = (typeof nonuniformityIds)[number]

export interface Nonuniformity {
  readonly id: NonuniformityId
  readonly title: string
  /** As text, for tables and footnotes. */
  readonly formula: string
  readonly source: string
  /** NaN where the summary gives none (one site and a standard deviation, or a divisor of zero). */
  readonly percent: (summary: SpreadSummary) => number
}

const NO_SOURCE = 'common practice, no source'

/** Every definition on offer, in menu order. A new one is one entry here and its id above. */
export const nonuniformities: readonly Nonuniformity[] = [
  {
    id: 'sup',
    title: 'Standard deviation over mean',
    formula: '100 s / mean',
    source: 'SEMI MF1618-1104, sample uniformity SUP',
    percent: ({ mean, standardDeviation }) => percentOf(standardDeviation, mean),
  },
  {
    id: 'hlv',
    title: 'High-low variation',
    formula: '200 (max - min) / (max + min)',
    source: 'SEMI MF1618-1104, high-low variation HLV',
    percent: ({ min, max }) => percentOf(max - min, (max + min) / 2),
  },
  {
    id: 'half-range-over-mean',
    title: 'Half range over mean',
    formula: '100 (max - min) / (2 mean)',
    source: NO_SOURCE,
    percent: ({ mean, min, max }) => percentOf(max - min, 2 * mean),
  },
  {
    id: 'contrast',
    title: 'Contrast',
    formula: '100 (max - min) / (max + min)',
    source: NO_SOURCE,
    percent: ({ min, max }) => percentOf(max - min, max + min),
  },
  {
    id: 'range-over-mean',
    title: 'Range over mean',
    formula: '100 (max - min) / mean',
    source: NO_SOURCE,
    percent: ({ mean, min, max }) => percentOf(max - min, mean),
  },
  {
    id: 'range-over-min',
    title: 'Range over minimum',
    formula: '100 (max - min) / min',
    source: NO_SOURCE,
    percent: ({ min, max }) => percentOf(max - min, min),
  },
]

/** The definition of that id. Throws CoreError 'unknown-id'. */
export function nonuniformity(id: string): Nonuniformity {
  const found = nonuniformities.find((definition) => definition.id === id)
  if (!found) throw new CoreError({ kind: 'unknown-id', family: 'non-uniformity', id, known: nonuniformityIds })
  return found
}

function percentOf(part: number, whole: number): number {
  return whole === 0 ? NaN : (100 * part) / whole
}
