/** Exact arithmetic on doubles: every finite double is a whole number of 2^-1074, so sums and squares are whole too. */

/** The doubles as whole multiples of one power of two. */
export interface Scaled {
  readonly whole: readonly bigint[]
  /** value = whole / 2^shift. */
  readonly shift: number
}

export function exactly(values: ArrayLike<number>): Scaled {
  const parts = Array.from(values, split)
  const shift = Math.max(...parts.map((part) => part.shift))
  return { whole: parts.map((part) => part.whole << BigInt(shift - part.shift)), shift }
}

/** Sum of squared deviations from the mean, exact up to the last rounding to a double. */
export function exactSumOfSquares(values: ArrayLike<number>): number {
  const { whole, shift } = exactly(values)
  const count = BigInt(whole.length)
  const sum = whole.reduce((a, b) => a + b, 0n)
  const squares = whole.reduce((a, b) => a + b * b, 0n)
  // sum (x - mean)^2 = (n sum x^2 - (sum x)^2) / n, free of cancellation in whole numbers.
  return ratio(count * squares - sum * sum, count << BigInt(2 * shift))
}

export function exactMean(values: ArrayLike<number>): number {
  const { whole, shift } = exactly(values)
  return ratio(
    whole.reduce((a, b) => a + b, 0n),
    BigInt(whole.length) << BigInt(shift),
  )
}

/** To 60 bits before the last rounding. */
export function ratio(numerator: bigint, denominator: bigint): number {
  if (numerator === 0n) return 0
  const magnitude = numerator < 0n ? -numerator : numerator
  const bits = denominator.toString(2).length - magnitude.toString(2).length + 60
  const quotient = bits >= 0 ? (magnitude << BigInt(bits)) / denominator : magnitude / (denominator << BigInt(-bits))
  const value = Number(quotient) * 2 ** -bits
  return numerator < 0n ? -value : value
}

function split(value: number): { whole: bigint; shift: number } {
  let [scaled, shift] = [value, 0]
  while (!Number.isInteger(scaled)) {
    scaled *= 2
    shift++
  }
  return { whole: BigInt(scaled), shift }
}
