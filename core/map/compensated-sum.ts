/** A sum of products as if carried in twice the digits: for residuals in which nearly everything cancels. */
export class CompensatedSum {
  #high = 0
  #low = 0

  reset(): void {
    this.#high = 0
    this.#low = 0
  }

  /**
   * Adds a * b. The rounding errors of the product (Dekker's split, good below about 1e290) and of the addition
   * (Knuth) are kept apart.
   *
   * Source: T. Ogita, S. M. Rump, S. Oishi, SIAM J. Sci. Comput. 26 (2005) 1955, algorithm Dot2 (from memory).
   */
  addProduct(a: number, b: number): void {
    const product = a * b
    const aHigh = upperHalf(a)
    const bHigh = upperHalf(b)
    const aLow = a - aHigh
    const bLow = b - bHigh
    const productError = aLow * bLow - (product - aHigh * bHigh - aLow * bHigh - aHigh * bLow)
    const sum = this.#high + product
    const added = sum - this.#high
    this.#low += this.#high - (sum - added) + (product - added) + productError
    this.#high = sum
  }

  get value(): number {
    return this.#high + this.#low
  }
}

/** The upper 26 of 53 bits: 2^27 + 1 is Dekker's splitter. */
function upperHalf(value: number): number {
  const spread = 134217729 * value
  return spread - (spread - value)
}
