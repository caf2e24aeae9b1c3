import type { Readings } from '../ingest/readings'
import { SITE_FLAGS } from './flags'

/** SEMI MF1529 13.1.3: forward and reverse V/I agree within 5 % of the larger, or the reading is suspect. */
const REVERSAL_TOLERANCE = 0.05

export interface VOverI {
  /** Configuration A; NaN where the site has no voltage and current and no V/I. */
  readonly a_ohm: Float64Array
  /** Configuration B; null where the file has none. */
  readonly b_ohm: Float64Array | null
}

/**
 * V/I of every site: the mean of the forward and reverse ratios (SEMI MF1527 R2-3), which cancels a thermal EMF, or
 * the ratio of one polarity, or the V/I that the file gives. Sites whose two polarities disagree are flagged.
 */
export function ratios(readings: Readings, flags: Uint32Array): VOverI {
  const a_ohm = polarityMean(
    readings.count,
    { voltage: readings.voltage_V, current: readings.current_A },
    { voltage: readings.voltageReverse_V, current: readings.currentReverse_A },
    readings.vOverI_ohm,
    flags,
  )
  const hasB = readings.voltageB_V !== null || readings.vOverIB_ohm !== null
  const b_ohm = hasB
    ? polarityMean(
        readings.count,
        { voltage: readings.voltageB_V, current: readings.currentB_A ?? readings.current_A },
        { voltage: readings.voltageReverseB_V, current: readings.currentReverseB_A ?? readings.currentReverse_A },
        readings.vOverIB_ohm,
        flags,
      )
    : null
  return { a_ohm, b_ohm }
}

interface Polarity {
  readonly voltage: Float64Array | null
  readonly current: Float64Array | null
}

function polarityMean(
  count: number,
  forward: Polarity,
  reverse: Polarity,
  given: Float64Array | null,
  flags: Uint32Array,
): Float64Array {
  const mean = new Float64Array(count)
  for (let i = 0; i < count; i++) {
    const f = ratioAt(forward, i)
    const r = ratioAt(reverse, i)
    if (f === f && r === r) {
      mean[i] = (f + r) / 2
      if (Math.abs(f - r) > REVERSAL_TOLERANCE * Math.max(f, r)) flags[i] |= SITE_FLAGS.forwardReverse.bit
    } else if (f === f) mean[i] = f
    else if (r === r) mean[i] = r
    else mean[i] = given ? given[i] : NaN
  }
  return mean
}

function ratioAt({ voltage, current }: Polarity, i: number): number {
  return voltage && current ? voltage[i] / current[i] : NaN
}
