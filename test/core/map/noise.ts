/** Noise that is the same in every run: normal deviates from a fixed sequence. */
import { normalQuantile } from '../../../core/numeric/normal'

/** Standard normal, one a call. */
export function noiseFrom(seed: number): () => number {
  let state = seed >>> 0
  return () => {
    // Mulberry32, of its upper digits the half between two whole numbers, so that neither 0 nor 1 comes out.
    state = (state + 0x6d2b79f5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state)
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed
    return normalQuantile((((mixed ^ (mixed >>> 14)) >>> 0) + 0.5) / 4294967296)
  }
}

export function noisy(values: Float64Array, sigma: number, seed: number): Float64Array {
  const noise = noiseFrom(seed)
  return values.map((value) => value + sigma * noise())
}
