/** Round numbers along an axis. */
export interface Ticks {
  readonly values: readonly number[]
  readonly step: number
  /** Decimals that tell two ticks apart. */
  readonly decimals: number
}

/** Multiples of 1, 2 or 5 times a power of ten within [min, max], about `count` of them. */
export function niceTicks(min: number, max: number, count: number): Ticks {
  const step = niceStep((max - min) / Math.max(1, count))
  const first = Math.ceil(min / step - 1e-9)
  const last = Math.floor(max / step + 1e-9)
  const values: number[] = []
  for (let i = first; i <= last; i++) values.push(fromStep(i, step))
  return { values, step, decimals: stepDecimals(step) }
}

/** The round step nearest a raw one in proportion; 1 where there is no range at all. */
export function niceStep(raw: number): number {
  if (!(raw > 0) || !Number.isFinite(raw)) return 1
  const power = 10 ** Math.floor(Math.log10(raw))
  const ratio = raw / power
  // Geometric means of neighbours: 1 | 2 | 5 | 10.
  const factor = ratio < Math.SQRT2 ? 1 : ratio < Math.sqrt(10) ? 2 : ratio < Math.sqrt(50) ? 5 : 10
  return power * factor
}

export function stepDecimals(step: number): number {
  return Math.max(0, -Math.floor(Math.log10(step) + 1e-9))
}

/** A multiple of the step without the dust of binary fractions. */
export function fromStep(multiple: number, step: number): number {
  return Number((multiple * step).toPrecision(12))
}
