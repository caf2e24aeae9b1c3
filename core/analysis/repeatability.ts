/** How well a reading repeats, as the two polarities of the lot's own readings tell it. */
import type { Readings } from '../ingest/readings'

export interface Repeatability {
  /** Standard uncertainty of the mean of the two polarities, relative. */
  readonly relative: number
  readonly degreesOfFreedom: number
}

const LEAST_SITES = 8

/**
 * Spread of the relative differences of forward and reverse V/I about their mean, halved: the mean of two readings has
 * half the standard deviation of their difference. A difference that is the same everywhere (a stray voltage, a
 * rectifying contact) is no lack of repeatability and drops out. Sites beyond 5 median deviations don't count.
 *
 * @returns null where fewer than eight sites have both polarities
 */
export function repeatabilityOf({ count, voltage_V, current_A, voltageReverse_V, currentReverse_A }: Readings): Repeatability | null {
  if (!voltage_V || !current_A || !voltageReverse_V || !currentReverse_A) return null
  const differences: number[] = []
  for (let i = 0; i < count; i++) {
    const forward = voltage_V[i] / current_A[i]
    const reverse = voltageReverse_V[i] / currentReverse_A[i]
    const difference = (2 * (forward - reverse)) / (forward + reverse)
    if (Number.isFinite(difference)) differences.push(difference)
  }
  const kept = withoutStrays(differences)
  if (kept.length < LEAST_SITES) return null
  const mean = kept.reduce((sum, d) => sum + d, 0) / kept.length
  const variance = kept.reduce((sum, d) => sum + (d - mean) ** 2, 0) / (kept.length - 1)
  return { relative: Math.sqrt(variance) / 2, degreesOfFreedom: kept.length - 1 }
} // prettier-ignore

function withoutStrays(values: readonly number[]): readonly number[] {
  const middle = median(values)
  const deviation = median(values.map((value) => Math.abs(value - middle)))
  return values.filter((value) => Math.abs(value - middle) <= 5 * 1.4826 * deviation)
}

function median(values: readonly number[]): number {
  const sorted = Float64Array.from(values).sort()
  return sorted.length === 0 ? NaN : sorted[sorted.length >> 1]
}
